// SPDX-License-Identifier: GPL-3.0-or-later
// The repair's state: what each place may take, what a single step costs, and the steps at hand.
#include "reshape/price_point_repair.h"

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <limits>

namespace rungwright
{

namespace
{

// For heaps that give the least merit first, the lower place of equal ones.
constexpr auto kWorse = [](const auto& a, const auto& b) { return a.merit != b.merit ? a.merit > b.merit : a.place > b.place; };

} // namespace

std::int64_t PricePointRepair::allowedAtOrAbove(std::size_t i, std::int64_t price) const
{
    const std::int64_t from = std::max(price, m_problem.lo[i].minor);
    std::int64_t found = kNone;
    if (const auto point = m_problem.points->atOrAbove(Price{from}))
        found = point->minor;
    const std::int64_t today = m_problem.today[i].minor;
    if (today >= from && (found == kNone || today < found))
        found = today;
    return found <= m_problem.hi[i].minor ? found : kNone;
}

std::int64_t PricePointRepair::allowedAtOrBelow(std::size_t i, std::int64_t price) const
{
    const std::int64_t from = std::min(price, m_problem.hi[i].minor);
    std::int64_t found = kNone;
    if (const auto point = m_problem.points->atOrBelow(Price{from}))
        found = point->minor;
    const std::int64_t today = m_problem.today[i].minor;
    if (today <= from && today > found)
        found = today;
    return found >= m_problem.lo[i].minor ? found : kNone;
}

bool PricePointRepair::start()
{
    const std::size_t n = m_problem.wanted.size();
    m_lo.resize(n);
    m_hi.resize(n);
    m_price.resize(n);
    m_up.resize(n);
    m_down.resize(n);
    m_best.resize(n);
    m_stamp.assign(n, 0);
    m_odds.assign(n, 0.0);
    std::ranges::copy(m_problem.odds, m_odds.begin());
    // Each place's first and last allowed price that leave its neighbours one.
    for (std::size_t i = 0; i < n; ++i)
        if ((m_lo[i] = allowedAtOrAbove(i, i > 0 ? m_lo[i - 1] : 0)) == kNone)
            return false;
    for (std::size_t i = n; i-- > 0;) {
        m_hi[i] = allowedAtOrBelow(i, i + 1 < n ? m_hi[i + 1] : std::numeric_limits<std::int64_t>::max());
        if (m_hi[i] == kNone || m_hi[i] < m_lo[i])
            return false;
    }
    m_base = n > 0 ? m_problem.today.front().minor : 0;
    m_total = 0;
    m_expected = 0;
    for (std::size_t i = 0; i < n; ++i) {
        const double wanted = m_problem.wanted[i];
        // A hair, so that an optimum that is a price but for rounding is taken for that price.
        const double hair = 1e-9 * std::max(1.0, std::abs(wanted));
        const std::int64_t below = allowedAtOrBelow(i, static_cast<std::int64_t>(std::floor(wanted + hair)));
        const std::int64_t above = allowedAtOrAbove(i, static_cast<std::int64_t>(std::ceil(wanted - hair)));
        std::int64_t price = below == kNone ? above : below;
        if (below != kNone && above != kNone && static_cast<double>(above) - wanted < wanted - static_cast<double>(below))
            price = above;
        price = std::clamp(price, m_lo[i], m_hi[i]);
        if (i > 0 && price < m_price[i - 1])
            price = allowedAtOrAbove(i, m_price[i - 1]);
        m_price[i] = price;
        m_total += m_problem.counted[i] > 0 ? price : 0;
        m_expected += m_odds[i] * static_cast<double>(price - m_base);
    }
    for (std::size_t i = 0; i < n; ++i)
        setNeighbours(i);
    return true;
}

void PricePointRepair::setNeighbours(std::size_t i)
{
    m_up[i] = m_price[i] < m_hi[i] ? allowedAtOrAbove(i, m_price[i] + 1) : kNone;
    m_down[i] = m_price[i] > m_lo[i] ? allowedAtOrBelow(i, m_price[i] - 1) : kNone;
}

bool PricePointRepair::canRise(std::size_t i) const { return m_up[i] != kNone && (i + 1 == m_price.size() || m_up[i] <= m_price[i + 1]); }

bool PricePointRepair::canFall(std::size_t i) const { return m_down[i] != kNone && (i == 0 || m_down[i] >= m_price[i - 1]); }

double PricePointRepair::costChange(std::size_t i, std::int64_t to) const
{
    const auto before = static_cast<double>(m_price[i] - m_problem.today[i].minor);
    const auto after = static_cast<double>(to - m_problem.today[i].minor);
    return m_problem.weight[i] * (after - before) * (after + before);
}

double PricePointRepair::merit(std::size_t i, std::int64_t to) const
{
    const auto step = static_cast<double>(to - m_price[i]);
    return costChange(i, to) + (m_theta * m_odds[i] - 2 * m_problem.mu * m_problem.counted[i]) * step;
}

std::int64_t PricePointRepair::change(const Step& step, bool rise) const
{
    return (rise ? m_up[step.place] : m_down[step.place]) - m_price[step.place];
}

/// Total less the nearest one asked for.
std::int64_t PricePointRepair::missOf(std::int64_t total) const
{
    if (m_problem.totalLeast && total < m_problem.totalLeast->minor)
        return total - m_problem.totalLeast->minor;
    if (m_problem.totalMost && total > m_problem.totalMost->minor)
        return total - m_problem.totalMost->minor;
    return 0;
}

void PricePointRepair::fillHeaps()
{
    m_rises.clear();
    m_falls.clear();
    for (std::uint32_t i = 0; i < m_price.size(); ++i) {
        if (canRise(i))
            m_rises.push_back({merit(i, m_up[i]), i, m_stamp[i]});
        if (canFall(i))
            m_falls.push_back({merit(i, m_down[i]), i, m_stamp[i]});
    }
    std::ranges::make_heap(m_rises, kWorse);
    std::ranges::make_heap(m_falls, kWorse);
}

void PricePointRepair::offer(std::size_t i)
{
    const auto place = static_cast<std::uint32_t>(i);
    ++m_stamp[i]; // What the heaps hold of this place is out of date.
    if (canRise(i)) {
        putBack(m_rises, {merit(i, m_up[i]), place, m_stamp[i]});
    }
    if (canFall(i)) {
        putBack(m_falls, {merit(i, m_down[i]), place, m_stamp[i]});
    }
}

void PricePointRepair::putBack(Heap& heap, const Step& step)
{
    heap.push_back(step);
    std::ranges::push_heap(heap, kWorse);
}

bool PricePointRepair::takeBest(Heap& heap, Step& step)
{
    while (!heap.empty()) {
        std::ranges::pop_heap(heap, kWorse);
        step = heap.back();
        heap.pop_back();
        if (step.stamp == m_stamp[step.place])
            return true;
    }
    return false;
}

void PricePointRepair::move(std::size_t i, std::int64_t to)
{
    const std::int64_t step = to - m_price[i];
    m_total += m_problem.counted[i] > 0 ? step : 0;
    m_expected += m_odds[i] * static_cast<double>(step);
    m_price[i] = to;
    setNeighbours(i);
    if (i > 0)
        offer(i - 1);
    offer(i);
    if (i + 1 < m_price.size())
        offer(i + 1);
}

} // namespace rungwright
