// SPDX-License-Identifier: GPL-3.0-or-later
// Reshaping by mouse and keyboard: what the sliders show live is what core solves, Enter keeps it as one undo step, Esc leaves no trace.
#include "desk_fixture.h"
#include "frontier_page.h"
#include "least_change_form.h"
#include "reshape_panel.h"
#include "reshape_words.h"
#include "scenario_json.h"
#include "shape_form.h"

#include <QCheckBox>
#include <QClipboard>
#include <QComboBox>
#include <QDockWidget>
#include <QDoubleSpinBox>
#include <QFile>
#include <QMenu>
#include <QPushButton>
#include <QSlider>
#include <QStyle>
#include <QStyleOptionSlider>
#include <QTableWidget>

using namespace rungwright;

class ReshapeGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void init();
    void cleanup() { m_desk.reset(); }

    void draggingTheTargetSolvesLive();
    void escGivesUpAndKeepsNothing();
    void theLadderWaitsForTheTrial();
    void aTargetOutOfReachSaysWhatBinds();
    void theTotalMayChangeOrBeFree();
    void enterInAnUntouchedFieldKeepsNothing();
    void anotherAimOrTabGivesUpTheTrial();
    void aFigureIsHeardWithItsName();
    void theOrderChosenIsOfItsTierOnly();
    void aTierWithoutFloorSaysSo();
    void aShapeBeginsAsTodayAndFollowsItsDials();
    void priceStepsAreReadFromTheTable();
    void aPointOfTheTradeOffBecomesACandidate();
    void theTradeOffGoesByKeys();
    void theTradeOffAgainstTheTotal();
    void theTradeOffSaysWhyItIsEmpty();
    void itsTableLeavesWithTheCaution();

private:
    DeskFixture& desk() { return *m_desk; }
    Workbench& bench() { return desk().bench(); }
    QUndoStack& undo() { return desk().window->document().undoStack(); }
    QByteArray scenario() { return scenarioToJson(desk().window->document().scenario()); }
    LeastChangeForm& form() { return *desk().window->findChild<LeastChangeForm*>(); }
    ShapeForm& shape() { return *desk().window->findChild<ShapeForm*>(); }
    FrontierPlot& plot() { return *desk().window->findChild<FrontierPlot*>(); }
    template <class T>
    static T& in(QWidget& parent, const char* name)
    {
        T* found = parent.findChild<T*>(QString::fromLatin1(name));
        if (!found)
            qFatal("no child of that name: %s", name);
        return *found;
    }
    static QPoint knob(QSlider& slider)
    {
        QStyleOptionSlider option;
        option.initFrom(&slider);
        option.orientation = slider.orientation();
        option.minimum = slider.minimum();
        option.maximum = slider.maximum();
        option.sliderPosition = slider.sliderPosition();
        option.sliderValue = slider.value();
        return slider.style()->subControlRect(QStyle::CC_Slider, &option, QStyle::SC_SliderHandle, &slider).center();
    }
    /// Presses the knob and moves it that share of the slider's way; the button stays down.
    static QPoint slide(QSlider& slider, double share)
    {
        const QPoint from = knob(slider);
        const QPoint to = from + QPoint(qRound(share * slider.width()), 0);
        DeskFixture::pressAndMove(slider, from, to, 12);
        return to;
    }
    /// What core alone gives for a gap of at most `value` minor units with the total held or free.
    LeastChangeAnswer solved(double value, bool freeTotal = false)
    {
        ChangeWish wish;
        wish.total.free = freeTotal;
        wish.target = {TargetKind::gap, value};
        LeastChange solver;
        return solver.solve(bench().tierCase()->tier, bench().settings(), bench().rules(), wish);
    }
    std::vector<Price> today() { return {bench().currentPrices().begin(), bench().currentPrices().end()}; }
    std::vector<Price> worked() { return {bench().workedPrices().begin(), bench().workedPrices().end()}; }
    void showLeastChange()
    {
        QTest::keyClick(desk().window.get(), Qt::Key_T, Qt::ControlModifier);
        QTRY_VERIFY(form().isVisible());
    }
    void showTradeOff()
    {
        QTest::keyClick(desk().window.get(), Qt::Key_4, Qt::ControlModifier);
        QTRY_VERIFY(plot().isVisible());
        QCoreApplication::processEvents();
    }

    std::unique_ptr<DeskFixture> m_desk;
};

