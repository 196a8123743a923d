// SPDX-License-Identifier: GPL-3.0-or-later
// Price rules as JSON: inside a scenario, and as a small file of their own, `*.rules.json`.
#pragma once

#include "json_walk.h"
#include "outcome.h"
#include "scenario.h"

#include <QByteArray>

#include <string>

namespace rungwright
{

inline constexpr int kRulesVersion = 1;

/// An object, its lines indented by `indent` and one step more; no comma behind it.
void writeRules(std::string& out, const PriceRules& rules, const Currency& currency, const std::string& indent);
/// The list of rules of sites and tiers, likewise.
void writeOwnRules(std::string& out, const std::vector<OwnRules>& all, const Currency& currency, const std::string& indent);

/// Every value is looked at; the first that is wrong is told with its place.
PriceRules readRules(const QJsonValue& value, const QString& place, const Currency& currency, JsonTrouble& trouble);
/// The key "own_rules" of `walk`; in ascending order of scope whatever order they stand in.
std::vector<OwnRules> readOwnRules(const JsonWalk& walk, const Currency& currency, JsonTrouble& trouble);

/// What a rules file holds.
struct RuleSet {
    PriceRules rules;
    std::vector<OwnRules> ownRules;

    bool operator==(const RuleSet&) const = default;
};

/// {"format": "rungwright-rules", "version": 1, "currency": "EUR", "rules": {...}, "own_rules": [...]}, spelt as in a scenario.
QByteArray rulesToJson(const RuleSet& rules, const Currency& currency);
/// Another currency than `currency` is refused: the amounts would mean something else. Messages as scenarioFromJson() gives them.
Outcome<RuleSet> rulesFromJson(const QByteArray& json, const QString& fileName, const Currency& currency);
Outcome<RuleSet> loadRules(const QString& path, const Currency& currency);

} // namespace rungwright
