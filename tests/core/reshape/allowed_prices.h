// SPDX-License-Identifier: GPL-3.0-or-later
// The price rules taken literally, amount by amount, for tests; and random rules and units from a seed.
#pragma once

#include "reshape/rules.h"

#include <cmath>
#include <cstdint>
#include <random>
#include <set>
#include <vector>

inline constexpr std::int64_t kDearest = 4000; ///< No test price lies above this.

inline bool isGridPoint(const rungwright::PricePoints& points, std::int64_t p)
{
    const std::int64_t rest = ((p % points.step.minor) + points.step.minor) % points.step.minor;
    if (points.endings.empty())
        return rest == 0;
    for (const auto ending : points.endings)
        if (ending.minor == rest)
            return true;
    return false;
}

/// Every price the unit may take, ascending: points within least and greatest that no rule forbids, and today's price.
inline std::vector<std::int64_t> allowedPrices(const rungwright::Unit& unit, const rungwright::PriceRules& rules)
{
    const std::int64_t today = unit.asking.minor;
    std::set<std::int64_t> allowed{today};
    for (std::int64_t p = 1; p <= kDearest && !unit.locked; ++p) {
        const auto change = static_cast<double>(std::abs(p - today));
        if (!isGridPoint(rules.points, p) || (rules.points.least && p < rules.points.least->minor) ||
            (rules.points.greatest && p > rules.points.greatest->minor))
            continue;
        if (rules.greatestChangePercent && change * 100 > *rules.greatestChangePercent * static_cast<double>(today) * (1 + 1e-12))
            continue;
        if (rules.greatestChange && std::abs(p - today) > rules.greatestChange->minor)
            continue;
        if (rules.ceiling && p > today && p > rules.ceiling->minor)
            continue;
        if (rules.least && p < today && p < rules.least->minor)
            continue;
        allowed.insert(p);
    }
    return {allowed.begin(), allowed.end()};
}

inline rungwright::PriceRules randomRules(std::mt19937_64& random)
{
    rungwright::PriceRules rules;
    rules.points.step = {static_cast<std::int64_t>(1 + random() % 120)};
    std::set<std::int64_t> endings;
    for (auto count = random() % 4; count > 0; --count)
        endings.insert(static_cast<std::int64_t>(random()) & 0x7fffffff);
    std::set<std::int64_t> inside;
    for (const auto ending : endings)
        inside.insert(ending % rules.points.step.minor);
    for (const auto ending : inside)
        rules.points.endings.push_back({ending});
    rules.points.greatest = rungwright::Price{kDearest - static_cast<std::int64_t>(random() % 2500)};
    if (random() % 2)
        rules.points.least = rungwright::Price{static_cast<std::int64_t>(1 + random() % 1500)};
    if (random() % 2)
        rules.greatestChangePercent = 0.1 * static_cast<double>(1 + random() % 300);
    if (random() % 2)
        rules.greatestChange = rungwright::Price{static_cast<std::int64_t>(1 + random() % 400)};
    if (random() % 2)
        rules.ceiling = rungwright::Price{static_cast<std::int64_t>(600 + random() % 2000)};
    if (random() % 2)
        rules.least = rungwright::Price{static_cast<std::int64_t>(300 + random() % 300)};
    return rules;
}
