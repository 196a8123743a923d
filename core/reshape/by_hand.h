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
/// With `by` = 0 nothing moves. Reuses `out`'s storage.
void moveUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> moved, Price by,
               const PriceRules& rules, Reshaped& out);

/// Each of `moved` goes `steps` price points up (negative: down). A unit with no price point that way stays where it is.
void nudgeUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> moved, int steps,
                const PriceRules& rules, Reshaped& out);

/// Bend: p -> lo + (hi - lo) ((p - lo) / (hi - lo))^g over `among` (unit indices; lo and hi their least and greatest price in `start`),
/// moved to the nearest price point in [lo, hi] and held inside the rules. g > 1 lowers the middle, g < 1 raises it; units at the ends and
/// locked units stay. Order among the unlocked units is kept up to ties (checked by tests); a unit held by its own rules may break it, as
/// it may in a drag. g > 0. Nothing changes when all prices are equal, when g = 1, or when no price point lies in [lo, hi].
void bendUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> among, double g,
               const PriceRules& rules, Reshaped& out);

/// Spreads what `out` took or gave (against `start`, over `counted` unit indices) over the unlocked units of `counted` that are not in
/// `moved`, in proportion to their room inside the rules: each takes the last allowed price before its share, then units go one price point
/// further, largest remainder first and ties by index, while such a step still fits. If something is then left, one exchange (a unit one
/// point further, another one point back) is tried that would bring it to nothing. Never overshoots the total.
///
/// Sets leftOver to what remains: what has no room, or is smaller than every single step that could be made. When all prices concerned are
/// points of an evenly spaced grid, only want of room leaves anything; with uneven endings, or units whose price today is no point, a
/// remainder below the spacing may stay. `out.prices` of the receiving units are taken to be those of `start`.
void holdTotal(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> counted,
               std::span<const std::uint32_t> moved, const PriceRules& rules, Reshaped& out);

} // namespace rungwright
