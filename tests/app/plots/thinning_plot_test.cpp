// SPDX-License-Identifier: GPL-3.0-or-later
// The thinning plot's marker by mouse and keys.
#include "plot_fixture.h"
#include "wording.h"

#include <QSignalSpy>

using namespace rungwright;

class ThinningPlotTest : public QObject
{
    Q_OBJECT

private:
    static Scenario plain(ModelKind kind = ModelKind::perceived)
    {
        Scenario scenario = invented::scenarioOf(invented::leaningTier(38, Price{6900}, 6100));
        scenario.tiers.front().model.kind = kind;
        return scenario;
    }

private slots:
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral("."))); }

    void draggingTheMarkerSetsTheNumberLeft()
    {
        OnBench on(plain());
        const int start = *on.bench.worked().odds.left;
        QVERIFY(start > 6);
        press(on.thinning(), on.thinning().knob());
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::left);
        QCOMPARE(*on.bench.worked().odds.left, start); // Taking hold changes nothing.
        moveTo(on.thinning(), QPointF(on.thinning().xOf(5), on.thinning().knob().y()));
        QCOMPARE(*on.bench.worked().odds.left, 5);
        OnBench::settle();
        QVERIFY(std::abs(on.thinning().knob().x() - on.thinning().xOf(5)) < 1.0);
        // The marker's height is the gap: the curve's own value at 5, from core.
        QCOMPARE(*on.bench.worked().gap.gap, on.bench.worked().thinning[4]);
        release(on.thinning(), QPointF(on.thinning().xOf(5), 0));
        QCOMPARE(on.document.undoStack().count(), 1);
        QCOMPARE(*on.bench.settings().left, 5);
    }

    void aPressBesideTheMarkerBringsItThere()
    {
        OnBench on(plain());
        const QPointF at(on.thinning().xOf(3), on.thinning().area().center().y());
        press(on.thinning(), at);
        release(on.thinning(), at);
        QCOMPARE(*on.bench.settings().left, 3);
    }

    /// What is tried stays on the bench until it is kept or given up in so many words.
    void theMarkerWaitsForATrial()
    {
        OnBench on(plain());
        const QSignalSpy told(&on.thinning(), &PaperPlot::told);
        QVERIFY(on.bench.beginTrial(QStringLiteral("Tried")));
        std::vector<Price> prices(on.bench.currentPrices().begin(), on.bench.currentPrices().end());
        prices[0] += Price{500};
        on.bench.tryPrices(prices);
        const int start = *on.bench.worked().odds.left;
        const QPointF at(on.thinning().xOf(3), on.thinning().area().center().y());
        press(on.thinning(), at);
        release(on.thinning(), at);
        QCOMPARE(told.count(), 1);
        QTest::keyClick(&on.thinning(), Qt::Key_Left);
        QCOMPARE(told.count(), 2);
        QVERIFY(told.last().first().toString().contains(QStringLiteral("keep what is tried")));
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::trial);
        QCOMPARE(on.bench.workedPrices()[0], prices[0]);
        QCOMPARE(*on.bench.worked().odds.left, start);
        QCOMPARE(on.document.undoStack().count(), 0);
        on.bench.giveUpGesture();
        QTest::keyClick(&on.thinning(), Qt::Key_Left);
        QCOMPARE(*on.bench.settings().left, start - 1);
    }

    void escapeGivesUp()
    {
        OnBench on(plain());
        const int start = *on.bench.worked().odds.left;
        press(on.thinning(), on.thinning().knob());
        moveTo(on.thinning(), QPointF(on.thinning().xOf(2), 30));
        QTest::keyClick(&on.thinning(), Qt::Key_Escape);
        release(on.thinning(), QPointF(on.thinning().xOf(2), 30));
        QCOMPARE(*on.bench.worked().odds.left, start);
        QCOMPARE(on.document.undoStack().count(), 0);
    }

    void keysMoveTheMarker()
    {
        OnBench on(plain());
        const int start = *on.bench.worked().odds.left;
        QTest::keyClick(&on.thinning(), Qt::Key_Left);
        QCOMPARE(*on.bench.settings().left, start - 1);
        QTest::keyClick(&on.thinning(), Qt::Key_PageUp);
        QCOMPARE(*on.bench.settings().left, start + 4);
        QTest::keyClick(&on.thinning(), Qt::Key_Home);
        QCOMPARE(*on.bench.settings().left, 1);
        QTest::keyClick(&on.thinning(), Qt::Key_End);
        QCOMPARE(*on.bench.settings().left, static_cast<int>(on.bench.worked().rentable));
    }

    void aModelWithoutANumberLeftShowsThePresent()
    {
        OnBench on(plain(ModelKind::turnover));
        QVERIFY(!on.thinning().knob().isNull());
        QVERIFY(std::abs(on.thinning().knob().x() - on.thinning().xOf(static_cast<double>(on.bench.worked().onOffer))) < 1.0);
        press(on.thinning(), on.thinning().knob());
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::none);
        release(on.thinning(), on.thinning().knob());
        QVERIFY(on.thinning().accessibleDescription().contains(moneyText(*on.bench.worked().gap.gap, on.bench.currency())));
    }
};

QTEST_MAIN(ThinningPlotTest)
#include "thinning_plot_test.moc"