void ReshapeGuiTest::init()
{
    m_desk = std::make_unique<DeskFixture>();
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    QVERIFY(bench().tierCase());
    bench().workOn(-1);
    QVERIFY(bench().worked().onOffer >= 5);
    QVERIFY(bench().worked().gap.gap.value() > 100);
}

void ReshapeGuiTest::draggingTheTargetSolvesLive()
{
    showLeastChange();
    auto& slider = in<QSlider>(form(), "targetSlider");
    auto& spin = in<QDoubleSpinBox>(form(), "targetSpin");
    QVERIFY(slider.hasFocus());
    QVERIFY(!in<QPushButton>(*desk().window, "keepButton").isEnabled());
    QCOMPARE(slider.value(), slider.maximum()); // begins at today's gap
    const QString current = desk().figure("gap", FiguresModel::currentColumn);
    QSignalSpy moving(&bench(), &Workbench::moving);

    const QPoint at = slide(slider, -0.15);
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    QVERIFY2(moving.count() >= 4, "the ladder did not follow the slider");
    const double wanted = std::round(spin.value() * 100);
    QVERIFY(wanted < bench().current().gap.gap.value());
    QVERIFY(bench().worked().gap.gap.value() <= wanted + 1e-6);
    QCOMPARE(worked(), solved(wanted).prices);
    // Figures and reading line show the trial while the button is down, the current ladder stays.
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    QCOMPARE(desk().figure("gap", FiguresModel::currentColumn), current);
    QCOMPARE(desk().figure("asking_total", FiguresModel::workedColumn), desk().figure("asking_total", FiguresModel::currentColumn));
    QVERIFY(desk().child<QLabel>("gapHeadline").text().contains(desk().coreGap()));
    const auto prices = worked();
    const auto changes = priceChanges(bench().currentPrices(), prices);
    QVERIFY(!changes.empty());
    QVERIFY(in<QLabel>(form(), "changedValue").text().startsWith(QString::number(changes.size()) + QLatin1Char(' ')));
    QVERIFY(in<QLabel>(form(), "gapValue").text().startsWith(desk().coreGap()));
    QTest::mouseRelease(&slider, Qt::LeftButton, {}, at);
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial); // a trial until it is kept
    QCOMPARE(undo().count(), 0);

    QTest::keyClick(&slider, Qt::Key_Return);
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    QCOMPARE(undo().count(), 1);
    const auto& candidates = bench().tierCase()->candidates;
    QCOMPARE(bench().candidate(), static_cast<int>(candidates.size()) - 1);
    QCOMPARE(candidates.back().prices, prices);
    QCOMPARE(QString::fromStdString(candidates.back().name), leastChangeName({TargetKind::gap, wanted}, bench().currency()));
    QTest::keyClick(desk().window.get(), Qt::Key_Z, Qt::ControlModifier);
    QCOMPARE(undo().index(), 0);
    QCOMPARE(desk().figure("gap", FiguresModel::currentColumn), current);
}

void ReshapeGuiTest::escGivesUpAndKeepsNothing()
{
    const QByteArray before = scenario();
    showLeastChange();
    auto& slider = in<QSlider>(form(), "targetSlider");
    for (int i = 0; i < 20; ++i)
        QTest::keyClick(&slider, Qt::Key_Left);
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    QVERIFY(worked() != std::vector<Price>(bench().currentPrices().begin(), bench().currentPrices().end()));
    QTest::keyClick(&slider, Qt::Key_Escape);
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    QCOMPARE(worked(), std::vector<Price>(bench().currentPrices().begin(), bench().currentPrices().end()));
    QCOMPARE(scenario(), before);
    QCOMPARE(undo().count(), 0);
    // The slider stays where it was, so that one more step goes on from there.
    QVERIFY(slider.value() < slider.maximum());
}

