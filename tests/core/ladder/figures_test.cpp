// SPDX-License-Identifier: GPL-3.0-or-later
// Sorting a tier into a ladder, and what is said of it without any model.
#include <QtTest>

#include "ladder/figures.h"

#include "core/close.h"
#include "core/sample_tiers.h"

using namespace rungwright;

class FiguresTest : public QObject
{
    Q_OBJECT

private slots:
    void choosesAndSortsUnits();
    void readsStatusWords();
    void saysNothingOfAnEmptyLadder();
    void describesOneUnit();
    void describesASmallLadder();
    void standsNowhereUnderAFloorAboveAll();
    void countsInversionsAsAllPairsWould();
    void doesNotDependOnTheOrderOfTiedUnits();
};

void FiguresTest::choosesAndSortsUnits()
{
    Tier tier = tierOf({300, 100, 200, 100, 50}, 40);
    tier.units[2].status = Status::occupied;
    tier.units[4].status = Status::closed;
    tier.units[0].status = Status::reserved;
    const auto prices = askingPrices(tier.units);
    const auto places = [&](Among among) {
        std::vector<std::uint32_t> unitsInOrder;
        for (const Rung& rung : sortedLadder(tier.units, prices, among))
            unitsInOrder.push_back(rung.unit);
        return unitsInOrder;
    };
    QCOMPARE(places(Among::onOffer), (std::vector<std::uint32_t>{1, 3})); // Tied: in the order of the list.
    QCOMPARE(places(Among::rentable), (std::vector<std::uint32_t>{1, 3, 2, 0}));
    QCOMPARE(places(Among::all), (std::vector<std::uint32_t>{4, 1, 3, 2, 0}));
    // A candidate's prices, not today's.
    const std::vector<Price> candidate{{10}, {20}, {30}, {5}, {1}};
    QCOMPARE(sortedLadder(tier.units, candidate, Among::onOffer).front().unit, 3U);
}

void FiguresTest::readsStatusWords()
{
    for (const Status status : {Status::vacant, Status::occupied, Status::reserved, Status::closed})
        QVERIFY(statusFromWord(statusWord(status)) == status);
    QVERIFY(!statusFromWord("Vacant"));
    QVERIFY(!statusFromWord(""));
}

void FiguresTest::saysNothingOfAnEmptyLadder()
{
    const auto figures = ladderFigures({}, {}, {5000});
    QCOMPARE(figures.count, 0U);
    QCOMPARE(figures.total.minor, 0);
    QCOMPARE(figures.inversions, 0U);
    QVERIFY(!figures.lowest && !figures.highest && !figures.width && !figures.mean && !figures.median && !figures.meanStanding);
    QVERIFY(!figures.skew.moment && !figures.skew.adjusted && !figures.skew.medcouple && !figures.skew.l);
}

void FiguresTest::describesOneUnit()
{
    const Tier tier = tierOf({6900}, 5900);
    const auto figures =
        ladderFigures(sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer), tier.units, tier.advertisedFloor);
    QCOMPARE(figures.count, 1U);
    QCOMPARE(figures.lowest->minor, 6900);
    QCOMPARE(figures.highest->minor, 6900);
    QCOMPARE(figures.width->minor, 1000);
    QCOMPARE(*figures.mean, 6900.0);
    QCOMPARE(*figures.median, 6900.0);
    QCOMPARE(*figures.meanStanding, 1.0);
    QVERIFY(!figures.skew.moment);
}

void FiguresTest::describesASmallLadder()
{
    // By hand: mean (50 + 60 + 80 + 100) / 4 = 72.50, standing (72.50 - 50) / (100 - 50) = 0.45.
    const Tier tier = tierOf({8000, 5000, 10000, 6000}, 5000);
    const auto figures =
        ladderFigures(sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer), tier.units, tier.advertisedFloor);
    QCOMPARE(figures.total.minor, 29000);
    QCOMPARE(*figures.mean, 7250.0);
    QCOMPARE(*figures.median, 7000.0);
    QCOMPARE(*figures.meanStanding, 0.45);
    QVERIFY(*figures.skew.moment > 0);
}

void FiguresTest::standsNowhereUnderAFloorAboveAll()
{
    const Tier tier = tierOf({8000, 5000}, 9000);
    const auto figures =
        ladderFigures(sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer), tier.units, tier.advertisedFloor);
    QCOMPARE(figures.width->minor, -1000);
    QVERIFY(!figures.meanStanding);
    const Tier at = tierOf({8000, 5000}, 8000);
    QVERIFY(!ladderFigures(sortedLadder(at.units, askingPrices(at.units), Among::onOffer), at.units, at.advertisedFloor).meanStanding);
}

void FiguresTest::countsInversionsAsAllPairsWould()
{
    std::mt19937_64 random(21);
    for (int round = 0; round < 500; ++round) {
        TierSpread spread;
        spread.units = random() % 60;
        spread.grain = round % 2 ? 1 : 500; // Few or many ties.
        const Tier tier = randomTier(random, spread);
        const auto ladder = sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer);
        std::size_t pairs = 0;
        for (const Unit& a : tier.units)
            for (const Unit& b : tier.units)
                if (a.grade && b.grade && *a.grade > *b.grade && a.asking < b.asking)
                    ++pairs;
        QCOMPARE(countInversions(ladder, tier.units), pairs);
    }
}

void FiguresTest::doesNotDependOnTheOrderOfTiedUnits()
{
    std::mt19937_64 random(22);
    for (int round = 0; round < 200; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 30;
        spread.grain = 600;
        Tier tier = randomTier(random, spread);
        const auto figuresOf = [&] {
            return ladderFigures(sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer), tier.units, tier.advertisedFloor);
        };
        const auto before = figuresOf();
        std::ranges::shuffle(tier.units, random);
        const auto after = figuresOf();
        QCOMPARE(after.mean, before.mean);
        QCOMPARE(after.median, before.median);
        QCOMPARE(after.skew.moment, before.skew.moment);
        QCOMPARE(after.skew.medcouple, before.skew.medcouple);
        QCOMPARE(after.skew.l, before.skew.l);
        QCOMPARE(after.inversions, before.inversions);
    }
}

QTEST_APPLESS_MAIN(FiguresTest)
#include "figures_test.moc"
