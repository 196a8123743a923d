// SPDX-License-Identifier: GPL-3.0-or-later
#include "tier_maker.h"

#include "ladder/ladder.h"

#include <algorithm>
#include <cmath>
#include <numeric>

namespace rungwright::samples
{

namespace
{

Price onStep(double minor, Price step) { return Price{std::llround(minor / static_cast<double>(step.minor)) * step.minor}; }

std::string unitName(const std::string& prefix, int number) { return prefix + (number < 10 ? "0" : "") + std::to_string(number); }

// Which of the ladder's places are taken: a weighted draw without return, the weight falling with the place.
std::vector<bool> takenPlaces(const TierPlan& plan, const std::vector<Unit>& ladder, int rentable, Dice& dice)
{
    const int taken = rentable - plan.onOffer;
    std::vector<std::pair<double, int>> keys;
    for (int i = 0; i < rentable; ++i) {
        const double weight = std::exp(-plan.cheapFirst * i / rentable);
        const double key = std::pow(dice.share(), 1 / weight);
        keys.emplace_back(ladder[static_cast<std::size_t>(i)].asking < plan.vacantFrom ? 2 : key, i);
    }
    std::sort(keys.begin(), keys.end(), [](const auto& a, const auto& b) { return a.first > b.first; });
    std::vector<bool> places(static_cast<std::size_t>(rentable), false);
    for (int i = 0; i < taken; ++i)
        places[static_cast<std::size_t>(keys[static_cast<std::size_t>(i)].second)] = true;
    return places;
}

Candidate named(const char* name, const char* note, const TierCase& tierCase) { return {name, note, askingPrices(tierCase.tier.units)}; }

// The price nearest to the wish that the rules allow.
void put(Candidate& candidate, const TierCase& tierCase, std::uint32_t unit, double minor, const PriceRules& rules)
{
    const Unit& of = tierCase.tier.units[unit];
    candidate.prices[unit] = snapped(of, of.asking, Price{std::llround(minor)}, rules).price;
}

std::vector<Rung> onOffer(const TierCase& tierCase)
{
    return sortedLadder(tierCase.tier.units, askingPrices(tierCase.tier.units), Among::onOffer);
}

} // namespace

TierCase makeTier(const TierPlan& plan, Dice& dice)
{
    TierCase made;
    made.tier.site = plan.site;
    made.tier.name = plan.name;
    made.tier.advertisedFloor = plan.floor;
    const int rentable = plan.units - plan.closed;
    std::vector<Unit> ladder;
    for (int i = 0; i < plan.units; ++i) {
        Unit unit;
        const bool closed = i >= rentable;
        const double u = closed ? dice.share() : rentable == 1 ? 0 : static_cast<double>(i) / (rentable - 1);
        const double noise = i == 0 || i == rentable - 1 ? 0 : (dice.share() - 0.5) / rentable;
        const double bent = std::pow(std::clamp(u + noise, 0.0, 1.0), plan.bend);
        unit.asking =
            onStep(static_cast<double>(plan.lowest.minor) + static_cast<double>((plan.highest - plan.lowest).minor) * bent, plan.step);
        unit.status = closed ? Status::closed : Status::vacant;
        if (plan.areaM2 > 0)
            unit.areaM2 = std::round(plan.areaM2 * (0.92 + 0.16 * u) * 10) / 10;
        ladder.push_back(unit);
    }
    const std::vector<bool> taken = takenPlaces(plan, ladder, rentable, dice);
    int reservedLeft = plan.reserved;
    for (std::size_t i = 0; i < taken.size(); ++i) {
        if (!taken[i])
            continue;
        const bool reserved = reservedLeft > 0 && dice.whole(0, 3) == 0;
        reservedLeft -= reserved ? 1 : 0;
        ladder[i].status = reserved ? Status::reserved : Status::occupied;
    }
    // Grades follow the prices (equal prices share one), then a few are thrown anew.
    for (std::size_t i = 0; plan.grades > 0 && i < ladder.size(); ++i) {
        const double standing =
            static_cast<double>((ladder[i].asking - plan.lowest).minor) / static_cast<double>((plan.highest - plan.lowest).minor);
        ladder[i].grade = 1 + std::min(plan.grades - 1, static_cast<int>(standing * plan.grades));
    }
    for (int i = 0; i < plan.inverted; ++i)
        ladder[static_cast<std::size_t>(dice.whole(0, rentable - 1))].grade = dice.whole(1, plan.grades);
    // Unit numbers have nothing to do with prices: corridors, not ladders.
    std::vector<std::size_t> order(ladder.size());
    std::iota(order.begin(), order.end(), std::size_t{0});
    for (std::size_t i = order.size(); i > 1; --i)
        std::swap(order[i - 1], order[static_cast<std::size_t>(dice.whole(0, static_cast<int>(i) - 1))]);
    for (const std::size_t i : order) {
        ladder[i].name = unitName(plan.prefix, static_cast<int>(made.tier.units.size()) + 1);
        made.tier.units.push_back(ladder[i]);
    }
    return made;
}

Candidate lowerTheLowEnd(const TierCase& tierCase, int count, const PriceRules& rules)
{
    Candidate candidate =
        named("Lower the low end", "Puts the cheapest unit on offer at, or as near as the rules allow to, the advertised floor.", tierCase);
    const std::vector<Rung> ladder = onOffer(tierCase);
    const double floor = static_cast<double>(tierCase.tier.advertisedFloor.minor);
    const int last = std::min(count, static_cast<int>(ladder.size()));
    for (int i = 0; i < last; ++i) {
        const Rung& rung = ladder[static_cast<std::size_t>(i)];
        const double above = static_cast<double>(rung.price.minor) - floor;
        put(candidate, tierCase, rung.unit, floor + above * i / count, rules);
    }
    return candidate;
}

Candidate evenSteps(const TierCase& tierCase, const PriceRules& rules)
{
    Candidate candidate =
        named("Even steps", "Spreads the units on offer evenly between the advertised floor and today's dearest one.", tierCase);
    const std::vector<Rung> ladder = onOffer(tierCase);
    if (ladder.size() < 2)
        return candidate;
    const double floor = static_cast<double>(tierCase.tier.advertisedFloor.minor);
    const double top = static_cast<double>(ladder.back().price.minor);
    for (std::size_t i = 0; i < ladder.size(); ++i)
        put(candidate, tierCase, ladder[i].unit, floor + (top - floor) * static_cast<double>(i) / static_cast<double>(ladder.size() - 1),
            rules);
    return candidate;
}

Candidate easeTheMiddle(const TierCase& tierCase, double percent, const PriceRules& rules)
{
    Candidate candidate = named("Ease the middle", "The middle third on offer asks a little less.", tierCase);
    const std::vector<Rung> ladder = onOffer(tierCase);
    for (std::size_t i = ladder.size() / 3; i < 2 * ladder.size() / 3; ++i)
        put(candidate, tierCase, ladder[i].unit, static_cast<double>(ladder[i].price.minor) * (1 - percent / 100), rules);
    return candidate;
}

} // namespace rungwright::samples