void ReshapeGuiTest::theLadderWaitsForTheTrial()
{
    showLeastChange();
    auto& slider = in<QSlider>(form(), "targetSlider");
    for (int i = 0; i < 20; ++i)
        QTest::keyClick(&slider, Qt::Key_Left);
    const auto tried = worked();
    const auto unit = desk().unitOnOffer(0);
    DeskFixture::drag(desk().ladder(), desk().rung(unit), desk().rung(unit) + QPoint(0, 30));
    QCOMPARE(worked(), tried);
    QVERIFY(desk().child<QLabel>("lastAction").text().contains(QStringLiteral("keep what is tried")));
    QTest::keyClick(&desk().ladder(), Qt::Key_Return);
    QCOMPARE(undo().count(), 1);
    QCOMPARE(bench().tierCase()->candidates.back().prices, tried);
}

void ReshapeGuiTest::aTargetOutOfReachSaysWhatBinds()
{
    // All but the dearest three units are locked: the low end cannot move.
    const auto& units = bench().tierCase()->tier.units;
    std::vector<std::uint32_t> locked;
    const auto ladder = sortedLadder(units, bench().currentPrices(), Among::all);
    for (std::size_t i = 0; i + 3 < ladder.size(); ++i)
        locked.push_back(ladder[i].unit);
    desk().window->document().setLocked(bench().tier(), locked, true);
    showLeastChange();
    auto& slider = in<QSlider>(form(), "targetSlider");
    QTest::keyClick(&slider, Qt::Key_Home);
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    const LeastChangeAnswer answer = solved(0);
    QCOMPARE(answer.obstacle, Obstacle::target);
    const QString said = in<QLabel>(form(), "saidLabel").text();
    QVERIFY2(said.contains(moneyText(*answer.nearestTarget, bench().currency())), qPrintable(said));
    QVERIFY2(said.contains(QStringLiteral("Without the locks")), qPrintable(said));
    auto& nearest = in<QPushButton>(form(), "nearestButton");
    QVERIFY(nearest.isVisible());
    QTest::mouseClick(&nearest, Qt::LeftButton);
    QVERIFY(!nearest.isVisible());
    QCOMPARE(in<QDoubleSpinBox>(form(), "targetSpin").value(), std::ceil(*answer.nearestTarget - 1e-6) / 100);
    // The nearest is solved for, and met.
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    const double wanted = std::ceil(*answer.nearestTarget - 1e-6);
    QCOMPARE(worked(), solved(wanted).prices);
    QVERIFY(bench().worked().gap.gap.value() <= wanted + 1e-6);
    for (const std::uint32_t unit : locked)
        QCOMPARE(bench().workedPrices()[unit], bench().currentPrices()[unit]);
}

void ReshapeGuiTest::theTotalMayChangeOrBeFree()
{
    showLeastChange();
    auto& total = in<QComboBox>(form(), "totalBox");
    auto& spin = in<QDoubleSpinBox>(form(), "totalSpin");
    QVERIFY(!spin.isVisible());
    total.setFocus();
    QTest::keyClick(&total, Qt::Key_Down);
    QVERIFY(spin.isVisible());
    spin.setFocus();
    spin.selectAll();
    QTest::keyClicks(&spin, QStringLiteral("-2"));
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    Price now;
    Price before;
    for (std::size_t i = 0; i < bench().workedPrices().size(); ++i) {
        if (!bench().tierCase()->tier.units[i].onOffer())
            continue;
        now += bench().workedPrices()[i];
        before += bench().currentPrices()[i];
    }
    const double step = inMinor(bench().rules().points.step);
    QVERIFY(std::abs(inMinor(now) - 0.98 * inMinor(before)) <= step);
    total.setFocus();
    QTest::keyClick(&total, Qt::Key_Down);
    QVERIFY(!spin.isVisible());
    // Free: what core gives for the same gap with no total to keep, and that is not what it gives with the total held.
    auto& slider = in<QSlider>(form(), "targetSlider");
    for (int i = 0; i < 20; ++i)
        QTest::keyClick(&slider, Qt::Key_Left);
    const double wanted = std::round(100 * in<QDoubleSpinBox>(form(), "targetSpin").value());
    QCOMPARE(worked(), solved(wanted, true).prices);
    QVERIFY(worked() != solved(wanted).prices);
}

