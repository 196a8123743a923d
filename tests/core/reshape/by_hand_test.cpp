// SPDX-License-Identifier: GPL-3.0-or-later
// Moving, nudging and bending: locks, rules, order.
#include <QtTest>

#include "reshape/by_hand.h"

#include "core/reshape/allowed_prices.h"
#include "core/sample_tiers.h"
#include "gap/measure.h"

#include <numeric>

using namespace rungwright;

namespace
{

std::vector<std::uint32_t> everyUnit(const Tier& tier)
{
    std::vector<std::uint32_t> all(tier.units.size());
    std::iota(all.begin(), all.end(), 0U);
    return all;
}

Tier randomLockedTier(std::mt19937_64& random, std::size_t units)
{
    TierSpread spread;
    spread.units = units;
    spread.floor = 300;
    spread.range = 2200;
    Tier tier = randomTier(random, spread);
    for (Unit& unit : tier.units)
        unit.locked = random() % 5 == 0;
    return tier;
}

bool isAllowed(const Unit& unit, Price price, const PriceRules& rules)
{
    return std::ranges::count(allowedPrices(unit, rules), price.minor) == 1;
}

} // namespace

class ByHandTest : public QObject
{
    Q_OBJECT

private slots:
    void moveKeepsLocksAndRules();
    void moveOfNothingMovesNothing();
    void moveTellsWhatStoppedIt();
    void nudgeGoesByPricePoints();
    void nudgeStopsAtTheLastPoint();
    void bendKeepsOrderLocksAndEnds();
    void bendFollowsItsFormula();
    void bendUpRaisesAndBendDownLowers();
    void bendLeavesFlatLaddersAlone();
    void bendHoldsAUnitAtItsRules();
    void reusesStorage();
};

void ByHandTest::moveKeepsLocksAndRules()
{
    std::mt19937_64 random(101);
    Reshaped out;
    for (int round = 0; round < 400; ++round) {
        const Tier tier = randomLockedTier(random, 2 + random() % 10);
        const PriceRules rules = randomRules(random);
        const auto start = askingPrices(tier.units);
        std::vector<std::uint32_t> moved;
        for (std::uint32_t i = 0; i < tier.units.size(); ++i)
            if (random() % 2)
                moved.push_back(i);
        const Price by{static_cast<std::int64_t>(random() % 1000) - 500};
        moveUnits(tier.units, start, moved, by, rules, out);
        QCOMPARE(out.prices.size(), start.size());
        QCOMPARE(out.leftOver.minor, 0);
        bool stopped = false;
        for (std::uint32_t i = 0; i < tier.units.size(); ++i) {
            if (std::ranges::count(moved, i) == 0 || tier.units[i].locked) {
                QVERIFY(out.prices[i] == start[i]);
                stopped = stopped || (std::ranges::count(moved, i) == 1 && by.minor != 0);
                continue;
            }
            QVERIFY(isAllowed(tier.units[i], out.prices[i], rules));
            const Snapped alone = snapped(tier.units[i], start[i], start[i] + by, rules);
            QVERIFY(out.prices[i] == alone.price);
            stopped = stopped || (alone.bound != Bound::none && by.minor != 0);
        }
        QCOMPARE(out.bound != Bound::none, stopped);
    }
}

void ByHandTest::moveOfNothingMovesNothing()
{
    const Tier tier = tierOf({333, 777}, 300);
    PriceRules rules;
    rules.points.step = {500};
    Reshaped out;
    moveUnits(tier.units, std::vector<Price>{{345}, {777}}, std::vector<std::uint32_t>{0, 1}, {0}, rules, out);
    QVERIFY(out.prices[0].minor == 345 && out.prices[1].minor == 777 && out.bound == Bound::none);
    moveUnits(tier.units, askingPrices(tier.units), {}, {100}, rules, out);
    QVERIFY(out.prices[0].minor == 333 && out.prices[1].minor == 777);
}

