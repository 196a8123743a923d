// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/ladder_chain.h"

#include <algorithm>
#include <cassert>
#include <limits>
#include <tuple>

namespace rungwright
{

std::string_view familyPhrase(RuleFamily family)
{
    switch (family) {
    case RuleFamily::locks:
        return "the locks";
    case RuleFamily::changePercent:
        return "the greatest change in percent";
    case RuleFamily::changeMoney:
        return "the greatest change in money";
    case RuleFamily::ceiling:
        return "the ceiling";
    case RuleFamily::least:
        return "the lowest asking price";
    case RuleFamily::pointLimits:
        return "the least and greatest price point";
    case RuleFamily::total:
        return "the asking total";
    case RuleFamily::tierTotal:
        return "the greatest change of the tier's asking total";
    case RuleFamily::shareAtFloor:
        return "the least share at the advertised floor";
    }
    return "";
}

void roomsOf(std::span<const Unit> units, const PriceRules& rules, std::optional<RuleFamily> without, std::vector<Room>& out)
{
    PriceRules eased = rules;
    if (without == RuleFamily::changePercent)
        eased.greatestChangePercent.reset();
    if (without == RuleFamily::changeMoney)
        eased.greatestChange.reset();
    if (without == RuleFamily::ceiling)
        eased.ceiling.reset();
    if (without == RuleFamily::least)
        eased.least.reset();
    if (without == RuleFamily::pointLimits)
        eased.points.least = eased.points.greatest = std::nullopt;
    out.clear();
    out.reserve(units.size());
    Unit unlocked;
    for (const Unit& unit : units) {
        unlocked.asking = unit.asking;
        out.push_back(roomOf(without == RuleFamily::locks ? unlocked : unit, eased));
    }
}

void chainOrder(std::span<const Unit> units, std::span<const Room> rooms, Among among, OrderKept kept, std::vector<std::uint32_t>& places)
{
    assert(rooms.size() == units.size());
    places.clear();
    places.reserve(units.size());
    for (std::uint32_t i = 0; i < units.size(); ++i)
        if (among == Among::all || (among == Among::onOffer ? units[i].onOffer() : units[i].rentable()))
            places.push_back(i);
    const auto grade = [&](std::uint32_t i) { return units[i].grade.value_or(std::numeric_limits<int>::min()); };
    const auto rank = [&](std::uint32_t i) {
        const Unit& unit = units[i];
        return std::tuple(unit.asking, grade(i), rooms[i].lo, rooms[i].hi, !unit.onOffer(), unit.vacancyChance.value_or(-1), i);
    };
    std::ranges::sort(places, {}, rank);
    if (kept == OrderKept::present)
        return;

    // The graded ones to the front, in order of grade, then back onto the rungs that graded units held.
    std::vector<std::uint32_t> graded;
    for (const std::uint32_t i : places)
        if (units[i].grade)
            graded.push_back(i);
    std::ranges::stable_sort(graded, {}, grade);
    auto next = graded.begin();
    for (std::uint32_t& place : places)
        if (units[place].grade)
            place = *next++;
}

void LadderChain::build(const Tier& tier, const ModelSettings& model, const PriceRules& rules, OrderKept order, bool takenStay,
                        std::span<const double> weights, std::optional<RuleFamily> without)
{
    assert(weights.empty() || weights.size() == tier.units.size());
    roomsOf(tier.units, rules, without, rooms);
    if (takenStay)
        for (std::size_t i = 0; i < rooms.size(); ++i)
            if (!tier.units[i].onOffer())
                rooms[i] = {tier.units[i].asking, tier.units[i].asking, Bound::lock, Bound::lock};
    chainOrder(tier.units, rooms, modelUnits(model.kind), order, places);

    m_ladder.clear();
    todayPrices.clear();
    least.clear();
    most.clear();
    today.clear();
    weight.clear();
    lo.clear();
    hi.clear();
    counted.clear();
    total = {};
    for (const std::uint32_t i : places) {
        const Unit& unit = tier.units[i];
        m_ladder.push_back({unit.asking, i});
        todayPrices.push_back(unit.asking);
        least.push_back(rooms[i].lo);
        most.push_back(rooms[i].hi);
        today.push_back(static_cast<double>(unit.asking.minor));
        weight.push_back(weights.empty() ? 1.0 : weights[i]);
        lo.push_back(static_cast<double>(rooms[i].lo.minor));
        hi.push_back(static_cast<double>(rooms[i].hi.minor));
        counted.push_back(unit.onOffer() ? 1 : 0);
        total += unit.onOffer() ? unit.asking : Price{};
    }

    cheapestOdds(m_ladder, tier.units, model, cheapest);
    odds.assign(cheapest.perRung.begin(), cheapest.perRung.end());
    double found = 0;
    for (const double w : odds)
        found += w;
    if (!(found > 0))
        odds.clear();
    for (double& w : odds)
        w /= found;

    wantedAtFloor = reachFloor = 0;
    if (!rules.leastShareAtFloor || !tier.hasFloor() || without == RuleFamily::shareAtFloor)
        return;
    const auto onOffer = static_cast<std::size_t>(std::ranges::count_if(tier.units, &Unit::onOffer));
    wantedAtFloor = unitsWantedAtFloor(onOffer, rules);
    PricePoints points = rules.points;
    if (without == RuleFamily::pointLimits)
        points.least = points.greatest = std::nullopt;
    for (std::size_t i = 0; i < places.size() && reachFloor < wantedAtFloor; ++i) {
        if (counted[i] == 0)
            continue;
        if (!holdPlaceAtFloor(i, tier.advertisedFloor, points))
            return;
        ++reachFloor;
    }
}

bool LadderChain::holdPlaceAtFloor(std::size_t place, Price floor, const PricePoints& points)
{
    if (most[place] <= floor)
        return true;
    Price price = todayPrices[place] <= floor ? todayPrices[place] : Price{0};
    if (const auto point = points.atOrBelow(floor))
        price = std::max(price, *point);
    if (price < least[place])
        return false;
    most[place] = price;
    hi[place] = inMinor(price);
    return true;
}

bool LadderChain::holdAtFloor(std::size_t rungs, Price floor, const PricePoints& points)
{
    for (std::size_t i = 0; i < rungs; ++i)
        if (!holdPlaceAtFloor(i, floor, points))
            return false;
    return true;
}

RepairProblem LadderChain::repairProblem(const PricePoints& points) const
{
    return {&points, {}, todayPrices, least, most, weight, counted, odds, {}, {}, {}, 0, 0};
}

} // namespace rungwright