void ReshapeGuiTest::enterInAnUntouchedFieldKeepsNothing()
{
    QTest::keyClick(desk().window.get(), Qt::Key_T, Qt::ControlModifier | Qt::ShiftModifier);
    QTRY_VERIFY(shape().isVisible());
    for (const char* name : {"floorSpin", "topSpin", "leanSpin"}) {
        auto& spin = in<QDoubleSpinBox>(shape(), name);
        spin.setFocus();
        QTest::keyClick(&spin, Qt::Key_Return);
        QCOMPARE(bench().gesture(), Workbench::Gesture::none);
        QCOMPARE(undo().count(), 0);
    }
    showLeastChange();
    auto& target = in<QDoubleSpinBox>(form(), "targetSpin");
    target.setFocus();
    QTest::keyClick(&target, Qt::Key_Return);
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    QCOMPARE(undo().count(), 0);
    // What is set there is tried, and then Enter keeps it.
    for (int i = 0; i < 20; ++i)
        QTest::keyClick(&target, Qt::Key_Down);
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    QTest::keyClick(&target, Qt::Key_Return);
    QCOMPARE(undo().count(), 1);
}

void ReshapeGuiTest::anotherAimOrTabGivesUpTheTrial()
{
    showLeastChange();
    auto& slider = in<QSlider>(form(), "targetSlider");
    const auto tryOne = [&] {
        for (int i = 0; i < 20; ++i)
            QTest::keyClick(&slider, Qt::Key_Left);
    };
    tryOne();
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    QVERIFY(worked() != today());
    QTest::keyClick(&in<QComboBox>(form(), "targetBox"), Qt::Key_Down);
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    QCOMPARE(worked(), today());
    QCOMPARE(slider.value(), slider.maximum()); // today's share
    tryOne();
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    QTest::keyClick(desk().window.get(), Qt::Key_T, Qt::ControlModifier | Qt::ShiftModifier);
    QTRY_VERIFY(shape().isVisible());
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    QCOMPARE(worked(), today());
    QCOMPARE(undo().count(), 0);
}

void ReshapeGuiTest::aFigureIsHeardWithItsName()
{
    showLeastChange();
    auto& slider = in<QSlider>(form(), "targetSlider");
    for (int i = 0; i < 20; ++i)
        QTest::keyClick(&slider, Qt::Key_Left);
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    for (const char* name : {"changedValue", "typicalValue", "greatestValue", "gapValue", "metValue", "totalValue"}) {
        const auto& label = in<QLabel>(form(), name);
        QVERIFY2(label.accessibleName().endsWith(QStringLiteral(": ") + label.text()), name);
    }
    QCOMPARE(in<QLabel>(form(), "gapValue").accessibleName(), QStringLiteral("Gap reached: ") + in<QLabel>(form(), "gapValue").text());
    // A sentence is heard as it is written.
    QVERIFY(in<QLabel>(form(), "saidLabel").accessibleName().isEmpty());
    QVERIFY(in<QLabel>(shape(), "saidLabel").accessibleName().isEmpty());
}

