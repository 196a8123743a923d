// SPDX-License-Identifier: GPL-3.0-or-later
// Reshaping by hand: move some units, bend the whole ladder, hold the asking total.
#pragma once

#include "reshape/rules.h"

#include <cstdint>
#include <span>
#include <vector>

namespace rungwright
{

/// What a gesture did. `prices` (by unit index) are whole and allowed whatever happened.
struct Reshaped {
    std::vector<Price> prices;
    Bound bound = Bound::none; ///< The first thing that stopped a moved unit short, if any.
    Price leftOver;            ///< hold the total: what could not be spread (new total minus old); 0 when held exactly.
};

/// Each of `moved` (unit indices) asks `by` more than in `start`, snapped and held inside the rules; the others keep `start`'s price.
/// Reuses `out`'s storage.
void moveUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> moved, Price by,
               const PriceRules& rules, Reshaped& out);

/// Each of `moved` goes `steps` price points up (negative: down).
void nudgeUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> moved, int steps,
                const PriceRules& rules, Reshaped& out);

/// Bend: p -> lo + (hi - lo) ((p - lo) / (hi - lo))^g over `among` (unit indices; lo and hi their least and greatest price in `start`),
/// snapped to price points and held inside the rules. g > 1 lowers the middle, g < 1 raises it; the ends and locked units stay.
/// Order among the unlocked units is kept up to ties (checked by tests); a unit held by its own rules may break it, as it may in a drag.
/// g > 0. Nothing changes when all prices are equal.
void bendUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> among, double g,
               const PriceRules& rules, Reshaped& out);

/// Spreads what `out` took or gave (against `start`, over `counted` unit indices) over the unlocked units of `counted` that are not in
/// `moved`, in proportion to their room inside the rules, in price points; units with the largest remainder first, ties by index. Sets
/// leftOver to what has no room or is smaller than every step that could be made.
void holdTotal(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> counted,
               std::span<const std::uint32_t> moved, const PriceRules& rules, Reshaped& out);

} // namespace rungwright
