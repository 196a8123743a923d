// SPDX-License-Identifier: GPL-3.0-or-later
// Where labels go: never over each other, never out of the plot, off the rungs wherever there is room.
#pragma once

#include "look.h"

#include <QFontMetricsF>
#include <QLineF>
#include <QPointF>
#include <QRectF>
#include <QString>

#include <span>
#include <vector>

class QFont;
class QPainter;

namespace rungwright
{

struct PlacedLabel {
    enum class Tone { ink, gap, floor };
    enum class Backing { none, paper, fill };
    QString text;
    QRectF rect; ///< Tight around the text, a few pixels of air on each side.
    Tone tone = Tone::ink;
    bool strong = false;
    Backing backing = Backing::none;
};

/// Rungs and labels already placed, which new labels keep off.
class LabelRoom
{
public:
    /// `rungs` must stay alive while this is used; `reach` = how far a rung reaches from its middle.
    LabelRoom(const QRectF& area, std::span<const QPointF> rungs, double reach);

    bool fits(const QRectF& rect) const; ///< In the area and off the labels taken so far.
    int rungsUnder(const QRectF& rect) const;
    /// The first of `wanted` that fits and covers no rung; else the one that fits and covers fewest; else an empty rectangle.
    QRectF choose(std::span<const QRectF> wanted) const;
    void take(const QRectF& rect) { m_taken.push_back(rect); }
    const QRectF& area() const { return m_area; }

private:
    QRectF m_area;
    std::span<const QPointF> m_rungs;
    double m_reach;
    std::vector<QRectF> m_taken;
};

/// The gap on the ladder in pixels: a band from the advertised floor to the expected cheapest.
struct BandInput {
    double floorY = 0;    ///< NaN: no floor is known; then there is no band either.
    double expectedY = 0; ///< NaN when undefined.
    double claimY = 0;    ///< Where the claim part ends; NaN when there is none to show.
    QString expectedText; ///< "expected cheapest 98.19"
    QString floorText;    ///< "advertised floor 69.00"
    QString gapText;      ///< "gap 29.19 (42 %)"
    QString claimText;    ///< "floor not on sale 21.00"; empty for none.
    QString shapeText;    ///< "thin low end 8.19"; empty for none.
};

struct BandLayout {
    QRectF band;    ///< Within the area; null when undefined or out of sight.
    QRectF hatched; ///< The claim part of it; null when there is none.
    QLineF bracket; ///< The gap as a length, at the right; null when the band is too thin.
    std::vector<PlacedLabel> labels;
};

/// A thin band carries its gap beside the expected cheapest; parts without room for their words go without.
void layOutBand(const BandInput& in, const QFontMetricsF& plain, const QFontMetricsF& strong, LabelRoom& room, BandLayout& out);

/// A box of `size` near `at`, beside it if possible; empty when there is no room at all.
QRectF placeBeside(QPointF at, QSizeF size, double distance, const LabelRoom& room);

void paintLabel(QPainter& painter, const PlacedLabel& label, const QFont& plain, const QFont& strong, const Look& look);

} // namespace rungwright
