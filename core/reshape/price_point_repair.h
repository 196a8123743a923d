// SPDX-License-Identifier: GPL-3.0-or-later
// From the continuous optimum of a least change to allowed prices: round, then repair total and target by single steps that cost least.
#pragma once

#include "ladder/price_points.h"

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// All spans by place in the order kept, of one size. A place may take the price points in [lo, hi] and `today`, if that lies there.
struct RepairProblem {
    const PricePoints* points = nullptr;
    std::span<const double> wanted; ///< The continuous optimum, nondecreasing, minor units.
    std::span<const Price> today, lo, hi;
    std::span<const double> weight;  ///< > 0
    std::span<const double> counted; ///< 1 where the price counts towards the total, else 0.
    std::span<const double> odds;    ///< >= 0, or empty.
    std::optional<Price> totalLeast, totalMost;
    std::optional<double> expectedMost;
    double mu = 0, lambda = 0; ///< The continuous optimum's multipliers.
};

struct RepairAnswer {
    /// False when no sequence of allowed prices keeps order and bounds. The rest is then of no use.
    bool possible = false;
    std::vector<Price> prices; ///< By place, nondecreasing, allowed.
    double cost = 0;           ///< sum weight (price - today)^2
    Price total;               ///< sum counted price
    double expected = 0;       ///< sum odds price
    Price totalMiss;           ///< Total less the nearest one asked for; 0 when met.
    bool expectedMet = true;
    double bound = 0; ///< See PricePointRepair.
};

/// Keeps its storage: repairing again with as many places allocates nothing.
///
/// Method. The nearest allowed price keeps the order wherever places share their allowed prices (Goldstein & Kruskal, Least-squares fitting
/// by monotonic functions having integer values, JASA 71 (1976), for the optimality of rounding without a total, from memory); where they
/// do not (a price today that is no point), a sweep up mends it. Then single steps to a neighbouring allowed price, always the one that
/// adds least to cost + theta * expected, by a priority queue: first until the total is met or no step brings it nearer, then exchanges (a
/// step up and a step down) as long as they gain. theta begins at 2 lambda, grows until the target is met and is then narrowed to the least
/// that meets it; of all ladders seen the cheapest that meets both is kept, and exchanges that gain without breaking anything finish it.
/// Where the price points do not let both be met, the target goes first and the total comes as near as single steps and exchanges bring it.
/// O(n log n) for a narrowing of fixed depth.
///
/// How good it is: the true optimum on price points costs no less than the continuous optimum and no more than the answer. Where counted
/// places share one evenly spaced grid that today's prices, bounds and total lie on, both constraints are met and the odds fall along the
/// order, the answer costs at most `bound` more than the continuous optimum:
///   bound = sum weight_i h_i^2 + sum |g_i| h_i + 2 lambda sum odds_i h_i + 2 |mu totalMiss|,
/// with h_i the distance between the two allowed prices around wanted_i (0 where it is one) and g_i the slope 2 weight_i (wanted_i -
/// today_i)
/// + 2 lambda odds_i - 2 mu counted_i, which is 0 for every place that stands alone. That is what a ladder costs whose every price is one
/// of those two and that meets both constraints, and there is one. Tests check the bound and print how far the answers are from the true
/// optimum, which is far less.
class PricePointRepair
{
public:
    const RepairAnswer& repair(const RepairProblem& problem);

private:
    static constexpr std::int64_t kNone = -1;
    struct Step {
        double merit = 0;
        std::uint32_t place = 0;
        std::uint32_t stamp = 0;
    };
    using Heap = std::vector<Step>;
    struct Pair {
        std::optional<Step> up, down;
        double merit = 0;
        std::int64_t miss = 0;
    };

    bool start();
    std::int64_t allowedAtOrAbove(std::size_t i, std::int64_t price) const;
    std::int64_t allowedAtOrBelow(std::size_t i, std::int64_t price) const;
    void setNeighbours(std::size_t i);
    bool canRise(std::size_t i) const;
    bool canFall(std::size_t i) const;
    std::int64_t change(const Step& step, bool rise) const;
    double costChange(std::size_t i, std::int64_t to) const;
    double merit(std::size_t i, std::int64_t to) const;
    std::int64_t missOf(std::int64_t total) const;

    void fillHeaps();
    void offer(std::size_t i);
    static void putBack(Heap& heap, const Step& step);
    bool takeBest(Heap& heap, Step& step);
    void move(std::size_t i, std::int64_t to);
    void meetTotal();
    void exchange();
    void meetTotalByPairs();
    void consider(Pair& best, std::optional<Step> up, std::optional<Step> down, bool hardTarget) const;
    void apply(const Pair& pair);
    void descend(double theta);
    void keepIfBetter();
    void meetTarget();
    void returnToBest();
    void lowerToTarget();
    void polish();
    void findBound();

    RepairProblem m_problem;
    std::vector<std::int64_t> m_lo, m_hi, m_price, m_up, m_down, m_best;
    std::vector<std::uint32_t> m_stamp;
    std::vector<double> m_odds;
    Heap m_rises, m_falls, m_aside, m_ups, m_downs;
    double m_theta = 0;
    double m_tolerance = 0;
    std::int64_t m_base = 0, m_total = 0;
    double m_expected = 0; ///< Of price less m_base.
    double m_expectedMost = 0;
    struct Standing {
        std::int64_t miss = 0;
        bool met = false;
        double cost = 0, expected = 0;
    };
    std::optional<Standing> m_bestStanding;
    RepairAnswer m_answer;
};

} // namespace rungwright
