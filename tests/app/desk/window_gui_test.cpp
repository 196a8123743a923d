// SPDX-License-Identifier: GPL-3.0-or-later
// The window as a whole: start page, worklist, candidates, every sample and edge case, remembered layout, names for those who cannot see
// it.
#include "candidates_model.h"
#include "desk_fixture.h"
#include "worklist_model.h"
#include "worklist_panel.h"

#include <QAbstractItemModelTester>
#include <QDockWidget>
#include <QLineEdit>
#include <QListView>
#include <QPushButton>
#include <QToolButton>

using namespace rungwright;

class WindowGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void init() { m_desk = std::make_unique<DeskFixture>(); }
    void cleanup() { m_desk.reset(); }

    void beginsWithThreeWays();
    void opensOnTheWorstTier();
    void filterAndKeysWalkTheWorklist();
    void candidatesAreCopiedRenamedDiscarded();
    void modelsAreSound();
    void everyTierOfEverySampleShows();
    void layoutIsRemembered();
    void everythingHasAName();

private:
    DeskFixture& desk() { return *m_desk; }
    QTableView& worklist() { return desk().child<QTableView>("worklistTable"); }
    std::unique_ptr<DeskFixture> m_desk;
};

void WindowGuiTest::beginsWithThreeWays()
{
    QVERIFY(desk().child<QPushButton>("startSample").isVisible());
    QVERIFY(desk().child<QPushButton>("startImport").isVisible());
    QVERIFY(desk().child<QPushButton>("startOpen").isVisible());
    QVERIFY(!desk().window->worklistDock().isVisible());
    QTest::mouseClick(&desk().child<QPushButton>("startSample"), Qt::LeftButton);
    QTRY_VERIFY(desk().bench().tierCase());
    QVERIFY(desk().window->worklistDock().isVisible());
    QVERIFY(desk().ladder().isVisible());
    QVERIFY(!desk().window->document().modified());
}

void WindowGuiTest::opensOnTheWorstTier()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    const auto& scenario = desk().window->document().scenario();
    double worst = 0;
    int at = -1;
    for (std::size_t i = 0; i < scenario.tiers.size(); ++i) {
        const TierCase& tc = scenario.tiers[i];
        const auto share = measured(tc.tier, askingPrices(tc.tier.units), tc.model).gap.gapShare;
        if (share && *share > worst) {
            worst = *share;
            at = static_cast<int>(i);
        }
    }
    QCOMPARE(desk().bench().tier(), at);
    QCOMPARE(worklist().currentIndex().row(), 0); // sorted: worst first
}

void WindowGuiTest::filterAndKeysWalkTheWorklist()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    const int all = worklist().model()->rowCount();
    QCOMPARE(all, 6);
    const int first = desk().bench().tier();
    QTest::keyClick(desk().window.get(), Qt::Key_Down, Qt::AltModifier);
    QVERIFY(desk().bench().tier() != first);
    QTest::keyClick(desk().window.get(), Qt::Key_Up, Qt::AltModifier);
    QCOMPARE(desk().bench().tier(), first);
    QTest::keyClick(desk().window.get(), Qt::Key_F, Qt::ControlModifier);
    auto& filter = desk().child<QLineEdit>("worklistFilter");
    QTest::keyClicks(&filter, QStringLiteral("leans left"));
    const int found = worklist().model()->rowCount();
    QVERIFY(found > 0 && found < all);
    filter.clear();
    QTest::keyClicks(&filter, QStringLiteral("no such tier"));
    QCOMPARE(worklist().model()->rowCount(), 0);
    QTest::keyClick(desk().window.get(), Qt::Key_Down, Qt::AltModifier); // harmless
    filter.clear();
    QCOMPARE(worklist().model()->rowCount(), all);
    for (int column = 0; column < worklist().model()->columnCount(); ++column) {
        worklist().sortByColumn(column, Qt::AscendingOrder);
        worklist().sortByColumn(column, Qt::DescendingOrder);
    }
    QCOMPARE(worklist().model()->rowCount(), all);
}

