// SPDX-License-Identifier: GPL-3.0-or-later
// An invented portfolio of any size, the same for every run, with the awkward tiers that every large list has.
#pragma once

#include "scenario.h"

#include <cmath>
#include <cstdint>
#include <string>

namespace rungwright
{

/// Eight tiers a site, `units` units a tier. Every 23rd tier has nothing on offer, every 31st no floor, every 37th one price for all,
/// every 41st one unit on offer; some units ask less than the floor; grades are invented, so that inversions come by themselves.
inline Scenario inventedPortfolio(int tiers, int units = 24)
{
    std::uint64_t state = 20'261'201;
    const auto draw = [&state] {
        state = state * 6364136223846793005U + 1442695040888963407U;
        return static_cast<double>(state >> 40) / static_cast<double>(1U << 24);
    };
    Scenario scenario;
    scenario.currency = Currency{"EUR", 2};
    scenario.title = "Invented portfolio";
    scenario.rules.points.step = Price{50};
    scenario.tiers.reserve(static_cast<std::size_t>(tiers));
    for (int t = 0; t < tiers; ++t) {
        TierCase tierCase;
        Tier& tier = tierCase.tier;
        tier.site = "Invented site " + std::to_string(1 + t / 8);
        tier.name = "Room " + std::to_string(1 + 2 * (t % 8)) + " m²";
        const auto floor = static_cast<std::int64_t>(2000 + 600 * (t % 8));
        tier.advertisedFloor = t % 31 == 30 ? Price{} : Price{floor};
        const double bend = 0.3 + 2.2 * draw();
        const double wide = 0.1 + 0.9 * draw();
        const double offered = 0.08 + 0.6 * draw();
        const double from = 0.25 * draw() - 0.02; // some begin a little below the floor
        int given = 0;
        for (int u = 0; u < units; ++u) {
            Unit unit;
            unit.name = std::string(1, static_cast<char>('A' + t % 8)) + "-" + std::to_string(u + 1);
            const double share = from + wide * std::pow(draw(), bend);
            unit.asking = Price{static_cast<std::int64_t>(std::llround(static_cast<double>(floor) * (1 + share) / 50)) * 50};
            unit.status = draw() < offered ? Status::vacant : draw() < 0.03 ? Status::closed : Status::occupied;
            if (draw() < 0.5)
                unit.grade = 1 + static_cast<int>(3 * draw());
            if (t % 23 == 22 && unit.onOffer())
                unit.status = Status::occupied;
            if (t % 37 == 36)
                unit.asking = Price{floor + 500};
            if (t % 41 == 40 && unit.onOffer() && given++ > 0)
                unit.status = Status::reserved;
            tier.units.push_back(unit);
        }
        scenario.tiers.push_back(tierCase);
    }
    return scenario;
}

} // namespace rungwright
