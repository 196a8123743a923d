// SPDX-License-Identifier: GPL-3.0-or-later
#include "main_window.h"

#include "bench_page.h"
#include "bench_picture.h"
#include "candidates_panel.h"
#include "caution.h"
#include "desk_actions.h"
#include "figures_panel.h"
#include "file_names.h"
#include "flags_dialog.h"
#include "floor_question.h"
#include "frontier_page.h"
#include "help_texts.h"
#include "history_page.h"
#include "picture_file.h"
#include "portfolio_page.h"
#include "questions.h"
#include "reading_rows.h"
#include "reshape_panel.h"
#include "rules_dialog.h"
#include "sheet_dialog.h"
#include "side_by_side_page.h"
#include "signoff_page.h"
#include "start_page.h"
#include "wording.h"
#include "worklist_export_dialog.h"
#include "worklist_panel.h"

#include <QCloseEvent>
#include <QCoreApplication>
#include <QDockWidget>
#include <QElapsedTimer>
#include <QFileInfo>
#include <QMimeData>
#include <QProgressBar>
#include <QScreen>
#include <QStackedWidget>
#include <QStatusBar>
#include <QTabWidget>
#include <QTimer>

namespace rungwright
{

namespace
{

const auto kGeometry = QStringLiteral("window/geometry");
const auto kLayout = QStringLiteral("window/layout");
const auto kColumns = QStringLiteral("window/worklistColumns");
const auto kWorklistWanted = QStringLiteral("window/worklist");
const auto kFiguresWanted = QStringLiteral("window/figures");
const auto kReshapeWanted = QStringLiteral("window/reshape");
constexpr int kLayoutVersion = 2;
/// Below this width the docks begin as narrow as they can be.
constexpr int kNarrow = 1360;

} // namespace

MainWindow::MainWindow(Questions& questions, QSettings& settings, const QString& stateFolder, AppearanceKeeper* appearance) :
    m_questions(questions), m_settings(settings), m_tiers(m_document), m_bench(m_document)
{
    setObjectName(QStringLiteral("mainWindow"));
    setAcceptDrops(true);
    m_files = new FileFlow(m_document, questions, settings, stateFolder, this);
    buildPages();
    buildDocks();
    buildStatus();
    m_actions = new DeskActions(*this, appearance);

    connect(m_files, &FileFlow::opened, this, &MainWindow::onOpened);
    connect(m_files, &FileFlow::readingRows, this, &MainWindow::onReadingRows);
    connect(m_files, &FileFlow::readingOver, this, &MainWindow::onReadingOver);
    connect(m_files, &FileFlow::told, this, &MainWindow::tell);
    connect(&m_files->saving(), &SaveFlow::writingChanged, this, [this](bool writing) {
        m_savingBar->setVisible(writing);
        showSaveState();
    });
    connect(m_files, &FileFlow::recentChanged, this, [this] { m_start->setRecent(m_files->recent().list()); });
    connect(&m_bench, &Workbench::told, this, &MainWindow::tell);
    connect(&m_bench, &Workbench::reset, this, &MainWindow::showModelInUse);
    connect(&m_document, &Document::saveStateChanged, this, &MainWindow::showSaveState);
    connect(&m_document.undoStack(), &QUndoStack::indexChanged, this, [this](int index) {
        if (index < std::exchange(m_undoIndex, index) && m_document.undoStack().canRedo())
            tell(tr("Undone: %1").arg(m_document.undoStack().redoText()));
        else if (m_document.undoStack().canUndo())
            tell(m_document.undoStack().undoText());
    });
    connect(m_benchPage, &BenchPage::told, this, &MainWindow::tell);
    connect(m_sideBySide, &SideBySidePage::told, this, &MainWindow::tell);
    m_start->setRecent(m_files->recent().list());
    restoreLayout();
    showSaveState();
    showModelInUse();
    for (QWidget* part : {static_cast<QWidget*>(m_worklistDock), static_cast<QWidget*>(m_figuresDock), static_cast<QWidget*>(m_pages)}) {
        m_toPolish.append(part);
        for (QWidget* inner : part->findChildren<QWidget*>())
            m_toPolish.append(inner);
    }
    QTimer::singleShot(0, this, &MainWindow::polishAhead);
}

MainWindow::~MainWindow()
{
    // The pages go first, and hidden: one that goes makes the next one current, which must not be shown a bench that is gone.
    m_pages->disconnect(this);
    m_stack->hide();
    delete takeCentralWidget();
}

void MainWindow::buildPages()
{
    m_start = new StartPage;
    m_start->setObjectName(QStringLiteral("startPage"));
    m_pages = new QTabWidget;
    m_pages->setObjectName(QStringLiteral("pages"));
    m_pages->setDocumentMode(true);
    m_benchPage = new BenchPage(m_bench, m_questions);
    m_benchPage->setObjectName(QStringLiteral("benchPage"));
    m_sideBySide = new SideBySidePage(m_bench, m_questions, &m_settings);
    m_sideBySide->setObjectName(QStringLiteral("sideBySidePage"));
    m_pages->addTab(m_benchPage, tr("Bench"));
    m_pages->addTab(m_sideBySide, tr("Side by side"));
    m_portfolio = new PortfolioPage(m_tiers, m_bench, m_questions);
    m_portfolio->setObjectName(QStringLiteral("portfolioPage"));
    m_pages->addTab(m_portfolio, tr("Portfolio"));
    m_frontier = new FrontierPage(m_bench, m_questions);
    m_frontier->setObjectName(QStringLiteral("frontierPage"));
    m_pages->addTab(m_frontier, tr("Trade-off"));
    m_signOff = new SignOffPage(m_bench, m_questions, m_settings, [this] { return m_files->save() && m_files->saving().finishWriting(); });
    m_signOff->setObjectName(QStringLiteral("signOffPage"));
    m_pages->addTab(m_signOff, tr("Sign-off"));
    m_history = new HistoryPage(m_bench, m_questions);
    m_history->setObjectName(QStringLiteral("historyPage"));
    m_pages->addTab(m_history, tr("History"));
    connect(m_history, &HistoryPage::told, this, &MainWindow::tell);
    m_stack = new QStackedWidget;
    m_stack->addWidget(m_start);
    m_stack->addWidget(m_pages);
    setCentralWidget(m_stack);

    connect(m_pages, &QTabWidget::currentChanged, this, &MainWindow::showDocksForPage);

    connect(m_start, &StartPage::importWanted, m_files, &FileFlow::askImport);
    connect(m_start, &StartPage::openWanted, m_files, &FileFlow::askOpen);
    connect(m_start, &StartPage::sampleWanted, this, [this] { m_files->openSample(DeskActions::firstSample()); });
    connect(m_start, &StartPage::recentWanted, m_files, &FileFlow::open);
    connect(&m_benchPage->candidates(), &CandidatesPanel::sheetWanted, this, &MainWindow::showSheet);
    connect(m_sideBySide, &SideBySidePage::chosen, this, &MainWindow::showSheet);
    connect(m_portfolio, &PortfolioPage::told, this, &MainWindow::tell);
    connect(m_frontier, &FrontierPage::told, this, &MainWindow::tell);
    connect(m_signOff, &SignOffPage::told, this, &MainWindow::tell);
    connect(m_signOff, &SignOffPage::recorded, m_history, &HistoryPage::reread);
    connect(m_portfolio, &PortfolioPage::thresholdsWanted, this, &MainWindow::showThresholds);
    connect(m_portfolio, &PortfolioPage::tierChosen, this, [this](int tier) {
        m_bench.showTier(tier, m_document.tier(tier)->chosen.value_or(-1));
        showBench();
    });
}

void MainWindow::showDocksForPage()
{
    // Side by side has a table of the same figures for every ladder, the sign-off its own, and the history those of other days; all
    // need the room.
    const QWidget* page = m_pages->currentWidget();
    const bool beside = page == m_sideBySide || page == m_signOff || page == m_history;
    m_figuresDock->setVisible(!beside && m_figuresWanted);
    // What is tried shows on the bench.
    m_reshapeDock->setVisible(page == m_benchPage && m_reshapeWanted);
}

void MainWindow::buildDocks()
{
    m_worklist = new WorklistPanel(m_bench, m_tiers);
    connect(m_worklist, &WorklistPanel::told, this, &MainWindow::tell);
    connect(&m_tiers, &Worklist::measured, this, [this] {
        // Unless the user has gone to work meanwhile.
        if (std::exchange(m_worstWanted, false) && m_bench.tier() == 0 && !m_document.undoStack().canUndo())
            showWorst();
    });
    m_readingRows = new ReadingRows(*m_worklist);
    m_worklistDock = new QDockWidget(tr("Worklist"), this);
    m_worklistDock->setObjectName(QStringLiteral("worklistDock"));
    m_worklistDock->setWidget(m_worklist);
    addDockWidget(Qt::LeftDockWidgetArea, m_worklistDock);
    m_figures = new FiguresPanel(m_bench);
    m_figuresDock = new QDockWidget(tr("Figures"), this);
    m_figuresDock->setObjectName(QStringLiteral("figuresDock"));
    m_figuresDock->setWidget(m_figures);
    addDockWidget(Qt::RightDockWidgetArea, m_figuresDock);
    m_reshape = new ReshapePanel(m_bench);
    m_reshapeDock = new QDockWidget(tr("Reshape"), this);
    m_reshapeDock->setObjectName(QStringLiteral("reshapeDock"));
    m_reshapeDock->setWidget(m_reshape);
    addDockWidget(Qt::RightDockWidgetArea, m_reshapeDock);
    tabifyDockWidget(m_figuresDock, m_reshapeDock);
    m_figuresDock->raise();
    // Closed by its button or by the menu: either way the user has said so.
    connect(m_worklistDock->toggleViewAction(), &QAction::triggered, this, [this](bool on) { m_worklistWanted = on; });
    connect(m_figuresDock->toggleViewAction(), &QAction::triggered, this, [this](bool on) { m_figuresWanted = on; });
    connect(m_reshapeDock->toggleViewAction(), &QAction::triggered, this, [this](bool on) { m_reshapeWanted = on; });
}

void MainWindow::buildStatus()
{
    m_lastAction = new QLabel;
    m_lastAction->setObjectName(QStringLiteral("lastAction"));
    m_lastAction->setAccessibleDescription(tr("Last action"));
    m_lastAction->setTextFormat(Qt::PlainText);
    m_saveState = new QLabel;
    m_saveState->setObjectName(QStringLiteral("saveState"));
    m_saveState->setAccessibleDescription(tr("Saved or not"));
    m_modelInUse = new QLabel;
    m_modelInUse->setObjectName(QStringLiteral("modelInUse"));
    m_modelInUse->setAccessibleDescription(tr("Availability model in use"));
    m_savingBar = new QProgressBar;
    m_savingBar->setObjectName(QStringLiteral("savingBar"));
    m_savingBar->setAccessibleName(tr("Saving"));
    m_savingBar->setRange(0, 0); // how much is left is not known
    m_savingBar->setTextVisible(false);
    m_savingBar->setFixedSize(96, 12);
    for (QLabel* label : {m_lastAction, m_saveState, m_modelInUse})
        label->setContentsMargins(8, 0, 8, 0);
    statusBar()->setSizeGripEnabled(false);
    statusBar()->addWidget(m_lastAction, 1);
    statusBar()->addPermanentWidget(m_modelInUse);
    statusBar()->addPermanentWidget(m_savingBar);
    statusBar()->addPermanentWidget(m_saveState);
    m_savingBar->hide();
}

void MainWindow::onOpened()
{
    m_stack->setCurrentWidget(m_pages);
    m_pages->setCurrentWidget(m_benchPage);
    m_worklistDock->setVisible(m_worklistWanted);
    m_figuresDock->setVisible(m_figuresWanted);
    m_reshapeDock->setVisible(m_reshapeWanted);
    m_readingRows->end();
    m_worstWanted = m_tiers.measuring(); // of a large list only then
    showWorst();
    tell(tr("%1 opened.").arg(m_document.displayName()));
    showSaveState();
}

void MainWindow::onReadingRows(const QString& name, const ListSoFar& list)
{
    if (!m_worklistWanted)
        return;
    m_worklistDock->show();
    m_readingRows->showRows(name, list);
}

void MainWindow::onReadingOver()
{
    m_readingRows->end();
    if (m_document.empty())
        m_worklistDock->hide(); // the start page has the window to itself again
}

/// Styling the bench takes longer than a few frames. It is done bit by bit while the start page is looked at, so that opening has not to.
void MainWindow::polishAhead()
{
    constexpr int sliceMs = 4;
    QElapsedTimer clock;
    clock.start();
    while (!m_toPolish.isEmpty() && clock.elapsed() < sliceMs) {
        if (const QPointer<QWidget> next = m_toPolish.takeFirst())
            next->ensurePolished();
    }
    if (!m_toPolish.isEmpty())
        QTimer::singleShot(0, this, &MainWindow::polishAhead);
}

void MainWindow::showWorst()
{
    const int worst = m_tiers.worstTier();
    if (worst >= 0)
        m_bench.showTier(worst, m_document.tier(worst)->chosen.value_or(-1));
}

void MainWindow::tell(const QString& sentence)
{
    m_lastAction->setText(sentence);
    m_lastAction->setToolTip(sentence);
}

void MainWindow::showSaveState()
{
    const bool empty = m_document.empty();
    setWindowTitle(empty ? tr("Rungwright") : tr("%1[*] – Rungwright").arg(m_document.displayName()));
    if (!empty)
        setWindowModified(m_document.modified());
    if (empty)
        m_saveState->clear();
    else if (m_files->saving().writing())
        m_saveState->setText(tr("saving …"));
    else if (m_document.modified())
        m_saveState->setText(tr("not saved"));
    else
        m_saveState->setText(m_document.path().isEmpty() ? tr("sample, unchanged") : tr("saved"));
}

void MainWindow::showModelInUse()
{
    if (!m_bench.tierCase()) {
        m_modelInUse->clear();
        return;
    }
    const ModelSettings& s = m_bench.settings();
    QString said = modelName(s.kind);
    const auto left = m_bench.worked().odds.left;
    if (takesLeft(s.kind) && left)
        said = tr("%1, %2 left").arg(said).arg(*left);
    m_modelInUse->setText(said);
}

// What the actions call ----------------------------------------------------------------------------------------------

void MainWindow::showSheet(int candidate)
{
    if (!m_bench.tierCase())
        return;
    if (candidate >= 0)
        m_document.chooseCandidate(m_bench.tier(), candidate);
    auto* dialog = new SheetDialog(m_document, m_bench.tier(), candidate, m_questions, this);
    dialog->setAttribute(Qt::WA_DeleteOnClose);
    connect(dialog, &SheetDialog::told, this, &MainWindow::tell);
    connect(dialog, &SheetDialog::leftTheTool, this,
            [this, dialog, tier = m_bench.tier()] { m_document.recordSignedSheet(tier, dialog->handedOver()); });
    dialog->open();
}

void MainWindow::showRules()
{
    if (!m_bench.tierCase())
        return;
    auto* dialog = new RulesDialog(m_document.scenario(), m_bench.tierCase()->tier, this);
    dialog->setAttribute(Qt::WA_DeleteOnClose);
    connect(dialog, &QDialog::accepted, this, [this, dialog] {
        const auto changes = dialog->changes();
        if (changes.size() > 1)
            m_document.undoStack().beginMacro(tr("Change the price rules"));
        for (const RulesDialog::Change& change : changes) {
            if (change.rules)
                m_document.setRules(change.scope, *change.rules);
            else
                m_document.dropRules(change.scope);
        }
        if (changes.size() > 1)
            m_document.undoStack().endMacro();
    });
    dialog->open();
}

void MainWindow::savePicture()
{
    if (!m_bench.tierCase())
        return;
    const Tier& tier = m_bench.tierCase()->tier;
    const QString name = fileNameFrom({QString::fromStdString(tier.site), QString::fromStdString(tier.name), m_bench.candidateName()},
                                      QStringLiteral("png"));
    const QString chosen = m_questions.savePath(this, tr("Save a picture of the bench"), name, pictureFilter());
    if (chosen.isEmpty())
        return;
    const QString path = withSuffix(chosen, QStringLiteral("png"));
    const auto saved = renderBench(m_document, m_bench.tier(), m_bench.candidate(), path);
    if (saved.ok())
        tell(tr("Picture saved as %1. %2").arg(QFileInfo(path).fileName(), cautionText()));
    else
        m_questions.tell(this, tr("The picture could not be saved."), QString::fromStdString(saved.trouble()));
}

void MainWindow::editTierNote()
{
    const TierCase* tc = m_bench.tierCase();
    if (!tc)
        return;
    const QString note = m_questions.longText(this, tr("Note on %1").arg(QString::fromStdString(tc->tier.name)), tr("Note:"),
                                              QString::fromStdString(tc->note));
    if (!note.isNull())
        m_document.setTierNote(m_bench.tier(), note);
}

void MainWindow::editTierFloor()
{
    if (m_bench.tierCase())
        askFloor(m_document, m_bench.tier(), m_questions, this);
}

void MainWindow::editScenarioNote()
{
    if (m_document.empty())
        return;
    const QString note =
        m_questions.longText(this, tr("Note on the scenario"), tr("Note:"), QString::fromStdString(m_document.scenario().note));
    if (!note.isNull())
        m_document.setScenarioNote(note);
}

void MainWindow::showKeys() { m_questions.tell(this, tr("Keys and gestures"), keysText()); }

void MainWindow::showAbout() { m_questions.tell(this, tr("Rungwright %1").arg(QCoreApplication::applicationVersion()), aboutText()); }

void MainWindow::showBench() { m_pages->setCurrentWidget(m_benchPage); }

void MainWindow::showSideBySide() { m_pages->setCurrentWidget(m_sideBySide); }

void MainWindow::showPortfolio() { m_pages->setCurrentWidget(m_portfolio); }

void MainWindow::showTradeOff() { m_pages->setCurrentWidget(m_frontier); }

void MainWindow::showLeastChange()
{
    showBench();
    m_reshapeWanted = true;
    m_reshapeDock->show();
    m_reshapeDock->raise();
    m_reshape->showLeastChange();
}

void MainWindow::showShape()
{
    showLeastChange();
    m_reshape->showShape();
}

void MainWindow::showHistory() { m_pages->setCurrentWidget(m_history); }

void MainWindow::showSignOff() { m_pages->setCurrentWidget(m_signOff); }

void MainWindow::showThresholds()
{
    if (m_document.empty())
        return;
    auto* dialog = new FlagsDialog(m_tiers, this);
    dialog->setAttribute(Qt::WA_DeleteOnClose);
    connect(dialog, &QDialog::accepted, this, [this, dialog] { m_document.setFlagThresholds(dialog->thresholds()); });
    dialog->open();
}

void MainWindow::showWorklistExport()
{
    auto* dialog = new WorklistExportDialog(m_tiers, m_worklist->model().arrangement().tiers, m_questions, this);
    dialog->setAttribute(Qt::WA_DeleteOnClose);
    connect(dialog, &WorklistExportDialog::told, this, &MainWindow::tell);
    dialog->open();
}

// Window -------------------------------------------------------------------------------------------------------------

void MainWindow::resetLayout()
{
    addDockWidget(Qt::LeftDockWidgetArea, m_worklistDock);
    addDockWidget(Qt::RightDockWidgetArea, m_figuresDock);
    addDockWidget(Qt::RightDockWidgetArea, m_reshapeDock);
    tabifyDockWidget(m_figuresDock, m_reshapeDock);
    m_figuresDock->raise();
    m_worklistWanted = m_figuresWanted = m_reshapeWanted = true;
    m_worklistDock->setVisible(!m_document.empty());
    m_figuresDock->setVisible(!m_document.empty());
    m_reshapeDock->setVisible(!m_document.empty());
    const bool narrow = width() < kNarrow;
    resizeDocks({m_worklistDock, m_figuresDock}, narrow ? QList<int>{300, 320} : QList<int>{404, 340}, Qt::Horizontal);
    if (!m_document.empty())
        showDocksForPage();
}

void MainWindow::restoreLayout()
{
    if (restoreGeometry(m_settings.value(kGeometry).toByteArray())) {
        if (!restoreState(m_settings.value(kLayout).toByteArray(), kLayoutVersion))
            resetLayout(); // of an earlier version, with other docks
        m_worklist->restoreColumns(m_settings.value(kColumns).toByteArray());
    } else {
        const QSize screen = this->screen()->availableSize();
        resize(QSize(1440, 900).boundedTo(screen));
        resetLayout();
    }
    m_worklistWanted = m_settings.value(kWorklistWanted, true).toBool();
    m_figuresWanted = m_settings.value(kFiguresWanted, true).toBool();
    m_reshapeWanted = m_settings.value(kReshapeWanted, true).toBool();
    // Nothing is open yet: the start page has the window to itself.
    m_worklistDock->hide();
    m_figuresDock->hide();
    m_reshapeDock->hide();
}

void MainWindow::closeEvent(QCloseEvent* event)
{
    m_bench.giveUpGesture();
    m_files->cancelLoading();
    if (!m_files->mayLeave()) {
        event->ignore();
        return;
    }
    m_files->leave();
    m_pages->setCurrentWidget(m_benchPage); // the layout to remember is the bench's
    m_settings.setValue(kGeometry, saveGeometry());
    m_settings.setValue(kLayout, saveState(kLayoutVersion));
    m_settings.setValue(kWorklistWanted, m_worklistWanted);
    m_settings.setValue(kFiguresWanted, m_figuresWanted);
    m_settings.setValue(kReshapeWanted, m_reshapeWanted);
    m_settings.setValue(kColumns, m_worklist->saveColumns());
    event->accept();
}

void MainWindow::dragEnterEvent(QDragEnterEvent* event)
{
    const QList<QUrl> urls = event->mimeData()->urls();
    if (urls.size() == 1 && urls.first().isLocalFile())
        event->acceptProposedAction();
}

void MainWindow::dropEvent(QDropEvent* event)
{
    event->acceptProposedAction();
    const QString path = event->mimeData()->urls().first().toLocalFile();
    // The sender waits until this returns; questions come after.
    QMetaObject::invokeMethod(
        this, [this, path] { openFile(path); }, Qt::QueuedConnection);
}

} // namespace rungwright
