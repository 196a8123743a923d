// SPDX-License-Identifier: GPL-3.0-or-later
#include "signoff_case.h"

#include "signoff_words.h"

namespace rungwright
{

SignedSheet signedSheet(const TierCase& tierCase, int candidate)
{
    SignedSheet sheet;
    sheet.candidate = candidate < 0 ? std::string(kCurrentName) : tierCase.candidates[static_cast<std::size_t>(candidate)].name;
    for (const PriceChange& change : priceChanges(askingPrices(tierCase.tier.units), pricesOf(tierCase, candidate)))
        sheet.prices.push_back({tierCase.tier.units[change.unit].name, change.before, change.after});
    return sheet;
}

SignOffCase signOffCase(const Document& document, int tier, int candidate, const ModelSettings& model, std::optional<double> leastTime)
{
    const TierCase& tierCase = *document.tier(tier);
    const Scenario& scenario = document.scenario();
    const PriceRules& rules = rulesFor(scenario, tierCase.tier);
    SignOffCase c;
    c.tier = tierCase.tier;
    c.ladder = SignOffWords::ladderName(tierCase, candidate);
    c.candidate = candidate;
    c.scenario = QString::fromStdString(scenario.title);
    c.currency = scenario.currency;
    c.model = model;
    c.prices = pricesOf(tierCase, candidate);
    c.rows = sheetRows(scenario, tierCase, candidate);
    c.sheet = signedSheet(tierCase, candidate);
    c.before = measured(c.tier, askingPrices(c.tier.units), model, MeasureParts::figuresOnly);
    c.after = measured(c.tier, c.prices, model, MeasureParts::figuresOnly);
    c.change = ladderChange(c.tier.units, c.prices);
    c.breaches = ruleBreaches(c.tier, c.prices, rules);
    ClaimLimits limits;
    limits.leastShareAtFloor = rules.leastShareAtFloor;
    limits.greatestTotalPercent = rules.greatestTierChangePercent;
    limits.greatestTotal = rules.greatestTierChange;
    limits.leastTimeAtFloor = leastTime;
    c.checks = claimChecks(c.tier, c.prices, rules, limits, model.kind == ModelKind::turnover ? model.load : std::nullopt);
    return c;
}

} // namespace rungwright
