// SPDX-License-Identifier: GPL-3.0-or-later
// LadderPlot: what a hand on the mouse does.
#include "ladder_plot.h"

#include "plot_words.h"

#include <QHelpEvent>
#include <QMouseEvent>
#include <QToolTip>
#include <QWheelEvent>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

constexpr double kDragStart = 3; ///< Pixels: prices are fine work, the platform's drag distance is too coarse for them.

bool adds(const QMouseEvent* event) { return event->modifiers() & (Qt::ControlModifier | Qt::ShiftModifier); }

} // namespace

bool LadderPlot::onHandle(QPointF pos) const
{
    return !m_scene.handle.isNull() && std::hypot(pos.x() - m_scene.handle.x(), pos.y() - m_scene.handle.y()) <= 11;
}

void LadderPlot::setHover(int unit, bool handle)
{
    if (unit == m_hover && handle == m_hoverHandle)
        return;
    const int before = m_hover;
    m_hover = unit;
    m_hoverHandle = handle;
    const bool locked = unit >= 0 && m_bench->tierCase()->tier.units[static_cast<std::size_t>(unit)].locked;
    if (handle || (unit >= 0 && !locked))
        setCursor(Qt::SizeVerCursor);
    else
        unsetCursor();
    update();
    if (unit != before)
        emit hovered(unit);
}

void LadderPlot::mousePressEvent(QMouseEvent* event)
{
    if (!shows() || event->button() != Qt::LeftButton) {
        PaperPlot::mousePressEvent(event);
        return;
    }
    event->accept();
    if (m_bench->gesture() == Workbench::Gesture::trial)
        emit told(tr("First keep what is tried (Enter), or give it up (Esc)."));
    if (m_bench->gesture() != Workbench::Gesture::none)
        return;
    m_hand = Hand::empty; // A release may have gone elsewhere.
    m_pressPos = event->position();
    m_pressPrice = priceAt(m_pressPos.y());
    m_lastBy = Price{};
    if (onHandle(m_pressPos)) {
        m_hand = Hand::maybeBend;
        return;
    }
    m_selectedBefore.assign(m_bench->selection().begin(), m_bench->selection().end());
    m_pressed = unitAt(m_pressPos);
    if (m_pressed < 0) {
        m_hand = Hand::rubber;
        m_rubber = QRectF();
        return;
    }
    const auto unit = static_cast<std::uint32_t>(m_pressed);
    if (event->modifiers() & Qt::ControlModifier) {
        std::vector<std::uint32_t> units = m_selectedBefore;
        const auto at = std::find(units.begin(), units.end(), unit);
        if (at == units.end())
            units.push_back(unit);
        else
            units.erase(at);
        m_bench->select(std::move(units));
        return;
    }
    m_hand = Hand::maybeMove;
    if (!m_bench->isSelected(unit))
        m_bench->select({unit});
}

void LadderPlot::startMoving()
{
    const auto selection = m_bench->selection();
    m_hand = m_bench->beginMove({selection.begin(), selection.end()}) ? Hand::move : Hand::empty;
}

void LadderPlot::dragTo(QPointF pos)
{
    if (m_hand == Hand::move) {
        const Price by{std::llround(priceAt(pos.y()) - m_pressPrice)};
        if (by != m_lastBy) {
            m_lastBy = by;
            m_bench->moveBy(by);
        }
    } else if (m_hand == Hand::bend) {
        m_bench->bendTo(exponentFor(m_bendStart + priceAt(pos.y()) - m_pressPrice));
    }
}

void LadderPlot::rubberTo(QPointF pos)
{
    const QRectF before = m_rubber.normalized();
    m_rubber = QRectF(m_pressPos, pos);
    const QRectF rect = m_rubber.normalized();
    update((before | rect).adjusted(-2, -2, 2, 2).toAlignedRect());
    std::vector<std::uint32_t> units;
    const auto columns = m_bench->columns();
    for (std::size_t place = 0; place < m_points.size(); ++place) {
        if (rect.contains(m_points[place]))
            units.push_back(columns[place]);
    }
    if (QGuiApplication::keyboardModifiers() & (Qt::ControlModifier | Qt::ShiftModifier))
        units.insert(units.end(), m_selectedBefore.begin(), m_selectedBefore.end());
    m_bench->select(std::move(units));
}