void ByHandTest::moveTellsWhatStoppedIt()
{
    Tier tier = tierOf({1000, 2000, 3000}, 1000);
    tier.units[1].locked = true;
    PriceRules rules;
    rules.greatestChange = Price{100};
    Reshaped out;
    const auto start = askingPrices(tier.units);
    moveUnits(tier.units, start, std::vector<std::uint32_t>{0}, {150}, rules, out);
    QVERIFY(out.bound == Bound::changeMoney && out.prices[0].minor == 1100);
    moveUnits(tier.units, start, std::vector<std::uint32_t>{1, 0}, {150}, rules, out);
    QVERIFY(out.bound == Bound::lock); // The first of those moved.
    moveUnits(tier.units, start, std::vector<std::uint32_t>{0, 2}, {50}, rules, out);
    QVERIFY(out.bound == Bound::none && out.prices[2].minor == 3050);
}

void ByHandTest::nudgeGoesByPricePoints()
{
    std::mt19937_64 random(102);
    Reshaped out;
    for (int round = 0; round < 400; ++round) {
        const Tier tier = randomLockedTier(random, 1 + random() % 6);
        PriceRules rules;
        rules.points = randomRules(random).points;
        const auto start = askingPrices(tier.units);
        const int steps = static_cast<int>(random() % 7) - 3;
        nudgeUnits(tier.units, start, everyUnit(tier), steps, rules, out);
        for (std::uint32_t i = 0; i < tier.units.size(); ++i)
            QVERIFY(out.prices[i] == (tier.units[i].locked ? start[i] : rules.points.stepped(start[i], steps)));
    }
}

void ByHandTest::nudgeStopsAtTheLastPoint()
{
    const Tier tier = tierOf({1000, 1950}, 1000);
    PriceRules rules;
    rules.points = {{100}, {}, Price{1000}, Price{2000}};
    Reshaped out;
    const auto start = askingPrices(tier.units);
    nudgeUnits(tier.units, start, std::vector<std::uint32_t>{1}, 1, rules, out);
    QVERIFY(out.prices[1].minor == 2000 && out.bound == Bound::none);
    nudgeUnits(tier.units, start, std::vector<std::uint32_t>{1}, 2, rules, out);
    QVERIFY(out.prices[1].minor == 2000 && out.bound == Bound::greatestPoint);
    nudgeUnits(tier.units, start, std::vector<std::uint32_t>{0}, -1, rules, out);
    QVERIFY(out.prices[0].minor == 1000 && out.bound == Bound::leastPoint);
    rules.greatestChange = Price{250};
    nudgeUnits(tier.units, start, std::vector<std::uint32_t>{0}, 5, rules, out);
    QVERIFY(out.prices[0].minor == 1200 && out.bound == Bound::changeMoney);
}

void ByHandTest::bendKeepsOrderLocksAndEnds()
{
    std::mt19937_64 random(103);
    Reshaped out;
    for (int round = 0; round < 600; ++round) {
        const Tier tier = randomLockedTier(random, 2 + random() % 30);
        PriceRules rules;
        rules.points = randomRules(random).points;
        const auto start = askingPrices(tier.units);
        const double g = std::exp(0.02 * (static_cast<double>(random() % 200) - 100));
        bendUnits(tier.units, start, everyUnit(tier), g, rules, out);
        const Price lo = *std::ranges::min_element(start);
        const Price hi = *std::ranges::max_element(start);
        for (std::size_t i = 0; i < start.size(); ++i) {
            if (tier.units[i].locked || start[i] == lo || start[i] == hi)
                QVERIFY(out.prices[i] == start[i]);
            QVERIFY(out.prices[i] >= lo && out.prices[i] <= hi);
            if (out.prices[i] != start[i])
                QVERIFY(rules.points.allows(out.prices[i]));
            for (std::size_t j = 0; j < start.size(); ++j)
                if (!tier.units[i].locked && !tier.units[j].locked && start[i] < start[j])
                    QVERIFY(out.prices[i] <= out.prices[j]);
        }
    }
}

