// SPDX-License-Identifier: GPL-3.0-or-later
// Room and snapping against the rules taken literally.
#include <QtTest>

#include "reshape/rules.h"

#include "core/reshape/allowed_prices.h"

using namespace rungwright;

namespace
{

Unit unitAt(std::int64_t price)
{
    Unit unit;
    unit.asking = {price};
    return unit;
}

/// Of `prices`, the nearest to `wanted`, the cheaper of two equally near ones.
std::int64_t nearestOf(const std::vector<std::int64_t>& prices, std::int64_t wanted)
{
    std::int64_t nearest = prices.front();
    for (const auto p : prices)
        if (std::abs(p - wanted) < std::abs(nearest - wanted))
            nearest = p;
    return nearest;
}

/// Where `wanted` would go if only the spacing of the points (and today's price) counted.
std::int64_t bySpacingAlone(const Unit& unit, std::int64_t wanted, const PriceRules& rules)
{
    std::vector<std::int64_t> prices;
    for (std::int64_t p = wanted - 400; p <= wanted + 400; ++p)
        if (isGridPoint(rules.points, p) || p == unit.asking.minor)
            prices.push_back(p);
    return nearestOf(prices, wanted);
}

} // namespace

class RulesTest : public QObject
{
    Q_OBJECT

private slots:
    void roomHoldsExactlyWhatTheRulesAllow();
    void snapsToTheNearestAllowedPrice();
    void namesWhatBinds();
    void aWholePercentIsNotLostToRounding();
    void locksHold();
    void aUnitThatBreaksARuleMayStay();
    void everyReasonHasWords();
};

void RulesTest::roomHoldsExactlyWhatTheRulesAllow()
{
    std::mt19937_64 random(91);
    for (int round = 0; round < 3000; ++round) {
        const PriceRules rules = randomRules(random);
        const Unit unit = unitAt(static_cast<std::int64_t>(200 + random() % 2500));
        const auto allowed = allowedPrices(unit, rules);
        const Room room = roomOf(unit, rules);
        QCOMPARE(room.lo.minor, allowed.front());
        QCOMPARE(room.hi.minor, allowed.back());
        QVERIFY(room.above != Bound::none && room.below != Bound::none); // There is always a last price.
    }
}

void RulesTest::snapsToTheNearestAllowedPrice()
{
    std::mt19937_64 random(92);
    for (int round = 0; round < 300; ++round) {
        const PriceRules rules = randomRules(random);
        const Unit unit = unitAt(static_cast<std::int64_t>(200 + random() % 2500));
        const auto allowed = allowedPrices(unit, rules);
        for (int i = 0; i < 20; ++i) {
            const auto wanted = static_cast<std::int64_t>(random() % 4400) - 200;
            const Snapped result = snapped(unit, unit.asking, {wanted}, rules);
            QCOMPARE(result.price.minor, nearestOf(allowed, wanted));
            // Something other than the spacing stood in the way exactly when the spacing alone would have given another price.
            QCOMPARE(result.bound != Bound::none, bySpacingAlone(unit, wanted, rules) != result.price.minor);
        }
    }
}

void RulesTest::namesWhatBinds()
{
    const Unit unit = unitAt(10000);
    PriceRules rules;
    rules.points.step = {100};
    rules.greatestChangePercent = 10;
    QVERIFY(roomOf(unit, rules).above == Bound::changePercent);
    QCOMPARE(roomOf(unit, rules).hi.minor, 11000);
    rules.greatestChange = Price{500};
    QVERIFY(roomOf(unit, rules).above == Bound::changeMoney);
    QVERIFY(roomOf(unit, rules).below == Bound::changeMoney);
    QCOMPARE(roomOf(unit, rules).lo.minor, 9500);
    rules.ceiling = Price{10200};
    QVERIFY(roomOf(unit, rules).above == Bound::ceiling);
    QVERIFY(roomOf(unit, rules).below == Bound::changeMoney);
    rules.points.greatest = Price{10100};
    QVERIFY(roomOf(unit, rules).above == Bound::greatestPoint);
    QCOMPARE(roomOf(unit, rules).hi.minor, 10100);
    rules.points.least = Price{9900};
    QVERIFY(roomOf(unit, rules).below == Bound::leastPoint);
    rules.points.least = Price{10150}; // Nothing left between least and greatest.
    QVERIFY(roomOf(unit, rules).above == Bound::noPricePoint);
    QCOMPARE(roomOf(unit, rules).hi.minor, 10000);

    PriceRules tenPercent;
    tenPercent.points.step = {100};
    tenPercent.greatestChangePercent = 10.0;
    QVERIFY(snapped(unit, {10000}, {13000}, tenPercent).bound == Bound::changePercent);
    QVERIFY(snapped(unit, {10000}, {10960}, tenPercent).bound == Bound::none);
    QVERIFY(snapped(unit, {10000}, {11040}, tenPercent).bound == Bound::none); // Spacing would do the same.
    QVERIFY(snapped(unit, {10000}, {11060}, tenPercent).bound == Bound::changePercent);
}

void RulesTest::aWholePercentIsNotLostToRounding()
{
    // 0.7 % of 100.00 is 0.70 though 10000 * 0.7 / 100 is a little less in floating point; every tenth of a percent of every 10.00 is
    // whole.
    PriceRules rules;
    for (int tenths = 1; tenths <= 1000; ++tenths) {
        rules.greatestChangePercent = tenths / 10.0;
        for (std::int64_t today : {1000, 7000, 10000, 123000, 99'999'000}) {
            const Room room = roomOf(unitAt(today), rules);
            QCOMPARE(room.hi.minor - today, today / 1000 * tenths);
            QCOMPARE(today - room.lo.minor, std::min(today / 1000 * tenths, today - 1));
        }
    }
}

void RulesTest::locksHold()
{
    Unit unit = unitAt(777);
    unit.locked = true;
    PriceRules rules;
    rules.points.step = {100};
    const Room room = roomOf(unit, rules);
    QVERIFY(room.lo.minor == 777 && room.hi.minor == 777 && room.above == Bound::lock && room.below == Bound::lock);
    const Snapped moved = snapped(unit, {850}, {900}, rules); // Held at the candidate's price, not today's.
    QVERIFY(moved.price.minor == 850 && moved.bound == Bound::lock);
    QVERIFY(snapped(unit, {850}, {850}, rules).bound == Bound::none);
}

void RulesTest::aUnitThatBreaksARuleMayStay()
{
    PriceRules rules;
    rules.points.step = {500};
    rules.ceiling = Price{2000};
    const Unit unit = unitAt(2330); // Above the ceiling and off the points.
    QCOMPARE(snapped(unit, {2330}, {2330}, rules).price.minor, 2330);
    QVERIFY(snapped(unit, {2330}, {2330}, rules).bound == Bound::none);
    QCOMPARE(snapped(unit, {2330}, {3000}, rules).price.minor, 2330); // Never raised.
    QVERIFY(snapped(unit, {2330}, {3000}, rules).bound == Bound::ceiling);
    QCOMPARE(snapped(unit, {2330}, {2010}, rules).price.minor, 2000); // It may come down.
}

void RulesTest::everyReasonHasWords()
{
    for (const Bound bound :
         {Bound::none, Bound::lock, Bound::changePercent, Bound::changeMoney, Bound::ceiling, Bound::least, Bound::leastPoint,
          Bound::greatestPoint, Bound::noPricePoint, Bound::totalPercent, Bound::totalMoney, Bound::shareAtFloor})
        QVERIFY(!boundReason(bound).empty());
}

QTEST_APPLESS_MAIN(RulesTest)
#include "rules_test.moc"
