// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_menu.h"

#include "main_window.h"
#include "worklist_panel.h"

#include <QDockWidget>
#include <QMenuBar>
#include <QTableView>

namespace rungwright
{

WorklistMenu::WorklistMenu(MainWindow& window) : QObject(&window)
{
    WorklistPanel& panel = window.worklist();
    QMenu* menu = window.menuBar()->addMenu(tr("&Worklist"));
    add(menu, "nextTierAction", tr("&Next tier"), QKeySequence(tr("Alt+Down")), [&panel] { panel.step(+1); });
    add(menu, "previousTierAction", tr("&Previous tier"), QKeySequence(tr("Alt+Up")), [&panel] { panel.step(-1); });
    add(menu, "nextUnseenAction", tr("Next tier not yet s&een"), QKeySequence(tr("Alt+Shift+Down")), [&panel] { panel.stepToUnseen(); });
    menu->addSeparator();
    QAction* seen = add(menu, "seenAction", tr("Mark as &seen or not seen"), QKeySequence(tr("Ctrl+M")), [&panel] { panel.toggleSeen(); });
    QAction* note =
        add(menu, "tierNoteAction", tr("N&ote on the tier…"), QKeySequence(tr("Ctrl+Shift+N")), [&window] { window.editTierNote(); });
    menu->addSeparator();
    add(menu, "filterAction", tr("&Filter"), QKeySequence::Find, [&window, &panel] {
        window.worklistDock().show();
        panel.focusFilter();
    });
    QAction* group = add(menu, "groupAction", tr("&Group by site"), QKeySequence(tr("Ctrl+G")), [] {});
    group->setCheckable(true);
    group->setChecked(panel.model().wish().grouped);
    connect(group, &QAction::toggled, &panel, &WorklistPanel::setGrouped);
    connect(&panel, &WorklistPanel::groupedChanged, group, &QAction::setChecked);
    QAction* fold = add(menu, "foldAllAction", tr("Fold &all sites"), {}, [&panel] { panel.foldAll(true); });
    QAction* unfold = add(menu, "unfoldAllAction", tr("&Unfold all sites"), {}, [&panel] { panel.foldAll(false); });
    menu->addSeparator();
    add(menu, "thresholdsAction", tr("Flag &thresholds…"), {}, [&window] { window.showThresholds(); });
    add(menu, "exportWorklistAction", tr("Save as &CSV…"), QKeySequence(tr("Ctrl+Shift+E")), [&window] { window.showWorklistExport(); });

    auto* line = new QAction(this);
    line->setSeparator(true);
    panel.table().addAction(line);
    panel.table().addActions({seen, note, fold, unfold});
    connect(&panel, &WorklistPanel::thresholdsWanted, &window, &MainWindow::showThresholds);
}

QAction* WorklistMenu::add(QMenu* menu, const char* name, const QString& text, const QKeySequence& keys, const std::function<void()>& what)
{
    QAction* action = menu->addAction(text);
    action->setObjectName(QLatin1String(name));
    action->setShortcut(keys);
    connect(action, &QAction::triggered, this, what);
    m_actions << action;
    return action;
}

} // namespace rungwright
