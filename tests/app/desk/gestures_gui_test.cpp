// SPDX-License-Identifier: GPL-3.0-or-later
// The bench by mouse and keyboard: what is dragged is what core computes, and each gesture is one undo step.
#include "desk_fixture.h"
#include "scenario_json.h"

#include <QAbstractItemModelTester>
#include <QCheckBox>
#include <QListView>
#include <QSpinBox>

using namespace rungwright;

class GesturesGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void init();
    void cleanup() { m_desk.reset(); }

    void aDraggedRungsGapIsCores();
    void escGivesUp();
    void aSelectionIsDraggedTogether();
    void theHandleBends();
    void theTotalIsHeld();
    void keysNudgeAndLock();
    void aTypedPriceIsTaken();
    void theMarkerIsDragged();
    void undoAndRedoAreByteIdentical();
    void switchingTheModelIsOneStep();

private:
    DeskFixture& desk() { return *m_desk; }
    QByteArray scenario() { return scenarioToJson(desk().window->document().scenario()); }

    std::unique_ptr<DeskFixture> m_desk;
};

void GesturesGuiTest::init()
{
    m_desk = std::make_unique<DeskFixture>();
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    QVERIFY(desk().bench().tierCase());
    desk().bench().workOn(-1);
    QVERIFY(desk().bench().worked().onOffer >= 5);
}

void GesturesGuiTest::aDraggedRungsGapIsCores()
{
    const auto unit = desk().unitOnOffer(0);
    const QString before = desk().figure("gap", FiguresModel::currentColumn);
    QCOMPARE(before, desk().coreGap());
    const QPoint from = desk().rung(unit);
    const QPoint to = from + QPoint(0, 40);
    DeskFixture::pressAndMove(desk().ladder(), from, to);
    QCOMPARE(desk().bench().gesture(), Workbench::Gesture::move);
    const Price during = desk().bench().workedPrices()[unit];
    QVERIFY(during < desk().bench().currentPrices()[unit]);
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    QVERIFY(desk().figure("gap", FiguresModel::workedColumn) != before);
    QVERIFY(desk().child<QLabel>("gapHeadline").text().contains(desk().coreGap()));
    QTest::mouseRelease(&desk().ladder(), Qt::LeftButton, {}, to);
    QCOMPARE(desk().bench().gesture(), Workbench::Gesture::none);
    QCOMPARE(desk().bench().workedPrices()[unit], during);
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    QCOMPARE(desk().window->document().undoStack().count(), 1);
    // The current ladder stays as it was.
    QCOMPARE(desk().figure("gap", FiguresModel::currentColumn), before);
}

void GesturesGuiTest::escGivesUp()
{
    const QByteArray before = scenario();
    const auto unit = desk().unitOnOffer(1);
    const QPoint from = desk().rung(unit);
    DeskFixture::pressAndMove(desk().ladder(), from, from + QPoint(0, 30));
    QVERIFY(desk().bench().workedPrices()[unit] != desk().bench().currentPrices()[unit]);
    QTest::keyClick(&desk().ladder(), Qt::Key_Escape);
    QCOMPARE(desk().bench().workedPrices()[unit], desk().bench().currentPrices()[unit]);
    QTest::mouseRelease(&desk().ladder(), Qt::LeftButton, {}, from + QPoint(0, 30));
    QCOMPARE(scenario(), before);
    QCOMPARE(desk().window->document().undoStack().count(), 0);
}

void GesturesGuiTest::aSelectionIsDraggedTogether()
{
    const auto first = desk().unitOnOffer(0);
    const auto second = desk().unitOnOffer(2);
    QTest::mouseClick(&desk().ladder(), Qt::LeftButton, {}, desk().rung(first));
    QTest::mouseClick(&desk().ladder(), Qt::LeftButton, Qt::ControlModifier, desk().rung(second));
    QCOMPARE(desk().bench().selection().size(), std::size_t(2));
    DeskFixture::drag(desk().ladder(), desk().rung(second), desk().rung(second) + QPoint(0, 24));
    const auto change = [&](std::uint32_t unit) { return desk().bench().workedPrices()[unit] - desk().bench().currentPrices()[unit]; };
    QVERIFY(change(first) < Price{0});
    QCOMPARE(change(first), change(second));
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    QCOMPARE(desk().window->document().undoStack().count(), 1);
}

void GesturesGuiTest::theHandleBends()
{
    const QPointF handle = desk().ladder().bendHandle();
    QVERIFY(!handle.isNull());
    DeskFixture::drag(desk().ladder(), handle.toPoint(), handle.toPoint() + QPoint(0, 30));
    QCOMPARE(desk().window->document().undoStack().count(), 1);
    QVERIFY(desk().window->document().undoStack().undoText().startsWith(QStringLiteral("Bend")));
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    int lower = 0;
    for (std::size_t i = 0; i < desk().bench().workedPrices().size(); ++i) {
        QVERIFY(desk().bench().workedPrices()[i] <= desk().bench().currentPrices()[i]);
        lower += desk().bench().workedPrices()[i] < desk().bench().currentPrices()[i];
    }
    QVERIFY(lower > 5);
}

