// SPDX-License-Identifier: GPL-3.0-or-later
// Holding the asking total: what is spread, over whom, and what is left.
#include <QtTest>

#include "reshape/by_hand.h"

#include "core/reshape/allowed_prices.h"
#include "core/sample_tiers.h"

#include <numeric>

using namespace rungwright;

namespace
{

std::int64_t total(const std::vector<Price>& prices) { return std::accumulate(prices.begin(), prices.end(), Price{}).minor; }

std::vector<std::uint32_t> everyUnit(const Tier& tier)
{
    std::vector<std::uint32_t> all(tier.units.size());
    std::iota(all.begin(), all.end(), 0U);
    return all;
}

struct Held {
    std::vector<Price> start;
    std::vector<std::uint32_t> moved;
    Reshaped out;
};

Held dragAndHold(const Tier& tier, const std::vector<std::uint32_t>& moved, std::int64_t by, const PriceRules& rules)
{
    Held held{askingPrices(tier.units), moved, {}};
    moveUnits(tier.units, held.start, moved, {by}, rules, held.out);
    holdTotal(tier.units, held.start, everyUnit(tier), moved, rules, held.out);
    return held;
}

/// Largest remainder on an even grid, written out: room, shares, whole steps, and one more for the largest remainders.
std::vector<Price> spreadByHand(const Tier& tier, const std::vector<Price>& afterMove, const std::vector<std::uint32_t>& moved,
                                const PriceRules& rules)
{
    const std::int64_t step = rules.points.step.minor;
    std::vector<Price> prices = afterMove;
    std::int64_t need = 0;
    for (std::size_t i = 0; i < prices.size(); ++i)
        need -= (afterMove[i] - tier.units[i].asking).minor;
    const std::int64_t sign = need < 0 ? -1 : 1;
    struct Share {
        std::size_t unit;
        double room, share, remainder;
    };
    std::vector<Share> shares;
    double all = 0;
    for (std::size_t i = 0; i < prices.size(); ++i) {
        if (tier.units[i].locked || std::ranges::count(moved, i) == 1)
            continue;
        const auto allowed = allowedPrices(tier.units[i], rules);
        const auto room = static_cast<double>(std::abs((sign > 0 ? allowed.back() : allowed.front()) - tier.units[i].asking.minor));
        shares.push_back({i, room, 0, 0});
        all += room;
    }
    std::int64_t left = std::abs(need);
    for (Share& share : shares) {
        share.share = static_cast<double>(std::abs(need)) * share.room / all;
        const auto whole = static_cast<std::int64_t>(share.share / static_cast<double>(step)) * step;
        share.remainder = share.share - static_cast<double>(whole);
        prices[share.unit] += Price{sign * whole};
        left -= whole;
    }
    std::ranges::stable_sort(shares, std::ranges::greater{}, &Share::remainder);
    for (const Share& share : shares)
        if (left > 0) {
            prices[share.unit] += Price{sign * step};
            left -= step;
        }
    return prices;
}

} // namespace

class HoldTotalTest : public QObject
{
    Q_OBJECT

private slots:
    void spreadsInProportionToRoom();
    void isExactOnAnEvenGrid();
    void followsTheLargestRemainder();
    void keepsRulesLocksAndMovedUnits();
    void neverOvershootsAndLeavesNoStepThatFits();
    void saysWhenThereIsNoRoom();
    void countsOnlyWhatItIsTold();
    void exchangesAStepToComeOutEven();
    void doesNothingWhenNothingWasTaken();
};

void HoldTotalTest::spreadsInProportionToRoom()
{
    // By hand: one unit is dragged down by 6.00; 6.00 goes up, rooms 10 % of 20.00, 40.00 and 60.00, so 1.00, 2.00 and 3.00.
    const Tier tier = tierOf({10000, 2000, 4000, 6000}, 2000);
    PriceRules rules;
    rules.greatestChangePercent = 10;
    const auto held = dragAndHold(tier, {0}, -600, rules);
    QCOMPARE(held.out.prices[0].minor, 9400);
    QCOMPARE(held.out.prices[1].minor, 2100);
    QCOMPARE(held.out.prices[2].minor, 4200);
    QCOMPARE(held.out.prices[3].minor, 6300);
    QCOMPARE(held.out.leftOver.minor, 0);
}

