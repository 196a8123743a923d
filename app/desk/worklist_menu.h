// SPDX-License-Identifier: GPL-3.0-or-later
// The menu of the worklist.
#pragma once

#include <QAction>
#include <QList>
#include <QObject>

#include <functional>

class QMenuBar;

namespace rungwright
{

class MainWindow;

class WorklistMenu : public QObject
{
    Q_OBJECT
public:
    /// Adds the menu to the window's menu bar, and what it does to a tier to the table's own context menu.
    explicit WorklistMenu(MainWindow& window);

    /// All but those that need no scenario.
    const QList<QAction*>& actions() const { return m_actions; }

private:
    QAction* add(class QMenu* menu, const char* name, const QString& text, const QKeySequence& keys, const std::function<void()>& what);

    QList<QAction*> m_actions;
};

} // namespace rungwright
