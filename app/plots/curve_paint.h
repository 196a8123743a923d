// SPDX-License-Identifier: GPL-3.0-or-later
// Curves in pixels: as few points as the eye needs, and painted the way the raster engine is quick at.
#pragma once

#include <QPen>
#include <QPolygonF>
#include <QRectF>

#include <vector>

class QPainter;

namespace rungwright
{

/// Adds a point to a curve that goes on to the right (or straight up or down), dropping the one before it where a straight line misses it
/// by less than an eighth of a pixel. Start a stretch with begin(); points must not go back in x.
class CurveBuilder
{
public:
    explicit CurveBuilder(QPolygonF& into) : m_into(into) {}
    void begin(QPointF first);
    void add(QPointF next);

private:
    QPolygonF& m_into;
    QPointF m_anchor; ///< The last point that stays.
    double m_low = 0; ///< Slopes from the anchor that come close enough to every point dropped since.
    double m_high = 0;
};

/// A line through `count` points. The pen's cap: square where the curve has corners, flat where it is smooth. On the screen as single
/// strokes: as one outline the raster engine takes quadratic time in the width of a flat curve, for it looks up each pixel of a row in a
/// list.
void paintCurve(QPainter& painter, const QPointF* points, qsizetype count, const QPen& pen);

/// The area between a curve (x never going back) and the height `base`, as rectangles a whole number of pixels wide; neighbours of equal
/// height are one.
void appendFill(const QPointF* points, qsizetype count, double base, std::vector<QRectF>& rects);

} // namespace rungwright
