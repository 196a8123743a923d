// SPDX-License-Identifier: GPL-3.0-or-later
// Where the tiers lie in the portfolio picture: which can be shown, over which range, how densely.
#pragma once

#include "worklist.h"

#include <QPointF>
#include <QRectF>

#include <cstdint>
#include <vector>

namespace rungwright
{

/// A tier with a lean and a gap share.
struct PortfolioPoint {
    int tier = -1;
    double lean = 0;
    double share = 0;
    std::uint32_t onOffer = 0;
    bool leansLeft = false; ///< Flagged for it.
    bool wideGap = false;
};

/// Tiers that cannot be shown, by the first reason that holds.
struct PortfolioLeftOut {
    int notMeasured = 0; ///< Not yet.
    int noneOnOffer = 0;
    int noFloor = 0;
    int noGap = 0;  ///< Undefined under the tier's own model.
    int noLean = 0; ///< Fewer than two units on offer, or all at one price.
    int total() const { return notMeasured + noneOnOffer + noFloor + noGap + noLean; }
};

struct PortfolioPoints {
    std::vector<PortfolioPoint> points; ///< In the worklist's order.
    PortfolioLeftOut leftOut;
};

PortfolioPoints portfolioPoints(const Worklist& list);

struct ShownRange {
    double lower = 0;
    double upper = 1;
};

/// A range that shows all values, or, of 200 and more, all but the outermost half in a hundred on a side when they lie far off; `also` is
/// in it in any case.
ShownRange robustRange(std::vector<double> values, std::initializer_list<double> also);

/// Points in pixels, found by place.
class PortfolioShape
{
public:
    /// Maps `shown` onto `area`. What lies beyond the ranges is put at the edge.
    void place(const std::vector<PortfolioPoint>& points, const QRectF& area, const ShownRange& lean, const ShownRange& share);

    const std::vector<QPointF>& places() const { return m_places; }
    /// Index of the point nearest to `at`, not farther than `reach` pixels; -1 for none.
    int nearest(const QPointF& at, double reach) const;
    std::vector<int> inside(const QRectF& box) const;

    /// Points beyond each edge.
    int beyondLeft() const { return m_beyond[0]; }
    int beyondRight() const { return m_beyond[1]; }
    int beyondTop() const { return m_beyond[2]; }
    int beyondBottom() const { return m_beyond[3]; }
    bool atEdge(int point) const { return m_atEdge[static_cast<std::size_t>(point)]; }

    // Density: square cells of kCell pixels from the area's upper left corner.
    static constexpr int kCell = 8;
    int columns() const { return m_columns; }
    int rows() const { return m_rows; }
    std::uint32_t count(int column, int row) const { return m_counts[static_cast<std::size_t>(row * m_columns + column)]; }
    /// Number of points in the cell of this point, itself included.
    std::uint32_t countAround(int point) const;
    QRectF cell(int column, int row) const;

private:
    std::size_t cellOf(const QPointF& at) const;

    QRectF m_area;
    std::vector<QPointF> m_places;
    std::vector<bool> m_atEdge;
    std::array<int, 4> m_beyond{};
    int m_columns = 0;
    int m_rows = 0;
    std::vector<std::uint32_t> m_counts;
    std::vector<std::uint32_t> m_firsts; ///< By cell: where its points begin in m_byCell; one more at the end.
    std::vector<int> m_byCell;
};

} // namespace rungwright
