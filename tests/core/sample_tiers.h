// SPDX-License-Identifier: GPL-3.0-or-later
// Tiers made up for tests, by hand or at random from a fixed seed.
#pragma once

#include "ladder/unit.h"

#include <cstdint>
#include <random>
#include <string>
#include <vector>

/// Units on offer at the given prices (minor units), named by their place in the list.
inline rungwright::Tier tierOf(const std::vector<std::int64_t>& prices, std::int64_t floor)
{
    rungwright::Tier tier;
    tier.site = "Sample";
    tier.name = "Sample";
    tier.advertisedFloor = {floor};
    for (const std::int64_t price : prices) {
        rungwright::Unit unit;
        unit.name = std::to_string(tier.units.size() + 1);
        unit.asking = {price};
        tier.units.push_back(unit);
    }
    return tier;
}

/// What a random tier may hold.
struct TierSpread {
    std::size_t units = 8;
    std::int64_t floor = 4000;
    std::int64_t range = 3000; ///< Prices lie in [floor, floor + range].
    std::int64_t grain = 1;    ///< Prices are floor + a multiple of this: a coarse grain makes ties.
    bool mixedStatus = false;  ///< Some units occupied, reserved or closed; the first is always vacant, the second always occupied.
    bool ownChances = false;   ///< Two units in three have a vacancy chance of their own.
};

inline rungwright::Tier randomTier(std::mt19937_64& random, const TierSpread& spread)
{
    using rungwright::Status;
    std::vector<std::int64_t> prices(spread.units);
    std::uniform_int_distribution<std::int64_t> place(0, spread.range / spread.grain);
    for (auto& price : prices)
        price = spread.floor + spread.grain * place(random);
    rungwright::Tier tier = tierOf(prices, spread.floor);
    std::uniform_int_distribution<int> ten(0, 9);
    std::uniform_real_distribution<double> chance(0.02, 0.98);
    std::uniform_int_distribution<int> grade(1, 5);
    for (auto& unit : tier.units) {
        if (ten(random) < 7)
            unit.grade = grade(random);
        if (spread.ownChances && ten(random) < 7)
            unit.vacancyChance = chance(random);
        if (spread.mixedStatus) {
            const int draw = ten(random);
            unit.status = draw < 5 ? Status::vacant : draw < 8 ? Status::occupied : draw < 9 ? Status::reserved : Status::closed;
        }
    }
    if (spread.mixedStatus) {
        tier.units[0].status = Status::vacant;
        if (tier.units.size() > 1)
            tier.units[1].status = Status::occupied;
    }
    return tier;
}
