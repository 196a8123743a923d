// SPDX-License-Identifier: GPL-3.0-or-later
#include "pick_menu.h"

#include "words.h"

#include <QKeyEvent>
#include <QMouseEvent>

namespace rungwright
{

void PickMenu::setLadders(const QStringList& names, const LadderPick& picked)
{
    // The entry that was just ticked is the one that calls: entries are kept and changed, not made anew.
    while (actions().size() > names.size() + 1) {
        QAction* last = actions().constLast();
        removeAction(last);
        last->deleteLater();
    }
    for (int candidate = -1; candidate < names.size(); ++candidate) {
        const int place = candidate + 1;
        if (place == actions().size()) {
            QAction* made = addAction(QString());
            made->setCheckable(true);
            connect(made, &QAction::triggered, this, [this, candidate](bool on) { emit ticked(candidate, on); });
        }
        QAction* action = actions().at(place);
        action->setText(candidate < 0 ? tr("Current ladder") : buttonName(names[candidate]));
        const bool on = picked.isShown(candidate);
        action->setChecked(on);
        action->setEnabled(on ? picked.canShowFewer() : picked.canShowMore());
    }
}

void PickMenu::mouseReleaseEvent(QMouseEvent* event)
{
    if (!tick(actionAt(event->position().toPoint())))
        QMenu::mouseReleaseEvent(event);
}

void PickMenu::keyPressEvent(QKeyEvent* event)
{
    const bool ticks = event->key() == Qt::Key_Space || event->key() == Qt::Key_Return || event->key() == Qt::Key_Enter;
    if (!ticks || !tick(activeAction()))
        QMenu::keyPressEvent(event);
}

bool PickMenu::tick(QAction* action)
{
    if (!action || !action->isCheckable())
        return false;
    if (action->isEnabled())
        action->trigger();
    return true;
}

QString buttonName(const QString& name) { return shownText(name, 32).replace(u'&', QStringLiteral("&&")); }

} // namespace rungwright
