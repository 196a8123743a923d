// SPDX-License-Identifier: GPL-3.0-or-later
// The window: worklist, pages, figures, and the flow between them. What each part does is its own class's business.
#pragma once

#include "file_flow.h"
#include "workbench.h"
#include "worklist.h"

#include <QLabel>
#include <QMainWindow>
#include <QSettings>

class QDockWidget;
class QProgressBar;
class QStackedWidget;
class QTabWidget;

namespace rungwright
{

class AppearanceKeeper;
class BenchPage;
class DeskActions;
class FiguresPanel;
class FrontierPage;
class HistoryPage;
class Questions;
class PortfolioPage;
class ReadingRows;
class ReshapePanel;
class SideBySidePage;
class SignOffPage;
class StartPage;
class WorklistPanel;

class MainWindow : public QMainWindow
{
    Q_OBJECT
public:
    /// `stateFolder` is where unsaved work without a file is kept. All three outlive the window.
    MainWindow(Questions& questions, QSettings& settings, const QString& stateFolder, AppearanceKeeper* appearance = nullptr);
    ~MainWindow() override;

    Document& document() { return m_document; }
    Workbench& bench() { return m_bench; }
    Worklist& tiers() { return m_tiers; }
    FileFlow& files() { return *m_files; }
    void openFile(const QString& path) { m_files->open(path); }

    // What the actions call.
    void showSheet(int candidate);
    void showRules();
    void savePicture();
    void editTierNote();
    void editTierFloor();
    void editScenarioNote();
    void showKeys();
    void showAbout();
    void resetLayout();
    void showBench();
    void showSideBySide();
    void showPortfolio();
    void showTradeOff();
    void showLeastChange();
    void showShape();
    void showHistory();
    void showSignOff();
    void showThresholds();
    void showWorklistExport();
    WorklistPanel& worklist() { return *m_worklist; }
    BenchPage& benchPage() { return *m_benchPage; }
    QDockWidget& worklistDock() { return *m_worklistDock; }
    QDockWidget& figuresDock() { return *m_figuresDock; }
    QDockWidget& reshapeDock() { return *m_reshapeDock; }

protected:
    void closeEvent(QCloseEvent* event) override;
    void dragEnterEvent(QDragEnterEvent* event) override;
    void dropEvent(QDropEvent* event) override;

private:
    void buildDocks();
    void buildPages();
    void buildStatus();
    void showDocksForPage();
    void onOpened();
    void onReadingRows(const QString& name, const ListSoFar& list);
    void onReadingOver();
    void polishAhead();
    void showWorst();
    void showSaveState();
    void showModelInUse();
    void tell(const QString& sentence);
    void restoreLayout();

    Questions& m_questions;
    QSettings& m_settings;
    Document m_document;
    Worklist m_tiers; ///< Before whatever else listens to the document.
    Workbench m_bench;
    FileFlow* m_files = nullptr;
    QStackedWidget* m_stack = nullptr;
    QTabWidget* m_pages = nullptr;
    StartPage* m_start = nullptr;
    BenchPage* m_benchPage = nullptr;
    SideBySidePage* m_sideBySide = nullptr;
    PortfolioPage* m_portfolio = nullptr;
    FrontierPage* m_frontier = nullptr;
    HistoryPage* m_history = nullptr;
    SignOffPage* m_signOff = nullptr;
    WorklistPanel* m_worklist = nullptr;
    ReadingRows* m_readingRows = nullptr;
    FiguresPanel* m_figures = nullptr;
    QDockWidget* m_worklistDock = nullptr;
    QDockWidget* m_figuresDock = nullptr;
    ReshapePanel* m_reshape = nullptr;
    QDockWidget* m_reshapeDock = nullptr;
    DeskActions* m_actions = nullptr;
    QList<QPointer<QWidget>> m_toPolish; ///< What no one has seen yet.
    int m_undoIndex = 0;
    bool m_worstWanted = false; ///< The worst tier goes onto the bench as soon as it is known.
    bool m_worklistWanted = true;
    bool m_reshapeWanted = true;
    bool m_figuresWanted = true; ///< Whether the Figures stand beside the bench, which shows them.
    QLabel* m_lastAction = nullptr;
    QLabel* m_saveState = nullptr;
    QProgressBar* m_savingBar = nullptr; ///< Seen while a scenario is being written.
    QLabel* m_modelInUse = nullptr;
};

} // namespace rungwright
