// SPDX-License-Identifier: GPL-3.0-or-later
#include "curtain_shape.h"

#include "curve_paint.h"
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
    m_missing.clear();
    m_claim = QRectF();
    m_left = frame.area.left();
    if (m.curtain.empty() || !(frame.high > frame.low))
        return;
    const bool steps = m.model != ModelKind::fitted;
    // Without a known floor no area is a gap.
    const double floor = m.advertisedFloor.minor > 0 ? static_cast<double>(m.advertisedFloor.minor) : frame.high;
    const double fromPrice = std::clamp(floor, frame.low, frame.high);
    const double right = frame.x(1);
    const bool underFloor = !m.ladder.empty() && m.ladder.front().price < m.advertisedFloor;
    const auto cut = [&frame](double price) { return std::clamp(price, frame.low, frame.high); };
    const auto addBlock = [&](double chance, double from, double to) {
        // Above the floor the block under the curve counts to the gap, below it what is missing to certainty.
        const double low = std::max(from, fromPrice);
        if (low < to && frame.x(chance) - m_left >= 0.5)
            m_area.emplace_back(QPointF(m_left, frame.y(to)), QPointF(frame.x(chance), frame.y(low)));
        const double high = std::min(to, fromPrice);
        if (underFloor && from < high && right - frame.x(chance) >= 0.5)
            m_missing.emplace_back(QPointF(frame.x(chance), frame.y(high)), QPointF(right, frame.y(from)));
    };

    // From the lower edge upwards; below the first price the chance is the first step's. Steps finer than the eye sees are one.
    constexpr double fine = 0.2;
    double below = frame.low;
    double x = frame.x(m.curtain.front().chance);
    double blockFrom = frame.low;
    double blockChance = m.curtain.front().chance;
    m_line << QPointF(x, frame.y(frame.low));
    for (const CurtainStep& step : m.curtain) {
        const double price = cut(step.price);
        const double stepX = frame.x(step.chance);
        if (steps) {
            if (x - stepX >= fine) {
                m_line << QPointF(x, frame.y(below)) << QPointF(stepX, frame.y(below));
                addBlock(blockChance, blockFrom, below);
                blockFrom = below;
                blockChance = step.chance;
                x = stepX;
            }
        } else {
            const QPointF next(stepX, frame.y(price));
            if (std::abs(next.x() - m_line.back().x()) + std::abs(next.y() - m_line.back().y()) >= 1.0) {
                m_line << next;
                addBlock(0.5 * (blockChance + step.chance), blockFrom, price);
                blockFrom = price;
                blockChance = step.chance;
            }
        }
        below = price;
    }
    addBlock(blockChance, blockFrom, below);
    addBlock(0, below, frame.high);
    m_line << QPointF(steps ? x : frame.x(m.curtain.back().chance), frame.y(below));
    if (steps)
        m_line << QPointF(frame.x(0), frame.y(below));
    // The claim part is the block of certainty above the floor; a smooth curve has none, it leaves certainty at once.
    if (steps && m.gap.claimPart && *m.gap.claimPart >= 0.5)
        m_claim = QRectF(QPointF(m_left, frame.y(cut(floor + *m.gap.claimPart))), QPointF(right, frame.y(fromPrice)));
}

void CurtainShape::paintArea(QPainter& painter, const Look& look) const
{
    painter.setRenderHint(QPainter::Antialiasing, false);
    painter.setPen(Qt::NoPen);
    painter.setBrush(look.gapFill);
    if (!m_area.empty())
        painter.drawRects(m_area.data(), static_cast<int>(m_area.size()));
    paintHatching(painter, m_claim, look);
    for (const QRectF& rect : m_missing)
        paintHatching(painter, rect, look);
}

void CurtainShape::paintLine(QPainter& painter, const QPen& pen) const { paintCurve(painter, m_line.constData(), m_line.size(), pen); }

double CurtainShape::roomBetween(double upper, double lower) const
{
    // The curve only retreats upwards: what it reaches at the upper height holds for the rest.
    for (const QRectF& block : m_area) {
        if (block.top() <= upper && block.bottom() > upper)
            return m_area.front().bottom() >= lower ? block.right() - m_left : 0;
    }
    return 0;
}

} // namespace rungwright
