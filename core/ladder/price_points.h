// SPDX-License-Identifier: GPL-3.0-or-later
// The prices an operator allows.
#pragma once

#include "ladder/price.h"

#include <optional>
#include <vector>

namespace rungwright
{

/// Allowed prices are k * step + ending for whole k and each ending, within [least, greatest].
/// `endings` are offsets in [0, step), sorted, without repeats; an empty list means the single ending 0.
/// Step 1.00 with endings .00 .50 .95 .99; step 5.00 alone for multiples of five; step 10.00 with ending 9.00.
/// step >= 1 minor unit. No price point lies below 1 minor unit or above kGreatestPrice.
struct PricePoints {
    Price step{1};
    std::vector<Price> endings;
    std::optional<Price> least;
    std::optional<Price> greatest;

    bool operator==(const PricePoints&) const = default;

    bool allows(Price price) const;
    /// The dearest price point not above `price`; nothing when there is none.
    std::optional<Price> atOrBelow(Price price) const;
    /// The cheapest price point not below `price`; nothing when there is none.
    std::optional<Price> atOrAbove(Price price) const;
    /// The nearest price point, the cheaper of two equally near ones; nothing when no price is allowed at all.
    std::optional<Price> nearest(Price price) const;
    /// The nearest of k * step + ending as if there were no least, no greatest and no bound on k: what the spacing alone would give.
    Price nearestWithoutLimits(Price price) const;
    /// `steps` price points up (or down when negative) from `price`, which need not be one itself; the first step
    /// goes to the next point in that direction. Stops at the last point there is; `price` itself when there is none that way.
    Price stepped(Price price, int steps) const;
};

} // namespace rungwright
