// SPDX-License-Identifier: GPL-3.0-or-later
#include "help_texts.h"

#include "caution.h"

#include <QCoreApplication>

namespace rungwright
{

QString keysText()
{
    return QCoreApplication::translate(
        "Help", "On the ladder:\n"
                "Drag a rung: its price. Drag a selected rung: all selected ones together.\n"
                "Drag from an empty place: select what lies in the box. Ctrl+click: add or take one. Ctrl+A: all on offer.\n"
                "Double click or Enter: type a price.\n"
                "Up, Down: one price point. Page Up, Page Down: five.\n"
                "Left, Right: the next rung. L: lock or unlock. Esc: give up a drag.\n"
                "Drag the handle in the middle, or Ctrl+Up, Ctrl+Down: bend the ladder between its ends.\n\n"
                "Below it: drag the marker to set the number of units left.\n\n"
                "Ctrl+T: the smallest changes that reach a target; move its slider and the ladder follows. Ctrl+Shift+T: a ladder from a\n"
                "shape. Enter: keep what is tried as a candidate. Esc: give it up.\n"
                "In the trade-off (Ctrl+4): click a point to take its ladder, or Left, Right and Enter. Up, Down: the named ladders.\n\n"
                "Alt+Down, Alt+Up: the next tier of the worklist. Alt+Shift+Down: the next one not yet seen. Ctrl+M: mark the selected\n"
                "tiers as seen. Ctrl+F: filter. Ctrl+G: group by site; Left, Right: fold and unfold a site.\n"
                "In the portfolio: click a tier to work on it, drag a box to pick tiers for the worklist, Esc to show all again.\n"
                "Arrows: the next tier by gap share or lean. Space: pick it or let it go. Shift with an arrow: pick on the way.\n"
                "Ctrl+1, Ctrl+2, Ctrl+3: bench, side by side, portfolio. Ctrl+5: sign-off. Ctrl+R: refresh from a new list.\n"
                "Ctrl+Shift+R: price rules.\n"
                "Ctrl+6: history of the tier's sign-offs. In its plots Left, Right: the sign-off before, the next. F5: read again.\n"
                "Every plot: right click to copy or save. Every table: right click or Ctrl+C to copy.");
}

QString aboutText()
{
    return QCoreApplication::translate("Help", "Bench for shaping the price ladders of individually rented units.") +
           QStringLiteral("\n\n") + cautionText() + QStringLiteral("\n\n") +
           QCoreApplication::translate("Help", "Free software under the GNU General Public License, version 3 or later. "
                                               "Built on Qt, QCustomPlot, Eigen, Boost.Math and libcsv. Sample data is invented.");
}

} // namespace rungwright
