// SPDX-License-Identifier: GPL-3.0-or-later
#include "rung_painter.h"

#include <QPainter>

#include <algorithm>

namespace rungwright
{

namespace
{

bool free(const RungMark& mark) { return mark.status == Status::vacant; }

void drawLines(QPainter& painter, const std::vector<QLineF>& lines)
{
    if (!lines.empty())
        painter.drawLines(lines.data(), static_cast<int>(lines.size()));
}

void drawRects(QPainter& painter, const std::vector<QRectF>& rects)
{
    if (!rects.empty())
        painter.drawRects(rects.data(), static_cast<int>(rects.size()));
}

} // namespace

RungSize RungSize::forColumn(double pixels)
{
    RungSize s;
    s.half = std::clamp(0.43 * pixels, 1.2, 12.0);
    s.grip = std::min(0.30 * pixels, 5.0);
    if (s.grip < 1.8) {
        s.grip = 0;
        s.half = std::max(0.5 * pixels, 1.5);
        s.smooth = pixels >= 2.0;
    }
    s.line = pixels >= 12 ? 2.2 : 1.8;
    s.bolt = pixels >= 14 ? 4.6 : 0;
    return s;
}

void RungPainter::paint(QPainter& painter, const std::vector<RungMark>& marks, const RungSize& size, const Look& look, bool raised)
{
    if (marks.empty())
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, size.smooth);
    if (size.grip > 0)
        paintGrips(painter, marks, size, look, raised);
    else
        paintTicks(painter, marks, size, look);
    painter.restore();
}

void RungPainter::paintTicks(QPainter& painter, const std::vector<RungMark>& marks, const RungSize& size, const Look& look)
{
    const auto lines = [&](auto wanted, double half, const QPen& pen) {
        m_lines.clear();
        for (const RungMark& mark : marks) {
            if (wanted(mark))
                m_lines.emplace_back(mark.at.x() - half, mark.at.y(), mark.at.x() + half, mark.at.y());
        }
        painter.setPen(pen);
        drawLines(painter, m_lines);
    };
    const auto pen = [](const QColor& colour, double width) { return QPen(colour, width, Qt::SolidLine, Qt::FlatCap); };
    lines([](const RungMark& m) { return !free(m); }, size.half, pen(look.taken, 1));
    lines(free, size.half, pen(look.onOffer, 3));
    lines([](const RungMark& m) { return m.selected; }, std::max(size.half, 4.0), pen(look.selection, 3));
}

void RungPainter::paintGrips(QPainter& painter, const std::vector<RungMark>& marks, const RungSize& size, const Look& look, bool raised)
{
    const double grip = size.grip + (raised ? 1.5 : 0.0);
    const double half = std::max(size.half, grip);
    const auto around = [](QPointF at, double r) { return QRectF(at.x() - r, at.y() - r, 2 * r, 2 * r); };

    // Rungs, thin ones first so that those on offer lie on top.
    for (const bool onOffer : {false, true}) {
        m_lines.clear();
        for (const RungMark& mark : marks) {
            if (free(mark) == onOffer && mark.status != Status::closed)
                m_lines.emplace_back(mark.at.x() - half, mark.at.y(), mark.at.x() + half, mark.at.y());
        }
        painter.setPen(QPen(onOffer ? look.onOffer : look.taken, onOffer ? size.line : 1.2, Qt::SolidLine, Qt::FlatCap));
        drawLines(painter, m_lines);
    }
    // Closed: a cross.
    m_lines.clear();
    for (const RungMark& mark : marks) {
        if (mark.status == Status::closed) {
            const double r = 0.7 * grip;
            m_lines.emplace_back(mark.at.x() - r, mark.at.y() - r, mark.at.x() + r, mark.at.y() + r);
            m_lines.emplace_back(mark.at.x() - r, mark.at.y() + r, mark.at.x() + r, mark.at.y() - r);
        }
    }
    painter.setPen(QPen(look.taken, 1.2));
    drawLines(painter, m_lines);
    // Rings of what is selected, on paper so that they show on the gap's fill too.
    painter.setBrush(look.paper);
    painter.setPen(QPen(look.selection, 1.6));
    for (const RungMark& mark : marks) {
        if (mark.selected)
            painter.drawEllipse(around(mark.at, grip + 3.2));
    }
    // Grips.
    const auto gripShape = [&](const RungMark& mark) {
        if (mark.locked && size.bolt <= 0)
            painter.drawRect(around(mark.at, 0.9 * grip));
        else
            painter.drawEllipse(around(mark.at, grip));
    };
    painter.setBrush(look.paper);
    painter.setPen(QPen(look.taken, 1.3));
    for (const RungMark& mark : marks) {
        if (mark.status == Status::occupied || mark.status == Status::reserved)
            gripShape(mark);
    }
    painter.setPen(Qt::NoPen);
    painter.setBrush(look.taken);
    for (const RungMark& mark : marks) {
        if (mark.status == Status::reserved)
            painter.drawEllipse(around(mark.at, 0.42 * grip));
    }
    painter.setBrush(look.onOffer);
    for (const RungMark& mark : marks) {
        if (free(mark))
            gripShape(mark);
    }
    // Square ends of what is locked.
    for (const bool onOffer : {false, true}) {
        m_rects.clear();
        for (const RungMark& mark : marks) {
            if (mark.locked && size.bolt > 0 && free(mark) == onOffer) {
                for (const double side : {-1.0, 1.0})
                    m_rects.push_back(around({mark.at.x() + side * (half - 0.5), mark.at.y()}, 0.5 * size.bolt));
            }
        }
        painter.setBrush(onOffer ? look.onOffer : look.taken);
        drawRects(painter, m_rects);
    }
}

} // namespace rungwright