void WindowGuiTest::candidatesAreCopiedRenamedDiscarded()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    const int before = static_cast<int>(desk().bench().tierCase()->candidates.size());
    QTest::mouseClick(&desk().child<QToolButton>("copyCandidateButton"), Qt::LeftButton);
    QCOMPARE(static_cast<int>(desk().bench().tierCase()->candidates.size()), before + 1);
    QCOMPARE(desk().bench().candidate(), before);
    desk().questions.texts = {QString::fromLatin1(kCurrentName.data()), QStringLiteral("Gentle slope")};
    QTest::mouseClick(&desk().child<QToolButton>("renameCandidateButton"), Qt::LeftButton);
    QCOMPARE(desk().bench().candidateName(), QStringLiteral("Gentle slope"));
    auto& list = desk().child<QListView>("candidatesList");
    QCOMPARE(list.currentIndex().row(), CandidatesModel::rowOf(before));
    QTest::mouseClick(list.viewport(), Qt::LeftButton, {}, list.visualRect(list.model()->index(0, 0)).center());
    QCOMPARE(desk().bench().candidate(), -1);
    desk().bench().workOn(before);
    QTest::mouseClick(&desk().child<QToolButton>("discardCandidateButton"), Qt::LeftButton);
    QCOMPARE(static_cast<int>(desk().bench().tierCase()->candidates.size()), before);
    QTest::keyClick(desk().window.get(), Qt::Key_Z, Qt::ControlModifier);
    QCOMPARE(desk().bench().candidateName(), QStringLiteral("Gentle slope"));
}

void WindowGuiTest::modelsAreSound()
{
    Document& document = desk().window->document();
    Worklist list(document);
    WorklistModel worklistModel(list);
    FiguresModel figures(desk().bench());
    CandidatesModel candidates(desk().bench());
    const auto mode = QAbstractItemModelTester::FailureReportingMode::QtTest;
    QAbstractItemModelTester a(&worklistModel, mode);
    QAbstractItemModelTester b(&figures, mode);
    QAbstractItemModelTester c(&candidates, mode);
    QVERIFY(desk().open(desk().sample("edge-cases.rungs.json")));
    for (int tier = 0; tier < worklistModel.rowCount(); ++tier)
        desk().bench().showTier(tier);
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    document.copyCandidate(0, -1);
    document.setModel(0, {ModelKind::remainder, 2, {}}, QStringLiteral("m"));
    document.undoStack().undo();
    document.undoStack().undo();
    document.begin(Scenario{}, {}, true);
}

void WindowGuiTest::everyTierOfEverySampleShows()
{
    // All warnings but the offscreen platform's own.
    QTest::failOnWarning(QRegularExpression(QStringLiteral("^(?!This plugin does not support propagateSizeHints).")));
    for (const char* name :
         {"quillmere-storage.rungs.json", "kumonoura-berths.rungs.json", "rimalin-studios.rungs.json", "edge-cases.rungs.json"}) {
        QVERIFY(desk().open(desk().sample(name)));
        QVERIFY2(desk().questions.told.isEmpty() && desk().questions.asked.isEmpty(), name);
        const int tiers = static_cast<int>(desk().window->document().scenario().tiers.size());
        for (int tier = 0; tier < tiers; ++tier) {
            const int candidates = static_cast<int>(desk().window->document().tier(tier)->candidates.size());
            for (int candidate = -1; candidate < candidates; ++candidate) {
                desk().bench().showTier(tier, candidate);
                for (const ModelKind kind : kModels) {
                    desk().window->document().setModel(tier, {kind, {}, {}}, QStringLiteral("model"));
                    QCoreApplication::processEvents();
                    const QString sentence = desk().child<QLabel>("readingSentence").text();
                    QVERIFY(!sentence.isEmpty());
                    QVERIFY2(!sentence.contains(QStringLiteral("nan")) && !sentence.contains(QStringLiteral("inf,")), qPrintable(sentence));
                    QVERIFY(!desk().ladder().accessibleDescription().isEmpty());
                }
            }
        }
        while (desk().window->document().undoStack().canUndo())
            desk().window->document().undoStack().undo();
    }
}

void WindowGuiTest::layoutIsRemembered()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    desk().window->figuresDock().close();
    desk().window->resize(1300, 800);
    QVERIFY(desk().window->close());
    MainWindow again(desk().questions, desk().settings, desk().folder.filePath(QStringLiteral("state")));
    QCOMPARE(again.size(), QSize(1300, 800));
}

void WindowGuiTest::everythingHasAName()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    int checked = 0;
    for (const QWidget* widget : desk().window->findChildren<QWidget*>()) {
        const bool internal =
            widget->objectName().startsWith(QStringLiteral("qt_")) || widget->objectName().startsWith(QStringLiteral("ScrollLeft"));
        if (internal || !widget->isVisible() || widget->focusPolicy() == Qt::NoFocus)
            continue;
        const bool named = !widget->accessibleName().isEmpty() || !widget->property("text").toString().isEmpty() ||
                           widget->metaObject()->className() == QByteArray("QTabBar") ||
                           widget->metaObject()->className() == QByteArray("QTabWidget") ||
                           (widget->parentWidget() && widget->parentWidget()->inherits("QAbstractSpinBox"));
        QVERIFY2(named, qPrintable(QString::fromLatin1(widget->metaObject()->className()) + QLatin1Char(' ') + widget->objectName()));
        ++checked;
    }
    QVERIFY(checked > 8);
}

QTEST_MAIN(WindowGuiTest)
#include "window_gui_test.moc"
