// SPDX-License-Identifier: GPL-3.0-or-later
// The house's price rules and the room they leave each unit.
#pragma once

#include "ladder/price_points.h"
#include "ladder/unit.h"

#include <optional>
#include <span>
#include <string_view>
#include <vector>

namespace rungwright
{

/// Rules for changing prices. A rule binds changes, not what is already asked: a unit that breaks a rule today may stay where it is.
struct PriceRules {
    PricePoints points;
    std::optional<double> greatestChangePercent; ///< Of today's asking price, > 0: at most so many percent up or down.
    std::optional<Price> greatestChange;         ///< In money, > 0.
    std::optional<Price> ceiling;                ///< No price is raised above it.

    bool operator==(const PriceRules&) const = default;
};

/// What keeps a unit from going further in one direction.
enum class Bound : unsigned char { none, lock, changePercent, changeMoney, ceiling, leastPoint, greatestPoint, noPricePoint };
/// A short phrase for the user: "the unit is locked", "the greatest change is reached", ...
std::string_view boundReason(Bound bound);

/// The prices a unit may take: price points in [lo, hi], and today's price itself (always inside).
struct Room {
    Price lo;
    Price hi;
    Bound below = Bound::none; ///< What binds at lo.
    Bound above = Bound::none; ///< What binds at hi.
};

/// `unit.asking` is today's price, from which changes count. Locked units have lo = hi = today's price; for a candidate the
/// caller passes the price it holds the unit at.
Room roomOf(const Unit& unit, const PriceRules& rules);

/// `wanted`, moved to the nearest price point inside the unit's room (today's price counts as allowed). A locked unit stays at `from`.
/// `bound` tells what stopped it, if `wanted` itself could not be had for another reason than the price points' spacing.
struct Snapped {
    Price price;
    Bound bound = Bound::none;
};
Snapped snapped(const Unit& unit, Price from, Price wanted, const PriceRules& rules);

} // namespace rungwright
