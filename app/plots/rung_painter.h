// SPDX-License-Identifier: GPL-3.0-or-later
// Rungs: what a unit on the ladder looks like, and many of them at once.
#pragma once

#include "ladder/unit.h"
#include "look.h"

#include <QLineF>
#include <QPointF>
#include <QRectF>

#include <vector>

class QPainter;

namespace rungwright
{

/// How large rungs are where a column is so many pixels wide. Grips never touch those of the next column; where columns are narrow,
/// grips give way to ticks.
struct RungSize {
    double half = 8;    ///< Half the rung's length.
    double grip = 4;    ///< Radius of the grip; 0 = ticks only.
    double line = 2;    ///< Width of a rung on offer; the others are thinner.
    double bolt = 4;    ///< Side of the square ends of a locked rung; 0 = no room for them, the grip is square instead.
    bool smooth = true; ///< Antialiased.

    static RungSize forColumn(double pixels);
};

/// One unit to draw.
struct RungMark {
    QPointF at;
    Status status = Status::vacant;
    bool locked = false;
    bool selected = false;
};

/// On offer: filled. Taken: hollow. Reserved: hollow with a dot. Closed: a small cross, no rung. Locked: square ends. Selected: a ring.
/// Draws by kind, in batches; keeps its storage between calls.
class RungPainter
{
public:
    /// `raised`: drawn larger, as a rung in the hand is.
    void paint(QPainter& painter, const std::vector<RungMark>& marks, const RungSize& size, const Look& look, bool raised = false);

private:
    void paintTicks(QPainter& painter, const std::vector<RungMark>& marks, const RungSize& size, const Look& look);
    void paintGrips(QPainter& painter, const std::vector<RungMark>& marks, const RungSize& size, const Look& look, bool raised);

    std::vector<QLineF> m_lines;
    std::vector<QRectF> m_rects;
};

} // namespace rungwright
