// SPDX-License-Identifier: GPL-3.0-or-later
#include "curve_paint.h"

#include <QPaintEngine>
#include <QPainter>

#include <algorithm>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

constexpr double kMiss = 0.125; ///< Pixels a dropped point may lie off the line.
constexpr double kAnySlope = std::numeric_limits<double>::infinity();

} // namespace

void CurveBuilder::begin(QPointF first)
{
    m_into << first;
    m_anchor = first;
    m_low = -kAnySlope;
    m_high = kAnySlope;
}

void CurveBuilder::add(QPointF next)
{
    const double dx = next.x() - m_anchor.x();
    const double slope = dx > 0 ? (next.y() - m_anchor.y()) / dx : 0;
    const bool oneMore = m_into.back() != m_anchor; // A point that could be dropped lies between.
    if (dx > 0 && slope >= m_low && slope <= m_high) {
        if (oneMore)
            m_into.back() = next;
        else
            m_into << next;
        m_low = std::max(m_low, slope - kMiss / dx);
        m_high = std::min(m_high, slope + kMiss / dx);
        return;
    }
    // The bend is sharper than that: the point before stays.
    m_anchor = m_into.back();
    m_into << next;
    const double step = next.x() - m_anchor.x();
    if (step > 0) {
        const double onward = (next.y() - m_anchor.y()) / step;
        m_low = onward - kMiss / step;
        m_high = onward + kMiss / step;
    } else {
        m_anchor = next;
        m_low = -kAnySlope;
        m_high = kAnySlope;
    }
}

void paintCurve(QPainter& painter, const QPointF* points, qsizetype count, const QPen& pen)
{
    if (count < 2)
        return;
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setBrush(Qt::NoBrush);
    if (painter.paintEngine()->type() != QPaintEngine::Raster || pen.style() != Qt::SolidLine) {
        painter.setPen(pen);
        painter.drawPolyline(points, static_cast<int>(count));
        return;
    }
    painter.setPen(pen);
    static thread_local std::vector<QLineF> lines;
    lines.clear();
    for (qsizetype i = 1; i < count; ++i)
        lines.emplace_back(points[i - 1], points[i]);
    painter.drawLines(lines.data(), static_cast<int>(lines.size()));
}

void appendFill(const QPointF* points, qsizetype count, double base, std::vector<QRectF>& rects)
{
    if (count < 2)
        return;
    const double last = points[count - 1].x();
    double left = points[0].x();
    double height = points[0].y();
    const auto close = [&](double right) {
        if (right > left && std::abs(height - base) >= 0.5)
            rects.emplace_back(QPointF(left, std::min(height, base)), QPointF(right, std::max(height, base)));
    };
    qsizetype at = 0;
    const double firstColumn = std::floor(left);
    const int columns = static_cast<int>(std::ceil(last - firstColumn));
    for (int column = 0; column < columns; ++column) {
        const double x = firstColumn + column;
        // The curve's height in the middle of this pixel's column.
        const double middle = std::clamp(x + 0.5, points[0].x(), last);
        while (at + 2 < count && points[at + 1].x() < middle)
            ++at;
        const QPointF a = points[at];
        const QPointF b = points[at + 1];
        const double share = b.x() > a.x() ? std::clamp((middle - a.x()) / (b.x() - a.x()), 0.0, 1.0) : 1.0;
        const double y = std::round(a.y() + share * (b.y() - a.y()));
        if (x > left && y != height) {
            close(x);
            left = x;
            height = y;
        } else if (x <= left) {
            height = y;
        }
    }
    close(last);
}

} // namespace rungwright
