// SPDX-License-Identifier: GPL-3.0-or-later
// SideBySidePlot: painting columns and overlays.
#include "side_by_side_plot.h"

#include "gap_paint.h"
#include "label_layout.h"
#include "plot_words.h"
#include "rung_painter.h"
#include "wording.h"

#include <QPainter>

#include <algorithm>
#include <array>
#include <cmath>

namespace rungwright
{

namespace
{

constexpr double kSwatch = 34; ///< Room for a stretch of line with its mark, and some air.
constexpr double kSideGap = 18;
constexpr double kInset = 4; ///< Between a column's sides and its first and last rung.

/// Line styles beside the colours, in pen widths; empty = solid.
QPen seriesPen(const Look& look, std::size_t i, double width)
{
    static const std::array<QList<qreal>, SideBySidePlot::kMost> dashes{
        QList<qreal>{}, QList<qreal>{6, 3}, QList<qreal>{2, 2}, QList<qreal>{8, 2, 2, 2}, QList<qreal>{1, 2, 4, 2}, QList<qreal>{12, 4}};
    QPen pen(look.series[i], width, Qt::SolidLine, Qt::FlatCap, Qt::MiterJoin);
    if (!dashes[i].isEmpty())
        pen.setDashPattern(dashes[i]);
    return pen;
}

/// A mark of its own shape for each ladder: disc, square, triangle, diamond, cross, ring.
void paintMark(QPainter& painter, QPointF at, std::size_t i, double r, const Look& look)
{
    painter.setPen(QPen(look.series[i], 1.4));
    painter.setBrush(look.series[i]);
    switch (i) {
    case 0:
        painter.drawEllipse(at, r, r);
        break;
    case 1:
        painter.drawRect(QRectF(at.x() - r, at.y() - r, 2 * r, 2 * r));
        break;
    case 2: {
        const QPointF points[] = {at + QPointF(0, -1.2 * r), at + QPointF(1.1 * r, r), at + QPointF(-1.1 * r, r)};
        painter.drawPolygon(points, 3);
        break;
    }
    case 3: {
        const QPointF points[] = {at + QPointF(0, -1.3 * r), at + QPointF(1.3 * r, 0), at + QPointF(0, 1.3 * r), at + QPointF(-1.3 * r, 0)};
        painter.drawPolygon(points, 4);
        break;
    }
    case 4:
        painter.drawLine(at + QPointF(-r, -r), at + QPointF(r, r));
        painter.drawLine(at + QPointF(-r, r), at + QPointF(r, -r));
        break;
    default:
        painter.setBrush(look.paper);
        painter.drawEllipse(at, r, r);
    }
}

} // namespace

void SideBySidePlot::paintFrame(QPainter& painter)
{
    if (m_sides.empty())
        return;
    painter.save();
    const QFontMetricsF metrics(font());
    painter.setFont(font());
    painter.setPen(look().faintInk);
    const QString title = priceAxisTitle(m_currency);
    painter.drawText(QPointF(8, kHeadingTop + metrics.ascent()), title);
    const double left = 8 + metrics.horizontalAdvance(title) + 2 * kSideGap;
    const QRectF room(left, kHeadingTop, viewport().width() - left - 12, metrics.height());
    const QString beside = m_arrangement == Arrangement::columns ? tr("beside each ladder, the chance that nothing costs less (0 to 100 %)")
                                                                 : tr("on the right, the chance that nothing costs less (0 to 100 %)");
    painter.drawText(room, Qt::AlignRight | Qt::AlignTop, metrics.elidedText(beside, Qt::ElideRight, room.width()));
    if (m_arrangement == Arrangement::overlay) {
        paintOverlayLegend(painter);
        const Side& any = m_sides.front();
        painter.setPen(look().faintInk);
        painter.setFont(font());
        painter.drawText(QRectF(any.ladder.left(), any.ladder.bottom() + 6, any.ladder.width(), metrics.height()),
                         Qt::AlignRight | Qt::AlignTop, tr("place on the ladder"));
    }
    painter.restore();
}

void SideBySidePlot::paintMarks(QPainter& painter)
{
    painter.save();
    if (m_arrangement == Arrangement::columns) {
        for (const Side& side : m_sides)
            paintColumn(painter, side);
    } else if (!m_sides.empty()) {
        paintOverlay(painter);
    }
    painter.restore();
}

void SideBySidePlot::paintColumn(QPainter& painter, const Side& side)
{
    const CurtainFrame at = frame(side.ladder);
    const GapFigures& gap = side.measurement.gap;
    const double floorY = at.y(static_cast<double>(m_floor.minor));
    const QFontMetricsF strong(strongFont());
    const QFontMetricsF plain(font());
    const double line = plain.height();

    painter.setFont(strongFont());
    painter.setPen(look().ink);
    painter.drawText(QRectF(side.heading.topLeft(), QSizeF(side.heading.width(), line)),
                     Qt::AlignLeft | Qt::AlignVCenter | Qt::TextSingleLine,
                     strong.elidedText(side.name, Qt::ElideRight, side.heading.width()));
    painter.setFont(font());
    painter.drawText(QRectF(side.heading.left(), side.heading.top() + 1.1 * line, side.heading.width(), line),
                     Qt::AlignLeft | Qt::AlignVCenter | Qt::TextSingleLine,
                     plain.elidedText(gapText(side), Qt::ElideRight, side.heading.width()));

    side.shape.paintArea(painter, look());
    if (gap.gap) {
        const double expectedY = at.y(*gap.expectedCheapest);
        const QRectF band(QPointF(side.ladder.left(), std::min(floorY, expectedY)),
                          QPointF(side.ladder.right(), std::max(floorY, expectedY)));
        QRectF hatched;
        if (*gap.claimPart >= 0.5) {
            const double top = std::max(band.top(), at.y(static_cast<double>(m_floor.minor) + *gap.claimPart));
            hatched = QRectF(QPointF(band.left(), top), band.bottomRight());
        }
        paintGapBand(painter, band, hatched, look());
        paintExpectedLine(painter, side.ladder.left(), side.ladder.right(), expectedY, look());
    }
    if (m_floor.minor > 0)
        paintFloorLine(painter, side.ladder.left(), side.curtain.right(), floorY, look());
    side.shape.paintLine(painter, QPen(look().gapLine, 1.6, Qt::SolidLine, Qt::SquareCap, Qt::MiterJoin));

    const double dx = side.rungs.empty() ? 0 : (side.ladder.width() - 2 * kInset) / static_cast<double>(side.rungs.size());
    std::vector<RungMark> marks;
    std::vector<QPointF> points;
    marks.reserve(side.rungs.size());
    points.reserve(side.rungs.size());
    for (std::size_t i = 0; i < side.rungs.size(); ++i) {
        const Unit& unit = m_units[side.rungs[i].unit];
        points.emplace_back(side.ladder.left() + kInset + (static_cast<double>(i) + 0.5) * dx,
                            at.y(static_cast<double>(side.rungs[i].price.minor)));
        marks.push_back({points.back(), unit.status, unit.locked, false});
    }
    const RungSize size = RungSize::forColumn(dx);
    RungPainter rungs;
    rungs.paint(painter, marks, size, look());
    paintColumnLabels(painter, side, points, size.grip + 1);
}

void SideBySidePlot::paintColumnLabels(QPainter& painter, const Side& side, std::span<const QPointF> rungs, double reach)
{
    // A column is narrow: the bare amounts, where they cover no rung.
    const CurtainFrame at = frame(side.ladder);
    const QFontMetricsF metrics(font());
    LabelRoom room(side.ladder, rungs, reach);
    const auto write = [&](const QString& text, double y, double away, PlacedLabel::Tone tone) {
        const QSizeF size(std::ceil(metrics.horizontalAdvance(text)) + 4, std::ceil(metrics.height()));
        const double top = away < 0 ? y - size.height() - 2 : y + 3;
        const std::array wanted{QRectF(QPointF(side.ladder.right() - size.width(), top), size),
                                QRectF(QPointF(side.ladder.left(), top), size)};
        const QRectF rect = room.choose(wanted);
        if (rect.isNull() || room.rungsUnder(rect) > 0)
            return;
        room.take(rect);
        paintLabel(painter, {text, rect, tone, false, PlacedLabel::Backing::none}, font(), strongFont(), look());
    };
    const double away = side.measurement.gap.gap && *side.measurement.gap.gap < 0 ? 1.0 : -1.0;
    if (side.measurement.gap.gap)
        write(moneyText(*side.measurement.gap.expectedCheapest, m_currency), at.y(*side.measurement.gap.expectedCheapest), away,
              PlacedLabel::Tone::gap);
    if (m_floor.minor > 0)
        write(moneyText(m_floor, m_currency), at.y(static_cast<double>(m_floor.minor)), -away, PlacedLabel::Tone::floor);
}

void SideBySidePlot::paintOverlay(QPainter& painter)
{
    const Side& first = m_sides.front();
    const double floorY = frame(first.ladder).y(static_cast<double>(m_floor.minor));
    if (m_floor.minor > 0)
        paintFloorLine(painter, first.ladder.left(), first.curtain.right(), floorY, look());
    for (std::size_t s = 0; s < m_sides.size(); ++s) {
        const Side& side = m_sides[s];
        if (side.rungs.empty())
            continue;
        const CurtainFrame at = frame(side.ladder);
        const double dx = side.ladder.width() / static_cast<double>(side.rungs.size());
        QPolygonF points;
        for (std::size_t i = 0; i < side.rungs.size(); ++i) {
            points << QPointF(side.ladder.left() + (static_cast<double>(i) + 0.5) * dx,
                              at.y(static_cast<double>(side.rungs[i].price.minor)));
        }
        painter.setRenderHint(QPainter::Antialiasing, true);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(seriesPen(look(), s, 1.6));
        painter.drawPolyline(points);
        side.shape.paintLine(painter, seriesPen(look(), s, 1.6));
        // Marks on some of the units on offer, each ladder's at places of its own so that equal ladders show all their marks.
        const auto every = static_cast<std::size_t>(std::max(1.0, std::ceil(46.0 / std::max(dx, 0.01))));
        const std::size_t start = every * s / m_sides.size();
        for (std::size_t i = start; i < side.rungs.size(); i += every)
            paintMark(painter, points[static_cast<qsizetype>(i)], s, 3.4, look());
    }
    if (m_floor.minor <= 0)
        return;
    painter.setPen(look().floor);
    painter.setFont(strongFont());
    painter.drawText(QRectF(first.ladder.left(), floorY + 3, first.ladder.width() - 8, QFontMetricsF(strongFont()).height()),
                     Qt::AlignRight | Qt::AlignTop, tr("advertised floor %1").arg(moneyText(m_floor, m_currency)));
}

int SideBySidePlot::legendRows(double width) const
{
    const QFontMetricsF metrics(font());
    int rows = 1;
    double x = 0;
    for (const Side& side : m_sides) {
        const double entry = kSwatch + std::min(metrics.horizontalAdvance(side.name), 0.3 * width) +
                             metrics.horizontalAdvance(QStringLiteral(": ") + gapText(side)) + kSideGap;
        if (x > 0 && x + entry > width) {
            ++rows;
            x = 0;
        }
        x += entry;
    }
    return rows;
}

void SideBySidePlot::paintOverlayLegend(QPainter& painter)
{
    const QFontMetricsF metrics(font());
    const double width = viewport().width() - 16;
    double x = 0;
    double top = kHeadingTop + 1.2 * metrics.height();
    for (std::size_t s = 0; s < m_sides.size(); ++s) {
        const Side& side = m_sides[s];
        const QString text = isolated(metrics.elidedText(side.name, Qt::ElideRight, 0.3 * width)) + QStringLiteral(": ") + gapText(side);
        const double entry = kSwatch + std::min(metrics.horizontalAdvance(side.name), 0.3 * width) +
                             metrics.horizontalAdvance(QStringLiteral(": ") + gapText(side)) + kSideGap;
        if (x > 0 && x + entry > width) {
            x = 0;
            top += 1.15 * metrics.height();
        }
        const double y = top + 0.5 * metrics.height();
        painter.setRenderHint(QPainter::Antialiasing, true);
        painter.setPen(seriesPen(look(), s, 1.6));
        painter.drawLine(QPointF(8 + x, y), QPointF(8 + x + kSwatch - 6, y));
        paintMark(painter, QPointF(8 + x + 0.5 * (kSwatch - 6), y), s, 3.4, look());
        painter.setPen(look().ink);
        painter.setFont(font());
        painter.drawText(QPointF(8 + x + kSwatch, top + metrics.ascent()), text);
        x += entry;
    }
}

} // namespace rungwright
