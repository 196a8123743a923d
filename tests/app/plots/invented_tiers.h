// SPDX-License-Identifier: GPL-3.0-or-later
// Invented tiers to draw: ordinary ones of any size, and the awkward ones.
#pragma once

#include "document.h"

#include <algorithm>
#include <cmath>
#include <string>

namespace rungwright::invented
{

/// `count` units from `floor` upwards (minor units), crowding near the top; a third on offer, the cheap end mostly taken. The same for
/// every run.
inline Tier leaningTier(int count, Price floor, std::int64_t width, std::int64_t step = 50)
{
    Tier tier;
    tier.site = "Invented Quay";
    tier.name = "Room 14-16 m²";
    tier.advertisedFloor = floor;
    unsigned state = 12345;
    const auto draw = [&state] {
        state = state * 1103515245u + 12345u;
        return static_cast<double>((state >> 8) & 0xffff) / 65536.0;
    };
    for (int i = 0; i < count; ++i) {
        const double place = (i + 0.5) / count;
        Unit unit;
        unit.name = "B-" + std::to_string(i + 1);
        const double raw = static_cast<double>(floor.minor) + static_cast<double>(width) * (0.12 + 0.88 * std::pow(place, 0.62));
        unit.asking = Price{std::llround(raw / static_cast<double>(step)) * step};
        const double chance = draw();
        unit.status = chance < 0.12 + 0.4 * place ? Status::vacant : Status::occupied;
        if (unit.status == Status::occupied && draw() < 0.06)
            unit.status = Status::reserved;
        if (draw() < 0.03)
            unit.status = Status::closed;
        unit.grade = 1 + i % 3;
        unit.areaM2 = 14.0 + 2.0 * place;
        tier.units.push_back(unit);
    }
    return tier;
}

inline Scenario scenarioOf(Tier tier, const Currency& currency = {"EUR", 2}, Price step = Price{50})
{
    Scenario scenario;
    scenario.currency = currency;
    scenario.title = "Invented";
    scenario.rules.points.step = step;
    TierCase tc;
    tc.tier = std::move(tier);
    scenario.tiers.push_back(std::move(tc));
    return scenario;
}

/// Adds a candidate that lowers the low end.
inline void addLowered(Scenario& scenario, const std::string& name)
{
    TierCase& tc = scenario.tiers.front();
    Candidate candidate;
    candidate.name = name;
    candidate.prices = askingPrices(tc.tier.units);
    const auto [low, high] = std::minmax_element(candidate.prices.begin(), candidate.prices.end());
    const double lo = static_cast<double>(low->minor);
    const double width = std::max(1.0, static_cast<double>(high->minor) - lo);
    const std::int64_t step = scenario.rules.points.step.minor;
    for (Price& price : candidate.prices) {
        const double u = (static_cast<double>(price.minor) - lo) / width;
        price = Price{std::max<std::int64_t>(step, std::llround((lo + width * std::pow(u, 1.5)) / static_cast<double>(step)) * step)};
    }
    tc.candidates.push_back(std::move(candidate));
}

} // namespace rungwright::invented
