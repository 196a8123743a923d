// SPDX-License-Identifier: GPL-3.0-or-later
#include "claims/checks.h"

#include "cheapest/erlang.h"
#include "cheapest/odds.h"
#include "ladder/figures.h"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

/// The tier at two sets of prices, counted once.
struct Counted {
    const Tier& tier;
    std::span<const Price> prices;
    std::vector<Price> today;
    std::vector<Rung> onOffer; ///< Of the new prices.
    std::vector<Rung> before;
    std::size_t atFloor = 0; ///< On offer, at or below the floor.
};

std::size_t countIf(const std::vector<Rung>& rungs, auto holds)
{
    return static_cast<std::size_t>(std::ranges::count_if(rungs, [&](const Rung& rung) { return holds(rung.price); }));
}

Check notChecked(CheckKind kind, NotChecked why)
{
    Check check;
    check.kind = kind;
    check.why = why;
    return check;
}

Check judged(Check check, bool holds)
{
    check.outcome = holds ? ClaimOutcome::holds : ClaimOutcome::lookAtThis;
    return check;
}

Check floorOnSale(const Counted& c)
{
    if (!c.tier.hasFloor())
        return notChecked(CheckKind::floorOnSale, NotChecked::noFloor);
    Check check;
    check.kind = CheckKind::floorOnSale;
    check.count = c.atFloor;
    check.of = c.onOffer.size();
    if (!c.onOffer.empty())
        check.price = c.onOffer.front().price;
    // With nothing on offer the floor is not on sale: that is an answer, not a check left out.
    return judged(check, c.atFloor > 0);
}

Check shareAtFloor(const Counted& c, std::optional<double> least)
{
    if (!c.tier.hasFloor())
        return notChecked(CheckKind::shareAtFloor, NotChecked::noFloor);
    if (c.onOffer.empty())
        return notChecked(CheckKind::shareAtFloor, NotChecked::nothingOnOffer);
    Check check = notChecked(CheckKind::shareAtFloor, NotChecked::noLeastShare);
    check.count = c.atFloor;
    check.of = c.onOffer.size();
    check.value = static_cast<double>(c.atFloor) / static_cast<double>(c.onOffer.size());
    check.limit = least;
    if (!least)
        return check;
    check.why = NotChecked::no;
    // 1 of 10 meets a tenth, whatever a tenth is in binary.
    return judged(check, *check.value >= *least - 1e-12);
}

Check floorStays(const Counted& c, std::optional<double> least, std::optional<double> load)
{
    constexpr CheckKind kind = CheckKind::floorStays;
    if (!c.tier.hasFloor())
        return notChecked(kind, NotChecked::noFloor);
    if (c.atFloor == 0)
        return notChecked(kind, NotChecked::floorNotOnSale);
    ModelSettings turnover;
    turnover.kind = ModelKind::turnover;
    turnover.load = load;
    const std::vector<Rung> rentable = sortedLadder(c.tier.units, c.prices, Among::rentable);
    const std::optional<double> a = settled(rentable, c.tier.units, turnover).load;
    if (!a)
        return notChecked(kind, NotChecked::loadUnknown);
    const std::size_t n = countIf(rentable, [&](Price price) { return price <= c.tier.advertisedFloor; });
    Check check = notChecked(kind, NotChecked::noLeastTime);
    check.count = c.atFloor;
    check.of = c.onOffer.size();
    check.value = 1.0 - erlangB(static_cast<int>(n), *a);
    check.limit = least;
    check.untilGone = meanStaysUntilTaken(static_cast<int>(n), static_cast<int>(n - c.atFloor), *a);
    if (!least)
        return check;
    check.why = NotChecked::no;
    return judged(check, *check.value >= *least - 1e-12);
}

Check inversions(const Counted& c)
{
    const auto graded = std::ranges::count_if(c.tier.units, [](const Unit& unit) { return unit.onOffer() && unit.grade; });
    if (graded < 2)
        return notChecked(CheckKind::inversions, NotChecked::noGrades);
    Check check;
    check.kind = CheckKind::inversions;
    check.count = countInversions(c.onOffer, c.tier.units);
    check.before = countInversions(c.before, c.tier.units);
    check.of = c.onOffer.size();
    return judged(check, check.count == 0);
}

std::size_t unitsChanged(const Counted& c)
{
    std::size_t changed = 0;
    for (std::size_t i = 0; i < c.prices.size(); ++i)
        changed += c.prices[i] == c.today[i] ? 0U : 1U;
    return changed;
}

