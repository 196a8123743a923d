// SPDX-License-Identifier: GPL-3.0-or-later
// Gap figures and the curtain against the enumeration of every case.
#include <QtTest>

#include "gap/measure.h"

#include "core/close.h"
#include "core/enumerated.h"
#include "core/sample_tiers.h"

using namespace rungwright;

namespace
{

void compareFigures(const Measurement& measured, const Enumerated& expected)
{
    const auto floor = static_cast<double>(measured.advertisedFloor.minor);
    const GapFigures& gap = measured.gap;
    // 1e-9 of the price, and of the gap where it is not tiny beside it.
    COMPARE_CLOSE(*gap.expectedCheapest, expected.expected(), 1e-9);
    COMPARE_WITHIN(*gap.gap, expected.expected() - floor, 1e-9 * std::abs(expected.expected() - floor) + 1e-9);
    COMPARE_CLOSE(*gap.gapShare * floor, *gap.gap, 1e-12);
    COMPARE_CLOSE(*gap.claimPart, static_cast<double>(measured.ladder.front().price.minor) - floor, 0);
    COMPARE_WITHIN(*gap.claimPart + *gap.shapePart, *gap.gap, 1e-9);
    QVERIFY(*gap.shapePart >= 0);
    COMPARE_WITHIN(*gap.chanceFloorMet, expected.chanceAtMost(measured.advertisedFloor.minor), 1e-12);
    COMPARE_CLOSE(*gap.gapMedian, expected.quantile(0.5) - floor, 0);
    COMPARE_CLOSE(*gap.gapP90, expected.quantile(0.9) - floor, 0);
}

/// Integral of the curtain from the floor upwards.
double areaFromFloor(const std::vector<CurtainStep>& steps, double floor)
{
    double area = 0;
    double from = floor;
    for (const CurtainStep& step : steps) {
        area += std::max(0.0, step.price - from) * step.chance;
        from = std::max(from, step.price);
    }
    return area;
}

std::vector<std::int64_t> pricesOf(const std::vector<Rung>& ladder)
{
    std::vector<std::int64_t> prices;
    for (const Rung& rung : ladder)
        prices.push_back(rung.price.minor);
    return prices;
}

Measurement measure(const Tier& tier, const ModelSettings& settings) { return measured(tier, askingPrices(tier.units), settings); }

} // namespace

class GapFiguresTest : public QObject
{
    Q_OBJECT

private slots:
    void agreeWithAllDraws();
    void agreeWithAllSetsOfASize();
    void agreeWithAllSets();
    void ofTurnoverFollowFromItsOdds();
    void onHandIsExact();
    void ofTheFittedRangeFollowFromItsDistribution();
    void meetExactHalves();
    void areGivenThatSomethingIsOnOffer();
    void curtainAreaIsTheGap();
    void curtainCountsOnlyWhatLiesAboveTheFloor();
    void curtainIsTheChanceOfNothingCheaper();
    void smoothCurtainFollowsTheFit();
    void nothingFromNothing();
};

void GapFiguresTest::agreeWithAllDraws()
{
    std::mt19937_64 random(51);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 6;
        spread.grain = round % 2 ? 1 : 1000;
        Tier tier = randomTier(random, spread);
        tier.advertisedFloor.minor += static_cast<std::int64_t>(random() % 1000) - 300; // Some units below the floor, some tiers all above.
        for (int n = 1; n <= 6; ++n) {
            const auto result = measure(tier, {ModelKind::perceived, n, {}});
            compareFigures(result, allDraws(pricesOf(result.ladder), n));
        }
    }
}

void GapFiguresTest::agreeWithAllSetsOfASize()
{
    std::mt19937_64 random(52);
    for (int round = 0; round < 40; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 10;
        spread.grain = round % 2 ? 1 : 700;
        spread.mixedStatus = true;
        Tier tier = randomTier(random, spread);
        tier.advertisedFloor.minor += static_cast<std::int64_t>(random() % 1000) - 300;
        for (int k = 1; k <= static_cast<int>(measure(tier, {}).rentable); ++k) {
            const auto result = measure(tier, {ModelKind::remainder, k, {}});
            compareFigures(result, allSetsOf(pricesOf(result.ladder), k));
        }
    }
}