void GesturesGuiTest::theTotalIsHeld()
{
    QTest::mouseClick(&desk().child<QCheckBox>("holdTotalBox"), Qt::LeftButton, {},
                      QPoint(8, desk().child<QCheckBox>("holdTotalBox").height() / 2));
    QVERIFY(desk().bench().holdsTotal());
    const QString total = desk().figure("asking_total", FiguresModel::currentColumn);
    const auto unit = desk().unitOnOffer(0);
    DeskFixture::drag(desk().ladder(), desk().rung(unit), desk().rung(unit) + QPoint(0, 30));
    QVERIFY(desk().bench().workedPrices()[unit] < desk().bench().currentPrices()[unit]);
    QCOMPARE(desk().figure("asking_total", FiguresModel::workedColumn), total);
    QCOMPARE(desk().window->document().undoStack().count(), 1);
}

void GesturesGuiTest::keysNudgeAndLock()
{
    const auto unit = desk().unitOnOffer(1);
    LadderPlot& ladder = desk().ladder();
    QTest::mouseClick(&ladder, Qt::LeftButton, {}, desk().rung(unit));
    const Price start = desk().bench().workedPrices()[unit];
    const PricePoints& points = desk().window->document().scenario().rules.points;
    QTest::keyClick(&ladder, Qt::Key_Down);
    QCOMPARE(desk().bench().workedPrices()[unit], points.stepped(start, -1));
    QTest::keyClick(&ladder, Qt::Key_PageDown);
    QCOMPARE(desk().bench().workedPrices()[unit], points.stepped(start, -6));
    QTest::keyClick(&ladder, Qt::Key_Up);
    QCOMPARE(desk().bench().workedPrices()[unit], points.stepped(start, -5));
    QCOMPARE(desk().figure("gap", FiguresModel::workedColumn), desk().coreGap());
    QTest::keyClick(&ladder, Qt::Key_L);
    QVERIFY(desk().bench().tierCase()->tier.units[unit].locked);
    const Price held = desk().bench().workedPrices()[unit];
    QTest::keyClick(&ladder, Qt::Key_Up);
    DeskFixture::drag(ladder, desk().rung(unit), desk().rung(unit) + QPoint(0, 30));
    QCOMPARE(desk().bench().workedPrices()[unit], held);
}

void GesturesGuiTest::aTypedPriceIsTaken()
{
    const auto unit = desk().unitOnOffer(0);
    desk().questions.texts = {QStringLiteral("eighty"), QStringLiteral("81.50")};
    QTest::mouseDClick(&desk().ladder(), Qt::LeftButton, {}, desk().rung(unit));
    QCOMPARE(desk().bench().workedPrices()[unit], Price{8150});
    QCOMPARE(desk().questions.asked.size(), 2); // the first answer was no price, and it was asked again
}

void GesturesGuiTest::theMarkerIsDragged()
{
    ThinningPlot& thinning = desk().thinning();
    QVERIFY(!thinning.knob().isNull());
    const QPoint from = thinning.knob().toPoint();
    const QPoint to(qRound(thinning.xOf(3)), from.y());
    DeskFixture::drag(thinning, from, to);
    QCOMPARE(desk().bench().settings().left, std::optional<int>(3));
    QCOMPARE(desk().child<QSpinBox>("leftBox").value(), 3);
    QCOMPARE(desk().figure("gap", FiguresModel::currentColumn), desk().coreGap());
    QCOMPARE(desk().window->document().undoStack().count(), 1);
}

void GesturesGuiTest::undoAndRedoAreByteIdentical()
{
    QList<QByteArray> states{scenario()};
    const auto dragged = [&](std::size_t place, int pixels) {
        const auto unit = desk().unitOnOffer(place);
        DeskFixture::drag(desk().ladder(), desk().rung(unit), desk().rung(unit) + QPoint(0, pixels));
        states << scenario();
    };
    dragged(0, 30);
    dragged(1, 22);
    dragged(3, -18);
    const QPoint handle = desk().ladder().bendHandle().toPoint();
    DeskFixture::drag(desk().ladder(), handle, handle + QPoint(0, 16));
    states << scenario();
    QCOMPARE(desk().window->document().undoStack().count(), 4);
    for (int i = 3; i >= 0; --i) {
        QTest::keyClick(desk().window.get(), Qt::Key_Z, Qt::ControlModifier);
        QCOMPARE(scenario(), states.at(i));
    }
    for (int i = 1; i <= 4; ++i) {
        QTest::keyClick(desk().window.get(), Qt::Key_Y, Qt::ControlModifier);
        QCOMPARE(scenario(), states.at(i));
    }
}

void GesturesGuiTest::switchingTheModelIsOneStep()
{
    auto& box = desk().child<QComboBox>("modelBox");
    for (int i = 1; i < box.count(); ++i) {
        box.setFocus();
        QTest::keyClick(&box, Qt::Key_Down);
        QCOMPARE(desk().window->document().undoStack().count(), i);
        const Workbench& bench = desk().bench();
        QCOMPARE(bench.settings().kind, kModels[static_cast<std::size_t>(i)]);
        if (bench.worked().gap.gap)
            QCOMPARE(desk().figure("gap", FiguresModel::currentColumn), desk().coreGap());
    }
}

QTEST_MAIN(GesturesGuiTest)
#include "gestures_gui_test.moc"
