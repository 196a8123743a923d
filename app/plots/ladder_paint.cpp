// SPDX-License-Identifier: GPL-3.0-or-later
// LadderPlot: painting its four parts.
#include "ladder_plot.h"

#include "gap_paint.h"
#include "wording.h"

#include <QPainter>

#include <algorithm>
#include <cmath>

namespace rungwright
{

void LadderPlot::paintFrame(QPainter& painter)
{
    if (!shows())
        return;
    const QFontMetricsF metrics(font());
    m_legend.paint(painter, QRectF(8, kHeadingTop, viewport().width() - 16, 0), font(), strongFont(), look());
    painter.setFont(font());
    painter.setPen(look().faintInk);
    painter.drawText(QRectF(area().left(), area().bottom() + 5, area().width() - 4, metrics.height()), Qt::AlignRight | Qt::AlignTop,
                     tr("place on the ladder"));
}

void LadderPlot::paintBelow(QPainter& painter)
{
    if (!shows())
        return;
    const BandLayout& band = m_scene.band;
    painter.save();
    paintGapBand(painter, band.band, band.hatched, look());
    if (!std::isnan(m_scene.expectedY) && m_scene.expectedY >= area().top() && m_scene.expectedY <= area().bottom())
        paintExpectedLine(painter, area().left(), area().right(), m_scene.expectedY, look());
    painter.restore();
}

void LadderPlot::paintMarks(QPainter& painter)
{
    if (!shows())
        return;
    painter.save();
    const double floorY = yOf(static_cast<double>(m_bench->worked().advertisedFloor.minor));
    if (m_bench->tierCase()->tier.hasFloor() && floorY >= area().top() && floorY <= area().bottom())
        paintFloorLine(painter, area().left(), area().right(), floorY, look());
    paintTrace(painter);
    m_rungs.paint(painter, m_still, m_size, look());
    if (m_size.grip <= 0 && m_bench->selection().size() <= 40) {
        // Among a thousand ticks a selected one wants a pointer: a wedge at the foot of its column.
        painter.setRenderHint(QPainter::Antialiasing, true);
        painter.setPen(Qt::NoPen);
        painter.setBrush(look().selection);
        for (const std::uint32_t unit : m_bench->selection()) {
            const QPointF foot(xOf(placeOf(unit)), area().bottom() - 1);
            const QPointF wedge[] = {foot + QPointF(0, -7), foot + QPointF(4.5, 0), foot + QPointF(-4.5, 0)};
            painter.drawPolygon(wedge, 3);
        }
    }
    painter.restore();
}

void LadderPlot::paintTrace(QPainter& painter) const
{
    if (m_behind.empty())
        return;
    QPolygonF steps;
    steps.reserve(static_cast<qsizetype>(2 * m_behind.size()));
    for (std::size_t place = 0; place < m_behind.size(); ++place) {
        const double y = std::clamp(yOf(static_cast<double>(m_behind[place].price.minor)), area().top(), area().bottom());
        steps << QPointF(xOf(place) - 0.5 * m_dx, y) << QPointF(xOf(place) + 0.5 * m_dx, y);
    }
    painter.setRenderHint(QPainter::Antialiasing, m_size.smooth);
    painter.setPen(QPen(look().trace, 1.2, Qt::SolidLine, Qt::FlatCap, Qt::MiterJoin));
    painter.setBrush(Qt::NoBrush);
    painter.drawPolyline(steps);
}

void LadderPlot::paintGhosts(QPainter& painter) const
{
    // Where the dragged rungs were. With many of them the trace of the whole is told by the ladder itself.
    constexpr std::size_t few = 60;
    if (m_moverPlaces.empty() || m_moverPlaces.size() > few || m_size.grip <= 0)
        return;
    painter.setRenderHint(QPainter::Antialiasing, true);
    const auto columns = m_bench->columns();
    for (const std::uint32_t place : m_moverPlaces) {
        const QPointF now = m_points[place];
        const QPointF was(now.x(), yOf(static_cast<double>(m_bench->startPrices()[columns[place]].minor)));
        const double apart = now.y() - was.y();
        if (std::abs(apart) < 2)
            continue;
        painter.setPen(QPen(look().faintInk, 1.2, Qt::DotLine));
        painter.drawLine(was - QPointF(m_size.half, 0), was + QPointF(m_size.half, 0));
        painter.setPen(QPen(look().faintInk, 1));
        if (std::abs(apart) > m_size.grip + 4)
            painter.drawLine(was + QPointF(0, apart > 0 ? 3 : -3), now - QPointF(0, (apart > 0 ? 1 : -1) * (m_size.grip + 2)));
    }
}

void LadderPlot::paintHandle(QPainter& painter) const
{
    if (m_scene.handle.isNull() || exporting())
        return;
    const bool held = m_hand == Hand::bend || m_hoverHandle;
    const QPointF at = m_scene.handle;
    const QPointF rung = rungPosition(static_cast<std::uint32_t>(m_bendUnit));
    const QColor colour = held ? look().ink : look().faintInk;
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(QPen(colour, 1));
    const QPointF way = rung - at;
    const double length = std::hypot(way.x(), way.y());
    painter.drawLine(at + way * (8 / length), at + way * (1 - (m_size.grip + 3) / length));
    painter.setBrush(look().paper);
    painter.setPen(QPen(colour, held ? 1.8 : 1.2));
    painter.drawEllipse(at, 8, 8);
    for (const double side : {-1.0, 1.0}) {
        const QPointF chevron[] = {at + QPointF(-3, 2 * side), at + QPointF(0, 5 * side), at + QPointF(3, 2 * side)};
        painter.drawPolyline(chevron, 3);
    }
}

void LadderPlot::paintDragBox(QPainter& painter) const
{
    if (m_scene.dragBox.isEmpty())
        return;
    const QRectF box = m_scene.dragBox;
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(QPen(look().faintInk, 1));
    painter.setBrush(look().paper);
    painter.drawRoundedRect(box.adjusted(0.5, 0.5, -0.5, -0.5), 3, 3);
    const double line = QFontMetricsF(font()).height();
    painter.setPen(look().ink);
    for (qsizetype i = 0; i < m_scene.dragLines.size(); ++i) {
        painter.setFont(i == 0 ? strongFont() : font());
        painter.drawText(QRectF(box.left() + 8, box.top() + 4 + static_cast<double>(i) * line, box.width() - 8, line),
                         Qt::AlignLeft | Qt::AlignVCenter | Qt::TextSingleLine, m_scene.dragLines[i]);
    }
}

void LadderPlot::paintAbove(QPainter& painter)
{
    painter.save();
    if (shows()) {
        paintGhosts(painter);
        m_rungs.paint(painter, m_movers, m_size, look(), m_movers.size() <= 60);
        const BandLayout& band = m_scene.band;
        if (!band.bracket.isNull())
            paintBracket(painter, band.bracket, look());
        for (const PlacedLabel& label : band.labels)
            paintLabel(painter, label, font(), strongFont(), look());
        paintHandle(painter);
        if (m_hover >= 0 && m_hand == Hand::empty && !exporting()) {
            painter.setRenderHint(QPainter::Antialiasing, true);
            painter.setBrush(Qt::NoBrush);
            painter.setPen(QPen(look().faintInk, 1)); // Thinner than a selection's ring, and without its paper.
            const double r = std::max(m_size.grip, 2.0) + 4;
            painter.drawEllipse(rungPosition(static_cast<std::uint32_t>(m_hover)), r, r);
        }
        paintDragBox(painter);
    }
    if (!exporting()) {
        painter.setRenderHint(QPainter::Antialiasing, false);
        if (!m_rubber.isNull()) {
            QColor fill = look().focus;
            fill.setAlphaF(0.12F);
            painter.setPen(QPen(look().focus, 1, Qt::DashLine));
            painter.setBrush(fill);
            painter.drawRect(m_rubber.normalized());
        }
        if (hasFocus()) {
            painter.setBrush(Qt::NoBrush);
            painter.setPen(QPen(look().focus, 1));
            painter.drawRect(area().adjusted(0, 0, -1, -1));
        }
    }
    painter.restore();
}

} // namespace rungwright
