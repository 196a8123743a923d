// SPDX-License-Identifier: GPL-3.0-or-later
// Gestures on the bench give what core gives for the same prices, and one undo step each.
#include "workbench.h"

#include "invented_tier.h"
#include "refresh.h"
#include "scenario_json.h"

#include <QSignalSpy>
#include <QTest>

using namespace rungwright;

class WorkbenchTest : public QObject
{
    Q_OBJECT
private slots:
    void dragShowsCoresGapWhileItMoves();
    void escLeavesNoTrace();
    void columnsStayDuringADrag();
    void selectionMovesTogether();
    void lockedUnitsStay();
    void bendLowersTheMiddle();
    void heldTotalIsHeld();
    void leftIsDraggedAsOneStep();
    void nudgesAreOneStepAndSayWhenTheyEnd();
    void undoGoesWhereItHappened();
    void undoInTheMiddleOfADragIsSafe();
    void aRefreshKeepsTheTierOnTheBench();
    void aTierThatLeftComesBackToTheBench();
    void marksDoNotInterruptADrag();
    void aFloorIsMeasuredAnew();
    void emptyDocumentIsHarmless();
    void aTrialIsShownAndKeptAsACandidate();
    void aTrialGivenUpLeavesNoTrace();
    void typedPriceIsHeldInsideTheRules();
};

namespace
{

double gapOf(const Workbench& bench) { return measured(bench.tierCase()->tier, bench.workedPrices(), bench.settings()).gap.gap.value(); }

} // namespace

void WorkbenchTest::dragShowsCoresGapWhileItMoves()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    bench.showTier(0);
    QSignalSpy moving(&bench, &Workbench::moving);
    QVERIFY(bench.beginMove({0}));
    for (const int by : {-50, -130, -400}) {
        bench.moveBy(Price{by});
        QCOMPARE(bench.worked().gap.gap.value(), gapOf(bench));
    }
    QCOMPARE(moving.count(), 3);
    QCOMPARE(bench.workedPrices()[0], Price{5600});
    QVERIFY(document.tier(0)->candidates.empty()); // nothing is written before the release
    bench.finishGesture();
    QCOMPARE(document.undoStack().count(), 1);
    QCOMPARE(document.undoStack().undoText(), QStringLiteral("B-10: 60.00 to 56.00"));
    QCOMPARE(bench.candidate(), 0);
    QVERIFY(bench.worked().gap.gap.value() < bench.current().gap.gap.value());
}

void WorkbenchTest::escLeavesNoTrace()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    const QByteArray before = scenarioToJson(document.scenario());
    const double gap = bench.worked().gap.gap.value();
    QVERIFY(bench.beginMove({0, 1}));
    bench.moveBy(Price{-300});
    bench.giveUpGesture();
    QCOMPARE(bench.worked().gap.gap.value(), gap);
    QCOMPARE(scenarioToJson(document.scenario()), before);
    QCOMPARE(document.undoStack().count(), 0);
}

void WorkbenchTest::columnsStayDuringADrag()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    const std::vector<std::uint32_t> before(bench.columns().begin(), bench.columns().end());
    QVERIFY(bench.beginMove({0}));
    bench.moveBy(Price{2300});
    QVERIFY(std::equal(before.begin(), before.end(), bench.columns().begin()));
    bench.finishGesture();
    QCOMPARE(bench.columns()[0], 1u); // it has slid to its new place
}

void WorkbenchTest::selectionMovesTogether()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    bench.select({4, 1, 3, 1});
    QCOMPARE(bench.selection().size(), std::size_t(3));
    QVERIFY(bench.beginMove({bench.selection().begin(), bench.selection().end()}));
    bench.moveBy(Price{-250});
    bench.finishGesture();
    for (const std::uint32_t unit : {1u, 3u, 4u})
        QCOMPARE(bench.workedPrices()[unit], bench.currentPrices()[unit] - Price{250});
    QCOMPARE(document.undoStack().undoText(), QStringLiteral("3 units: by %1").arg(QChar(0x2212)) + QStringLiteral("2.50"));
}

void WorkbenchTest::lockedUnitsStay()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    QSignalSpy told(&bench, &Workbench::told);
    bench.select({1});
    bench.toggleLock();
    QVERIFY(document.tier(0)->tier.units[1].locked);
    QVERIFY(!bench.beginMove({1}));
    QCOMPARE(told.count(), 1);
    QVERIFY(bench.beginMove({1, 3}));
    bench.moveBy(Price{-500});
    bench.finishGesture();
    QCOMPARE(bench.workedPrices()[1], bench.currentPrices()[1]);
    QCOMPARE(bench.workedPrices()[3], bench.currentPrices()[3] - Price{500});
}