void LadderPlot::mouseMoveEvent(QMouseEvent* event)
{
    event->accept();
    if (!shows())
        return;
    const QPointF pos = event->position();
    const bool far = std::abs(pos.x() - m_pressPos.x()) > kDragStart || std::abs(pos.y() - m_pressPos.y()) > kDragStart;
    switch (m_hand) {
    case Hand::empty:
        if (event->buttons() == Qt::NoButton) {
            const bool handle = onHandle(pos);
            setHover(handle ? -1 : unitAt(pos), handle);
        }
        break;
    case Hand::maybeMove:
        if (far)
            startMoving();
        dragTo(pos);
        break;
    case Hand::maybeBend:
        if (far)
            m_hand = m_bench->beginBend() ? Hand::bend : Hand::empty;
        dragTo(pos);
        break;
    case Hand::move:
    case Hand::bend:
        if (m_bench->gesture() == Workbench::Gesture::none)
            m_hand = Hand::empty; // Given up meanwhile.
        else
            dragTo(pos);
        break;
    case Hand::rubber:
        if (far || !m_rubber.isNull())
            rubberTo(pos);
        break;
    }
}

void LadderPlot::mouseReleaseEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton) {
        PaperPlot::mouseReleaseEvent(event);
        return;
    }
    event->accept();
    const Hand hand = m_hand;
    m_hand = Hand::empty;
    if (!shows())
        return;
    if ((hand == Hand::move || hand == Hand::bend) && m_bench->gesture() != Workbench::Gesture::none) {
        m_bench->finishGesture();
    } else if (hand == Hand::maybeMove && m_pressed >= 0) {
        m_bench->select({static_cast<std::uint32_t>(m_pressed)});
    } else if (hand == Hand::rubber) {
        if (m_rubber.isNull() && !adds(event))
            m_bench->select({});
        m_rubber = QRectF();
        update();
    }
    m_pressed = -1;
    describe();
}

void LadderPlot::mouseDoubleClickEvent(QMouseEvent* event)
{
    if (!shows() || event->button() != Qt::LeftButton)
        return;
    event->accept();
    const int unit = unitAt(event->position());
    if (unit >= 0)
        emit priceEditRequested(static_cast<std::uint32_t>(unit));
    else if (!onHandle(event->position()))
        resetZoom();
}

void LadderPlot::zoom(double factor, double aroundPrice)
{
    const QCPRange range = yAxis->range();
    const QCPRange all = wantedRange();
    QCPRange now(aroundPrice - (aroundPrice - range.lower) * factor, aroundPrice + (range.upper - aroundPrice) * factor);
    if (now.size() < 4)
        return; // Four minor units: nothing finer to see.
    m_zoomed = now.size() < all.size();
    if (!m_zoomed)
        now = all;
    setRange(now);
    areaChanged();
    redrawAll();
}

void LadderPlot::wheelEvent(QWheelEvent* event)
{
    const double steps = event->angleDelta().y() / 120.0;
    const bool idle = shows() && m_bench->gesture() == Workbench::Gesture::none;
    if (idle && (event->modifiers() & Qt::ControlModifier) && steps != 0) {
        zoom(std::pow(0.85, steps), priceAt(event->position().y()));
        event->accept();
    } else if (idle && m_zoomed && steps != 0) {
        QCPRange range = yAxis->range();
        range += 0.1 * steps * range.size();
        setRange(range);
        areaChanged();
        redrawAll();
        event->accept();
    } else {
        event->ignore();
    }
}

void LadderPlot::leaveEvent(QEvent* event)
{
    PaperPlot::leaveEvent(event);
    if (shows())
        setHover(-1, false);
}

bool LadderPlot::event(QEvent* event)
{
    if (event->type() == QEvent::ToolTip && shows()) {
        auto* help = static_cast<QHelpEvent*>(event);
        const int unit = unitAt(help->pos());
        if (onHandle(help->pos()))
            QToolTip::showText(help->globalPos(), tr("Bend the ladder: drag up or down"), this);
        else if (unit >= 0)
            QToolTip::showText(help->globalPos(), unitToolTip(*m_bench, static_cast<std::uint32_t>(unit)), this);
        else
            QToolTip::hideText();
        return true;
    }
    // Page and arrow keys are ours, before a scroll area or a shortcut takes them.
    if (event->type() == QEvent::ShortcutOverride) {
        const auto* key = static_cast<QKeyEvent*>(event);
        const bool all = key->key() == Qt::Key_A && key->modifiers() == Qt::ControlModifier;
        const bool bend = (key->key() == Qt::Key_Up || key->key() == Qt::Key_Down) && key->modifiers() == Qt::ControlModifier;
        if (all || bend || key->key() == Qt::Key_L ||
            (key->key() == Qt::Key_Escape && shows() && m_bench->gesture() != Workbench::Gesture::none)) {
            if (key->key() != Qt::Key_L || key->modifiers() == Qt::NoModifier) {
                event->accept();
                return true;
            }
        }
    }
    return PaperPlot::event(event);
}

} // namespace rungwright
