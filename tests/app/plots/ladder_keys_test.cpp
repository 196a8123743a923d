// SPDX-License-Identifier: GPL-3.0-or-later
// The ladder by keyboard alone.
#include "plot_fixture.h"
#include "plot_words.h"
#include "wording.h"

#include <QSignalSpy>

#include <cmath>

using namespace rungwright;

class LadderKeysTest : public QObject
{
    Q_OBJECT

private:
    static Scenario plain() { return invented::scenarioOf(invented::leaningTier(24, Price{6900}, 6100)); }
    static void key(OnBench& on, Qt::Key key, Qt::KeyboardModifiers modifiers = {}) { QTest::keyClick(&on.ladder(), key, modifiers); }
    static std::uint32_t only(OnBench& on) { return on.bench.selection().size() == 1 ? on.bench.selection().front() : 9999; }

private slots:
    void init() { QTest::failOnWarning(QRegularExpression(QStringLiteral("."))); }

    void arrowsGoAlongTheLadder()
    {
        OnBench on(plain());
        const std::vector<std::uint32_t> columns(on.bench.columns().begin(), on.bench.columns().end());
        key(on, Qt::Key_Right);
        QCOMPARE(only(on), columns[0]);
        key(on, Qt::Key_Right);
        QCOMPARE(only(on), columns[1]);
        key(on, Qt::Key_End);
        QCOMPARE(only(on), columns.back());
        key(on, Qt::Key_Right); // No further.
        QCOMPARE(only(on), columns.back());
        key(on, Qt::Key_Left);
        QCOMPARE(only(on), columns[columns.size() - 2]);
        key(on, Qt::Key_Home);
        QCOMPARE(only(on), columns[0]);
        key(on, Qt::Key_Right, Qt::ShiftModifier);
        QCOMPARE(on.bench.selection().size(), std::size_t{2});
        key(on, Qt::Key_Escape);
        QVERIFY(on.bench.selection().empty());
    }

    void upAndDownNudgeByPricePoints()
    {
        OnBench on(plain());
        const std::uint32_t unit = on.onOffer(2);
        on.bench.select({unit});
        const Price start = on.bench.workedPrices()[unit];
        key(on, Qt::Key_Up);
        QCOMPARE(on.bench.workedPrices()[unit], start + Price{50});
        key(on, Qt::Key_Down);
        key(on, Qt::Key_Down);
        QCOMPARE(on.bench.workedPrices()[unit], start - Price{50});
        key(on, Qt::Key_PageUp);
        QCOMPARE(on.bench.workedPrices()[unit], start + Price{200});
        key(on, Qt::Key_PageDown);
        key(on, Qt::Key_PageDown);
        QCOMPARE(on.bench.workedPrices()[unit], start - Price{300});
        QCOMPARE(only(on), unit); // The selection stays with the unit, wherever it slides.
    }

    void selectAllLockAndEdit()
    {
        OnBench on(plain());
        key(on, Qt::Key_A, Qt::ControlModifier);
        QCOMPARE(on.bench.selection().size(), on.bench.worked().onOffer);
        const std::uint32_t unit = on.onOffer(1);
        on.bench.select({unit});
        key(on, Qt::Key_L);
        QVERIFY(on.tier().units[unit].locked);
        key(on, Qt::Key_L);
        QVERIFY(!on.tier().units[unit].locked);
        QSignalSpy asked(&on.ladder(), &LadderPlot::priceEditRequested);
        key(on, Qt::Key_Return);
        QCOMPARE(asked.count(), 1);
        QCOMPARE(asked.front().front().toUInt(), unit);
    }

    void altArrowsBend()
    {
        OnBench on(plain());
        const std::vector<Price> before(on.bench.workedPrices().begin(), on.bench.workedPrices().end());
        key(on, Qt::Key_Down, Qt::ControlModifier);
        QCOMPARE(on.bench.gesture(), Workbench::Gesture::none);
        QCOMPARE(on.document.undoStack().count(), 1);
        std::int64_t moved = 0;
        for (std::size_t i = 0; i < before.size(); ++i) {
            QVERIFY(on.bench.workedPrices()[i] <= before[i]);
            moved += (before[i] - on.bench.workedPrices()[i]).minor;
        }
        QVERIFY(moved > 0);
    }

    void theToolTipTellsAUnit()
    {
        OnBench on(plain());
        const std::uint32_t unit = on.onOffer(0); // The cheapest on offer.
        const QString tip = unitToolTip(on.bench, unit);
        const Unit& u = on.tier().units[unit];
        QVERIFY(tip.contains(QString::fromStdString(u.name)));
        QVERIFY(tip.contains(moneyText(u.asking, on.bench.currency())));
        QVERIFY(tip.contains(QLatin1String("on offer")));
        QVERIFY(tip.contains(QStringLiteral("grade %1").arg(*u.grade)));
        // Perceived range: the cheapest of m rungs is found with chance 1 - ((m-1)/m)^N, N = m.
        const auto m = static_cast<double>(on.bench.worked().onOffer);
        QVERIFY(tip.contains(percentText(1 - std::pow((m - 1) / m, m), true)));
        // Taken units are not on the model's ladder: no chance is claimed for them.
        QVERIFY(!unitToolTip(on.bench, on.unitWhere([](const Unit& x) {
                     return x.status == Status::occupied;
                 })).contains(QLatin1String("chance")));
    }

    void theDescriptionSaysWhatIsSelected()
    {
        OnBench on(plain());
        QVERIFY(!on.ladder().accessibleName().isEmpty());
        key(on, Qt::Key_Home);
        const QString name = QString::fromStdString(on.tier().units[only(on)].name);
        QVERIFY(on.ladder().accessibleDescription().contains(name));
        QVERIFY(on.ladder().accessibleDescription().contains(QLatin1String("69.00"))); // The advertised floor.
    }
};

QTEST_MAIN(LadderKeysTest)
#include "ladder_keys_test.moc"