void WorkbenchTest::bendLowersTheMiddle()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    const double gap = bench.worked().gap.gap.value();
    QVERIFY(bench.beginBend());
    bench.bendTo(1.6);
    bench.finishGesture();
    QCOMPARE(document.undoStack().count(), 1);
    QCOMPARE(bench.workedPrices()[0], bench.currentPrices()[0]);
    QCOMPARE(bench.workedPrices()[10], bench.currentPrices()[10]); // the dearest rentable unit; the closed one takes no part
    QCOMPARE(bench.workedPrices()[11], bench.currentPrices()[11]);
    for (std::uint32_t unit = 1; unit < 10; ++unit)
        QVERIFY(bench.workedPrices()[unit] < bench.currentPrices()[unit]);
    QVERIFY(bench.worked().gap.gap.value() < gap);
}

void WorkbenchTest::heldTotalIsHeld()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    bench.setHoldTotal(true);
    QVERIFY(bench.beginMove({0}));
    bench.moveBy(Price{-400});
    QCOMPARE(bench.worked().figures.total, bench.current().figures.total);
    QCOMPARE(bench.leftOver(), Price{0});
    bench.finishGesture();
    QCOMPARE(document.undoStack().count(), 1);
    QCOMPARE(bench.worked().figures.total, bench.current().figures.total);

    // With everything else locked there is no room, and the tool says so.
    QSignalSpy told(&bench, &Workbench::told);
    std::vector<std::uint32_t> others;
    for (std::uint32_t unit = 1; unit < 12; ++unit)
        others.push_back(unit);
    document.setLocked(0, others, true);
    QVERIFY(bench.beginMove({0}));
    bench.moveBy(Price{-100});
    QCOMPARE(bench.leftOver(), Price{-100});
    bench.finishGesture();
    QVERIFY(told.count() >= 1);
    QVERIFY(told.first().first().toString().contains(QStringLiteral("no room left")));
}

void WorkbenchTest::leftIsDraggedAsOneStep()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    QVERIFY(bench.beginLeft());
    bench.leftTo(5);
    bench.leftTo(3);
    bench.leftTo(-7);
    QCOMPARE(bench.settings().left, std::optional<int>(1));
    bench.leftTo(3);
    QCOMPARE(bench.worked().gap.gap.value(), gapOf(bench));
    bench.finishGesture();
    QCOMPARE(document.tier(0)->model.left, std::optional<int>(3));
    QCOMPARE(document.undoStack().count(), 1);
    document.setModel(0, {ModelKind::onHand, {}, {}}, QStringLiteral("on hand"));
    QVERIFY(!bench.beginLeft());
}

void WorkbenchTest::nudgesAreOneStepAndSayWhenTheyEnd()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    document.copyCandidate(0, -1);
    PriceRules rules = document.scenario().rules;
    rules.greatestChange = Price{150};
    document.setRules(rules);
    const int before = document.undoStack().count();
    bench.select({0});
    QSignalSpy told(&bench, &Workbench::told);
    for (int i = 0; i < 3; ++i)
        bench.nudge(-1);
    QCOMPARE(bench.workedPrices()[0], Price{5850});
    QCOMPARE(document.undoStack().count(), before + 1);
    bench.nudge(-1);
    QCOMPARE(bench.workedPrices()[0], Price{5850});
    QVERIFY(told.last().first().toString().startsWith(QStringLiteral("No further")));
}

void WorkbenchTest::undoGoesWhereItHappened()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    bench.showTier(0);
    QVERIFY(bench.beginMove({0}));
    bench.moveBy(Price{-100});
    bench.finishGesture();
    bench.showTier(1);
    document.undoStack().undo();
    QCOMPARE(bench.tier(), 0);
    QCOMPARE(bench.candidate(), -1);
    document.undoStack().redo();
    QCOMPARE(bench.candidate(), 0);
}

void WorkbenchTest::undoInTheMiddleOfADragIsSafe()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    QVERIFY(bench.beginMove({0}));
    bench.moveBy(Price{-100});
    bench.finishGesture(); // makes the candidate
    QVERIFY(bench.beginMove({1}));
    bench.moveBy(Price{-100});
    document.undoStack().undo(); // takes it away under the hand
    QCOMPARE(bench.gesture(), Workbench::Gesture::none);
    QCOMPARE(bench.candidate(), -1);
    QVERIFY(std::equal(bench.workedPrices().begin(), bench.workedPrices().end(), bench.currentPrices().begin()));
    bench.finishGesture();
    QVERIFY(document.tier(0)->candidates.empty());
    bench.select({3, 400}); // a unit that is not there
    QCOMPARE(bench.selection().size(), std::size_t(1));
}

