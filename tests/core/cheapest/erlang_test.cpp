// SPDX-License-Identifier: GPL-3.0-or-later
// Erlang's loss formula and its inverses against published values.
#include <QtTest>

#include "cheapest/erlang.h"

#include "core/close.h"
#include "published/erlang.h"

using namespace rungwright;

class ErlangTest : public QObject
{
    Q_OBJECT

private slots:
    void lossAgreesWithTheTable();
    void loadForLossAgreesWithTheTable();
    void huntingAgreesWithTheTable();
    void allLossesAreThoseOfEachSize();
    void meanFreeIsWhatIsNotCarried();
    void loadForCarriedUndoesTheCarriedLoad();
    void knowsTheEnds();
};

void ErlangTest::lossAgreesWithTheTable()
{
    // 1e-12: the table gives 13 digits.
    for (const auto& row : published::kErlangLoss)
        COMPARE_CLOSE(erlangB(row.n, row.a), row.loss, 1e-12);
}

void ErlangTest::loadForLossAgreesWithTheTable()
{
    // 1e-9: the table was made by a root finder stopped at 1e-13 absolute, which for the small loads leaves about 1e-10 relative.
    for (const auto& row : published::kErlangLoad) {
        COMPARE_CLOSE(loadForLoss(row.n, row.b), row.load, 1e-9);
        COMPARE_CLOSE(erlangB(row.n, loadForLoss(row.n, row.b)), row.b, 1e-12);
    }
    COMPARE_WITHIN(loadForLoss(15, 0.01), published::kPrintedLoad15At1Percent, 0.0005); // Printed to three decimals.
}

void ErlangTest::huntingAgreesWithTheTable()
{
    // 1e-11: thirteen digits, less what the differences in the table lose.
    for (const auto& row : published::kHunting) {
        COMPARE_CLOSE(erlangB(row.i, row.a), row.allTaken, 1e-11);
        COMPARE_CLOSE(row.a * (erlangB(row.i - 1, row.a) - erlangB(row.i, row.a)), row.carried, 1e-11);
    }
}

void ErlangTest::allLossesAreThoseOfEachSize()
{
    std::vector<double> losses;
    erlangBAll(200, 170, losses);
    QCOMPARE(losses.size(), 201U);
    for (int n = 0; n <= 200; ++n)
        COMPARE_CLOSE(losses[static_cast<std::size_t>(n)], erlangB(n, 170), 1e-13); // A few roundings a step apart.
}

void ErlangTest::meanFreeIsWhatIsNotCarried()
{
    // Where n - a (1 - B) does not cancel, it is the same number: 1e-12 is its own rounding.
    for (int n : {1, 2, 5, 20, 100})
        for (double share : {0.1, 0.5, 0.9})
            COMPARE_CLOSE(meanFree(n, share * n), n - share * n * (1 - erlangB(n, share * n)), 1e-12);
    // One server under a load a is free for the share 1 / (1 + a) of the time, however heavy the load.
    for (double a : {1e-9, 1.0, 1e6, 1e15})
        COMPARE_CLOSE(meanFree(1, a), 1 / (1 + a), 1e-14);
}

void ErlangTest::loadForCarriedUndoesTheCarriedLoad()
{
    for (int n : {1, 2, 3, 10, 47, 250, 1000})
        for (double share : {1e-6, 0.01, 0.3, 0.5, 0.9, 0.99, 0.9999}) {
            const double carried = share * n;
            const auto load = loadForCarried(n, carried);
            QVERIFY(load.has_value());
            // What is free is the figure asked for; 1e-10 allows for the rounding of n - carried itself where that is small.
            COMPARE_CLOSE(meanFree(n, *load), n - carried, 1e-10);
        }
    // One server: carried a / (1 + a), so a = c / (1 - c).
    for (double carried : {0.1, 0.5, 0.75, 0.999})
        COMPARE_CLOSE(*loadForCarried(1, carried), carried / (1 - carried), 1e-12);
    // Two servers: a (1 + a) / (1 + a + a^2 / 2) = 1 has the root sqrt(2).
    COMPARE_CLOSE(*loadForCarried(2, 1), std::sqrt(2.0), 1e-14);
}

void ErlangTest::knowsTheEnds()
{
    QCOMPARE(erlangB(0, 7), 1.0);
    QCOMPARE(erlangB(0, 0), 1.0);
    QCOMPARE(erlangB(5, 0), 0.0);
    QCOMPARE(meanFree(5, 0), 5.0);
    QVERIFY(!loadForCarried(5, 0));
    QVERIFY(!loadForCarried(5, 5));
    QVERIFY(!loadForCarried(5, -1));
    QVERIFY(!loadForCarried(0, 0));
    QVERIFY(!loadForCarried(5, std::numeric_limits<double>::quiet_NaN()));
}

QTEST_APPLESS_MAIN(ErlangTest)
#include "erlang_test.moc"
