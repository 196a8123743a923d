// SPDX-License-Identifier: GPL-3.0-or-later
// A scenario as it is held and stored: tiers, candidates, rules, models' settings, notes.
#pragma once

#include "cheapest/model.h"
#include "ladder/currency.h"
#include "ladder/unit.h"
#include "reshape/rules.h"
#include "tier_list.h"

#include <compare>
#include <optional>
#include <string>
#include <vector>

namespace rungwright
{

/// A whole alternative ladder for a tier, kept under a name. `prices` holds one price per unit, by unit index. Texts are UTF-8.
struct Candidate {
    std::string name; ///< Unique within its tier, not "current".
    std::string note;
    std::vector<Price> prices;

    bool operator==(const Candidate&) const = default;
};

/// One price of a sheet that was handed over.
struct SignedPrice {
    std::string unit; ///< The unit's name at that time.
    Price before;
    Price after;

    bool operator==(const SignedPrice&) const = default;
};

/// The last price sheet of a tier that left the tool: what the operator decided to ask.
struct SignedSheet {
    std::string candidate;           ///< The ladder's name.
    std::string whenUtc;             ///< ISO 8601, "2026-12-01T09:30:00Z".
    std::vector<SignedPrice> prices; ///< Of the units whose price it changes, in unit order.

    bool operator==(const SignedSheet&) const = default;
};

/// A tier and what was done with it.
struct TierCase {
    Tier tier;
    std::vector<Candidate> candidates;
    std::optional<int> chosen; ///< Index of the candidate the user settled on.
    ModelSettings model;
    std::string note;
    bool seen = false; ///< The user has dealt with this tier since the unit list came in.
    std::optional<SignedSheet> signedOff;

    bool operator==(const TierCase&) const = default;
};

/// From where on the worklist flags a tier. The user's to set; these are common practice, no source.
struct FlagThresholds {
    double leansLeft = -0.5; ///< Flagged when g1 lies below.
    int lastUnits = 3;       ///< Flagged with at most so many on offer, and at least one. >= 0.
    double gapShare = 0.10;  ///< Flagged when the gap is at least this share of the advertised floor. >= 0.

    bool operator==(const FlagThresholds&) const = default;
};

/// Whose rules: the scenario's (no names), a site's (no tier), or one tier's.
struct RuleScope {
    std::string site;
    std::string tier;

    auto operator<=>(const RuleScope&) const = default;
};

/// Rules of a site or a tier, in place of the scenario's.
struct OwnRules {
    RuleScope scope; ///< Names a site; it need not be among the scenario's at the time.
    PriceRules rules;

    bool operator==(const OwnRules&) const = default;
};

using TierList = SharedList<TierCase>;

/// Everything one `*.rungs.json` file holds. Self-contained: no path inside.
struct Scenario {
    Currency currency;
    std::string title;
    std::string note;
    PriceRules rules;               ///< Of every tier for which nearer ones are not set.
    std::vector<OwnRules> ownRules; ///< In ascending order of scope, each scope once.
    FlagThresholds flags;
    TierList tiers;

    bool operator==(const Scenario&) const = default;
};

/// The name that stands for the current ladder wherever a candidate can be named.
inline constexpr std::string_view kCurrentName = "current";

/// The tier of that site and name; nullptr when there is none.
const TierCase* findTier(const Scenario& scenario, std::string_view site, std::string_view tier);

/// The rules set for a scope itself; nullptr when there are none (the scenario always has some).
const PriceRules* rulesOf(const Scenario& scenario, const RuleScope& scope);
/// Sets a scope's rules, or takes them away; the scenario's own can only be set.
void setRulesOf(Scenario& scenario, const RuleScope& scope, std::optional<PriceRules> rules);
/// Whose rules are in force for a tier: the nearest ones win whole, the tier's before the site's before the scenario's.
RuleScope ruleScopeFor(const Scenario& scenario, const Tier& tier);
const PriceRules& rulesFor(const Scenario& scenario, const Tier& tier);

/// The prices of a candidate (index into tierCase.candidates), or the current ones for -1.
std::vector<Price> pricesOf(const TierCase& tierCase, int candidate);

} // namespace rungwright
