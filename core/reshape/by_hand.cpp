// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/by_hand.h"

#include <algorithm>
#include <cassert>
#include <cmath>

namespace rungwright
{

namespace
{

void begin(std::span<const Unit> units, std::span<const Price> start, Reshaped& out)
{
    assert(units.size() == start.size());
    static_cast<void>(units);
    out.prices.assign(start.begin(), start.end());
    out.bound = Bound::none;
    out.leftOver = {};
}

void place(std::uint32_t unit, Snapped where, Reshaped& out)
{
    out.prices[unit] = where.price;
    if (out.bound == Bound::none)
        out.bound = where.bound;
}

} // namespace

void moveUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> moved, Price by,
               const PriceRules& rules, Reshaped& out)
{
    begin(units, start, out);
    if (by == Price{0})
        return;
    for (const std::uint32_t unit : moved)
        place(unit, snapped(units[unit], start[unit], start[unit] + by, rules), out);
}

void nudgeUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> moved, int steps,
                const PriceRules& rules, Reshaped& out)
{
    begin(units, start, out);
    if (steps == 0)
        return;
    for (const std::uint32_t unit : moved) {
        const Price wanted = rules.points.stepped(start[unit], steps);
        const bool pointsRanOut = wanted == rules.points.stepped(start[unit], steps > 0 ? steps - 1 : steps + 1);
        // With no point at all that way the unit stays, wherever it stands.
        Snapped where = wanted == start[unit] ? Snapped{wanted, units[unit].locked ? Bound::lock : Bound::none}
                                              : snapped(units[unit], start[unit], wanted, rules);
        if (pointsRanOut && where.bound == Bound::none)
            where.bound = steps > 0 ? Bound::greatestPoint : Bound::leastPoint;
        place(unit, where, out);
    }
}

void bendUnits(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> among, double g,
               const PriceRules& rules, Reshaped& out)
{
    assert(g > 0);
    begin(units, start, out);
    if (among.empty() || g == 1)
        return;
    const auto priceOf = [start](std::uint32_t unit) { return start[unit]; };
    const Price lo = start[*std::ranges::min_element(among, {}, priceOf)];
    const Price hi = start[*std::ranges::max_element(among, {}, priceOf)];
    const auto width = static_cast<double>((hi - lo).minor);
    // One rounding for all keeps the order: to the nearest price point between the ends. Without one nothing can move.
    const auto lowest = rules.points.atOrAbove(lo);
    const auto highest = rules.points.atOrBelow(hi);
    if (!lowest || !highest || *lowest > *highest)
        return;

    for (const std::uint32_t unit : among) {
        if (units[unit].locked || start[unit] == lo || start[unit] == hi)
            continue;
        const double bent = width * std::pow(static_cast<double>((start[unit] - lo).minor) / width, g);
        const Price wanted = lo + Price{std::llround(bent)};
        const Price point = std::clamp(rules.points.nearest(wanted).value_or(*lowest), *lowest, *highest);
        place(unit, snapped(units[unit], start[unit], point, rules), out);
    }
}

} // namespace rungwright
