// SPDX-License-Identifier: GPL-3.0-or-later
// Random scenarios that use every field, from a fixed seed.
#pragma once

#include "file_helpers.h"

#include <algorithm>
#include <set>
#include <utility>

namespace rungwright::tests
{

inline Price oddPrice(Dice& dice) { return dice.whole(0, 30) == 0 ? kGreatestPrice : Price{dice.whole(1, 3'000'000)}; }

/// A name that is more than white space and not among `taken`; it is put there.
inline std::string freshName(Dice& dice, std::set<std::string>& taken)
{
    for (;;) {
        const std::string name = oddText(dice, 6) + std::to_string(dice.whole(0, 999));
        if (taken.insert(name).second)
            return name;
    }
}

inline Unit oddUnit(Dice& dice, std::set<std::string>& taken)
{
    Unit unit;
    unit.name = freshName(dice, taken);
    unit.asking = oddPrice(dice);
    unit.status = static_cast<Status>(dice.whole(0, 3));
    unit.locked = dice.coin();
    if (dice.coin())
        unit.grade = dice.whole(0, 9) == 0 ? std::numeric_limits<int>::min() : dice.whole(-3, 9);
    if (dice.coin())
        unit.areaM2 = dice.whole(1, 1'000'000) / 7.0;
    if (dice.coin())
        unit.vacancyChance = dice.whole(0, 3) / 3.0;
    return unit;
}

inline TierCase oddTier(Dice& dice, std::set<std::string>& taken)
{
    TierCase made;
    made.tier.site = freshName(dice, taken);
    made.tier.name = freshName(dice, taken);
    if (dice.whole(0, 5) > 0)
        made.tier.advertisedFloor = oddPrice(dice);
    made.seen = dice.coin();
    made.note = dice.coin() ? oddText(dice, 40) : "";
    made.model.kind = kModels[static_cast<std::size_t>(dice.whole(0, int(kModels.size()) - 1))];
    if (dice.coin())
        made.model.left = dice.whole(1, 40);
    if (dice.coin())
        made.model.load = dice.whole(1, 1000) / 11.0;
    std::set<std::string> units;
    for (int i = dice.whole(0, 7); i > 0; --i)
        made.tier.units.push_back(oddUnit(dice, units));
    std::set<std::string> candidates{std::string(kCurrentName)};
    for (int i = dice.whole(0, 3); i > 0; --i) {
        Candidate candidate{freshName(dice, candidates), dice.coin() ? oddText(dice, 20) : "", {}};
        for (std::size_t u = 0; u < made.tier.units.size(); ++u)
            candidate.prices.push_back(oddPrice(dice));
        made.candidates.push_back(std::move(candidate));
    }
    if (!made.candidates.empty() && dice.coin())
        made.chosen = dice.whole(0, int(made.candidates.size()) - 1);
    if (dice.coin()) {
        SignedSheet sheet{freshName(dice, candidates), "2026-12-01T09:30:00Z", {}};
        for (const Unit& unit : made.tier.units) {
            if (dice.coin())
                sheet.prices.push_back({unit.name, unit.asking, oddPrice(dice)});
        }
        made.signedOff = std::move(sheet);
    }
    return made;
}

inline PriceRules oddRules(Dice& dice)
{
    PriceRules rules;
    rules.points.step = {dice.whole(1, 500)};
    for (std::int64_t at = dice.whole(0, 99); at < rules.points.step.minor && dice.coin(); at += dice.whole(1, 99))
        rules.points.endings.push_back({at});
    if (dice.coin())
        rules.points.least = Price{dice.whole(1, 5000)};
    if (dice.coin())
        rules.points.greatest = Price{dice.whole(5000, 900'000)};
    if (dice.coin())
        rules.greatestChangePercent = dice.whole(1, 300) / 7.0;
    if (dice.coin())
        rules.greatestChange = oddPrice(dice);
    if (dice.coin())
        rules.ceiling = oddPrice(dice);
    if (dice.coin())
        rules.least = Price{rules.ceiling ? dice.whole(1, int(std::min<std::int64_t>(rules.ceiling->minor, 1'000'000))) : 77};
    if (dice.coin())
        rules.greatestTierChangePercent = dice.whole(1, 300) / 7.0;
    if (dice.coin())
        rules.greatestTierChange = oddPrice(dice);
    if (dice.coin())
        rules.order = OrderKept::grade;
    if (dice.coin())
        rules.leastShareAtFloor = dice.whole(1, 7) / 7.0;
    return rules;
}

inline Scenario oddScenario(Dice& dice)
{
    static const Currency currencies[]{{"JPY", 0}, {"EUR", 2}, {"KWD", 3}, {"CLF", 4}, {"XXX", 2}};
    Scenario made;
    made.currency = currencies[dice.whole(0, 4)];
    made.title = dice.coin() ? oddText(dice, 20) : "";
    made.note = dice.coin() ? oddText(dice, 60) : "";
    made.rules = oddRules(dice);
    made.flags = {dice.whole(-300, 300) / 70.0, dice.whole(0, 9), dice.whole(0, 90) / 70.0};
    std::set<std::string> taken;
    for (int i = dice.whole(0, 4); i > 0; --i)
        made.tiers.push_back(oddTier(dice, taken));
    // Of a site, of a tier, and of ones that are not there.
    for (const TierCase& tierCase : std::as_const(made.tiers)) {
        if (dice.coin())
            setRulesOf(made, {tierCase.tier.site, {}}, oddRules(dice));
        if (dice.coin())
            setRulesOf(made, {tierCase.tier.site, tierCase.tier.name}, oddRules(dice));
    }
    if (dice.coin())
        setRulesOf(made, {freshName(dice, taken), dice.coin() ? freshName(dice, taken) : ""}, oddRules(dice));
    return made;
}

} // namespace rungwright::tests
