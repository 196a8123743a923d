// SPDX-License-Identifier: GPL-3.0-or-later
// Random least-change problems on a chain, for tests: bounds of each place's own, locks, weights, a total and a target.
#pragma once

#include "reshape/chain_solver.h"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <limits>
#include <random>
#include <vector>

/// Owns what a ChainProblem points to.
struct Chain {
    std::vector<double> today, weight, lo, hi, counted, odds;
    std::optional<double> total;
    std::optional<double> expectedMost;

    rungwright::ChainProblem problem() const { return {today, weight, lo, hi, counted, odds, total, total, expectedMost}; }
    /// As live_values.R's topic "chain" reads it.
    std::vector<double> question() const
    {
        const double none = std::numeric_limits<double>::quiet_NaN();
        std::vector<double> q{static_cast<double>(today.size()), total.value_or(none), expectedMost.value_or(none)};
        for (const auto* part : {&today, &weight, &lo, &hi, &counted, &odds})
            q.insert(q.end(), part->begin(), part->end());
        return q;
    }
};

/// Prices about 5,000 to 9,000 in order (or, one time in four, only nearly so, as when grades give the order), one unit in eight locked,
/// one in six not counted in the total, odds of one of three kinds that fall or jump about; total and target mostly within reach.
inline Chain randomChain(std::mt19937_64& random, std::size_t n)
{
    std::uniform_real_distribution<double> uniform;
    Chain chain;
    for (std::size_t i = 0; i < n; ++i)
        chain.today.push_back(std::round(5000 + 4000 * uniform(random)));
    std::ranges::sort(chain.today);
    const bool graded = random() % 4 == 0;
    const bool someTaken = random() % 2 == 0;
    const bool weighted = random() % 2 == 0;
    const double reach = 50 + 900 * uniform(random);
    for (std::size_t i = 0; i < n; ++i) {
        const double p = chain.today[i] + (graded ? std::round(300 * (uniform(random) - 0.5)) : 0);
        chain.today[i] = p;
        const bool locked = random() % 8 == 0 && !graded;
        chain.lo.push_back(locked ? p : p - std::round(reach * uniform(random)));
        chain.hi.push_back(locked ? p : p + std::round(reach * uniform(random)));
        chain.weight.push_back(weighted ? std::exp2(4 * uniform(random) - 2) : 1);
        chain.counted.push_back(someTaken && random() % 6 == 0 ? 0 : 1);
    }
    const auto kind = random() % 3;
    double left = 1;
    for (std::size_t i = 0; i < n; ++i) {
        const double share = kind == 0 ? uniform(random) : 1.0 / static_cast<double>(2 + n / 3);
        chain.odds.push_back(kind == 2 ? (i == 0 ? 1 : 0) : left * share);
        left *= 1 - share;
    }
    double sum = 0;
    for (const double w : chain.odds)
        sum += w;
    for (double& w : chain.odds)
        w /= sum;

    rungwright::ChainSolver solver;
    const rungwright::ChainAnswer& bounds = solver.solve(chain.problem());
    if (bounds.status != rungwright::ChainStatus::solved)
        return chain;
    double held = 0;
    for (std::size_t i = 0; i < n; ++i)
        held += chain.counted[i] * bounds.x[i];
    const auto wish = random() % 8;
    if (wish > 0) // Held, or changed by up to 4 %; sometimes more than there is room for.
        chain.total = wish < 4 ? held : held * (1 + 0.08 * (uniform(random) - 0.5));
    const rungwright::ChainAnswer& least = solver.leastExpected(chain.problem());
    if (least.status == rungwright::ChainStatus::solved && random() % 8 > 0) {
        const double from = *least.leastExpected;
        const double now = solver.solve(chain.problem()).expected;
        // One time in eleven below what can be had; never at the very end, where rounding decides.
        const double share = 1.1 * uniform(random) - 0.1;
        if (now - from > 1e-2 && std::abs(share) > 1e-3)
            chain.expectedMost = from + (now - from) * share;
    }
    return chain;
}
