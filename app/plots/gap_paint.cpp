// SPDX-License-Identifier: GPL-3.0-or-later
#include "gap_paint.h"

#include <QPaintEngine>
#include <QPainter>

#include <algorithm>
#include <cmath>
#include <vector>

namespace rungwright
{

namespace
{

constexpr int kHatch = 7; ///< Pixels between hatching lines, along x.

/// One period of the hatching, for the screen: a tile is quicker than hundreds of antialiased lines.
const QBrush& hatchBrush(const Look& look)
{
    static QBrush brush;
    static QRgb madeFor[2] = {0, 0};
    const QRgb wanted[2] = {look.gapHatch.rgba(), look.paper.rgba()};
    if (brush.style() == Qt::NoBrush || madeFor[0] != wanted[0] || madeFor[1] != wanted[1]) {
        QPixmap tile(kHatch, kHatch);
        tile.fill(Qt::transparent);
        QPainter painter(&tile);
        painter.setRenderHint(QPainter::Antialiasing, true);
        painter.setPen(QPen(look.gapHatch, 1, Qt::SolidLine, Qt::FlatCap));
        for (const int c : {0, kHatch, 2 * kHatch}) // The line itself and what its neighbours' edges leave in the corners.
            painter.drawLine(QLineF(c + 2, -2, c - kHatch - 2, kHatch + 2));
        painter.end();
        brush = QBrush(tile);
        std::copy(std::begin(wanted), std::end(wanted), std::begin(madeFor));
    }
    return brush;
}

} // namespace

void paintHatching(QPainter& painter, const QRectF& rect, const Look& look)
{
    if (rect.isEmpty())
        return;
    // Lines x + y = c, cut to the rectangle by hand: not every picture format knows clipping, and the lines must not wander when the
    // rectangle grows.
    if (painter.paintEngine()->type() == QPaintEngine::Raster && painter.device()->devicePixelRatioF() == 1.0) {
        painter.fillRect(rect, hatchBrush(look));
        return;
    }
    const QRectF& seen = rect;
    static thread_local std::vector<QLineF> lines;
    lines.clear();
    const int first = static_cast<int>(std::ceil((seen.left() + seen.top()) / kHatch));
    for (int line = first; line * kHatch < seen.right() + seen.bottom(); ++line) {
        const double c = line * kHatch;
        const double x1 = std::max(seen.left(), c - seen.bottom());
        const double x2 = std::min(seen.right(), c - seen.top());
        lines.emplace_back(x1, c - x1, x2, c - x2);
    }
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(QPen(look.gapHatch, 1, Qt::SolidLine, Qt::FlatCap));
    painter.drawLines(lines.data(), static_cast<int>(lines.size()));
}

void paintGapBand(QPainter& painter, const QRectF& band, const QRectF& hatched, const Look& look)
{
    if (band.isEmpty())
        return;
    painter.setRenderHint(QPainter::Antialiasing, false);
    painter.fillRect(band, look.gapFill);
    paintHatching(painter, hatched, look);
}

void paintExpectedLine(QPainter& painter, double left, double right, double y, const Look& look)
{
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(QPen(look.gapLine, 2, Qt::SolidLine, Qt::FlatCap));
    painter.drawLine(QPointF(left, y), QPointF(right, y));
}

void paintFloorLine(QPainter& painter, double left, double right, double y, const Look& look)
{
    painter.setRenderHint(QPainter::Antialiasing, true);
    QPen pen(look.floor, 1.6, Qt::CustomDashLine, Qt::FlatCap);
    pen.setDashPattern({5, 3});
    painter.setPen(pen);
    painter.drawLine(QPointF(left, y), QPointF(right, y));
}

void paintBracket(QPainter& painter, const QLineF& bracket, const Look& look)
{
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(QPen(look.ink, 1.2, Qt::SolidLine, Qt::FlatCap));
    painter.drawLine(bracket);
    for (const QPointF end : {bracket.p1(), bracket.p2()})
        painter.drawLine(end - QPointF(4, 0), end + QPointF(4, 0));
}

} // namespace rungwright