void GapFiguresTest::agreeWithAllSets()
{
    std::mt19937_64 random(53);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 11;
        spread.grain = round % 2 ? 1 : 700;
        spread.mixedStatus = true;
        spread.ownChances = true;
        const Tier tier = randomTier(random, spread);
        const auto result = measure(tier, {ModelKind::unit, {}, {}});
        std::vector<double> chances;
        for (const Rung& rung : result.ladder)
            chances.push_back(
                tier.units[rung.unit].vacancyChance.value_or(static_cast<double>(result.onOffer) / static_cast<double>(result.rentable)));
        compareFigures(result, allSets(pricesOf(result.ladder), chances));
    }
}

void GapFiguresTest::ofTurnoverFollowFromItsOdds()
{
    // The odds themselves are held against the Markov chain elsewhere.
    std::mt19937_64 random(54);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 40;
        spread.grain = round % 2 ? 1 : 700;
        const Tier tier = randomTier(random, spread);
        const auto result = measure(tier, {ModelKind::turnover, {}, 0.1 + static_cast<double>(random() % 100)});
        Enumerated expected;
        for (std::size_t i = 0; i < result.ladder.size(); ++i)
            expected.cheapest[result.ladder[i].price.minor] += result.odds.perRung[i];
        compareFigures(result, expected);
    }
}

void GapFiguresTest::onHandIsExact()
{
    const auto result = measure(tierOf({6000, 5500, 7000}, 5000), {ModelKind::onHand, {}, {}});
    QCOMPARE(*result.gap.expectedCheapest, 5500.0);
    QCOMPARE(*result.gap.gap, 500.0);
    QCOMPARE(*result.gap.gapShare, 0.1);
    QCOMPARE(*result.gap.claimPart, 500.0);
    QCOMPARE(*result.gap.shapePart, 0.0);
    QCOMPARE(*result.gap.chanceFloorMet, 0.0);
    QCOMPARE(*result.gap.gapMedian, 500.0);
    QCOMPARE(*result.gap.gapP90, 500.0);
}

void GapFiguresTest::ofTheFittedRangeFollowFromItsDistribution()
{
    const Tier tier = tierOf({5000, 5200, 6100, 6300, 6800, 7000}, 5000);
    const auto result = measure(tier, {ModelKind::fitted, 4, {}});
    QVERIFY(result.fit.has_value());
    COMPARE_CLOSE(*result.gap.expectedCheapest, expectedCheapest(*result.fit, 4), 1e-15);
    COMPARE_CLOSE(*result.gap.gap, *result.gap.expectedCheapest - 5000, 1e-12);
    COMPARE_CLOSE(*result.gap.claimPart + *result.gap.shapePart, *result.gap.gap, 1e-12);
    QCOMPARE(*result.gap.claimPart, 0.0);
    QCOMPARE(*result.gap.chanceFloorMet, 0.0);
    COMPARE_CLOSE(*result.gap.gapMedian, cheapestQuantile(*result.fit, 4, 0.5) - 5000, 1e-12);
    COMPARE_CLOSE(*result.gap.gapP90, cheapestQuantile(*result.fit, 4, 0.9) - 5000, 1e-12);
}

void GapFiguresTest::meetExactHalves()
{
    // Ten equal odds: the fifth reaches one half, the ninth nine tenths, however 0.1 + 0.1 + ... rounds.
    const auto result = measure(tierOf({10, 20, 30, 40, 50, 60, 70, 80, 90, 100}, 10), {ModelKind::perceived, 1, {}});
    QCOMPARE(*result.gap.gapMedian, 40.0);
    QCOMPARE(*result.gap.gapP90, 80.0);
    for (int m = 2; m <= 1000; m += 2) { // And for every even number of rungs.
        std::vector<std::int64_t> prices;
        for (int i = 1; i <= m; ++i)
            prices.push_back(1000 + i);
        QCOMPARE(*measure(tierOf(prices, 1000), {ModelKind::perceived, 1, {}}).gap.gapMedian, m / 2.0);
    }
}

void GapFiguresTest::areGivenThatSomethingIsOnOffer()
{
    Tier tier = tierOf({5000, 6000}, 5000);
    tier.units[0].vacancyChance = 1e-12;
    tier.units[1].vacancyChance = 1e-12;
    const auto result = measure(tier, {ModelKind::unit, {}, {}});
    COMPARE_CLOSE(result.odds.none, 1 - 2e-12, 1e-15);
    // Equally likely, given that one is there at all: no digits are lost in 1 - none.
    COMPARE_CLOSE(*result.gap.expectedCheapest, 5500, 1e-11);
    COMPARE_CLOSE(*result.gap.chanceFloorMet, 0.5, 1e-11);
}

