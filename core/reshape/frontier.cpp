// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/frontier.h"

#include "cheapest/fitted.h"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

constexpr double kUndefined = std::numeric_limits<double>::quiet_NaN();

} // namespace

bool FrontierTracer::prepare(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish)
{
    m_points.clear();
    m_chain.build(tier, model, rules, wish.order, wish.takenStay, wish.weights);
    m_floor = static_cast<double>(tier.advertisedFloor.minor);
    m_weightAll = 0;
    for (const double v : m_chain.weight)
        m_weightAll += v;
    return tier.hasFloor() && !m_chain.odds.empty() && m_chain.reachFloor == m_chain.wantedAtFloor;
}

const std::vector<FrontierPoint>& FrontierTracer::byChange(const Tier& tier, const ModelSettings& model, const PriceRules& rules,
                                                           const ChangeWish& wish, int count)
{
    assert(count >= 2);
    if (!prepare(tier, model, rules, wish))
        return m_points;
    ChainProblem problem = m_chain.problem();
    const Price today = m_chain.total;
    if (const auto limits = totalLimits(today, wish.total, rules)) {
        if (limits->first > limits->second)
            return m_points;
        problem.totalLeast = static_cast<double>(limits->first.minor);
        problem.totalMost = static_cast<double>(limits->second.minor);
    }
    const auto add = [&](const ChainAnswer& answer) {
        double gap = answer.expected - m_floor;
        if (model.kind == ModelKind::fitted) {
            m_sorted.clear();
            for (std::size_t i = 0; i < answer.x.size(); ++i)
                m_sorted.push_back({Price{std::llround(answer.x[i])}, m_chain.places[i]});
            const auto fit = fitRange(m_sorted, tier.advertisedFloor);
            gap = fit ? expectedCheapest(*fit, *m_chain.cheapest.left) - m_floor : kUndefined;
        }
        m_points.push_back({gap, std::sqrt(answer.cost / m_weightAll), answer.total - static_cast<double>(today.minor)});
    };
    const ChainAnswer& start = m_solver.solve(problem);
    if (start.status != ChainStatus::solved)
        return m_points;
    const double from = start.expected;
    add(start);
    const double to = *m_solver.leastExpected(problem).leastExpected;
    if (from - to <= 1e-6 * std::max(1.0, m_chain.hi.back() - m_chain.lo.front()))
        return m_points;
    for (int i = 1; i < count; ++i) {
        // The last one a millionth short of the end, where the multiplier is still finite.
        problem.expectedMost = i + 1 < count ? from + (to - from) * i / (count - 1) : to + 1e-6 * (from - to);
        const ChainAnswer& answer = m_solver.solve(problem);
        if (answer.status == ChainStatus::solved)
            add(answer);
    }
    return m_points;
}

const std::vector<FrontierPoint>& FrontierTracer::byTotal(const Tier& tier, const ModelSettings& model, const PriceRules& rules,
                                                          const ChangeWish& wish, double percent, int count)
{
    assert(count >= 2);
    if (!prepare(tier, model, rules, wish) || model.kind == ModelKind::fitted)
        return m_points;
    ChainProblem problem = m_chain.problem();
    const ChainAnswer& reach = m_solver.leastExpected(problem);
    if (reach.status != ChainStatus::solved)
        return m_points;
    const auto today = static_cast<double>(m_chain.total.minor);
    double from = std::max(reach.leastTotal, today * (1 - percent / 100));
    double to = std::min(reach.mostTotal, today * (1 + percent / 100));
    if (const auto room = totalRoomOf(m_chain.total, rules)) {
        from = std::max(from, inMinor(room->least));
        to = std::min(to, inMinor(room->most));
    }
    for (int i = 0; i < count && from <= to; ++i) {
        const double total = from + (to - from) * i / (count - 1);
        problem.totalLeast = problem.totalMost = total;
        const ChainAnswer& answer = m_solver.leastExpected(problem);
        if (answer.leastExpected)
            m_points.push_back({*answer.leastExpected - m_floor, kUndefined, total - today});
    }
    return m_points;
}

} // namespace rungwright