void ReshapeGuiTest::theOrderChosenIsOfItsTierOnly()
{
    showLeastChange();
    auto& order = in<QComboBox>(form(), "orderBox");
    QCOMPARE(order.currentIndex(), 0);
    order.setCurrentIndex(1);
    Document& document = desk().window->document();
    Scenario other = document.scenario();
    bench().giveUpGesture();
    QCOMPARE(order.currentIndex(), 1);
    // Another tier at the same index: its rules say as today.
    const int index = bench().tier();
    for (TierCase& tierCase : other.tiers)
        tierCase.tier.name += " (another)";
    document.begin(other, {}, true);
    bench().showTier(index, -1);
    QCOMPARE(bench().tier(), index);
    QCOMPARE(order.currentIndex(), 0);
}

void ReshapeGuiTest::aTierWithoutFloorSaysSo()
{
    showLeastChange();
    desk().window->document().setFloor(bench().tier(), Price{0});
    QVERIFY(!in<QSlider>(form(), "targetSlider").isEnabled());
    QVERIFY(in<QLabel>(form(), "saidLabel").text().contains(QStringLiteral("No advertised floor")));
}

void ReshapeGuiTest::aShapeBeginsAsTodayAndFollowsItsDials()
{
    QTest::keyClick(desk().window.get(), Qt::Key_T, Qt::ControlModifier | Qt::ShiftModifier);
    QTRY_VERIFY(shape().isVisible());
    const auto ladder = sortedLadder(bench().tierCase()->tier.units, bench().currentPrices(), Among::onOffer);
    QCOMPARE(in<QDoubleSpinBox>(shape(), "floorSpin").value(), inMinor(ladder.front().price) / 100);
    QCOMPARE(in<QDoubleSpinBox>(shape(), "topSpin").value(), inMinor(ladder.back().price) / 100);
    const double lean = std::clamp(unitLMoments(ladder)->skewness, -0.32, 0.32);
    QVERIFY(std::abs(in<QDoubleSpinBox>(shape(), "leanSpin").value() - lean) <= 0.0005 + 1e-9); // three decimals are shown

    auto& slider = in<QSlider>(shape(), "leanSlider");
    const QPoint at = slide(slider, 0.3);
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    LadderShape wanted;
    wanted.floor = ladder.front().price;
    wanted.top = ladder.back().price;
    wanted.beta = *betaFromLean(in<QDoubleSpinBox>(shape(), "leanSpin").value());
    const auto& tier = bench().tierCase()->tier;
    QCOMPARE(worked(), shapedPrices(tier, bench().rules(), wanted, {}).value());
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    QTest::mouseRelease(&slider, Qt::LeftButton, {}, at);

    auto& kind = in<QComboBox>(shape(), "kindBox");
    kind.setFocus();
    QTest::keyClick(&kind, Qt::Key_Down);
    QTest::keyClick(&kind, Qt::Key_Down); // even steps
    wanted.beta = {};
    QCOMPARE(worked(), shapedPrices(tier, bench().rules(), wanted, {}).value());
    const auto prices = worked();
    QTest::keyClick(&kind, Qt::Key_Return);
    QCOMPARE(undo().count(), 1);
    QCOMPARE(bench().tierCase()->candidates.back().prices, prices);
    QVERIFY(undo().undoText().startsWith(QStringLiteral("Shape: even steps")));
}

