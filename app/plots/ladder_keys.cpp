// SPDX-License-Identifier: GPL-3.0-or-later
// LadderPlot: what the keyboard does.
#include "ladder_plot.h"

#include <QKeyEvent>

#include <algorithm>
#include <cmath>

namespace rungwright
{

void LadderPlot::focusInEvent(QFocusEvent* event)
{
    PaperPlot::focusInEvent(event);
    update();
}

void LadderPlot::focusOutEvent(QFocusEvent* event)
{
    PaperPlot::focusOutEvent(event);
    update();
}

void LadderPlot::goAlong(int steps, bool extend)
{
    const auto columns = m_bench->columns();
    const auto selection = m_bench->selection();
    if (columns.empty())
        return;
    const auto last = static_cast<int>(columns.size()) - 1;
    int place = steps > 0 ? -1 : last + 1;
    // From the selection's end that lies in the direction of travel.
    bool any = false;
    for (const std::uint32_t unit : selection) {
        const auto at = static_cast<int>(placeOf(unit));
        place = !any ? at : steps > 0 ? std::max(place, at) : std::min(place, at);
        any = true;
    }
    const std::uint32_t next = columns[static_cast<std::size_t>(std::clamp(place + steps, 0, last))];
    std::vector<std::uint32_t> units;
    if (extend)
        units.assign(selection.begin(), selection.end());
    units.push_back(next);
    m_bench->select(std::move(units));
}

void LadderPlot::bendByKey(int steps)
{
    if (m_bendUnit < 0 || !m_bench->beginBend())
        return;
    const PricePoints& points = m_bench->rules().points;
    const Price wanted = points.stepped(Price{std::llround(m_bendStart)}, steps);
    m_bench->bendTo(exponentFor(static_cast<double>(wanted.minor)));
    m_bench->finishGesture();
}

void LadderPlot::keyPressEvent(QKeyEvent* event)
{
    if (!shows()) {
        PaperPlot::keyPressEvent(event);
        return;
    }
    event->accept();
    const bool busy = m_bench->gesture() != Workbench::Gesture::none;
    const Qt::KeyboardModifiers modifiers = event->modifiers() & ~Qt::KeypadModifier;
    const bool extend = modifiers == Qt::ShiftModifier;
    const bool control = modifiers == Qt::ControlModifier;

    const bool enter = event->key() == Qt::Key_Return || event->key() == Qt::Key_Enter;
    if (enter && m_bench->gesture() == Workbench::Gesture::trial) {
        m_bench->finishGesture();
        return;
    }
    if (event->key() == Qt::Key_Escape) {
        if (m_hand == Hand::rubber) {
            m_rubber = QRectF();
            m_bench->select(m_selectedBefore);
            update();
        } else if (busy) {
            m_bench->giveUpGesture();
        } else if (!m_bench->selection().empty()) {
            m_bench->select({});
        } else {
            event->ignore();
        }
        m_hand = Hand::empty;
        return;
    }
    if (busy)
        return; // One gesture at a time; only Esc has a say in it.
    switch (event->key()) {
    case Qt::Key_Up:
    case Qt::Key_Down: {
        const int step = event->key() == Qt::Key_Up ? 1 : -1;
        if (control)
            bendByKey(step);
        else
            m_bench->nudge(step);
        return;
    }
    case Qt::Key_PageUp:
        m_bench->nudge(5);
        return;
    case Qt::Key_PageDown:
        m_bench->nudge(-5);
        return;
    case Qt::Key_Left:
        goAlong(-1, extend);
        return;
    case Qt::Key_Right:
        goAlong(1, extend);
        return;
    case Qt::Key_Home:
    case Qt::Key_End: {
        const auto columns = m_bench->columns();
        if (!columns.empty())
            m_bench->select({event->key() == Qt::Key_Home ? columns.front() : columns.back()});
        return;
    }
    case Qt::Key_A:
        if (control) {
            const auto& units = m_bench->tierCase()->tier.units;
            std::vector<std::uint32_t> onOffer;
            for (std::uint32_t unit = 0; unit < units.size(); ++unit) {
                if (units[unit].onOffer())
                    onOffer.push_back(unit);
            }
            m_bench->select(std::move(onOffer));
            return;
        }
        break;
    case Qt::Key_L:
        if (modifiers == Qt::NoModifier) {
            m_bench->toggleLock();
            return;
        }
        break;
    case Qt::Key_0:
        if (control) {
            resetZoom();
            return;
        }
        break;
    case Qt::Key_Return:
    case Qt::Key_Enter:
    case Qt::Key_F2:
        if (m_bench->selection().size() == 1) {
            emit priceEditRequested(m_bench->selection().front());
            return;
        }
        break;
    default:
        break;
    }
    event->ignore();
    PaperPlot::keyPressEvent(event);
}

} // namespace rungwright
