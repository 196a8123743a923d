// SPDX-License-Identifier: GPL-3.0-or-later
// The checks before a sheet leaves, on a tier small enough to be worked by hand.
#include <QtTest>

#include "claims/checks.h"

#include <cmath>
#include <random>

using namespace rungwright;

namespace
{

Unit unitAt(const char* name, std::int64_t price, Status status, std::optional<int> grade = {})
{
    Unit unit;
    unit.name = name;
    unit.asking = Price{price};
    unit.status = status;
    unit.grade = grade;
    return unit;
}

/// Advertised from 70.00; on offer 70.00, 80.00, 90.00 (grades 1, 2, 3), taken 70.00, closed 10.00. Invented.
Tier smallTier()
{
    Tier tier;
    tier.site = "Tern Wharf (invented)";
    tier.name = "Box 4";
    tier.advertisedFloor = Price{7000};
    tier.units = {unitAt("A", 7000, Status::vacant, 1), unitAt("B", 8000, Status::vacant, 2), unitAt("C", 9000, Status::vacant, 3),
                  unitAt("D", 7000, Status::occupied), unitAt("E", 1000, Status::closed)};
    return tier;
}

Check oneOf(CheckKind kind, const Tier& tier, const std::vector<Price>& prices, const PriceRules& rules = {},
            const ClaimLimits& limits = {}, std::optional<double> load = {})
{
    return claimChecks(tier, prices, rules, limits, load)[static_cast<std::size_t>(kind)];
}

std::vector<Price> changed(const Tier& tier, std::size_t unit, std::int64_t to)
{
    std::vector<Price> prices = askingPrices(tier.units);
    prices[unit] = Price{to};
    return prices;
}

} // namespace

class ChecksTest : public QObject
{
    Q_OBJECT
private slots:
    void theyComeInOrder()
    {
        const Tier tier = smallTier();
        const auto checks = claimChecks(tier, askingPrices(tier.units), {}, {});
        QCOMPARE(checks.size(), std::size_t(7));
        for (std::size_t i = 0; i < checks.size(); ++i)
            QCOMPARE(static_cast<std::size_t>(checks[i].kind), i);
    }

    void floorOnSaleByHand()
    {
        const Tier tier = smallTier();
        const Check now = oneOf(CheckKind::floorOnSale, tier, askingPrices(tier.units));
        QVERIFY(now.outcome == ClaimOutcome::holds);
        QCOMPARE(now.count, std::size_t(1)); // A; D is taken, E closed
        QCOMPARE(now.of, std::size_t(3));
        const Check raised = oneOf(CheckKind::floorOnSale, tier, changed(tier, 0, 7100));
        QVERIFY(raised.outcome == ClaimOutcome::lookAtThis);
        QVERIFY(raised.price == Price{7100});
        Tier full = tier;
        for (Unit& unit : full.units)
            unit.status = Status::occupied;
        QVERIFY(oneOf(CheckKind::floorOnSale, full, askingPrices(full.units)).outcome == ClaimOutcome::lookAtThis);
        Tier unknown = tier;
        unknown.advertisedFloor = {};
        const Check none = oneOf(CheckKind::floorOnSale, unknown, askingPrices(tier.units));
        QVERIFY(none.outcome == ClaimOutcome::notChecked && none.why == NotChecked::noFloor);
    }

    void shareAtFloorByHand()
    {
        const Tier tier = smallTier();
        const auto prices = askingPrices(tier.units);
        // 1 of 3 on offer.
        const Check unset = oneOf(CheckKind::shareAtFloor, tier, prices);
        QVERIFY(unset.outcome == ClaimOutcome::notChecked && unset.why == NotChecked::noLeastShare);
        QCOMPARE(*unset.value, 1.0 / 3.0);
        ClaimLimits limits;
        limits.leastShareAtFloor = 1.0 / 3.0;
        QVERIFY(oneOf(CheckKind::shareAtFloor, tier, prices, {}, limits).outcome == ClaimOutcome::holds);
        limits.leastShareAtFloor = 0.34;
        QVERIFY(oneOf(CheckKind::shareAtFloor, tier, prices, {}, limits).outcome == ClaimOutcome::lookAtThis);
    }

    void waitForTheLastOneByHand()
    {
        // One unit, load 1: the next enquiry takes it, after 1/1 mean stays. Two units, none taken: 1 for the first, then from one taken
        // t = 1/2 + 1/2 (1 + t), so t = 2; together 3.
        QCOMPARE(meanStaysUntilTaken(1, 0, 1.0), 1.0);
        QCOMPARE(meanStaysUntilTaken(2, 1, 1.0), 2.0);
        QCOMPARE(meanStaysUntilTaken(2, 0, 1.0), 3.0);
        QCOMPARE(meanStaysUntilTaken(1, 0, 4.0), 0.25);
        QVERIFY(std::isinf(meanStaysUntilTaken(2000, 0, 1e-3)));
    }

    void waitForTheLastOneByChance()
    {
        // The same by playing it: exponential arrivals at rate 3, stays of mean 1, four units of which one is taken.
        std::mt19937_64 dice(20261201);
        std::exponential_distribution<double> wait(1.0);
        constexpr int games = 40'000;
        double sum = 0;
        double squares = 0;
        for (int game = 0; game < games; ++game) {
            double clock = 0;
            for (int taken = 1; taken < 4;) {
                const double rate = 3.0 + taken;
                clock += wait(dice) / rate;
                taken += std::uniform_real_distribution<double>(0, rate)(dice) < 3.0 ? 1 : -1;
            }
            sum += clock;
            squares += clock * clock;
        }
        const double mean = sum / games;
        const double error = std::sqrt((squares / games - mean * mean) / games);
        QVERIFY2(std::abs(mean - meanStaysUntilTaken(4, 1, 3.0)) < 4 * error, qPrintable(QString::number(mean))); // four standard errors
    }

