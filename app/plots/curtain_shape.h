// SPDX-License-Identifier: GPL-3.0-or-later
// The curtain as a line and an area in pixels: the chance that nothing on offer costs less, against price.
#pragma once

#include "gap/measure.h"
#include "look.h"

#include <QPen>
#include <QPolygonF>
#include <QRectF>

#include <vector>

class QPainter;

namespace rungwright
{

/// Price and chance to pixels: a plot's area with its price range (minor units) and chance from 0 at the left to 1 at the right.
struct CurtainFrame {
    QRectF area;
    double low = 0;
    double high = 1;

    double x(double chance) const { return area.left() + chance * area.width(); }
    double y(double price) const { return area.bottom() - (price - low) / (high - low) * area.height(); }
};

/// Kept between frames, so that a drag allocates nothing once the tier has been drawn.
class CurtainShape
{
public:
    /// The curve of `m` cut to the frame. Steps for models that work on rungs, a smooth line for the fitted range.
    void build(const Measurement& m, const CurtainFrame& frame);
    bool empty() const { return m_line.isEmpty(); }
    bool reachesBelowFloor() const { return !m_missing.empty(); }

    /// The area above the floor under the curve, its claim part hatched. Where units are asked below the floor, what is missing there to
    /// certainty is hatched instead: the gap is the filled area less the hatched one.
    void paintArea(QPainter& painter, const Look& look) const;
    void paintLine(QPainter& painter, const QPen& pen) const;
    /// How far to the right the filled area reaches over the whole height between two pixel heights (upper, lower); 0 = not at all.
    double roomBetween(double upper, double lower) const;

private:
    QPolygonF m_line;
    std::vector<QRectF> m_area; ///< Under it, from the floor upwards.
    QRectF m_claim;
    std::vector<QRectF> m_missing; ///< Below the floor, beyond the curve; only with units asked there.
    double m_left = 0;
};

} // namespace rungwright
