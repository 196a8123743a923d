// SPDX-License-Identifier: GPL-3.0-or-later
// What the saving tests save: two versions that any reader can tell apart, shared by the saver and by the tests that judge its files.
#pragma once

#include "price_sheet.h"
#include "scenario_json.h"

namespace rungwright::tests
{

inline Scenario savedScenario(int version, int units)
{
    Scenario scenario;
    scenario.currency = {"EUR", 2};
    scenario.title = "version " + std::to_string(version);
    TierCase tierCase;
    tierCase.tier = {"Quay (invented)", "Room", {6900}, {}};
    for (int i = 0; i < units; ++i) {
        Unit unit;
        unit.name = "U-" + std::to_string(i);
        unit.asking = {7000 + 100 * version + i};
        tierCase.tier.units.push_back(std::move(unit));
    }
    scenario.tiers = {std::move(tierCase)};
    return scenario;
}

enum class Kind { scenario, sheet };

inline QByteArray savedBytes(Kind kind, int version, int units)
{
    const Scenario scenario = savedScenario(version, units);
    return kind == Kind::scenario ? scenarioToJson(scenario) : sheetToCsv(sheetRows(scenario, scenario.tiers[0], -1), scenario.currency);
}

inline Outcome<bool> save(Kind kind, int version, int units, const QString& path)
{
    const Scenario scenario = savedScenario(version, units);
    return kind == Kind::scenario ? saveScenario(scenario, path)
                                  : saveSheet(sheetRows(scenario, scenario.tiers[0], -1), scenario.currency, path);
}

} // namespace rungwright::tests
