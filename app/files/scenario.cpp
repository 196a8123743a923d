// SPDX-License-Identifier: GPL-3.0-or-later
#include "scenario.h"

#include <algorithm>
#include <cassert>
#include <utility>

namespace rungwright
{

const TierCase* findTier(const Scenario& scenario, std::string_view site, std::string_view tier)
{
    for (const TierCase& tierCase : scenario.tiers) {
        if (tierCase.tier.name == tier && tierCase.tier.site == site)
            return &tierCase;
    }
    return nullptr;
}

const PriceRules* rulesOf(const Scenario& scenario, const RuleScope& scope)
{
    if (scope == RuleScope{})
        return &scenario.rules;
    const auto place = std::ranges::lower_bound(scenario.ownRules, scope, {}, &OwnRules::scope);
    return place != scenario.ownRules.end() && place->scope == scope ? &place->rules : nullptr;
}

void setRulesOf(Scenario& scenario, const RuleScope& scope, std::optional<PriceRules> rules)
{
    if (scope == RuleScope{}) {
        assert(rules);
        scenario.rules = *std::move(rules);
        return;
    }
    const auto place = std::ranges::lower_bound(scenario.ownRules, scope, {}, &OwnRules::scope);
    const bool there = place != scenario.ownRules.end() && place->scope == scope;
    if (there && rules)
        place->rules = *std::move(rules);
    else if (there)
        scenario.ownRules.erase(place);
    else if (rules)
        scenario.ownRules.insert(place, {scope, *std::move(rules)});
}

RuleScope ruleScopeFor(const Scenario& scenario, const Tier& tier)
{
    if (scenario.ownRules.empty())
        return {};
    for (RuleScope scope : {RuleScope{tier.site, tier.name}, RuleScope{tier.site, {}}})
        if (rulesOf(scenario, scope))
            return scope;
    return {};
}

const PriceRules& rulesFor(const Scenario& scenario, const Tier& tier) { return *rulesOf(scenario, ruleScopeFor(scenario, tier)); }

std::vector<Price> pricesOf(const TierCase& tierCase, int candidate)
{
    assert(candidate >= -1 && candidate < static_cast<int>(tierCase.candidates.size()));
    if (candidate < 0)
        return askingPrices(tierCase.tier.units);
    return tierCase.candidates[static_cast<std::size_t>(candidate)].prices;
}

} // namespace rungwright
