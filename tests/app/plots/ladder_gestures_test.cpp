// SPDX-License-Identifier: GPL-3.0-or-later
// A real mouse on the ladder.
#include "plot_fixture.h"

#include <QSignalSpy>

#include <cmath>
#include <set>

using namespace rungwright;

class LadderGesturesTest : public QObject
{
    Q_OBJECT

private:
    static constexpr std::int64_t kStep = 50;
    static Scenario plain(int count = 24) { return invented::scenarioOf(invented::leaningTier(count, Price{6900}, 6100)); }

    /// Minor units a pixel of the price axis stands for.
    static double perPixel(OnBench& on)
    {
        const QCPRange range = on.ladder().priceRange();
        return range.size() / (on.ladder().area().height() - 1);
    }

private slots:
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral("."))); }

    void draggingARungMovesItsPrice()
    {
        OnBench on(plain());
        const std::uint32_t unit = on.onOffer(2);
        const Price start = on.bench.workedPrices()[unit];
        const QPointF at = on.ladder().rungPosition(unit);
        const double worth = perPixel(on);
        press(on.ladder(), at);
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::none); // A click is no drag.
        moveTo(on.ladder(), at + QPointF(0, 10));
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::move);
        moveTo(on.ladder(), at + QPointF(3, 40));
        const double wanted = static_cast<double>(start.minor) - 40 * worth;
        const Price now = on.bench.workedPrices()[unit];
        // Snapped to the nearest price point: at most half a step, and half a minor unit for rounding the drag itself.
        QVERIFY2(std::abs(static_cast<double>(now.minor) - wanted) <= kStep / 2.0 + 0.5, qPrintable(QString::number(now.minor)));
        QCOMPARE(now.minor % kStep, std::int64_t{0});
        QVERIFY(!on.ladder().dragBox().isEmpty());
        QCOMPARE(on.document.undoStack().count(), 0); // Nothing is written before the hand lets go.
        release(on.ladder(), at + QPointF(3, 40));
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::none);
        QCOMPARE(on.document.undoStack().count(), 1);
        QCOMPARE(on.bench.candidate(), 0); // A first edit of the current ladder makes a candidate.
        QCOMPARE(on.bench.workedPrices()[unit], now);
        QCOMPARE(on.bench.currentPrices()[unit], start);
        QVERIFY(on.ladder().dragBox().isEmpty());
    }

    void aRungKeepsItsColumnWhileDraggedPastItsNeighbours()
    {
        OnBench on(plain());
        const std::uint32_t unit = on.onOffer(1);
        const QPointF at = on.ladder().rungPosition(unit);
        press(on.ladder(), at);
        moveTo(on.ladder(), at + QPointF(0, -5));
        moveTo(on.ladder(), at + QPointF(0, -120));
        QCOMPARE(on.ladder().rungPosition(unit).x(), at.x());
        release(on.ladder(), at + QPointF(0, -120));
        OnBench::settle();
        QVERIFY(on.ladder().rungPosition(unit).x() > at.x()); // Slid to its new place.
    }

    void escapeGivesUpADrag()
    {
        OnBench on(plain());
        const std::uint32_t unit = on.onOffer(2);
        const std::vector<Price> before(on.bench.workedPrices().begin(), on.bench.workedPrices().end());
        const QPointF at = on.ladder().rungPosition(unit);
        press(on.ladder(), at);
        moveTo(on.ladder(), at + QPointF(0, 30));
        QVERIFY(on.bench.workedPrices()[unit] != before[unit]);
        QTest::keyClick(&on.ladder(), Qt::Key_Escape);
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::none);
        moveTo(on.ladder(), at + QPointF(0, 60)); // The button is still down.
        release(on.ladder(), at + QPointF(0, 60));
        QVERIFY(std::equal(before.begin(), before.end(), on.bench.workedPrices().begin()));
        QCOMPARE(on.document.undoStack().count(), 0);
    }

    void controlClickCollectsAndTheSelectionMovesTogether()
    {
        OnBench on(plain());
        const std::uint32_t a = on.onOffer(1);
        const std::uint32_t b = on.onOffer(4);
        press(on.ladder(), on.ladder().rungPosition(a));
        release(on.ladder(), on.ladder().rungPosition(a));
        press(on.ladder(), on.ladder().rungPosition(b), Qt::ControlModifier);
        release(on.ladder(), on.ladder().rungPosition(b), Qt::ControlModifier);
        QCOMPARE(on.bench.selection().size(), std::size_t{2});
        const Price startA = on.bench.workedPrices()[a];
        const Price startB = on.bench.workedPrices()[b];
        const QPointF at = on.ladder().rungPosition(b);
        press(on.ladder(), at);
        moveTo(on.ladder(), at + QPointF(0, -6));
        moveTo(on.ladder(), at + QPointF(0, -25));
        release(on.ladder(), at + QPointF(0, -25));
        const Price byA = on.bench.workedPrices()[a] - startA;
        QVERIFY(byA.minor > 0);
        QCOMPARE(byA, on.bench.workedPrices()[b] - startB); // Both started on price points of one step.
        QCOMPARE(on.document.undoStack().count(), 1);
        // Ctrl-click takes away again.
        OnBench::settle();
        press(on.ladder(), on.ladder().rungPosition(a), Qt::ControlModifier);
        release(on.ladder(), on.ladder().rungPosition(a), Qt::ControlModifier);
        QCOMPARE(on.bench.selection().size(), std::size_t{1});
    }

    void aRubberBandSelectsWhatItEncloses()
    {
        OnBench on(plain(38));
        const QRectF area = on.ladder().area();
        // Starts in the empty upper left corner.
        const QPointF from = area.topLeft() + QPointF(3, 3);
        const QPointF to(area.left() + 0.55 * area.width(), area.top() + 0.6 * area.height());
        std::set<std::uint32_t> enclosed;
        for (const std::uint32_t unit : on.bench.columns()) {
            if (QRectF(from, to).contains(on.ladder().rungPosition(unit)))
                enclosed.insert(unit);
        }
        QVERIFY(enclosed.size() >= 3); // The test means something.
        QVERIFY(enclosed.size() < on.bench.columns().size());
        press(on.ladder(), from);
        moveTo(on.ladder(), from + QPointF(20, 20));
        moveTo(on.ladder(), to);
        release(on.ladder(), to);
        const std::set<std::uint32_t> selected(on.bench.selection().begin(), on.bench.selection().end());
        QVERIFY(selected == enclosed);
        // A click on nothing lets go of the selection; Esc on a new band brings the old one back.
        press(on.ladder(), from);
        moveTo(on.ladder(), from + QPointF(20, 20));
        QVERIFY(on.bench.selection().empty());
        QTest::keyClick(&on.ladder(), Qt::Key_Escape);
        QCOMPARE(on.bench.selection().size(), selected.size());
        release(on.ladder(), from);
        press(on.ladder(), from);
        release(on.ladder(), from);
        QVERIFY(on.bench.selection().empty());
    }

    void theBendHandleFollowsThePointer()
    {
        OnBench on(plain(38));
        const QPointF handle = on.ladder().bendHandle();
        QVERIFY(!handle.isNull());
        const std::vector<Price> before(on.bench.workedPrices().begin(), on.bench.workedPrices().end());
        press(on.ladder(), handle);
        moveTo(on.ladder(), handle + QPointF(0, 8));
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::bend);
        moveTo(on.ladder(), handle + QPointF(0, 30));
        OnBench::settle();
        // It goes with its rung, whose price is snapped: half a price step of pixels off at most, and one pixel for rounding.
        const double off = std::abs(on.ladder().bendHandle().y() - (handle.y() + 30));
        QVERIFY2(off <= 0.5 * kStep / perPixel(on) + 1.0, qPrintable(QString::number(off)));
        QVERIFY(on.bench.bendExponent() > 1.0);
        release(on.ladder(), handle + QPointF(0, 30));
        const auto ends = std::minmax_element(before.begin(), before.end());
        QCOMPARE(on.bench.workedPrices()[static_cast<std::size_t>(ends.first - before.begin())], *ends.first);
        QCOMPARE(on.bench.workedPrices()[static_cast<std::size_t>(ends.second - before.begin())], *ends.second);
        QCOMPARE(on.document.undoStack().count(), 1);
    }

    void aLockedRungDoesNotMove()
    {
        Scenario scenario = plain();
        for (Unit& unit : scenario.tiers.front().tier.units)
            unit.locked = unit.onOffer();
        OnBench on(scenario);
        const std::uint32_t unit = on.onOffer(0);
        const QPointF at = on.ladder().rungPosition(unit);
        press(on.ladder(), at);
        moveTo(on.ladder(), at + QPointF(0, 30));
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::none);
        release(on.ladder(), at + QPointF(0, 30));
        QCOMPARE(on.document.undoStack().count(), 0);
    }

    void doubleClickAsksForAPrice()
    {
        OnBench on(plain());
        QSignalSpy asked(&on.ladder(), &LadderPlot::priceEditRequested);
        const std::uint32_t unit = on.onOffer(3);
        mouse(on.ladder(), QEvent::MouseButtonDblClick, on.ladder().rungPosition(unit), Qt::LeftButton, Qt::LeftButton);
        QCOMPARE(asked.count(), 1);
        QCOMPARE(asked.front().front().toUInt(), unit);
    }

    void hoveringNamesTheUnit()
    {
        OnBench on(plain());
        QSignalSpy hovered(&on.ladder(), &LadderPlot::hovered);
        const std::uint32_t unit = on.onOffer(3);
        hoverTo(on.ladder(), on.ladder().rungPosition(unit) + QPointF(2, 3));
        QCOMPARE(hovered.count(), 1);
        QCOMPARE(hovered.front().front().toInt(), static_cast<int>(unit));
        hoverTo(on.ladder(), on.ladder().area().topLeft() + QPointF(2, 2));
        QCOMPARE(hovered.back().front().toInt(), -1);
    }

    void hitTestingAtAThousandUnits()
    {
        OnBench on(invented::scenarioOf(invented::leaningTier(1000, Price{6900}, 6100)));
        int free = 0;
        for (std::uint32_t unit = 0; unit < 1000; unit += 7) {
            const QPointF at = on.ladder().rungPosition(unit);
            const int hit = on.ladder().unitAt(at);
            QVERIFY(hit >= 0);
            if (on.tier().units[unit].onOffer()) {
                ++free;
                QCOMPARE(hit, static_cast<int>(unit));
            } else {
                // Where columns are narrower than a pixel, a unit on offer close by may be meant instead; never one out of reach (9 px).
                const QPointF found = on.ladder().rungPosition(static_cast<std::uint32_t>(hit));
                QVERIFY(std::hypot(found.x() - at.x(), found.y() - at.y()) <= 9.0);
            }
            // A hand is never that exact: five pixels off still takes hold of something within reach.
            QVERIFY(on.ladder().unitAt(at + QPointF(3, 4)) >= 0);
        }
        QVERIFY(free > 10);
        QCOMPARE(on.ladder().unitAt(on.ladder().area().topLeft() + QPointF(4, 4)), -1);
    }

    void controlWheelZoomsAndADoubleClickResets()
    {
        OnBench on(plain());
        const QCPRange whole = on.ladder().priceRange();
        const QPointF at = on.ladder().area().center();
        QWheelEvent in(at, on.ladder().mapToGlobal(at), QPoint(), QPoint(0, 240), Qt::NoButton, Qt::ControlModifier, Qt::NoScrollPhase,
                       false);
        QApplication::sendEvent(&on.ladder(), &in);
        OnBench::settle();
        QVERIFY(on.ladder().priceRange().size() < 0.8 * whole.size());
        QVERIFY(on.plots.curtain()->yAxis->range() == on.ladder().priceRange());
        mouse(on.ladder(), QEvent::MouseButtonDblClick, on.ladder().area().bottomRight() - QPointF(30, 4), Qt::LeftButton, Qt::LeftButton);
        OnBench::settle();
        QVERIFY(on.ladder().priceRange() == whole);
        // Without Ctrl the wheel belongs to whatever is around the plot.
        QWheelEvent bare(at, on.ladder().mapToGlobal(at), QPoint(), QPoint(0, 240), Qt::NoButton, Qt::NoModifier, Qt::NoScrollPhase, false);
        bare.setAccepted(true);
        QApplication::sendEvent(&on.ladder(), &bare);
        QVERIFY(on.ladder().priceRange() == whole);
    }

    void manyMovesAreOnePaint()
    {
        OnBench on(plain(60));
        const std::uint32_t unit = on.onOffer(2);
        const QPointF at = on.ladder().rungPosition(unit);
        press(on.ladder(), at);
        moveTo(on.ladder(), at + QPointF(0, 5));
        OnBench::settle();
        PaintCount ladder(&on.ladder());
        PaintCount curtain(on.plots.curtain());
        PaintCount thinning(&on.thinning());
        const QCPRange range = on.ladder().priceRange();
        for (int i = 6; i < 46; ++i)
            moveTo(on.ladder(), at + QPointF(0, i));
        OnBench::settle();
        QCOMPARE(ladder.count, 1);
        QCOMPARE(curtain.count, 1);
        QCOMPARE(thinning.count, 1);
        // Only what moved is painted: far less than the whole plot.
        std::int64_t painted = 0;
        for (const QRect& rect : ladder.region)
            painted += std::int64_t{rect.width()} * rect.height();
        QVERIFY2(painted < std::int64_t{on.ladder().width()} * on.ladder().height() / 2, qPrintable(QString::number(painted)));
        QVERIFY(on.ladder().priceRange() == range); // The axis stands still.
        release(on.ladder(), at + QPointF(0, 45));
    }

    void whatIsPaintedInADragIsWhatAFullPaintShows()
    {
        // The partial repaints must leave nothing behind: after a drag's frames the widget looks as if painted anew.
        OnBench on(plain(60), -1);
        const std::uint32_t unit = on.onOffer(2);
        const QPointF at = on.ladder().rungPosition(unit);
        on.plots.activateWindow();
        on.ladder().setFocus();
        press(on.ladder(), at);
        QImage screen(on.ladder().size(), QImage::Format_RGB32);
        on.ladder().render(&screen);
        PaintCount paints(&on.ladder());
        for (const int dy : {5, 31, -20, -64, 12, 47}) {
            moveTo(on.ladder(), at + QPointF(0, dy));
            QRegion touched;
            // Take each frame as the screen would: only its region is replaced.
            OnBench::settle();
            touched = paints.region;
            QImage frame(on.ladder().size(), QImage::Format_RGB32);
            on.ladder().render(&frame);
            QPainter painter(&screen);
            painter.setClipRegion(touched);
            painter.drawImage(0, 0, frame);
            painter.end();
            QCOMPARE(screen, frame);
        }
        release(on.ladder(), at);
    }

    void theAxisStretchesWhenARungLeavesIt()
    {
        OnBench on(plain());
        const std::uint32_t unit = on.onOffer(4);
        const QPointF at = on.ladder().rungPosition(unit);
        const QCPRange before = on.ladder().priceRange();
        press(on.ladder(), at);
        moveTo(on.ladder(), at + QPointF(0, -5));
        moveTo(on.ladder(), QPointF(at.x(), -30)); // Above the plot.
        OnBench::settle();
        QVERIFY(on.ladder().priceRange().upper > before.upper);
        QVERIFY(on.plots.curtain()->yAxis->range() == on.ladder().priceRange());
        QVERIFY(on.ladder().area().contains(on.ladder().rungPosition(unit)));
        QTest::keyClick(&on.ladder(), Qt::Key_Escape);
        release(on.ladder(), at);
        OnBench::settle();
        QVERIFY(on.ladder().priceRange() == before);
    }
};

QTEST_MAIN(LadderGesturesTest)
#include "ladder_gestures_test.moc"
