// SPDX-License-Identifier: GPL-3.0-or-later
// An invented tier for tests of the session and the desk.
#pragma once

#include "scenario.h"

namespace rungwright
{

/// "Mill Quay", "Room 8-10": twelve units, 60.00 to 115.00 in steps of 5.00; every third one occupied, the last one closed; advertised
/// from 55.00. Price points of 0.50.
inline Scenario inventedScenario()
{
    Scenario scenario;
    scenario.currency = Currency{"EUR", 2};
    scenario.title = "Invented for tests";
    scenario.rules.points.step = Price{50};
    for (const char* name : {"Room 8-10", "Room 3-5"}) {
        TierCase tierCase;
        tierCase.tier.site = "Mill Quay";
        tierCase.tier.name = name;
        tierCase.tier.advertisedFloor = Price{5500};
        for (int i = 0; i < 12; ++i) {
            Unit unit;
            unit.name = "B-" + std::to_string(10 + i);
            unit.asking = Price{6000 + 500 * i};
            unit.status = i % 3 == 2 ? Status::occupied : Status::vacant;
            if (i == 11)
                unit.status = Status::closed;
            tierCase.tier.units.push_back(unit);
        }
        scenario.tiers.push_back(tierCase);
    }
    return scenario;
}

} // namespace rungwright
