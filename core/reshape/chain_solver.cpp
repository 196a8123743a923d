// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/chain_solver.h"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>
#include <numeric>
#include <utility>

namespace rungwright
{

namespace
{

constexpr double kInfinity = std::numeric_limits<double>::infinity();
constexpr double kRounding = std::numeric_limits<double>::epsilon();
// Newton within a bracket ends after a handful of steps; the limit only keeps a bug from hanging a window.
constexpr int kMostSteps = 200;

/// A root of a monotone function, closing in from both sides.
class Bracket
{
public:
    explicit Bracket(double lower, double reach) : m_lower(lower), m_reach(reach) {}

    void raiseLower(double at) { m_lower = at; }
    void lowerUpper(double at) { m_upper = at; }
    double upper() const { return m_upper; }
    bool bounded() const { return std::isfinite(m_lower) && std::isfinite(m_upper); }
    bool closed() const { return bounded() && m_upper - m_lower <= 4 * kRounding * std::max(std::abs(m_lower), std::abs(m_upper)); }

    /// Newton's step when it stays inside (every eighth step halves, so that no run of short steps lasts); else halfway, or further out.
    double next(double newton)
    {
        ++m_steps;
        if (newton > m_lower && newton < m_upper && !(bounded() && m_steps % 8 == 0))
            return newton;
        if (bounded())
            return m_lower + (m_upper - m_lower) / 2;
        m_reach *= 4;
        return std::isfinite(m_lower) ? m_lower + m_reach : m_upper - m_reach;
    }

private:
    double m_lower;
    double m_upper = kInfinity;
    double m_reach;
    int m_steps = 0;
};

} // namespace

bool ChainSolver::prepare(const ChainProblem& problem)
{
    const std::size_t n = problem.today.size();
    assert(problem.weight.size() == n && problem.lo.size() == n && problem.hi.size() == n && problem.counted.size() == n);
    assert(problem.odds.empty() || problem.odds.size() == n);
    m_problem = problem;
    m_answer = {ChainStatus::solved, std::move(m_answer.x), 0, 0, 0, 0, 0, {}, 0, 0, {}};
    m_base = n == 0 ? 0 : problem.today.front();
    m_today.resize(n);
    m_lo.resize(n);
    m_hi.resize(n);
    m_target.resize(n);
    m_odds.assign(n, 0.0);
    std::ranges::copy(problem.odds, m_odds.begin());
    double countedAll = 0;
    double oddsAll = 0;
    double heaviest = 0;
    for (std::size_t i = 0; i < n; ++i) {
        m_today[i] = problem.today[i] - m_base;
        m_lo[i] = problem.lo[i] - m_base;
        m_hi[i] = problem.hi[i] - m_base;
        countedAll += problem.counted[i];
        oddsAll += m_odds[i];
        heaviest = std::max(heaviest, problem.weight[i]);
    }
    m_countedBase = m_base * countedAll;
    m_oddsBase = m_base * oddsAll;
    if (const auto conflict = tightenBounds(m_lo, m_hi)) {
        m_answer.status = ChainStatus::boundsCross;
        m_answer.conflict = *conflict;
        return false;
    }
    m_countedAll = countedAll;
    m_oddsAll = oddsAll;
    // Against the prices there are; bounds may lie as far as they like.
    double spread = 1e-3;
    for (const double today : m_today)
        spread = std::max(spread, std::abs(today));
    m_muScale = heaviest * spread;

    for (std::size_t i = 0; i < n; ++i) {
        m_answer.leastTotal += problem.counted[i] * m_lo[i];
        m_answer.mostTotal += problem.counted[i] * m_hi[i];
    }
    const auto hair = [&](double total) { return roundings() * std::abs(total) + 4 * kRounding * std::abs(m_countedBase); };
    const bool reached = m_answer.mostTotal >= problem.totalLeast.value_or(-kInfinity) - m_countedBase - hair(m_answer.mostTotal) &&
                         m_answer.leastTotal <= problem.totalMost.value_or(kInfinity) - m_countedBase + hair(m_answer.leastTotal);
    m_answer.leastTotal += m_countedBase;
    m_answer.mostTotal += m_countedBase;
    if (!reached)
        m_answer.status = ChainStatus::totalOutOfReach;
    return reached;
}

/// A sum of n products keeps about sqrt(n) roundings of the largest; the base's product adds its own.
double ChainSolver::roundings() const { return 8 * kRounding * std::sqrt(static_cast<double>(m_today.size()) + 1); }

double ChainSolver::totalTolerance(const Fit& fit) const
{
    return roundings() * fit.largest * m_countedAll + 4 * kRounding * std::abs(m_countedBase);
}

double ChainSolver::expectTolerance(const Fit& fit) const
{
    return roundings() * fit.largest * m_oddsAll + 4 * kRounding * std::abs(m_oddsBase);
}

const ChainAnswer& ChainSolver::leastExpected(const ChainProblem& problem)
{
    if (prepare(problem))
        m_answer.leastExpected = smallestExpected(problem.totalLeast.value_or(-kInfinity) - m_countedBase) + m_oddsBase;
    return m_answer;
}

const ChainAnswer& ChainSolver::solve(const ChainProblem& problem)
{
    if (!prepare(problem))
        return m_answer;
    const Fit unhurried = fitFor(0, 0);
    const double most = problem.expectedMost.value_or(kInfinity) - m_oddsBase;
    if (problem.odds.empty() || unhurried.expected <= most + expectTolerance(unhurried)) {
        writeAnswer(unhurried, 0);
        return m_answer;
    }
    const double least = smallestExpected(problem.totalLeast.value_or(-kInfinity) - m_countedBase);
    m_answer.leastExpected = least + m_oddsBase;
    if (most < least - expectTolerance(unhurried)) {
        m_answer.status = ChainStatus::expectedOutOfReach;
        return m_answer;
    }
    // At the very end lambda has no bound; 1e-9 of the way there is as near as the multipliers can be told.
    findLambda(std::max(most, least + 1e-9 * (unhurried.expected - least)), unhurried);
    return m_answer;
}

void ChainSolver::sumsOf(std::span<const IsotonicBlock> blocks, double& total, double& expected) const
{
    total = 0;
    expected = 0;
    for (const IsotonicBlock& block : blocks)
        for (std::size_t i = block.begin; i < block.end; ++i) {
            total += m_problem.counted[i] * block.value;
            expected += m_odds[i] * block.value;
        }
}

double ChainSolver::smallestExpected(double totalAtLeast)
{
    // From the two ends of theta, the price of a unit of total: all at the lower bounds, and all at the upper ones.
    const std::size_t n = m_lo.size();
    const auto product = [&](std::span<const double> a, std::span<const double> b) {
        return std::inner_product(a.begin(), a.end(), b.begin(), 0.0);
    };
    double totalBelow = product(m_problem.counted, m_lo);
    double expectedBelow = product(m_odds, m_lo);
    if (totalBelow >= totalAtLeast)
        return expectedBelow;
    double totalAbove = product(m_problem.counted, m_hi);
    double expectedAbove = product(m_odds, m_hi);
    for (int step = 0; step < kMostSteps && totalAbove > totalBelow; ++step) {
        const double theta = (expectedAbove - expectedBelow) / (totalAbove - totalBelow);
        for (std::size_t i = 0; i < n; ++i)
            m_target[i] = m_odds[i] - theta * m_problem.counted[i];
        fitLinear(m_target, m_lo, m_hi, m_blocks);
        double total = 0;
        double expected = 0;
        sumsOf(m_blocks, total, expected);
        // Both ends are best at this theta too: so is every mixture of them, and one of those has the total.
        const double hair = roundings() * (std::abs(expected) + std::abs(theta * total)) + kRounding * std::abs(m_oddsBase);
        if (expected - theta * total >= expectedBelow - theta * totalBelow - hair)
            break;
        (total <= totalAtLeast ? totalBelow : totalAbove) = total;
        (total <= totalAtLeast ? expectedBelow : expectedAbove) = expected;
    }
    if (totalAbove <= totalBelow)
        return expectedBelow;
    const double share = std::clamp((totalAtLeast - totalBelow) / (totalAbove - totalBelow), 0.0, 1.0);
    return expectedBelow + share * (expectedAbove - expectedBelow);
}

ChainSolver::Fit ChainSolver::fitAt(double mu, double lambda)
{
    const auto& [counted, weight] = std::pair(m_problem.counted, m_problem.weight);
    for (std::size_t i = 0; i < m_target.size(); ++i)
        m_target[i] = m_today[i] + (mu * counted[i] - lambda * m_odds[i]) / weight[i];
    fitIsotonic(m_target, weight, m_lo, m_hi, m_blocks);
    Fit fit;
    fit.mu = mu;
    if (!m_blocks.empty())
        fit.largest = std::max(std::abs(m_blocks.front().value), std::abs(m_blocks.back().value));
    for (const IsotonicBlock& block : m_blocks) {
        double c = 0;
        double w = 0;
        for (std::size_t i = block.begin; i < block.end; ++i) {
            c += counted[i];
            w += m_odds[i];
        }
        fit.total += c * block.value;
        fit.expected += w * block.value;
        if (!block.held) {
            fit.cc += c * c / block.weight;
            fit.cw += c * w / block.weight;
            fit.ww += w * w / block.weight;
        }
    }
    return fit;
}

ChainSolver::Fit ChainSolver::fitForTotal(double wanted, double lambda, double start)
{
    Bracket bracket(-kInfinity, m_muScale);
    double mu = start;
    Fit fit;
    for (int step = 0; step < kMostSteps; ++step) {
        fit = fitAt(mu, lambda);
        fit.totalBinds = true;
        const double excess = fit.total - wanted;
        if (std::abs(excess) <= totalTolerance(fit))
            return fit;
        if (excess < 0)
            bracket.raiseLower(mu);
        else
            bracket.lowerUpper(mu);
        if (bracket.closed())
            return fit;
        mu = bracket.next(fit.cc > 0 ? mu - excess / fit.cc : std::numeric_limits<double>::quiet_NaN());
    }
    return fit;
}

ChainSolver::Fit ChainSolver::fitFor(double lambda, double start)
{
    const double least = m_problem.totalLeast.value_or(-kInfinity) - m_countedBase;
    const double most = m_problem.totalMost.value_or(kInfinity) - m_countedBase;
    if (least == most)
        return fitForTotal(least, lambda, start);
    const Fit fit = fitAt(0, lambda);
    if (fit.total < least - totalTolerance(fit))
        return fitForTotal(least, lambda, start);
    if (fit.total > most + totalTolerance(fit))
        return fitForTotal(most, lambda, start);
    return fit;
}

void ChainSolver::findLambda(double expectedMost, Fit fit)
{
    double heaviestOdds = 0;
    for (const double w : m_odds)
        heaviestOdds = std::max(heaviestOdds, w);
    Bracket bracket(0, m_muScale / heaviestOdds);
    double lambda = 0;
    for (int step = 0; step < kMostSteps; ++step) {
        const double excess = fit.expected - expectedMost;
        if (std::abs(excess) <= expectTolerance(fit)) {
            if (step == 0)
                fit = fitFor(0, fit.mu); // The blocks are those of another fit.
            break;
        }
        if (excess > 0)
            bracket.raiseLower(lambda);
        else
            bracket.lowerUpper(lambda);
        if (bracket.closed()) {
            lambda = bracket.upper(); // The side that keeps the target.
            fit = fitFor(lambda, fit.mu);
            break;
        }
        // Along the mu that keeps the total: mu changes by cw / cc, the expectation by the Schur complement.
        const bool held = fit.totalBinds && fit.cc > 0;
        const double slope = held ? fit.ww - fit.cw * fit.cw / fit.cc : fit.ww;
        // What is left of ww after cancellation is no slope.
        const bool steep = slope > 16 * kRounding * fit.ww;
        const double next = bracket.next(steep ? lambda + excess / slope : std::numeric_limits<double>::quiet_NaN());
        const double mu = held ? fit.mu + (next - lambda) * fit.cw / fit.cc : fit.mu;
        fit = fitFor(next, mu);
        lambda = next;
    }
    writeAnswer(fit, lambda);
}

void ChainSolver::writeAnswer(const Fit& fit, double lambda)
{
    m_answer.x.resize(m_today.size());
    spreadBlocks(m_blocks, m_answer.x);
    m_answer.mu = fit.mu;
    m_answer.lambda = lambda;
    m_answer.total = fit.total + m_countedBase;
    m_answer.expected = fit.expected + m_oddsBase;
    for (std::size_t i = 0; i < m_today.size(); ++i) {
        const double change = m_answer.x[i] - m_today[i];
        m_answer.cost += m_problem.weight[i] * change * change;
        m_answer.x[i] += m_base;
    }
}

} // namespace rungwright