void ReshapeGuiTest::priceStepsAreReadFromTheTable()
{
    QTest::keyClick(desk().window.get(), Qt::Key_T, Qt::ControlModifier | Qt::ShiftModifier);
    QTRY_VERIFY(shape().isVisible());
    in<QCheckBox>(shape(), "rulesBox").setChecked(false);
    auto& kind = in<QComboBox>(shape(), "kindBox");
    kind.setCurrentIndex(3);
    auto& table = in<QTableWidget>(shape(), "stepsTable");
    table.item(0, 0)->setText(QStringLiteral("ninety"));
    QVERIFY(in<QLabel>(shape(), "saidLabel").text().contains(QStringLiteral("Row 1: “ninety”")));
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
    table.item(0, 0)->setText(QStringLiteral("70"));
    table.item(0, 1)->setText(QStringLiteral("25"));
    table.item(1, 0)->setText(QStringLiteral("95.00"));
    table.item(1, 1)->setText(QStringLiteral("75 %"));
    QCOMPARE(bench().gesture(), Workbench::Gesture::trial);
    const auto ladder = sortedLadder(bench().tierCase()->tier.units, bench().workedPrices(), Among::onOffer);
    const auto low = std::count_if(ladder.begin(), ladder.end(), [](const Rung& rung) { return rung.price == Price{7000}; });
    const auto high = std::count_if(ladder.begin(), ladder.end(), [](const Rung& rung) { return rung.price == Price{9500}; });
    QVERIFY(low > 0);
    QVERIFY(high > low);
    QTest::keyClick(&in<QPushButton>(*desk().window, "giveUpButton"), Qt::Key_Space);
    QCOMPARE(bench().gesture(), Workbench::Gesture::none);
}

void ReshapeGuiTest::aPointOfTheTradeOffBecomesACandidate()
{
    showTradeOff();
    const auto& curve = plot().picture().curve;
    QVERIFY(curve.size() >= 40);
    QVERIFY(!desk().window->reshapeDock().isVisible()); // what is tried shows on the bench
    QVERIFY(std::abs(plot().picture().marks.front().gap - bench().current().gap.gap.value()) < 1e-9);
    const int middle = static_cast<int>(curve.size()) / 2;
    const FrontierPoint wanted = curve[static_cast<std::size_t>(middle)];
    const QPoint at = plot().placeOf(middle).toPoint();
    QTest::mouseMove(&plot(), at);
    QTest::mouseClick(&plot(), Qt::LeftButton, {}, at);
    QCOMPARE(undo().count(), 1);
    const auto& candidates = bench().tierCase()->candidates;
    QCOMPARE(bench().candidate(), static_cast<int>(candidates.size()) - 1);
    QVERIFY(bench().worked().gap.gap.value() <= std::ceil(wanted.gap) + 1e-6);
    QCOMPARE(candidates.back().prices, solved(std::ceil(wanted.gap - 1e-6)).prices);
    // It is a named point now, on the curve or, by its price points, a little beyond.
    const auto& mark = plot().picture().marks.back();
    QCOMPARE(mark.name, QString::fromStdString(candidates.back().name));
    QVERIFY(mark.amount >= wanted.rmsChange - 1);
    QCOMPARE(plot().picture().worked, bench().candidate());
    QVERIFY(plot().accessibleDescription().contains(mark.name));
    // A click on the current ladder's square puts that one on the bench again.
    QTest::mouseClick(&plot(), Qt::LeftButton, {}, plot().placeOfMark(0).toPoint());
    QCOMPARE(bench().candidate(), -1);
    QTest::keyClick(desk().window.get(), Qt::Key_Z, Qt::ControlModifier);
    QCOMPARE(undo().index(), 0);
}

void ReshapeGuiTest::theTradeOffGoesByKeys()
{
    showTradeOff();
    plot().setFocus();
    QTest::keyClick(&plot(), Qt::Key_Home);
    QVERIFY(plot().accessibleDescription().startsWith(plot().pointText(0).section(QLatin1Char('\n'), 0, 0)));
    for (int i = 0; i < 3; ++i)
        QTest::keyClick(&plot(), Qt::Key_PageDown);
    QTest::keyClick(&plot(), Qt::Key_Right);
    QVERIFY(plot().accessibleDescription().startsWith(plot().pointText(16).section(QLatin1Char('\n'), 0, 0)));
    const double gap = plot().picture().curve[16].gap;
    QTest::keyClick(&plot(), Qt::Key_Return);
    QCOMPARE(undo().count(), 1);
    QVERIFY(bench().worked().gap.gap.value() <= std::ceil(gap) + 1e-6);
}

