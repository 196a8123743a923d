// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder_thumb.h"

#include "gap_paint.h"

#include <QPainter>

#include <algorithm>

namespace rungwright
{

void paintLadderThumb(QPainter& painter, const QRectF& where, const ThumbLadder& ladder, const Look& look)
{
    std::vector<Rung> rungs;
    sortLadder(ladder.units, ladder.prices, Among::rentable, rungs);
    const auto floor = static_cast<double>(ladder.advertisedFloor.minor);
    const bool hasFloor = ladder.advertisedFloor.minor > 0;
    double low = floor;
    double high = floor;
    if (!rungs.empty()) {
        low = static_cast<double>(rungs.front().price.minor);
        high = static_cast<double>(rungs.back().price.minor);
        if (hasFloor) {
            low = std::min(low, floor);
            high = std::max(high, floor);
        }
    }
    low = ladder.low.value_or(low);
    high = ladder.high.value_or(high);
    if (!(high > low)) {
        low -= 1;
        high += 1;
    }
    constexpr double air = 4;
    const QRectF in = where.adjusted(air, air, -air, -air);
    const auto y = [&](double price) { return in.bottom() - (std::clamp(price, low, high) - low) / (high - low) * in.height(); };

    painter.save();
    const double floorY = y(floor);
    if (ladder.expectedCheapest) {
        const double expectedY = y(*ladder.expectedCheapest);
        if (hasFloor)
            paintGapBand(painter,
                         QRectF(QPointF(where.left(), std::min(floorY, expectedY)), QPointF(where.right(), std::max(floorY, expectedY))),
                         QRectF(), look);
        painter.setRenderHint(QPainter::Antialiasing, true);
        painter.setPen(QPen(look.gapLine, 1.4, Qt::SolidLine, Qt::FlatCap));
        painter.drawLine(QPointF(where.left(), expectedY), QPointF(where.right(), expectedY));
    }
    painter.setRenderHint(QPainter::Antialiasing, true);
    QPen dashed(look.floor, 1.2, Qt::CustomDashLine, Qt::FlatCap);
    dashed.setDashPattern({4, 3});
    painter.setPen(dashed);
    if (hasFloor)
        painter.drawLine(QPointF(where.left(), floorY), QPointF(where.right(), floorY));

    const double dx = rungs.empty() ? 0 : in.width() / static_cast<double>(rungs.size());
    painter.setPen(Qt::NoPen);
    for (const bool onOffer : {false, true}) {
        painter.setBrush(onOffer ? look.onOffer : look.trace);
        const double r = std::clamp(0.4 * dx, 0.8, onOffer ? 2.4 : 1.4);
        for (std::size_t i = 0; i < rungs.size(); ++i) {
            if (ladder.units[rungs[i].unit].onOffer() == onOffer)
                painter.drawEllipse(QPointF(in.left() + (static_cast<double>(i) + 0.5) * dx, y(static_cast<double>(rungs[i].price.minor))),
                                    r, r);
        }
    }
    painter.restore();
}

} // namespace rungwright
