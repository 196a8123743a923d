// SPDX-License-Identifier: GPL-3.0-or-later
#include "portfolio_shape.h"

#include <algorithm>
#include <cmath>

namespace rungwright
{

PortfolioPoints portfolioPoints(const Worklist& list)
{
    PortfolioPoints all;
    all.points.reserve(static_cast<std::size_t>(list.count()));
    for (int tier = 0; tier < list.count(); ++tier) {
        const WorklistRow& row = list.row(tier);
        if (!row.measured)
            ++all.leftOut.notMeasured;
        else if (row.onOffer == 0)
            ++all.leftOut.noneOnOffer;
        else if (row.floor.minor <= 0)
            ++all.leftOut.noFloor;
        else if (!row.share)
            ++all.leftOut.noGap;
        else if (!row.lean)
            ++all.leftOut.noLean;
        else
            all.points.push_back(
                {tier, *row.lean, *row.share, row.onOffer, list.flags(tier).has(Flag::leansLeft), list.flags(tier).has(Flag::wideGap)});
    }
    return all;
}

ShownRange robustRange(std::vector<double> values, std::initializer_list<double> also)
{
    constexpr std::size_t kMany = 200;
    double lower = std::min(also);
    double upper = std::max(also);
    if (!values.empty()) {
        std::sort(values.begin(), values.end());
        const std::size_t cut = values.size() < kMany ? 0 : values.size() / 200;
        double low = values[cut];
        double high = values[values.size() - 1 - cut];
        // Outliers that lie near are not worth a mark at the edge.
        const double near = 0.5 * (high - low);
        if (values.front() >= low - near)
            low = values.front();
        if (values.back() <= high + near)
            high = values.back();
        lower = std::min(lower, low);
        upper = std::max(upper, high);
    }
    if (!(upper > lower)) {
        lower -= 0.5;
        upper += 0.5;
    }
    const double air = 0.04 * (upper - lower);
    return {lower - air, upper + air};
}

void PortfolioShape::place(const std::vector<PortfolioPoint>& points, const QRectF& area, const ShownRange& lean, const ShownRange& share)
{
    m_area = area;
    m_places.clear();
    m_places.reserve(points.size());
    m_atEdge.assign(points.size(), false);
    m_beyond = {};
    m_columns = std::max(1, static_cast<int>(std::ceil(area.width() / kCell)));
    m_rows = std::max(1, static_cast<int>(std::ceil(area.height() / kCell)));
    m_counts.assign(static_cast<std::size_t>(m_columns) * static_cast<std::size_t>(m_rows), 0);
    const double dx = area.width() / (lean.upper - lean.lower);
    const double dy = area.height() / (share.upper - share.lower);
    for (std::size_t i = 0; i < points.size(); ++i) {
        const PortfolioPoint& p = points[i];
        const std::array beyond{p.lean<lean.lower, p.lean> lean.upper, p.share > share.upper, p.share < share.lower};
        for (std::size_t side = 0; side < beyond.size(); ++side) {
            m_beyond[side] += beyond[side] ? 1 : 0;
            m_atEdge[i] = m_atEdge[i] || beyond[side];
        }
        const double x = area.left() + dx * (std::clamp(p.lean, lean.lower, lean.upper) - lean.lower);
        const double y = area.bottom() - dy * (std::clamp(p.share, share.lower, share.upper) - share.lower);
        m_places.emplace_back(x, y);
        ++m_counts[cellOf(m_places.back())];
    }
    // Counting sort into cells.
    m_firsts.assign(m_counts.size() + 1, 0);
    for (std::size_t c = 0; c < m_counts.size(); ++c)
        m_firsts[c + 1] = m_firsts[c] + m_counts[c];
    std::vector<std::uint32_t> next(m_firsts.begin(), m_firsts.end() - 1);
    m_byCell.assign(points.size(), 0);
    for (std::size_t i = 0; i < m_places.size(); ++i)
        m_byCell[next[cellOf(m_places[i])]++] = static_cast<int>(i);
}

std::size_t PortfolioShape::cellOf(const QPointF& at) const
{
    const int column = std::clamp(static_cast<int>((at.x() - m_area.left()) / kCell), 0, m_columns - 1);
    const int row = std::clamp(static_cast<int>((at.y() - m_area.top()) / kCell), 0, m_rows - 1);
    return static_cast<std::size_t>(row * m_columns + column);
}

std::uint32_t PortfolioShape::countAround(int point) const { return m_counts[cellOf(m_places[static_cast<std::size_t>(point)])]; }

QRectF PortfolioShape::cell(int column, int row) const
{
    return QRectF(m_area.left() + column * kCell, m_area.top() + row * kCell, kCell, kCell).intersected(m_area);
}

int PortfolioShape::nearest(const QPointF& at, double reach) const
{
    if (m_places.empty())
        return -1;
    const auto column = [&](double x) { return std::clamp(static_cast<int>((x - m_area.left()) / kCell), 0, m_columns - 1); };
    const auto row = [&](double y) { return std::clamp(static_cast<int>((y - m_area.top()) / kCell), 0, m_rows - 1); };
    int found = -1;
    double best = reach * reach;
    for (int r = row(at.y() - reach); r <= row(at.y() + reach); ++r) {
        for (int c = column(at.x() - reach); c <= column(at.x() + reach); ++c) {
            const auto cellAt = static_cast<std::size_t>(r * m_columns + c);
            for (std::uint32_t k = m_firsts[cellAt]; k < m_firsts[cellAt + 1]; ++k) {
                const QPointF d = m_places[static_cast<std::size_t>(m_byCell[k])] - at;
                const double distance = QPointF::dotProduct(d, d);
                if (distance <= best) {
                    best = distance;
                    found = m_byCell[k];
                }
            }
        }
    }
    return found;
}

std::vector<int> PortfolioShape::inside(const QRectF& box) const
{
    std::vector<int> found;
    for (std::size_t i = 0; i < m_places.size(); ++i) {
        if (box.contains(m_places[i]))
            found.push_back(static_cast<int>(i));
    }
    return found;
}

} // namespace rungwright
