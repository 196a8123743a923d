// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/price_point_repair.h"

#include <algorithm>
#include <array>
#include <cassert>
#include <cmath>
#include <cstdlib>
#include <limits>

namespace rungwright
{

namespace
{

// How many of the best steps each way are paired: more than one only matters where steps differ in size.
constexpr std::size_t kPaired = 4;
// For the last exchanges, which obey the target itself.
constexpr std::size_t kPolished = 48;
constexpr int kGrowths = 48;
constexpr int kNarrowings = 14;

double square(double a) { return a * a; }

} // namespace

void PricePointRepair::meetTotal()
{
    m_aside.clear();
    const bool rise = missOf(m_total) < 0;
    Heap& heap = rise ? m_rises : m_falls;
    Step step;
    while (missOf(m_total) != 0 && (missOf(m_total) < 0) == rise && takeBest(heap, step)) {
        const bool counts = m_problem.counted[step.place] > 0;
        if (counts && std::abs(missOf(m_total + change(step, rise))) < std::abs(missOf(m_total)))
            move(step.place, rise ? m_up[step.place] : m_down[step.place]);
        else
            m_aside.push_back(step);
    }
    for (const Step& aside : m_aside) {
        putBack(heap, aside);
    }
}

/// Takes the pair for the best one when it gains and brings the total no further away; under a hard target also when it brings the total
/// nearer at a price, the nearest first.
void PricePointRepair::consider(Pair& best, std::optional<Step> up, std::optional<Step> down, bool hardTarget) const
{
    if (up && down && (up->place == down->place || (up->place + 1 == down->place && m_up[up->place] > m_down[down->place])))
        return;
    double gain = 0;
    double expected = m_expected;
    std::int64_t total = m_total;
    for (const auto& [step, rise] : {std::pair(up, true), std::pair(down, false)}) {
        if (!step)
            continue;
        gain += step->merit;
        expected += m_odds[step->place] * static_cast<double>(change(*step, rise));
        total += m_problem.counted[step->place] > 0 ? change(*step, rise) : 0;
    }
    const std::int64_t miss = std::abs(missOf(total));
    if (miss > best.miss || (!(gain < best.merit) && !(hardTarget && miss < best.miss)))
        return;
    if (hardTarget && expected > std::max(m_expectedMost, m_expected) + m_tolerance)
        return;
    best = {up, down, gain, hardTarget ? miss : best.miss};
}

void PricePointRepair::apply(const Pair& pair)
{
    const std::int64_t to = pair.down ? m_down[pair.down->place] : 0; // Before the neighbour moves.
    if (pair.up)
        move(pair.up->place, m_up[pair.up->place]);
    if (pair.down)
        move(pair.down->place, to);
}

void PricePointRepair::exchange()
{
    // Every exchange gains more than rounding can feign; the limit is for safety only.
    for (std::size_t round = 0; round < 40 * m_price.size() + 40; ++round) {
        std::array<Step, kPaired> ups;
        std::array<Step, kPaired> downs;
        std::size_t upCount = 0;
        std::size_t downCount = 0;
        while (upCount < kPaired && takeBest(m_rises, ups[upCount]))
            ++upCount;
        while (downCount < kPaired && takeBest(m_falls, downs[downCount]))
            ++downCount;
        Pair best;
        best.merit = -1e-9;
        best.miss = std::abs(missOf(m_total));
        for (std::size_t u = 0; u < upCount; ++u)
            consider(best, ups[u], {}, false);
        for (std::size_t d = 0; d < downCount; ++d) {
            consider(best, {}, downs[d], false);
            for (std::size_t u = 0; u < upCount; ++u)
                consider(best, ups[u], downs[d], false);
        }
        for (std::size_t u = 0; u < upCount; ++u) {
            putBack(m_rises, ups[u]);
        }
        for (std::size_t d = 0; d < downCount; ++d) {
            putBack(m_falls, downs[d]);
        }
        if (!best.up && !best.down)
            return;
        apply(best);
    }
}

/// With uneven steps a step up and another one down may bring the total nearer where no single step does.
void PricePointRepair::meetTotalByPairs()
{
    for (int round = 0; round < 8 && missOf(m_total) != 0; ++round) {
        m_ups.clear();
        m_downs.clear();
        for (std::uint32_t i = 0; i < m_price.size(); ++i) {
            if (m_problem.counted[i] > 0 && canRise(i))
                m_ups.push_back({merit(i, m_up[i]), i, 0});
            if (m_problem.counted[i] > 0 && canFall(i))
                m_downs.push_back({merit(i, m_down[i]), i, 0});
        }
        // By size of the fall, the cheapest of each size first.
        const auto fall = [&](const Step& step) { return -change(step, false); };
        std::ranges::sort(m_downs,
                          [&](const Step& a, const Step& b) { return fall(a) != fall(b) ? fall(a) < fall(b) : a.merit < b.merit; });
        Pair best;
        best.miss = std::abs(missOf(m_total));
        best.merit = 0;
        for (const Step& up : m_ups) {
            const std::int64_t wanted = change(up, true) + missOf(m_total);
            const auto from = std::ranges::lower_bound(m_downs, wanted, {}, fall);
            // The first two of the size wanted or the next larger, and the last smaller one.
            for (std::ptrdiff_t k = from == m_downs.begin() ? 0 : -1; k < 2 && from + k < m_downs.end(); ++k) {
                const Step& down = from[k];
                const std::int64_t miss = std::abs(missOf(m_total + change(up, true) + change(down, false)));
                const bool nearer = miss < best.miss || (best.up && miss == best.miss && up.merit + down.merit < best.merit);
                const bool crosses = up.place == down.place || (up.place + 1 == down.place && m_up[up.place] > m_down[down.place]);
                if (nearer && !crosses)
                    best = {up, down, up.merit + down.merit, miss};
            }
        }
        if (!best.up)
            return;
        apply(best);
    }
}

void PricePointRepair::descend(double theta)
{
    m_theta = theta;
    fillHeaps();
    meetTotal();
    exchange();
    if (missOf(m_total) != 0) {
        meetTotalByPairs();
        exchange();
    }
    keepIfBetter();
}

void PricePointRepair::keepIfBetter()
{
    Standing now{std::abs(missOf(m_total)), m_expected <= m_expectedMost + m_tolerance, 0, m_expected};
    for (std::size_t i = 0; i < m_price.size(); ++i)
        now.cost += m_problem.weight[i] * square(static_cast<double>(m_price[i] - m_problem.today[i].minor));
    const auto better = [](const Standing& a, const Standing& b) {
        if (a.met != b.met)
            return a.met;
        if (a.miss != b.miss)
            return a.miss < b.miss;
        return a.met ? a.cost < b.cost : a.expected < b.expected;
    };
    if (m_bestStanding && !better(now, *m_bestStanding))
        return;
    m_bestStanding = now;
    std::ranges::copy(m_price, m_best.begin());
}

void PricePointRepair::meetTarget()
{
    const auto met = [&] { return m_expected <= m_expectedMost + m_tolerance; };
    double below = 0;
    double above = 2 * m_problem.lambda;
    descend(above);
    if (!met()) {
        // From a price of the expectation at which one step of the likeliest place weighs as much as it costs to take it.
        double likeliest = 0;
        for (std::size_t i = 0; i < m_price.size(); ++i)
            likeliest = std::max(likeliest, m_odds[i] / m_problem.weight[i]);
        const auto step = static_cast<double>(std::max<std::int64_t>(m_problem.points->step.minor, 1));
        double growth = std::max(0.02 * above, 0.05 * step / std::max(likeliest, 1e-12));
        for (int i = 0; i < kGrowths && !met(); ++i) {
            below = above;
            above += growth;
            growth *= 2;
            descend(above);
        }
        if (!met())
            return;
    } else if (above == 0) {
        return;
    }
    for (int i = 0; i < kNarrowings && above - below > 1e-6 * above; ++i) {
        const double middle = below + (above - below) / 2;
        descend(middle);
        (met() ? above : below) = middle;
    }
}

void PricePointRepair::returnToBest()
{
    std::ranges::copy(m_best, m_price.begin());
    m_total = 0;
    m_expected = 0;
    for (std::size_t i = 0; i < m_price.size(); ++i) {
        m_total += m_problem.counted[i] > 0 ? m_price[i] : 0;
        m_expected += m_odds[i] * static_cast<double>(m_price[i] - m_base);
    }
    for (std::size_t i = 0; i < m_price.size(); ++i)
        setNeighbours(i);
}

/// Where no ladder found has the total and meets the target, the target goes first: prices fall, the cheapest fall for what it brings
/// first.
void PricePointRepair::lowerToTarget()
{
    returnToBest();
    fillHeaps();
    while (m_expected > m_expectedMost + m_tolerance) {
        std::size_t best = m_price.size();
        double bestRatio = std::numeric_limits<double>::infinity();
        for (std::size_t i = 0; i < m_price.size(); ++i) {
            if (!canFall(i) || m_odds[i] <= 0)
                continue;
            const double ratio = costChange(i, m_down[i]) / (m_odds[i] * static_cast<double>(m_price[i] - m_down[i]));
            if (ratio < bestRatio) {
                bestRatio = ratio;
                best = i;
            }
        }
        if (best == m_price.size())
            return;
        move(best, m_down[best]);
    }
    keepIfBetter();
}

void PricePointRepair::polish()
{
    m_theta = 0;
    const double mu = m_problem.mu;
    m_problem.mu = 0; // Cost alone.
    if (!m_bestStanding->met)
        lowerToTarget();
    returnToBest();
    fillHeaps();
    for (int round = 0; round < 64; ++round) {
        Pair best;
        best.merit = -1e-9;
        best.miss = std::abs(missOf(m_total));
        m_ups.clear();
        m_downs.clear();
        for (Step step; m_ups.size() < kPolished && takeBest(m_rises, step);)
            m_ups.push_back(step);
        for (Step step; m_downs.size() < kPolished && takeBest(m_falls, step);)
            m_downs.push_back(step);
        for (const Step& up : m_ups) {
            consider(best, up, {}, true);
            for (const Step& down : m_downs)
                consider(best, up, down, true);
        }
        for (const Step& down : m_downs)
            consider(best, {}, down, true);
        for (const Step& up : m_ups) {
            putBack(m_rises, up);
        }
        for (const Step& down : m_downs) {
            putBack(m_falls, down);
        }
        if (!best.up && !best.down)
            break;
        apply(best);
    }
    m_problem.mu = mu;
    keepIfBetter();
}

void PricePointRepair::findBound()
{
    const RepairProblem& p = m_problem;
    double bound = 2 * std::abs(p.mu) * static_cast<double>(std::abs(m_answer.totalMiss.minor));
    for (std::size_t i = 0; i < m_price.size(); ++i) {
        const double wanted = p.wanted[i];
        const double hair = 1e-6 * std::max(1.0, std::abs(wanted) * 1e-6);
        const std::int64_t below = allowedAtOrBelow(i, static_cast<std::int64_t>(std::floor(wanted + hair)));
        const std::int64_t above = allowedAtOrAbove(i, static_cast<std::int64_t>(std::ceil(wanted - hair)));
        if (below == kNone || above == kNone || above <= below)
            continue;
        const auto h = static_cast<double>(above - below);
        const double slope =
            2 * p.weight[i] * (wanted - static_cast<double>(p.today[i].minor)) + 2 * p.lambda * m_odds[i] - 2 * p.mu * p.counted[i];
        bound += p.weight[i] * h * h + std::abs(slope) * h + 2 * p.lambda * m_odds[i] * h;
    }
    m_answer.bound = bound;
}

const RepairAnswer& PricePointRepair::repair(const RepairProblem& problem)
{
    const std::size_t n = problem.wanted.size();
    assert(problem.points && problem.today.size() == n && problem.lo.size() == n && problem.hi.size() == n && problem.weight.size() == n &&
           problem.counted.size() == n && (problem.odds.empty() || problem.odds.size() == n));
    m_problem = problem;
    m_answer.possible = start();
    if (!m_answer.possible)
        return m_answer;
    m_bestStanding.reset();
    double oddsAll = 0;
    for (const double w : m_odds)
        oddsAll += w;
    m_expectedMost = problem.expectedMost ? *problem.expectedMost - oddsAll * static_cast<double>(m_base) : 0;
    // Rounding of the odds' sums, against the prices there are; bounds may lie as far as they like.
    const auto reach = [&](std::size_t i) { return std::abs(problem.wanted[i] - static_cast<double>(m_base)); };
    m_tolerance = n == 0 ? 0 : 1e-9 + 1e-12 * std::max(reach(0), reach(n - 1));
    if (problem.expectedMost) {
        meetTarget();
    } else {
        m_expectedMost = std::numeric_limits<double>::infinity();
        descend(0);
    }
    polish();

    m_answer.prices.resize(n);
    m_answer.total = {};
    m_answer.expected = oddsAll * static_cast<double>(m_base);
    for (std::size_t i = 0; i < n; ++i) {
        m_answer.prices[i] = Price{m_best[i]};
        m_answer.total += problem.counted[i] > 0 ? Price{m_best[i]} : Price{};
        m_answer.expected += m_odds[i] * static_cast<double>(m_best[i] - m_base);
    }
    m_answer.cost = m_bestStanding->cost;
    m_answer.expectedMet = m_bestStanding->met;
    m_answer.totalMiss = Price{missOf(m_answer.total.minor)};
    findBound();
    return m_answer;
}

} // namespace rungwright
