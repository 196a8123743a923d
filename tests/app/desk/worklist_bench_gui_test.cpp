// SPDX-License-Identifier: GPL-3.0-or-later
// What worklist, portfolio picture and bench do to each other, by mouse, keys, filter and refresh.
#include "portfolio_plot.h"
#include "refresh.h"
#include "worklist_fixture.h"

#include <QTabWidget>
#include <QToolButton>

using namespace rungwright;

class WorklistBenchGuiTest : public WorklistFixture
{
    Q_OBJECT
private slots:
    void init() { start(); }
    void cleanup() { end(); }

    void boxInThePortfolioFiltersAndEscClears();
    void clickInThePortfolioOpensTheBench();
    void aTierHiddenByTheFilterIsTheOneMarked();
    void aRefreshSelectsWhatIsOnTheBench_data();
    void aRefreshSelectsWhatIsOnTheBench();
};

void WorklistBenchGuiTest::boxInThePortfolioFiltersAndEscClears()
{
    begin(150);
    key(Qt::Key_3, Qt::ControlModifier);
    auto& plot = desk().child<PortfolioPlot>("portfolioPlot");
    QTRY_VERIFY(plot.isVisible());
    QCoreApplication::processEvents();
    const QPoint from = plot.area().topLeft().toPoint() + QPoint(2, 2);
    const QPoint to = plot.area().center().toPoint();
    DeskFixture::drag(plot, from, to);
    const int picked = model().list().pickedCount();
    QVERIFY(picked > 2 && picked < 150);
    QCOMPARE(model().rowCount(), picked);
    auto& chip = desk().child<QToolButton>("pickedChip");
    QVERIFY(chip.isVisible());
    QVERIFY(chip.text().contains(QString::number(picked)));
    QTest::keyClick(&plot, Qt::Key_Escape);
    QCOMPARE(model().rowCount(), 150);
    QVERIFY(!chip.isVisible());
    DeskFixture::drag(plot, from, to);
    QCOMPARE(model().rowCount(), picked);
    QTest::mouseClick(&chip, Qt::LeftButton);
    QCOMPARE(model().rowCount(), 150);
}

void WorklistBenchGuiTest::clickInThePortfolioOpensTheBench()
{
    begin(60);
    key(Qt::Key_3, Qt::ControlModifier);
    auto& plot = desk().child<PortfolioPlot>("portfolioPlot");
    QTRY_VERIFY(plot.isVisible());
    QCoreApplication::processEvents();
    const int tier = plot.points().points[7].tier;
    const QPoint at = plot.placeOf(tier).toPoint();
    QTest::mouseMove(&plot, at);
    QTest::mouseClick(&plot, Qt::LeftButton, {}, at);
    // Another may lie nearer to that pixel; it is the one the picture names.
    const int found = plot.points().points[static_cast<std::size_t>(plot.shape().nearest(at, 9))].tier;
    QCOMPARE(desk().bench().tier(), found);
    QCOMPARE(model().tierAt(table().currentIndex().row()), found);
    QCOMPARE(desk().child<QTabWidget>("pages").currentWidget()->objectName(), QStringLiteral("benchPage"));
}

void WorklistBenchGuiTest::aTierHiddenByTheFilterIsTheOneMarked()
{
    begin(60);
    WorklistWish wish = model().wish();
    wish.setWords(QStringLiteral("15"));
    model().setWish(wish);
    QVERIFY(model().rowCount() > 1 && model().rowCount() < 60);
    const int shown = model().tierAt(0);
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::gapColumn));
    QCOMPARE(desk().bench().tier(), shown);
    key(Qt::Key_3, Qt::ControlModifier);
    auto& plot = desk().child<PortfolioPlot>("portfolioPlot");
    QTRY_VERIFY(plot.isVisible());
    QCoreApplication::processEvents();
    int hidden = -1;
    for (const PortfolioPoint& p : plot.points().points) {
        const int nearest = plot.shape().nearest(plot.placeOf(p.tier).toPoint(), 9);
        if (model().rowOf({p.tier, 0}) < 0 && plot.points().points[static_cast<std::size_t>(nearest)].tier == p.tier)
            hidden = p.tier;
    }
    QVERIFY(hidden >= 0);
    QTest::mouseClick(&plot, Qt::LeftButton, {}, plot.placeOf(hidden).toPoint());
    QCOMPARE(desk().bench().tier(), hidden);
    QVERIFY(!table().currentIndex().isValid());
    QVERIFY(panel().selectedTiers().empty());
    key(Qt::Key_M, Qt::ControlModifier);
    QVERIFY(document().tier(hidden)->seen);
    QVERIFY(!document().tier(shown)->seen);
    // The one that was selected can be had again by a click.
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::gapColumn));
    QCOMPARE(desk().bench().tier(), shown);
    // An edit of a hidden tier leads there too; and the keys go on from where they were.
    document().setFloor(hidden, Price{1234});
    QCOMPARE(desk().bench().tier(), hidden);
    QVERIFY(panel().selectedTiers().empty());
    key(Qt::Key_Down, Qt::AltModifier);
    QCOMPARE(desk().bench().tier(), shown);
    // While the bench stays with a hidden tier, a site that is selected stays so.
    panel().setGrouped(true);
    panel().foldAll(true);
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::gapColumn));
    const std::vector<int> ofSite = panel().selectedTiers();
    QVERIFY(!ofSite.empty());
    desk().bench().setHoldTotal(!desk().bench().holdsTotal());
    QCOMPARE(panel().selectedTiers(), ofSite);
}

void WorklistBenchGuiTest::aRefreshSelectsWhatIsOnTheBench_data()
{
    QTest::addColumn<QString>("words");
    QTest::addColumn<bool>("isShown");
    QTest::newRow("all shown") << QString() << true;
    QTest::newRow("shown by the filter") << QStringLiteral("3") << true;
    QTest::newRow("hidden; the next tier is shown") << QStringLiteral("5") << false;
}

void WorklistBenchGuiTest::aRefreshSelectsWhatIsOnTheBench()
{
    QFETCH(QString, words);
    QFETCH(bool, isShown);
    begin(8); // one site, Room 1 m² to Room 15 m²
    WorklistWish wish = model().wish();
    wish.setWords(words);
    model().setWish(wish);
    desk().bench().showTier(1); // Room 3 m²
    QCOMPARE(model().rowOf({1, 0}) >= 0, isShown);
    RefreshPlan plan;
    plan.currency = document().scenario().currency;
    plan.before = document().scenario().tiers;
    for (std::size_t i = 1; i < plan.before.size(); ++i)
        plan.after.push_back(plan.before[i]);
    QVERIFY(document().refresh(plan, QStringLiteral("a.csv")));
    for (const int tier : {0, 1, 0}) { // then undone, and done again
        QCOMPARE(desk().bench().tier(), tier);
        QCOMPARE(desk().bench().tierCase()->tier.name, std::string("Room 3 m²"));
        QCOMPARE(table().currentIndex().isValid(), isShown);
        QCOMPARE(panel().selectedTiers(), isShown ? std::vector{tier} : std::vector<int>());
        if (tier == 0)
            document().undoStack().undo();
        else
            document().undoStack().redo();
    }
}

QTEST_MAIN(WorklistBenchGuiTest)
#include "worklist_bench_gui_test.moc"