Check changesByRule(const Counted& c, const PriceRules& rules)
{
    const bool anyLock = std::ranges::any_of(c.tier.units, &Unit::locked);
    if (rules == PriceRules{} && !anyLock)
        return notChecked(CheckKind::changesByRule, NotChecked::noRules);
    Check check;
    check.kind = CheckKind::changesByRule;
    check.of = unitsChanged(c);
    check.count = ruleBreaches(c.tier, c.prices, rules).size();
    return judged(check, check.count == 0);
}

Check totalByRule(const Counted& c, const ClaimLimits& limits)
{
    constexpr CheckKind kind = CheckKind::totalByRule;
    if (c.onOffer.empty())
        return notChecked(kind, NotChecked::nothingOnOffer);
    Price now;
    Price was;
    for (const Rung& rung : c.onOffer)
        now += rung.price;
    for (const Rung& rung : c.before)
        was += rung.price;
    const Price by = now - was;
    Check check = notChecked(kind, NotChecked::noTotalRule);
    check.of = c.onOffer.size();
    check.price = by;
    check.value = inMinor(by) / inMinor(was);
    if (limits.greatestTotalPercent)
        check.limit = *limits.greatestTotalPercent / 100.0;
    check.priceLimit = limits.greatestTotal;
    if (!check.limit && !check.priceLimit)
        return check;
    check.why = NotChecked::no;
    const bool share = !check.limit || std::abs(*check.value) <= *check.limit + 1e-12;
    const bool money = !check.priceLimit || std::abs(by.minor) <= check.priceLimit->minor;
    return judged(check, share && money);
}

Check belowFloor(const Counted& c)
{
    if (!c.tier.hasFloor())
        return notChecked(CheckKind::belowFloor, NotChecked::noFloor);
    if (c.onOffer.empty())
        return notChecked(CheckKind::belowFloor, NotChecked::nothingOnOffer);
    const auto below = [&](Price price) { return price < c.tier.advertisedFloor; };
    Check check;
    check.kind = CheckKind::belowFloor;
    check.count = countIf(c.onOffer, below);
    check.before = countIf(c.before, below);
    check.of = c.onOffer.size();
    return judged(check, check.count == 0);
}

} // namespace

std::vector<RuleBreach> ruleBreaches(const Tier& tier, std::span<const Price> prices, const PriceRules& rules)
{
    assert(tier.units.size() == prices.size());
    std::vector<RuleBreach> breaches;
    for (std::size_t i = 0; i < prices.size(); ++i) {
        const Unit& unit = tier.units[i];
        if (prices[i] == unit.asking)
            continue;
        RuleBreach breach{static_cast<std::uint32_t>(i), Bound::none};
        const Room room = roomOf(unit, rules);
        if (prices[i] > room.hi)
            breach.bound = room.above;
        else if (prices[i] < room.lo)
            breach.bound = room.below;
        else if (rules.points.allows(prices[i]))
            continue;
        breaches.push_back(breach);
    }
    return breaches;
}

std::vector<Check> claimChecks(const Tier& tier, std::span<const Price> prices, const PriceRules& rules, const ClaimLimits& limits,
                               std::optional<double> load)
{
    assert(tier.units.size() == prices.size());
    Counted c{tier, prices, askingPrices(tier.units), sortedLadder(tier.units, prices, Among::onOffer), {}, 0};
    c.before = sortedLadder(tier.units, c.today, Among::onOffer);
    if (tier.hasFloor())
        c.atFloor = countIf(c.onOffer, [&](Price price) { return price <= tier.advertisedFloor; });
    return {floorOnSale(c),
            shareAtFloor(c, limits.leastShareAtFloor),
            floorStays(c, limits.leastTimeAtFloor, load),
            inversions(c),
            changesByRule(c, rules),
            totalByRule(c, limits),
            belowFloor(c)};
}

double meanStaysUntilTaken(int units, int taken, double load)
{
    assert(0 <= taken && taken < units && load > 0);
    std::vector<double> blocked;
    erlangBAll(units, load, blocked);
    double sum = 0;
    for (int m = taken; m < units; ++m)
        sum += 1.0 / (load * blocked[static_cast<std::size_t>(m)]);
    return std::isnan(sum) ? std::numeric_limits<double>::infinity() : sum;
}

} // namespace rungwright
