// SPDX-License-Identifier: GPL-3.0-or-later
// What the rules ask of a tier as a whole, and how it holds a gesture back.
#pragma once

#include "reshape/by_hand.h"

#include <cstdint>
#include <optional>
#include <span>

namespace rungwright
{

/// Limits of a tier's ladder under change by hand.
struct TierLimits {
    std::optional<TotalRoom> total; ///< Of the units on offer.
    Price floor;                    ///< The advertised floor.
    std::size_t atFloor = 0;        ///< So many units on offer are to be at or below it; 0 without a floor.

    bool any() const { return total || atFloor > 0; }
};
TierLimits tierLimitsOf(const Tier& tier, const PriceRules& rules);

/// The limit that `prices` overstep further than `start` does, if any: a ladder that breaks a rule already may come back by any amount, and
/// go no further.
Bound oversteppedLimit(const Tier& tier, const TierLimits& limits, std::span<const Price> start, std::span<const Price> prices);

/// Makes a gesture of `amount`, or as much of it as the tier's limits let it go. `make(part)` fills `out` for a part of the amount, between
/// 0 and it; where it moves every price one way, further for more, it goes as far as the limits let it. A gesture that moves others the
/// other way, to hold a total, stays inside the limits, but may stop short of the furthest. What is held back has the limit it would
/// overstep next as its bound. Allocates nothing.
template <class Make>
void makeWithin(const Tier& tier, const TierLimits& limits, std::span<const Price> start, std::int64_t amount, Make make, Reshaped& out)
{
    make(amount);
    if (!limits.any())
        return;
    Bound bound = oversteppedLimit(tier, limits, start, out.prices);
    if (bound == Bound::none)
        return;
    std::int64_t good = 0;
    std::int64_t bad = amount;
    while (bad - good > 1 || good - bad > 1) {
        const std::int64_t middle = good + (bad - good) / 2;
        make(middle);
        const Bound at = oversteppedLimit(tier, limits, start, out.prices);
        if (at == Bound::none) {
            good = middle;
        } else {
            bad = middle;
            bound = at;
        }
    }
    make(good);
    out.bound = bound;
}

} // namespace rungwright