void ReshapeGuiTest::theTradeOffAgainstTheTotal()
{
    showTradeOff();
    auto& against = in<QComboBox>(*plot().parentWidget(), "againstBox");
    against.setFocus();
    QTest::keyClick(&against, Qt::Key_Down);
    const auto& curve = plot().picture().curve;
    QVERIFY(curve.size() >= 10);
    QVERIFY(curve.front().totalChange < curve.back().totalChange);
    QVERIFY(!in<QComboBox>(*plot().parentWidget(), "totalBox").isVisible());
    const int at = static_cast<int>(curve.size()) / 4;
    const FrontierPoint wanted = curve[static_cast<std::size_t>(at)];
    QTest::mouseClick(&plot(), Qt::LeftButton, {}, plot().placeOf(at).toPoint());
    QCOMPARE(undo().count(), 1);
    Price change;
    for (std::size_t i = 0; i < bench().workedPrices().size(); ++i) {
        if (bench().tierCase()->tier.units[i].onOffer())
            change += bench().workedPrices()[i] - bench().currentPrices()[i];
    }
    // Within a price point: the total wished for need not be a sum of price points.
    QVERIFY(std::abs(inMinor(change) - wanted.totalChange) <= inMinor(bench().rules().points.step));
}

void ReshapeGuiTest::theTradeOffSaysWhyItIsEmpty()
{
    showTradeOff();
    auto& said = in<QLabel>(*plot().parentWidget(), "frontierSaid");
    QVERIFY(said.text().contains(QStringLiteral("at best")));
    desk().window->document().setFloor(bench().tier(), Price{0});
    QVERIFY(plot().picture().curve.empty());
    QVERIFY(said.text().contains(QStringLiteral("No advertised floor")));
    QCOMPARE(plot().picture().note, said.text());
    undo().undo();
    QVERIFY(!plot().picture().curve.empty());
    ModelSettings fitted;
    fitted.kind = ModelKind::fitted;
    in<QComboBox>(*plot().parentWidget(), "againstBox").setCurrentIndex(1);
    desk().window->document().setModel(bench().tier(), fitted, QStringLiteral("Fitted"));
    QVERIFY(said.text().contains(QStringLiteral("fitted range")));
}

void ReshapeGuiTest::itsTableLeavesWithTheCaution()
{
    showTradeOff();
    desk().questions.nextPath = desk().folder.filePath(QStringLiteral("trade-off.csv"));
    const auto pick = [this](const char* name) {
        QContextMenuEvent menuEvent(QContextMenuEvent::Keyboard, plot().rect().center(), plot().mapToGlobal(plot().rect().center()));
        QCoreApplication::sendEvent(&plot(), &menuEvent);
        auto* menu = plot().findChild<QMenu*>(QStringLiteral("pictureMenu"));
        QVERIFY(menu);
        auto* action = menu->findChild<QAction*>(QString::fromLatin1(name));
        QVERIFY(action);
        action->trigger();
        delete menu;
    };
    pick("saveTable");
    QFile file(desk().folder.filePath(QStringLiteral("trade-off.csv")));
    QVERIFY(file.open(QIODevice::ReadOnly));
    const QList<QByteArray> lines = file.readAll().split('\n');
    QCOMPARE(lines.first().trimmed(), QByteArray("kind,name,gap,gap_share,typical_change,total_change,currency"));
    QCOMPARE(static_cast<std::size_t>(lines.size()) - 2, plot().picture().curve.size() + plot().picture().marks.size());
    QVERIFY(desk().child<QLabel>("lastAction").text().contains(QStringLiteral("not legal advice")));
    pick("copyTable");
    QVERIFY(QGuiApplication::clipboard()->text().startsWith(QStringLiteral("Ladder\tGap")));
}

QTEST_MAIN(ReshapeGuiTest)
#include "reshape_gui_test.moc"