    void floorStaysByHand()
    {
        const Tier tier = smallTier();
        // A and D at the floor: n = 2, D is taken; at load 1, B(2, 1) = 1/5 (1 + 1 + 1/2 = 5/2 shares, of which 1/2).
        ClaimLimits limits;
        const Check unset = oneOf(CheckKind::floorStays, tier, askingPrices(tier.units), {}, limits, 1.0);
        QVERIFY(unset.outcome == ClaimOutcome::notChecked && unset.why == NotChecked::noLeastTime);
        QVERIFY(std::abs(*unset.value - 0.8) < 1e-15); // a rounding
        QCOMPARE(*unset.untilGone, 2.0);
        limits.leastTimeAtFloor = 0.8;
        QVERIFY(oneOf(CheckKind::floorStays, tier, askingPrices(tier.units), {}, limits, 1.0).outcome == ClaimOutcome::holds);
        limits.leastTimeAtFloor = 0.9;
        QVERIFY(oneOf(CheckKind::floorStays, tier, askingPrices(tier.units), {}, limits, 1.0).outcome == ClaimOutcome::lookAtThis);
        QVERIFY(oneOf(CheckKind::floorStays, tier, changed(tier, 0, 7100)).why == NotChecked::floorNotOnSale);
        Tier empty = tier;
        empty.units[3].status = Status::vacant;
        QVERIFY(oneOf(CheckKind::floorStays, empty, askingPrices(tier.units)).why == NotChecked::loadUnknown);
    }

    void inversionsByHand()
    {
        const Tier tier = smallTier();
        QVERIFY(oneOf(CheckKind::inversions, tier, askingPrices(tier.units)).outcome == ClaimOutcome::holds);
        // C, grade 3, at 75.00: below B (80.00, grade 2), above A (70.00).
        const Check one = oneOf(CheckKind::inversions, tier, changed(tier, 2, 7500));
        QVERIFY(one.outcome == ClaimOutcome::lookAtThis);
        QCOMPARE(one.count, std::size_t(1));
        QCOMPARE(one.before, std::size_t(0));
        Tier plain = tier;
        for (Unit& unit : plain.units)
            unit.grade.reset();
        QVERIFY(oneOf(CheckKind::inversions, plain, askingPrices(tier.units)).why == NotChecked::noGrades);
    }

    void breachesByHand()
    {
        Tier tier = smallTier();
        tier.units[1].locked = true;
        PriceRules rules;
        rules.points.step = Price{100};
        rules.greatestChangePercent = 10.0;
        rules.ceiling = Price{9500};
        // A: 70.00 to 80.00 is 14.3 %. B is locked. C: 90.00 to 95.50 is within 10 % and above the ceiling. D: 70.00 to 70.50 is no whole
        // amount. E stays.
        const std::vector<Price> prices{Price{8000}, Price{8100}, Price{9550}, Price{7050}, Price{1000}};
        const std::vector<RuleBreach> wanted{{0, Bound::changePercent}, {1, Bound::lock}, {2, Bound::ceiling}, {3, Bound::none}};
        QVERIFY(ruleBreaches(tier, prices, rules) == wanted);
        const Check check = oneOf(CheckKind::changesByRule, tier, prices, rules);
        QVERIFY(check.outcome == ClaimOutcome::lookAtThis);
        QCOMPARE(check.count, std::size_t(4));
        QCOMPARE(check.of, std::size_t(4));
        QVERIFY(oneOf(CheckKind::changesByRule, tier, askingPrices(tier.units), rules).outcome == ClaimOutcome::holds);
        const Tier free = smallTier();
        QVERIFY(oneOf(CheckKind::changesByRule, free, prices).why == NotChecked::noRules);
    }

    void totalByHand()
    {
        const Tier tier = smallTier();
        // 240.00 on offer; C down by 12.00 is 5 %. The taken unit does not count.
        auto prices = changed(tier, 2, 7800);
        prices[3] = Price{99'900};
        const Check unset = oneOf(CheckKind::totalByRule, tier, prices);
        QVERIFY(unset.why == NotChecked::noTotalRule);
        QVERIFY(unset.price == Price{-1200});
        QCOMPARE(*unset.value, -0.05);
        ClaimLimits limits;
        limits.greatestTotalPercent = 5.0;
        QVERIFY(oneOf(CheckKind::totalByRule, tier, prices, {}, limits).outcome == ClaimOutcome::holds);
        limits.greatestTotal = Price{1199};
        QVERIFY(oneOf(CheckKind::totalByRule, tier, prices, {}, limits).outcome == ClaimOutcome::lookAtThis);
        limits = {};
        limits.greatestTotalPercent = 4.9;
        QVERIFY(oneOf(CheckKind::totalByRule, tier, prices, {}, limits).outcome == ClaimOutcome::lookAtThis);
    }

    void belowFloorByHand()
    {
        const Tier tier = smallTier();
        QVERIFY(oneOf(CheckKind::belowFloor, tier, askingPrices(tier.units)).outcome == ClaimOutcome::holds); // E is closed
        const Check one = oneOf(CheckKind::belowFloor, tier, changed(tier, 0, 6999));
        QVERIFY(one.outcome == ClaimOutcome::lookAtThis);
        QCOMPARE(one.count, std::size_t(1));
        QCOMPARE(one.before, std::size_t(0));
    }
};

QTEST_APPLESS_MAIN(ChecksTest)
#include "checks_test.moc"
