// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/rules.h"

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <limits>

namespace rungwright
{

namespace
{

/// How far a rule lets a price go, and which rule it is.
struct Limit {
    std::int64_t minor;
    Bound bound;
};

/// The greatest change in whole minor units, up to `most`, that `percent` of `price` allows.
std::int64_t wholePercent(Price price, double percent, Price most = kGreatestPrice)
{
    const double change = static_cast<double>(price.minor) * percent / 100.0;
    // 0.7 % of 100.00 is 69.99999999999999 in floating point; a hair is added so that a whole amount is not lost to that.
    const double hair = 1e-9 + 1e-14 * change;
    return static_cast<std::int64_t>(std::floor(std::min(change + hair, static_cast<double>(most.minor))));
}

/// The stricter of two limits in the direction `up`; the first when they are equal.
Limit stricter(Limit first, Limit second, bool up)
{
    const bool secondWins = up ? second.minor < first.minor : second.minor > first.minor;
    return secondWins ? second : first;
}

Limit limitOf(Price today, const PriceRules& rules, bool up)
{
    const std::int64_t sign = up ? 1 : -1;
    Limit limit = up ? Limit{std::min(rules.points.greatest.value_or(kGreatestPrice), kGreatestPrice).minor, Bound::greatestPoint}
                     : Limit{std::max(rules.points.least.value_or(Price{1}), Price{1}).minor, Bound::leastPoint};
    if (rules.greatestChangePercent)
        limit = stricter({today.minor + sign * wholePercent(today, *rules.greatestChangePercent), Bound::changePercent}, limit, up);
    if (rules.greatestChange)
        limit = stricter({today.minor + sign * rules.greatestChange->minor, Bound::changeMoney}, limit, up);
    if (up && rules.ceiling)
        limit = stricter({rules.ceiling->minor, Bound::ceiling}, limit, up);
    if (!up && rules.least)
        limit = stricter({rules.least->minor, Bound::least}, limit, up);
    return limit;
}

std::int64_t distance(Price a, Price b) { return std::abs(a.minor - b.minor); }

/// The nearer of two prices to `wanted`, the cheaper of two equally near ones.
Price nearer(Price wanted, Price a, Price b)
{
    const std::int64_t toA = distance(wanted, a);
    const std::int64_t toB = distance(wanted, b);
    return toA == toB ? std::min(a, b) : toA < toB ? a : b;
}

} // namespace

std::string_view boundReason(Bound bound)
{
    switch (bound) {
    case Bound::none:
        return "nothing is in the way";
    case Bound::lock:
        return "the unit is locked";
    case Bound::changePercent:
        return "the greatest change in percent is reached";
    case Bound::changeMoney:
        return "the greatest change in money is reached";
    case Bound::ceiling:
        return "the ceiling is reached";
    case Bound::least:
        return "the lowest asking price is reached";
    case Bound::leastPoint:
        return "the least price point is reached";
    case Bound::greatestPoint:
        return "the greatest price point is reached";
    case Bound::noPricePoint:
        return "the rules allow no price point";
    case Bound::totalPercent:
        return "the tier's asking total has changed by the greatest percentage";
    case Bound::totalMoney:
        return "the tier's asking total has changed by the greatest amount";
    case Bound::shareAtFloor:
        return "no fewer units may be at the advertised floor";
    }
    return "";
}

Room roomOf(const Unit& unit, const PriceRules& rules)
{
    const Price today = unit.asking;
    if (unit.locked)
        return {today, today, Bound::lock, Bound::lock};
    if (!rules.points.nearest(today))
        return {today, today, Bound::noPricePoint, Bound::noPricePoint};

    const Limit up = limitOf(today, rules, true);
    const Limit down = limitOf(today, rules, false);
    Room room{today, today, down.bound, up.bound};
    if (const auto point = rules.points.atOrBelow(Price{up.minor}))
        room.hi = std::max(today, *point);
    if (const auto point = rules.points.atOrAbove(Price{down.minor}))
        room.lo = std::min(today, *point);
    return room;
}

Snapped snapped(const Unit& unit, Price from, Price wanted, const PriceRules& rules)
{
    if (unit.locked)
        return {from, wanted == from ? Bound::none : Bound::lock};

    const Room room = roomOf(unit, rules);
    const Price inside = std::clamp(wanted, room.lo, room.hi);
    Price price = unit.asking;
    if (const auto below = rules.points.atOrBelow(inside); below && *below >= room.lo)
        price = nearer(wanted, price, *below);
    if (const auto above = rules.points.atOrAbove(inside); above && *above <= room.hi)
        price = nearer(wanted, price, *above);

    // What the spacing alone would have given tells whether a rule was in the way.
    const Price freely = nearer(wanted, unit.asking, rules.points.nearestWithoutLimits(wanted));
    if (freely == price)
        return {price, Bound::none};
    if (freely > room.hi)
        return {price, room.above};
    if (freely < room.lo)
        return {price, room.below};
    // Between today's price and the price points, where those begin above it or end below it.
    return {price, rules.points.greatest && freely > *rules.points.greatest ? Bound::greatestPoint : Bound::leastPoint};
}

std::optional<TotalRoom> totalRoomOf(Price today, const PriceRules& rules)
{
    if (!rules.greatestTierChangePercent && !rules.greatestTierChange)
        return {};
    // No sum of a tier's prices comes near; there is room above it in the type.
    constexpr Price far{std::numeric_limits<std::int64_t>::max() / 4};
    Limit change{far.minor, Bound::totalMoney};
    if (rules.greatestTierChangePercent)
        change = {wholePercent(today, *rules.greatestTierChangePercent, far), Bound::totalPercent};
    if (rules.greatestTierChange)
        change = stricter(change, {rules.greatestTierChange->minor, Bound::totalMoney}, true);
    return TotalRoom{today - Price{change.minor}, today + Price{change.minor}, change.bound};
}

std::size_t unitsWantedAtFloor(std::size_t onOffer, const PriceRules& rules)
{
    if (!rules.leastShareAtFloor)
        return 0;
    // 0.07 of 100 is 7.000000000000001 in floating point; a hair is taken so that it does not ask for an eighth.
    const double wanted = std::ceil(*rules.leastShareAtFloor * static_cast<double>(onOffer) * (1 - 1e-12));
    return std::min(onOffer, static_cast<std::size_t>(std::max(0.0, wanted)));
}

} // namespace rungwright
