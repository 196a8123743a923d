// SPDX-License-Identifier: GPL-3.0-or-later
// The least change of a chain of numbers under bounds, a total and an expectation: the mathematics under least_change.h.
#pragma once

#include "reshape/isotonic.h"

#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Minimise sum weight_i (x_i - today_i)^2 over x with
///   x_1 <= x_2 <= ... <= x_n,   lo_i <= x_i <= hi_i,   totalLeast <= sum counted_i x_i <= totalMost,   sum odds_i x_i <= expectedMost.
/// All spans by place in the order kept, of one size. weight > 0; counted >= 0; odds >= 0, or empty when there are none. Bounds are finite.
/// A total that is fixed has totalLeast = totalMost. The spans must outlive the call only.
struct ChainProblem {
    std::span<const double> today;
    std::span<const double> weight;
    std::span<const double> lo, hi;
    std::span<const double> counted;
    std::span<const double> odds;
    std::optional<double> totalLeast, totalMost;
    std::optional<double> expectedMost;
};

enum class ChainStatus : unsigned char {
    solved,
    boundsCross,        ///< `conflict` names the places.
    totalOutOfReach,    ///< Within the bounds the total runs from leastTotal to mostTotal.
    expectedOutOfReach, ///< Within bounds and total the expectation comes down to leastExpected.
};

struct ChainAnswer {
    ChainStatus status = ChainStatus::solved;
    std::vector<double> x; ///< By place; of no use unless solved.
    double cost = 0;       ///< sum weight (x - today)^2
    double total = 0;      ///< sum counted x
    double expected = 0;   ///< sum odds x; 0 without odds
    /// The multipliers: x minimises cost - 2 mu total + 2 lambda expected under order and bounds. lambda >= 0.
    double mu = 0;
    double lambda = 0;
    BoundConflict conflict;
    double leastTotal = 0, mostTotal = 0; ///< Unless boundsCross.
    std::optional<double> leastExpected;  ///< Worked out when lambda is needed, or by leastExpected().
};

/// Keeps its storage: solving again with as many places allocates nothing.
///
/// Method. For given multipliers the problem is isotonic regression under bounds (isotonic.h) of today + (mu counted - lambda odds) /
/// weight. Total and expectation of that fit are piecewise linear and monotone, the one in mu, the other, along the mu that keeps the
/// total, in lambda; their slopes are sums over the blocks that no bound holds. Both are found by Newton's steps inside a bracket: from the
/// right linear piece the step lands on the root but for rounding, and elsewhere halving keeps it safe. (Library root finders stop at a
/// relative width of the root, which is often 0 here.) Each fit is O(n).
///
/// Whether an expectation can be had is settled first: the least one is a linear program, whose dual in the total's multiplier is concave
/// and piecewise linear, walked to its top by chords; every step is one linear fit, and the walk ends on the exact piece.
///
/// Objectives agree with quadprog to 1e-8 relative (checked by tests). The expectation exceeds expectedMost, and the total misses its goal,
/// by a few roundings at the most.
class ChainSolver
{
public:
    const ChainAnswer& solve(const ChainProblem& problem);
    /// Only status, conflict, leastTotal, mostTotal and leastExpected are filled.
    const ChainAnswer& leastExpected(const ChainProblem& problem);

private:
    struct Fit {
        double total = 0, expected = 0;
        double cc = 0, cw = 0, ww = 0; ///< Sums over free blocks of counted^2, counted odds, odds^2, divided by weight.
        double largest = 0;            ///< Largest price, either way from the base.
        double mu = 0;
        bool totalBinds = false;
    };

    double roundings() const;
    double totalTolerance(const Fit& fit) const;  ///< What rounding may take from a total ...
    double expectTolerance(const Fit& fit) const; ///< ... and from an expectation.
    bool prepare(const ChainProblem& problem);
    double smallestExpected(double totalAtLeast);
    Fit fitAt(double mu, double lambda);
    Fit fitForTotal(double wanted, double lambda, double start);
    Fit fitFor(double lambda, double start);
    void findLambda(double expectedMost, Fit fit);
    void writeAnswer(const Fit& fit, double lambda);
    void sumsOf(std::span<const IsotonicBlock> blocks, double& total, double& expected) const;

    ChainProblem m_problem;
    double m_base = 0;                      ///< Subtracted from every price, so that rounding counts against the range and not the price.
    double m_countedBase = 0;               ///< m_base times the sum of counted.
    double m_oddsBase = 0;                  ///< m_base times the sum of odds.
    double m_countedAll = 0, m_oddsAll = 0; ///< Sums.
    double m_muScale = 0;
    std::vector<double> m_today, m_lo, m_hi, m_target, m_odds;
    std::vector<IsotonicBlock> m_blocks;
    ChainAnswer m_answer;
};

} // namespace rungwright
