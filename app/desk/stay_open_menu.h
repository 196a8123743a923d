// SPDX-License-Identifier: GPL-3.0-or-later
// A menu in which several boxes are ticked without opening it again for each.
#pragma once

#include <QKeyEvent>
#include <QMenu>
#include <QMouseEvent>

namespace rungwright
{

/// Choosing an entry that can be ticked, by mouse, Space or Enter, ticks it and leaves the menu open. Esc and a click elsewhere close it.
class StayOpenMenu : public QMenu
{
public:
    using QMenu::QMenu;

protected:
    void mouseReleaseEvent(QMouseEvent* event) override
    {
        if (!tick(actionAt(event->position().toPoint())))
            QMenu::mouseReleaseEvent(event);
    }
    void keyPressEvent(QKeyEvent* event) override
    {
        const bool ticks = event->key() == Qt::Key_Space || event->key() == Qt::Key_Return || event->key() == Qt::Key_Enter;
        if (!ticks || !tick(activeAction()))
            QMenu::keyPressEvent(event);
    }

private:
    static bool tick(QAction* action)
    {
        if (!action || !action->isCheckable())
            return false;
        if (action->isEnabled())
            action->trigger();
        return true;
    }
};

} // namespace rungwright