void GapFiguresTest::curtainAreaIsTheGap()
{
    std::mt19937_64 random(55);
    for (int round = 0; round < 100; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 60;
        spread.grain = round % 2 ? 1 : 300;
        spread.mixedStatus = true;
        spread.ownChances = true;
        const Tier tier = randomTier(random, spread);
        for (const ModelKind kind : {ModelKind::perceived, ModelKind::remainder, ModelKind::unit, ModelKind::turnover, ModelKind::onHand}) {
            const auto result = measure(tier, {kind, {}, {}});
            QVERIFY(result.odds.defined());
            COMPARE_WITHIN(areaFromFloor(result.curtain, static_cast<double>(tier.advertisedFloor.minor)), *result.gap.gap, 1e-9);
        }
    }
}

void GapFiguresTest::curtainCountsOnlyWhatLiesAboveTheFloor()
{
    // One unit below the floor: the area is the expected amount above it, not the gap. By hand: draws 4500 5500, one each.
    const auto result = measure(tierOf({4500, 5500}, 5000), {ModelKind::perceived, 1, {}});
    COMPARE_CLOSE(areaFromFloor(result.curtain, 5000), 250, 1e-14);
    COMPARE_WITHIN(*result.gap.gap, 0, 1e-12);
    QCOMPARE(*result.gap.claimPart, -500.0);
}

void GapFiguresTest::curtainIsTheChanceOfNothingCheaper()
{
    std::mt19937_64 random(56);
    for (int round = 0; round < 40; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 6;
        spread.grain = 500;
        const Tier tier = randomTier(random, spread);
        const auto result = measure(tier, {ModelKind::perceived, 3, {}});
        const auto expected = allDraws(pricesOf(result.ladder), 3);
        QCOMPARE(result.curtain.size(), expected.cheapest.size());
        QCOMPARE(result.curtain.front().chance, 1.0);
        double before = 1;
        double gone = 0;
        std::size_t i = 0;
        for (const auto& [price, chance] : expected.cheapest) {
            QCOMPARE(result.curtain[i].price, static_cast<double>(price));
            COMPARE_WITHIN(result.curtain[i].chance, 1 - gone, 1e-12);
            QVERIFY(result.curtain[i].chance <= before);
            before = result.curtain[i++].chance;
            gone += chance;
        }
    }
    // The last step ends at the highest price with odds.
    QCOMPARE(measure(tierOf({1, 2, 3, 4}, 1), {ModelKind::remainder, 3, {}}).curtain.size(), 2U);
    QCOMPARE(measure(tierOf({1, 2, 3, 4}, 1), {ModelKind::onHand, {}, {}}).curtain.size(), 1U);
}

void GapFiguresTest::smoothCurtainFollowsTheFit()
{
    std::mt19937_64 random(57);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 3 + random() % 60;
        const Tier tier = randomTier(random, spread);
        const auto result = measure(tier, {ModelKind::fitted, 1 + static_cast<int>(random() % 60), {}});
        if (!result.fit)
            continue;
        double area = 0;
        QCOMPARE(result.curtain.front().price, result.fit->floor);
        QCOMPARE(result.curtain.front().chance, 1.0);
        QCOMPARE(result.curtain.back().price, result.fit->highest);
        QCOMPARE(result.curtain.back().chance, 0.0);
        for (std::size_t i = 1; i < result.curtain.size(); ++i) {
            const CurtainStep& from = result.curtain[i - 1];
            const CurtainStep& to = result.curtain[i];
            QVERIFY(to.price >= from.price && to.chance <= from.chance);
            area += (to.price - from.price) * (from.chance + to.chance) / 2;
            if (i + 1 < result.curtain.size())
                COMPARE_WITHIN(to.chance, std::pow(result.fit->survival(to.price), *result.odds.left), 1e-12);
        }
        // 1 %: what a polyline of 160 points may lose on a curve drawn for the eye, plus the two thousandths at its ends.
        COMPARE_WITHIN(area, *result.gap.gap, 0.01 * *result.gap.gap + 0.001 * (result.fit->highest - result.fit->floor));
    }
}

void GapFiguresTest::nothingFromNothing()
{
    const GapFigures none = gapFigures({}, CheapestOdds{}, {5000});
    QVERIFY(!none.expectedCheapest && !none.gap && !none.gapShare && !none.claimPart && !none.shapePart && !none.chanceFloorMet &&
            !none.gapMedian && !none.gapP90);
    std::vector<CurtainStep> steps(3);
    curtainSteps({}, CheapestOdds{}, steps);
    QVERIFY(steps.empty());
}

QTEST_APPLESS_MAIN(GapFiguresTest)
#include "gap_figures_test.moc"
