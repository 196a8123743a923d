// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk_actions.h"

#include "appearance.h"
#include "bench_page.h"
#include "candidates_panel.h"
#include "main_window.h"
#include "worklist_menu.h"

#include <QActionGroup>
#include <QApplication>
#include <QDir>
#include <QDockWidget>
#include <QMenuBar>

namespace rungwright
{

DeskActions::DeskActions(MainWindow& window, AppearanceKeeper* appearance) : QObject(&window), m_window(window)
{
    buildFile();
    buildEdit();
    buildLadder();
    m_needScenario << (new WorklistMenu(window))->actions();
    buildView(appearance);
    buildHelp();
    connect(&window.bench(), &Workbench::reset, this, &DeskActions::showEnabled);
    showEnabled();
}

QAction* DeskActions::add(QMenu* menu, const QString& name, const QString& text, const QKeySequence& keys,
                          const std::function<void()>& what)
{
    QAction* action = menu->addAction(text);
    action->setObjectName(name);
    action->setShortcut(keys);
    connect(action, &QAction::triggered, this, what);
    return action;
}

QStringList DeskActions::samples()
{
    QStringList paths;
    for (const QString& name : QDir(QStringLiteral(":/samples")).entryList({QStringLiteral("*.rungs.json")}, QDir::Files, QDir::Name))
        paths << QStringLiteral(":/samples/") + name;
    return paths;
}

QString DeskActions::firstSample()
{
    const QStringList all = samples();
    for (const QString& path : all) {
        if (path.contains(QStringLiteral("storage")))
            return path;
    }
    return all.value(0);
}

void DeskActions::buildFile()
{
    FileFlow& files = m_window.files();
    QMenu* menu = m_window.menuBar()->addMenu(tr("&File"));
    add(menu, QStringLiteral("openAction"), tr("&Open a scenario…"), QKeySequence::Open, [&files] { files.askOpen(); });
    add(menu, QStringLiteral("importAction"), tr("&Import a unit list…"), QKeySequence(tr("Ctrl+I")), [&files] { files.askImport(); });
    m_needScenario << add(menu, QStringLiteral("refreshAction"), tr("Re&fresh from a new list…"), QKeySequence(tr("Ctrl+R")),
                          [&files] { files.askRefresh(); });
    QMenu* samplesMenu = menu->addMenu(tr("Open a &sample"));
    for (const QString& path : samples()) {
        const QString name = QFileInfo(path).fileName().section(QLatin1Char('.'), 0, 0).replace(QLatin1Char('-'), QLatin1Char(' '));
        add(samplesMenu, QString(), name.left(1).toUpper() + name.mid(1), {}, [&files, path] { files.openSample(path); });
    }
    m_recent = menu->addMenu(tr("&Recent"));
    connect(m_recent, &QMenu::aboutToShow, this, &DeskActions::fillRecent);
    fillRecent();
    menu->addSeparator();
    m_needScenario << add(menu, QStringLiteral("saveAction"), tr("&Save"), QKeySequence::Save, [&files] { files.save(); });
    m_needScenario << add(menu, QStringLiteral("saveAsAction"), tr("Save &as…"), QKeySequence(tr("Ctrl+Shift+S")),
                          [&files] { files.saveAs(); });
    menu->addSeparator();
    m_needScenario << add(menu, QStringLiteral("sheetAction"), tr("&Price sheet…"), QKeySequence(tr("Ctrl+E")),
                          [this] { m_window.showSheet(m_window.bench().candidate()); });
    m_needScenario << add(menu, QStringLiteral("pictureAction"), tr("Save a pic&ture of the bench…"), {},
                          [this] { m_window.savePicture(); });
    menu->addSeparator();
    add(menu, QStringLiteral("quitAction"), tr("&Quit"), QKeySequence::Quit, [this] { m_window.close(); });
}

void DeskActions::fillRecent()
{
    m_recent->clear();
    const QStringList paths = m_window.files().recent().list();
    for (const QString& path : paths)
        add(m_recent, QString(), path, {}, [this, path] { m_window.openFile(path); });
    if (paths.isEmpty())
        m_recent->addAction(tr("None yet"))->setEnabled(false);
}

void DeskActions::buildEdit()
{
    QMenu* menu = m_window.menuBar()->addMenu(tr("&Edit"));
    QUndoStack& undo = m_window.document().undoStack();
    QAction* undoAction = undo.createUndoAction(this, tr("&Undo"));
    undoAction->setObjectName(QStringLiteral("undoAction"));
    undoAction->setShortcut(QKeySequence::Undo);
    QAction* redoAction = undo.createRedoAction(this, tr("&Redo"));
    redoAction->setObjectName(QStringLiteral("redoAction"));
    redoAction->setShortcuts({QKeySequence(tr("Ctrl+Y")), QKeySequence(tr("Ctrl+Shift+Z"))});
    menu->addAction(undoAction);
    menu->addAction(redoAction);
    menu->addSeparator();
    m_needScenario << add(menu, QStringLiteral("rulesAction"), tr("&Price rules…"), QKeySequence(tr("Ctrl+Shift+R")),
                          [this] { m_window.showRules(); });
    menu->addSeparator();
    m_needScenario << add(menu, QStringLiteral("tierFloorAction"), tr("&Advertised floor of the tier…"), {},
                          [this] { m_window.editTierFloor(); });
    m_needScenario << add(menu, QStringLiteral("scenarioNoteAction"), tr("Note on the &scenario…"), {},
                          [this] { m_window.editScenarioNote(); });
}

void DeskActions::buildLadder()
{
    QMenu* menu = m_window.menuBar()->addMenu(tr("&Ladder"));
    CandidatesPanel& panel = m_window.benchPage().candidates();
    m_needScenario << add(menu, QStringLiteral("copyCandidateAction"), tr("&Copy as a new candidate"), QKeySequence(tr("Ctrl+D")),
                          [&panel] { panel.copyWorked(); });
    m_needCandidate << add(menu, QStringLiteral("renameCandidateAction"), tr("&Rename the candidate…"), QKeySequence(tr("F2")),
                           [&panel] { panel.renameWorked(); });
    m_needCandidate << add(menu, QStringLiteral("noteCandidateAction"), tr("&Note on the candidate…"), {},
                           [&panel] { panel.noteWorked(); });
    m_needCandidate << add(menu, QStringLiteral("discardCandidateAction"), tr("&Discard the candidate"), {},
                           [&panel] { panel.discardWorked(); });
    menu->addSeparator();
    m_needScenario << add(menu, QStringLiteral("leastChangeAction"), tr("Change as little as a &target takes"), QKeySequence(tr("Ctrl+T")),
                          [this] { m_window.showLeastChange(); });
    m_needScenario << add(menu, QStringLiteral("shapeAction"), tr("Make from a &shape"), QKeySequence(tr("Ctrl+Shift+T")),
                          [this] { m_window.showShape(); });
    menu->addSeparator();
    m_needScenario << add(menu, QStringLiteral("lockAction"), tr("&Lock or unlock the selected units"), QKeySequence(tr("Ctrl+L")),
                          [this] { m_window.bench().toggleLock(); });
    QAction* hold = add(menu, QStringLiteral("holdTotalAction"), tr("&Hold the asking total"), QKeySequence(tr("Ctrl+H")), [] {});
    hold->setCheckable(true);
    connect(hold, &QAction::toggled, &m_window.bench(), &Workbench::setHoldTotal);
    connect(&m_window.bench(), &Workbench::reset, hold, [this, hold] { hold->setChecked(m_window.bench().holdsTotal()); });
    m_needScenario << hold;
}

void DeskActions::buildView(AppearanceKeeper* appearance)
{
    QMenu* menu = m_window.menuBar()->addMenu(tr("&View"));
    m_needScenario << add(menu, QStringLiteral("benchAction"), tr("&Bench"), QKeySequence(tr("Ctrl+1")), [this] { m_window.showBench(); });
    m_needScenario << add(menu, QStringLiteral("sideBySideAction"), tr("&Side by side"), QKeySequence(tr("Ctrl+2")),
                          [this] { m_window.showSideBySide(); });
    m_needScenario << add(menu, QStringLiteral("portfolioAction"), tr("&Portfolio"), QKeySequence(tr("Ctrl+3")),
                          [this] { m_window.showPortfolio(); });
    m_needScenario << add(menu, QStringLiteral("frontierAction"), tr("&Trade-off"), QKeySequence(tr("Ctrl+4")),
                          [this] { m_window.showTradeOff(); });
    m_needScenario << add(menu, QStringLiteral("signOffAction"), tr("Sign-&off"), QKeySequence(tr("Ctrl+5")),
                          [this] { m_window.showSignOff(); });
    m_needScenario << add(menu, QStringLiteral("historyAction"), tr("&History"), QKeySequence(tr("Ctrl+6")),
                          [this] { m_window.showHistory(); });
    menu->addSeparator();
    menu->addAction(m_window.worklistDock().toggleViewAction());
    menu->addAction(m_window.figuresDock().toggleViewAction());
    menu->addAction(m_window.reshapeDock().toggleViewAction());
    add(menu, QStringLiteral("resetLayoutAction"), tr("&Reset the window's layout"), {}, [this] { m_window.resetLayout(); });
    if (!appearance)
        return;
    menu->addSeparator();
    QMenu* looks = menu->addMenu(tr("&Appearance"));
    auto* group = new QActionGroup(looks);
    const std::pair<Appearance, QString> kinds[] = {
        {Appearance::system, tr("As the &system has it")}, {Appearance::light, tr("&Light")}, {Appearance::dark, tr("&Dark")}};
    for (const auto& [kind, text] : kinds) {
        QAction* action = add(looks, QString(), text, {}, [appearance, kind = kind] { appearance->set(kind); });
        action->setCheckable(true);
        action->setChecked(appearance->appearance() == kind);
        group->addAction(action);
    }
}

void DeskActions::buildHelp()
{
    QMenu* menu = m_window.menuBar()->addMenu(tr("&Help"));
    add(menu, QStringLiteral("keysAction"), tr("&Keys and gestures"), QKeySequence::HelpContents, [this] { m_window.showKeys(); });
    add(menu, QStringLiteral("aboutAction"), tr("&About Rungwright"), {}, [this] { m_window.showAbout(); });
}

void DeskActions::showEnabled()
{
    const bool any = m_window.bench().tierCase() != nullptr;
    for (QAction* action : m_needScenario)
        action->setEnabled(any);
    for (QAction* action : m_needCandidate)
        action->setEnabled(any && m_window.bench().candidate() >= 0);
}

} // namespace rungwright
