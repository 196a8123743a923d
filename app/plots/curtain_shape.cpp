// SPDX-License-Identifier: GPL-3.0-or-later
#include "curtain_shape.h"

#include "gap_paint.h"

#include <QPainter>

#include <algorithm>
#include <cmath>

namespace rungwright
{

void CurtainShape::build(const Measurement& m, const CurtainFrame& frame)
{
    m_line.clear();
    m_area.clear();
    m_claim = QRectF();
    m_left = frame.area.left();
    m_steps = m.model != ModelKind::fitted;
    if (m.curtain.empty() || !(frame.high > frame.low))
        return;
    const double floor = static_cast<double>(m.advertisedFloor.minor);
    const double fromPrice = std::clamp(floor, frame.low, frame.high);
    const auto cut = [&frame](double price) { return std::clamp(price, frame.low, frame.high); };

    // From the lower edge upwards. Below the first price the chance is the first step's.
    double below = frame.low;
    double lastChance = m.curtain.front().chance;
    m_line << QPointF(frame.x(lastChance), frame.y(frame.low));
    const auto addArea = [&](double chance, double price) {
        if (price >= fromPrice)
            m_area << QPointF(frame.x(chance), frame.y(price));
    };
    m_area << QPointF(frame.area.left(), frame.y(fromPrice));
    for (const CurtainStep& step : m.curtain) {
        const double price = cut(step.price);
        if (m_steps) {
            m_line << QPointF(frame.x(step.chance), frame.y(below)) << QPointF(frame.x(step.chance), frame.y(price));
            if (price > fromPrice) {
                addArea(step.chance, std::max(below, fromPrice));
                addArea(step.chance, price);
            }
        } else {
            m_line << QPointF(frame.x(step.chance), frame.y(price));
            if (step.price >= floor)
                addArea(step.chance, price);
        }
        below = price;
        lastChance = step.chance;
    }
    if (m_steps)
        m_line << QPointF(frame.x(0), frame.y(below));
    if (below >= fromPrice)
        m_area << QPointF(frame.area.left(), frame.y(below));
    if (m.gap.claimPart && *m.gap.claimPart >= 0.5) {
        const double top = frame.y(cut(floor + *m.gap.claimPart));
        m_claim = QRectF(QPointF(frame.area.left(), top), QPointF(frame.x(1), frame.y(fromPrice)));
        if (!m_steps) // A smooth curve leaves the full width at the floor already; its claim part is no rectangle.
            m_claim = QRectF();
    }
}

void CurtainShape::paintArea(QPainter& painter, const Look& look) const
{
    if (m_area.size() < 3)
        return;
    painter.setPen(Qt::NoPen);
    painter.setBrush(look.gapFill);
    painter.setRenderHint(QPainter::Antialiasing, !m_steps);
    painter.drawPolygon(m_area);
    paintHatching(painter, m_claim, look);
}

void CurtainShape::paintLine(QPainter& painter, const QPen& pen) const
{
    if (m_line.size() < 2)
        return;
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(pen);
    painter.setBrush(Qt::NoBrush);
    painter.drawPolyline(m_line);
}

double CurtainShape::roomBetween(double upper, double lower) const
{
    if (m_area.size() < 3 || m_area.front().y() < lower)
        return 0;
    // The curve only retreats upwards: what it reaches at the upper height holds for the rest.
    double x = 0;
    bool covered = false;
    for (const QPointF& p : m_area) {
        if (p.y() >= upper)
            x = p.x() - m_left;
        else
            covered = true;
    }
    return covered ? x : 0;
}

} // namespace rungwright