void WorkbenchTest::aRefreshKeepsTheTierOnTheBench()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    document.copyCandidate(1, -1);
    bench.showTier(1, 0);
    bench.select({3, 4});
    RefreshPlan plan;
    plan.currency = document.scenario().currency;
    plan.before = document.scenario().tiers;
    plan.after.push_back(document.scenario().tiers[1]); // the first tier is gone
    plan.after[0].tier.units[0].asking = Price{5900};
    plan.after[0].candidates[0].prices[0] = Price{5900};
    QVERIFY(document.refresh(plan, QStringLiteral("a.csv")));
    QCOMPARE(bench.tier(), 0);
    QCOMPARE(bench.tierCase()->tier.name, std::string("Room 3-5"));
    QCOMPARE(bench.candidate(), 0);
    QCOMPARE(bench.currentPrices()[0], Price{5900});
    QVERIFY(bench.selection().empty());
    document.undoStack().undo();
    QCOMPARE(bench.tier(), 1);
    QCOMPARE(bench.candidate(), 0);
    QCOMPARE(bench.currentPrices()[0], Price{6000});
    bench.showTier(0);
    document.undoStack().redo(); // the tier on the bench leaves: another takes its place
    QCOMPARE(bench.tier(), 0);
    QCOMPARE(bench.candidate(), -1);
    QCOMPARE(bench.tierCase()->tier.name, std::string("Room 3-5"));
}

void WorkbenchTest::aTierThatLeftComesBackToTheBench()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    document.copyCandidate(1, -1);
    const std::string gone = document.scenario().tiers[1].tier.name;
    bench.showTier(1, 0);
    RefreshPlan plan;
    plan.currency = document.scenario().currency;
    plan.before = document.scenario().tiers;
    plan.after.push_back(document.scenario().tiers[0]);
    QVERIFY(document.refresh(plan, QStringLiteral("a.csv")));
    QCOMPARE(bench.tier(), 0);
    QCOMPARE(bench.candidate(), -1);
    bench.workOn(-1);
    document.setFloor(0, Price{4200}); // an edit of the tier that took its place chooses no tier
    document.undoStack().undo();
    document.undoStack().undo();
    QCOMPARE(bench.tier(), 1);
    QCOMPARE(bench.tierCase()->tier.name, gone);
    QCOMPARE(bench.candidate(), 0);
    document.undoStack().redo();
    QCOMPARE(bench.tier(), 0);
    document.undoStack().undo();
    QCOMPARE(bench.tier(), 1);
    // What the user chooses meanwhile counts.
    bench.showTier(0);
    bench.showTier(1, 0);
    document.undoStack().redo();
    QCOMPARE(bench.tier(), 0);
    bench.showTier(-1);
    bench.showTier(0);
    document.undoStack().undo();
    QCOMPARE(bench.tier(), 0);
    QVERIFY(bench.tierCase()->tier.name != gone);
}

void WorkbenchTest::marksDoNotInterruptADrag()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    QVERIFY(bench.beginMove({0}));
    bench.moveBy(Price{-200});
    document.setSeen(1, true);
    document.setFlagThresholds({0.0, 1, 0.5});
    document.recordSignedSheet(1, {"current", "2026-12-01T09:30:00Z", {}});
    QCOMPARE(bench.gesture(), Workbench::Gesture::move);
    QCOMPARE(bench.workedPrices()[0], Price{5800});
    bench.finishGesture();
    QCOMPARE(bench.workedPrices()[0], Price{5800});
}

void WorkbenchTest::aFloorIsMeasuredAnew()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    const double gap = bench.worked().gap.gap.value();
    document.setFloor(0, Price{5000});
    QVERIFY(qAbs(bench.worked().gap.gap.value() - (gap + 500)) < 1e-9); // rounding of two differences of amounts near 10^4
    document.setFloor(0, Price{});
    QVERIFY(!bench.worked().gap.gap);
    document.undoStack().undo();
    document.undoStack().undo();
    QCOMPARE(bench.worked().gap.gap.value(), gap);
}

