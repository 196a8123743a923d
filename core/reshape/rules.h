// SPDX-License-Identifier: GPL-3.0-or-later
// The house's price rules and the room they leave each unit, and the tier as a whole.
#pragma once

#include "ladder/price_points.h"
#include "ladder/unit.h"

#include <cstddef>
#include <optional>
#include <span>
#include <string_view>
#include <vector>

namespace rungwright
{

/// The order of prices a reshaping keeps.
enum class OrderKept : unsigned char {
    present, ///< Today's: a unit asked for less stays at or below one asked for more.
    grade,   ///< A higher grade is never asked for less: inversions are repaired. Within a grade today's order.
};

/// Rules for changing prices. A rule binds changes, not what is already asked: a unit that breaks a rule today may stay where it is.
/// `leastShareAtFloor` and `order` ask something of the ladder that a solver or a shape makes; a change by hand may not lower the share
/// further below, and keeps no order.
struct PriceRules {
    PricePoints points;
    std::optional<double> greatestChangePercent; ///< Of today's asking price, > 0: at most so many percent up or down.
    std::optional<Price> greatestChange;         ///< In money, > 0.
    std::optional<Price> ceiling;                ///< No price is raised above it.
    std::optional<Price> least;                  ///< No price is lowered below it; at most the ceiling.
    /// Of the asking total of the units on offer, > 0: at most so many percent, and so much money, up or down from today's.
    std::optional<double> greatestTierChangePercent;
    std::optional<Price> greatestTierChange;
    OrderKept order = OrderKept::present;
    std::optional<double> leastShareAtFloor; ///< Of the units on offer, at or below the advertised floor; in (0, 1].

    bool operator==(const PriceRules&) const = default;
};

/// What keeps a unit from going further in one direction.
enum class Bound : unsigned char {
    none,
    lock,
    changePercent,
    changeMoney,
    ceiling,
    least, ///< The floor for asking prices.
    leastPoint,
    greatestPoint,
    noPricePoint,
    totalPercent, ///< What the tier's asking total may change by.
    totalMoney,
    shareAtFloor, ///< Units that the least share at the advertised floor needs.
};
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

/// What the rules leave the asking total of the units on offer; nothing when they do not limit it. Today's total always lies inside.
struct TotalRoom {
    Price least;
    Price most;
    Bound bound = Bound::none; ///< Which of the two rules is the stricter one.
};
std::optional<TotalRoom> totalRoomOf(Price today, const PriceRules& rules);

/// How many of so many units on offer the rules want at or below the advertised floor.
std::size_t unitsWantedAtFloor(std::size_t onOffer, const PriceRules& rules);

} // namespace rungwright