void ByHandTest::bendFollowsItsFormula()
{
    const Tier tier = tierOf({1000, 1250, 1500, 2000}, 1000);
    Reshaped out;
    bendUnits(tier.units, askingPrices(tier.units), everyUnit(tier), 2, PriceRules{}, out);
    // By hand: 1000 + 1000 * 0.25^2 = 1062.5, of two equally near points the upper by rounding half away; 1000 + 1000 * 0.5^2 = 1250.
    QVERIFY(out.prices[1].minor == 1062 || out.prices[1].minor == 1063);
    QCOMPARE(out.prices[2].minor, 1250);
    PriceRules rules;
    rules.points.step = {100};
    bendUnits(tier.units, askingPrices(tier.units), everyUnit(tier), 0.5, rules, out);
    QCOMPARE(out.prices[1].minor, 1500); // 1000 + 1000 * 0.25^0.5
    QCOMPARE(out.prices[2].minor, 1700); // 1707
    // Only those among which it bends.
    bendUnits(tier.units, askingPrices(tier.units), std::vector<std::uint32_t>{0, 1, 2}, 2, rules, out);
    QCOMPARE(out.prices[1].minor, 1100); // 1000 + 500 * 0.5^2 = 1125
    QCOMPARE(out.prices[3].minor, 2000);
}

void ByHandTest::bendUpRaisesAndBendDownLowers()
{
    std::mt19937_64 random(104);
    Reshaped out;
    for (int round = 0; round < 100; ++round) {
        TierSpread spread;
        spread.units = 3 + random() % 30;
        const Tier tier = randomTier(random, spread);
        const auto start = askingPrices(tier.units);
        const double gap = *measured(tier, start, {}).gap.gap;
        for (double g : {0.5, 0.9, 1.1, 2.0}) {
            bendUnits(tier.units, start, everyUnit(tier), g, PriceRules{}, out);
            for (std::size_t i = 0; i < start.size(); ++i)
                QVERIFY(g < 1 ? out.prices[i] >= start[i] : out.prices[i] <= start[i]);
            const double bent = *measured(tier, out.prices, {}).gap.gap;
            QVERIFY(g < 1 ? bent >= gap : bent <= gap);
        }
        bendUnits(tier.units, start, everyUnit(tier), 1, PriceRules{}, out);
        QVERIFY(out.prices == start);
    }
}

void ByHandTest::bendLeavesFlatLaddersAlone()
{
    const Tier tier = tierOf({1234, 1234, 1234}, 1000);
    PriceRules rules;
    rules.points.step = {100};
    Reshaped out;
    bendUnits(tier.units, askingPrices(tier.units), everyUnit(tier), 3, rules, out);
    QVERIFY(out.prices == askingPrices(tier.units));
    bendUnits(tier.units, askingPrices(tier.units), {}, 3, rules, out);
    QVERIFY(out.prices == askingPrices(tier.units));
    const Tier narrow = tierOf({1010, 1030, 1090}, 1000); // No price point in between.
    bendUnits(narrow.units, askingPrices(narrow.units), everyUnit(narrow), 3, rules, out);
    QVERIFY(out.prices == askingPrices(narrow.units));
}

void ByHandTest::bendHoldsAUnitAtItsRules()
{
    const Tier tier = tierOf({1000, 1500, 2000}, 1000);
    PriceRules rules;
    rules.greatestChange = Price{100};
    Reshaped out;
    bendUnits(tier.units, askingPrices(tier.units), everyUnit(tier), 3, rules, out);
    QVERIFY(out.prices[1].minor == 1400 && out.bound == Bound::changeMoney);
}

void ByHandTest::reusesStorage()
{
    const Tier tier = tierOf({1000, 1500, 2000}, 1000);
    Reshaped out;
    moveUnits(tier.units, askingPrices(tier.units), std::vector<std::uint32_t>{0}, {10}, PriceRules{}, out);
    const Price* storage = out.prices.data();
    moveUnits(tier.units, askingPrices(tier.units), std::vector<std::uint32_t>{0}, {20}, PriceRules{}, out);
    QVERIFY(out.prices.data() == storage && out.prices[0].minor == 1020);
}

QTEST_APPLESS_MAIN(ByHandTest)
#include "by_hand_test.moc"