void WorkbenchTest::emptyDocumentIsHarmless()
{
    Document document;
    Workbench bench(document);
    QCOMPARE(bench.tier(), -1);
    QVERIFY(!bench.beginMove({}));
    QVERIFY(!bench.beginBend());
    QVERIFY(!bench.beginLeft());
    QVERIFY(!bench.beginTrial(QStringLiteral("Nothing")));
    bench.nudge(1);
    bench.toggleLock();
    bench.finishGesture();
    bench.giveUpGesture();
    document.begin(Scenario{}, {}, true);
    QCOMPARE(bench.tier(), -1);
    QVERIFY(bench.columns().empty());
}

void WorkbenchTest::typedPriceIsHeldInsideTheRules()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    PriceRules rules = document.scenario().rules;
    rules.ceiling = Price{9000};
    document.setRules(rules);
    bench.setPrice(0, Price{12345});
    QCOMPARE(bench.workedPrices()[0], Price{9000});
    bench.setPrice(0, Price{6120});
    QCOMPARE(bench.workedPrices()[0], Price{6100}); // the nearest price point
}

void WorkbenchTest::aTrialIsShownAndKeptAsACandidate()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    bench.showTier(0);
    // Even while another candidate is worked on, what is kept becomes one of its own.
    bench.setPrice(3, Price{7000});
    QCOMPARE(bench.candidate(), 0);
    const std::vector<Price> first = document.tier(0)->candidates.at(0).prices;
    const std::vector<std::uint32_t> columns(bench.columns().begin(), bench.columns().end());
    QSignalSpy moving(&bench, &Workbench::moving);
    QVERIFY(bench.beginTrial(QStringLiteral("Least change: gap at most 6.00")));
    std::vector<Price> prices = askingPrices(bench.tierCase()->tier.units);
    for (const int by : {-100, -300, -500}) {
        prices[0] = Price{6000 + by};
        prices[9] = Price{10500 - by};
        bench.tryPrices(prices);
        QCOMPARE(bench.worked().gap.gap.value(), gapOf(bench));
        QVERIFY(std::equal(prices.begin(), prices.end(), bench.workedPrices().begin(), bench.workedPrices().end()));
        QVERIFY(std::equal(columns.begin(), columns.end(), bench.columns().begin(), bench.columns().end()));
    }
    QCOMPARE(moving.count(), 3);
    QCOMPARE(document.tier(0)->candidates.size(), std::size_t(1));
    QVERIFY(bench.beginTrial(QStringLiteral("Least change: gap at most 5.00"))); // the slider went on
    QCOMPARE(bench.workedPrices()[0], Price{5500});
    bench.finishGesture();
    QCOMPARE(document.undoStack().count(), 2);
    QCOMPARE(document.undoStack().undoText(), QStringLiteral("Least change: gap at most 5.00"));
    QCOMPARE(document.tier(0)->candidates.size(), std::size_t(2));
    QCOMPARE(document.tier(0)->candidates[0].prices, first);
    QCOMPARE(document.tier(0)->candidates[1].prices, prices);
    QCOMPARE(bench.candidate(), 1);
    document.undoStack().undo();
    QCOMPARE(document.tier(0)->candidates.size(), std::size_t(1));
}

void WorkbenchTest::aTrialGivenUpLeavesNoTrace()
{
    Document document;
    Workbench bench(document);
    document.begin(inventedScenario(), {}, true);
    bench.showTier(0);
    const double before = bench.worked().gap.gap.value();
    std::vector<Price> prices = askingPrices(bench.tierCase()->tier.units);
    QVERIFY(bench.beginTrial(QStringLiteral("Even steps")));
    // Today's prices are nothing to keep.
    bench.finishGesture();
    QCOMPARE(document.undoStack().count(), 0);
    QVERIFY(bench.beginTrial(QStringLiteral("Even steps")));
    prices[0] = Price{5500};
    bench.tryPrices(prices);
    QVERIFY(bench.worked().gap.gap.value() != before);
    bench.giveUpGesture();
    QCOMPARE(bench.worked().gap.gap.value(), before);
    QCOMPARE(document.undoStack().count(), 0);
    bench.tryPrices(prices); // too late
    QCOMPARE(bench.worked().gap.gap.value(), before);
    // An edit from elsewhere ends it.
    QVERIFY(bench.beginTrial(QStringLiteral("Even steps")));
    bench.tryPrices(prices);
    document.setFloor(0, Price{5000});
    QCOMPARE(bench.gesture(), Workbench::Gesture::none);
    QCOMPARE(bench.workedPrices()[0], Price{6000});
}

QTEST_GUILESS_MAIN(WorkbenchTest)
#include "workbench_test.moc"
