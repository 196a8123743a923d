// SPDX-License-Identifier: GPL-3.0-or-later
// A scenario as it is held and stored: tiers, candidates, rules, models' settings, notes.
#pragma once

#include "cheapest/model.h"
#include "ladder/currency.h"
#include "ladder/unit.h"
#include "reshape/rules.h"

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

/// A tier and what was done with it.
struct TierCase {
    Tier tier;
    std::vector<Candidate> candidates;
    std::optional<int> chosen; ///< Index of the candidate the user settled on.
    ModelSettings model;
    std::string note;

    bool operator==(const TierCase&) const = default;
};

/// Everything one `*.rungs.json` file holds. Self-contained: no path inside.
struct Scenario {
    Currency currency;
    std::string title;
    std::string note;
    PriceRules rules;
    std::vector<TierCase> tiers;

    bool operator==(const Scenario&) const = default;
};

/// The name that stands for the current ladder wherever a candidate can be named.
inline constexpr std::string_view kCurrentName = "current";

/// The tier of that site and name; nullptr when there is none.
const TierCase* findTier(const Scenario& scenario, std::string_view site, std::string_view tier);

/// The prices of a candidate (index into tierCase.candidates), or the current ones for -1.
std::vector<Price> pricesOf(const TierCase& tierCase, int candidate);

} // namespace rungwright