void HoldTotalTest::isExactOnAnEvenGrid()
{
    std::mt19937_64 random(111);
    int spread = 0;
    for (int round = 0; round < 500; ++round) {
        PriceRules rules;
        rules.points.step = {static_cast<std::int64_t>(1 + random() % 50)};
        rules.greatestChangePercent = 5.0 + static_cast<double>(random() % 20);
        std::vector<std::int64_t> prices(3 + random() % 20);
        for (auto& price : prices)
            price = rules.points.step.minor * static_cast<std::int64_t>(20 + random() % 60);
        const Tier tier = tierOf(prices, 1);
        const auto held = dragAndHold(tier, {static_cast<std::uint32_t>(random() % prices.size())},
                                      static_cast<std::int64_t>(random() % 600) - 300, rules);
        std::int64_t room = 0;
        const std::int64_t taken = (held.out.prices[held.moved[0]] - held.start[held.moved[0]]).minor;
        for (std::size_t i = 0; i < prices.size(); ++i)
            if (i != held.moved[0]) {
                const auto allowed = allowedPrices(tier.units[i], rules);
                room += std::abs((taken < 0 ? allowed.back() : allowed.front()) - prices[i]);
            }
        if (room >= std::abs(taken)) {
            QCOMPARE(held.out.leftOver.minor, 0);
            QCOMPARE(total(held.out.prices), total(held.start));
            spread += taken != 0;
        } else {
            QCOMPARE(held.out.leftOver.minor, taken < 0 ? taken + room : taken - room);
        }
    }
    QVERIFY(spread > 100); // The sample is not all trivial.
}

void HoldTotalTest::followsTheLargestRemainder()
{
    std::mt19937_64 random(112);
    int compared = 0;
    for (int round = 0; round < 500; ++round) {
        PriceRules rules;
        rules.points.step = {static_cast<std::int64_t>(1 + random() % 40)};
        rules.greatestChange = Price{static_cast<std::int64_t>(200 + random() % 300)};
        std::vector<std::int64_t> prices(4 + random() % 12);
        for (auto& price : prices)
            price = rules.points.step.minor * static_cast<std::int64_t>(30 + random() % 30) +
                    400 / rules.points.step.minor * rules.points.step.minor;
        Tier tier = tierOf(prices, 1);
        tier.units[1].locked = random() % 2;
        const std::vector<std::uint32_t> moved{0, 2};
        const auto held = dragAndHold(tier, moved, static_cast<std::int64_t>(random() % 300) - 150, rules);
        Reshaped moveOnly;
        moveUnits(tier.units, held.start, moved, {(held.out.prices[0] - held.start[0])}, rules, moveOnly);
        if (moveOnly.prices[2] != held.out.prices[2] || held.out.leftOver.minor != 0)
            continue; // The two were held differently, or room was short.
        QVERIFY(held.out.prices == spreadByHand(tier, moveOnly.prices, moved, rules));
        ++compared;
    }
    QVERIFY(compared > 200);
}

void HoldTotalTest::keepsRulesLocksAndMovedUnits()
{
    std::mt19937_64 random(113);
    for (int round = 0; round < 400; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 12;
        spread.floor = 300;
        spread.range = 2200;
        Tier tier = randomTier(random, spread);
        for (Unit& unit : tier.units)
            unit.locked = random() % 5 == 0;
        const PriceRules rules = randomRules(random);
        const std::vector<std::uint32_t> moved{static_cast<std::uint32_t>(random() % tier.units.size())};
        const std::int64_t by = static_cast<std::int64_t>(random() % 800) - 400;
        const auto held = dragAndHold(tier, moved, by, rules);
        Reshaped moveOnly;
        moveUnits(tier.units, held.start, moved, {by}, rules, moveOnly);
        QVERIFY(held.out.prices[moved[0]] == moveOnly.prices[moved[0]]);
        for (std::size_t i = 0; i < tier.units.size(); ++i) {
            const auto allowed = allowedPrices(tier.units[i], rules);
            QVERIFY(std::ranges::count(allowed, held.out.prices[i].minor) == 1);
            if (tier.units[i].locked)
                QVERIFY(held.out.prices[i] == held.start[i]);
        }
    }
}

