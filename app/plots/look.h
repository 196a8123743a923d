// SPDX-License-Identifier: GPL-3.0-or-later
// The house's colours, by what they stand for. Named once, in resources/palette.json.
#pragma once

#include <QColor>

#include <array>

class QWidget;

namespace rungwright
{

/// Colours for one kind of paper. No colour stands alone: each thing it marks also differs by shape, line style or a word.
struct Look {
    bool dark = false;
    QColor paper;                 ///< What plots are drawn on.
    QColor ink;                   ///< Text that matters.
    QColor faintInk;              ///< Axis numbers, titles, small print; still readable.
    QColor grid;                  ///< Lines that may be overlooked.
    QColor onOffer;               ///< Rungs an enquirer could take now.
    QColor taken;                 ///< Rungs occupied, reserved or closed.
    QColor floor;                 ///< The advertised floor.
    QColor gapLine;               ///< The expected cheapest, curves of the gap.
    QColor gapFill;               ///< The gap as a length or an area, opaque.
    QColor gapHatch;              ///< Hatching of the gap's claim part, on gapFill.
    QColor selection;             ///< The ring around what is selected.
    QColor selectionFill;         ///< A selected row or card, quiet.
    QColor trace;                 ///< The current ladder behind the one worked on.
    QColor focus;                 ///< The frame of what has the keyboard.
    std::array<QColor, 6> series; ///< Ladders laid over each other, in order.

    static const Look& light();
    static const Look& night();
    /// The one that suits the widget's window colour.
    static const Look& of(const QWidget* widget);
};

} // namespace rungwright
