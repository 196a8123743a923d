// SPDX-License-Identifier: GPL-3.0-or-later
// The menus.
#pragma once

#include <QAction>
#include <QList>
#include <QObject>

#include <functional>

class QMenu;

namespace rungwright
{

class AppearanceKeeper;
class MainWindow;

class DeskActions : public QObject
{
    Q_OBJECT
public:
    DeskActions(MainWindow& window, AppearanceKeeper* appearance);

    /// Resource paths of the samples, and the one a newcomer should see first.
    static QStringList samples();
    static QString firstSample();

private:
    QAction* add(QMenu* menu, const QString& name, const QString& text, const QKeySequence& keys, const std::function<void()>& what);
    void buildFile();
    void buildEdit();
    void buildLadder();
    void buildView(AppearanceKeeper* appearance);
    void buildHelp();
    void fillRecent();
    void showEnabled();

    MainWindow& m_window;
    QMenu* m_recent = nullptr;
    QList<QAction*> m_needScenario;  ///< Off while no scenario is open.
    QList<QAction*> m_needCandidate; ///< Off while the current ladder is on the bench.
};

} // namespace rungwright