void HoldTotalTest::neverOvershootsAndLeavesNoStepThatFits()
{
    std::mt19937_64 random(114);
    for (int round = 0; round < 600; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 12;
        spread.floor = 300;
        spread.range = 2200;
        const Tier tier = randomTier(random, spread);
        const PriceRules rules = randomRules(random);
        const std::vector<std::uint32_t> moved{0};
        const auto held = dragAndHold(tier, moved, static_cast<std::int64_t>(random() % 800) - 400, rules);
        const std::int64_t left = total(held.out.prices) - total(held.start);
        QCOMPARE(held.out.leftOver.minor, left);
        const std::int64_t taken = (held.out.prices[0] - held.start[0]).minor;
        QVERIFY(taken >= 0 ? left >= 0 && left <= taken : left <= 0 && left >= taken);
        if (left == 0)
            continue;
        for (std::size_t i = 1; i < tier.units.size(); ++i)
            for (const std::int64_t p : allowedPrices(tier.units[i], rules)) {
                if (p == tier.units[i].asking.minor)
                    continue; // Today's price is allowed, but between points no step leads to it.
                const std::int64_t step = p - held.out.prices[i].minor;
                QVERIFY(!(left > 0 ? step < 0 && -step <= left : step > 0 && step <= -left));
            }
    }
}

void HoldTotalTest::saysWhenThereIsNoRoom()
{
    Tier tier = tierOf({5000, 6000, 7000}, 5000);
    tier.units[1].locked = true;
    PriceRules rules;
    rules.ceiling = Price{7100};
    const auto held = dragAndHold(tier, {0}, -500, rules);
    QCOMPARE(held.out.prices[2].minor, 7100);
    QCOMPARE(held.out.leftOver.minor, -400); // The new total is 4.00 lower.
    tier.units[2].locked = true;
    QCOMPARE(dragAndHold(tier, {0}, -500, rules).out.leftOver.minor, -500);
    QCOMPARE(dragAndHold(tier, {0}, 500, rules).out.leftOver.minor, 500);
}

void HoldTotalTest::countsOnlyWhatItIsTold()
{
    // Units outside `counted` neither count nor receive.
    const Tier tier = tierOf({5000, 6000, 7000}, 5000);
    const auto start = askingPrices(tier.units);
    Reshaped out;
    moveUnits(tier.units, start, std::vector<std::uint32_t>{0}, {-300}, PriceRules{}, out);
    holdTotal(tier.units, start, std::vector<std::uint32_t>{0, 1}, std::vector<std::uint32_t>{0}, PriceRules{}, out);
    QVERIFY(out.prices[1].minor == 6300 && out.prices[2].minor == 7000 && out.leftOver.minor == 0);
    // A moved unit that does not count takes nothing from the total.
    moveUnits(tier.units, start, std::vector<std::uint32_t>{0}, {-300}, PriceRules{}, out);
    holdTotal(tier.units, start, std::vector<std::uint32_t>{1, 2}, std::vector<std::uint32_t>{0}, PriceRules{}, out);
    QVERIFY(out.prices[1].minor == 6000 && out.prices[2].minor == 7000 && out.leftOver.minor == 0);
}

void HoldTotalTest::exchangesAStepToComeOutEven()
{
    // Multiples of 5.00; the second unit's price today, 52.30, is none. By room, 12.70 and 5.00, its share of 5.00 takes it to 55.00, and
    // the 2.30 left are no step; the third unit's step of 5.00 and the second one's return by 2.70 make them good.
    const Tier tier = tierOf({8000, 5230, 6000}, 5000);
    PriceRules rules;
    rules.points.step = {500};
    rules.ceiling = Price{6500};
    const auto held = dragAndHold(tier, {0}, -500, rules);
    QCOMPARE(held.out.prices[0].minor, 7500);
    QCOMPARE(held.out.leftOver.minor, 0);
    QCOMPARE(held.out.prices[1].minor, 5230);
    QCOMPARE(held.out.prices[2].minor, 6500);
}

void HoldTotalTest::doesNothingWhenNothingWasTaken()
{
    const Tier tier = tierOf({5000, 6033}, 5000);
    PriceRules rules;
    rules.points.step = {100};
    const auto held = dragAndHold(tier, {0}, 0, rules);
    QVERIFY(held.out.prices == held.start && held.out.leftOver.minor == 0);
}

QTEST_APPLESS_MAIN(HoldTotalTest)
#include "hold_total_test.moc"
