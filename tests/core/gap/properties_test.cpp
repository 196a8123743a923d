// SPDX-License-Identifier: GPL-3.0-or-later
// What must hold for every ladder, on random ones from fixed seeds.
#include <QtTest>

#include "gap/measure.h"

#include "core/close.h"
#include "core/sample_tiers.h"

using namespace rungwright;

namespace
{

Measurement measure(const Tier& tier, const ModelSettings& settings) { return measured(tier, askingPrices(tier.units), settings); }

constexpr std::array kFiguresToCompare{&GapFigures::expectedCheapest, &GapFigures::gap,       &GapFigures::claimPart,
                                       &GapFigures::shapePart,        &GapFigures::gapMedian, &GapFigures::gapP90};

void compareOptional(const std::optional<double>& actual, const std::optional<double>& expected, double scale, double shift,
                     double tolerance)
{
    QCOMPARE(actual.has_value(), expected.has_value());
    if (actual)
        COMPARE_WITHIN(*actual, scale * *expected + shift, tolerance);
}

/// An even ladder from `floor` to `top` bent by u -> u^g: g < 1 leans left, g > 1 leans right.
Tier bentLadder(int units, std::int64_t floor, std::int64_t top, double g)
{
    std::vector<std::int64_t> prices;
    for (int i = 0; i < units; ++i)
        prices.push_back(floor + std::llround(static_cast<double>(top - floor) * std::pow(static_cast<double>(i) / (units - 1), g)));
    return tierOf(prices, floor);
}

} // namespace

class PropertiesTest : public QObject
{
    Q_OBJECT

private slots:
    void shiftAndScale();
    void orderOfTiedUnitsDoesNotMatter();
    void oneMoreLeftNeverRaisesThePerceivedGap();
    void anotherCopyOfTheTierChangesNothingPerceived();
    void leaningLeftHasTheLargerGap();
    void aWiderRangeHasTheLargerGap();
    void noGapIsNegativeWithoutAUnitBelowTheFloor();
    void perceivedIsTheIntegralOfTheTail();
    void oneLeftIsTheMean();
    void raisingOnePriceNeverLowersTheGap();
};

void PropertiesTest::shiftAndScale()
{
    std::mt19937_64 random(81);
    for (int round = 0; round < 150; ++round) {
        TierSpread spread;
        spread.units = 3 + random() % 40;
        spread.mixedStatus = round % 2 != 0;
        spread.ownChances = round % 3 != 0;
        const Tier tier = randomTier(random, spread);
        Tier changed = tier;
        const auto scale = static_cast<std::int64_t>(1 + random() % 9);
        const auto shift = static_cast<std::int64_t>(random() % 20000);
        changed.advertisedFloor = {scale * tier.advertisedFloor.minor + shift};
        for (Unit& unit : changed.units)
            unit.asking = {scale * unit.asking.minor + shift};
        for (const ModelKind kind : kModels) {
            const auto before = measure(tier, {kind, {}, {}});
            const auto after = measure(changed, {kind, {}, {}});
            // 1e-8 minor units: prices up to 1e5 with some 1e-12 relative in the quadrature, less elsewhere.
            for (const auto figure : kFiguresToCompare)
                compareOptional(after.gap.*figure, before.gap.*figure, static_cast<double>(scale),
                                figure == &GapFigures::expectedCheapest ? static_cast<double>(shift) : 0, 1e-8);
            compareOptional(after.gap.chanceFloorMet, before.gap.chanceFloorMet, 1, 0, 1e-12);
            compareOptional(after.figures.meanStanding, before.figures.meanStanding, 1, 0, 1e-12);
            QCOMPARE(after.figures.inversions, before.figures.inversions);
            for (std::size_t k = 0; k < before.thinning.size(); ++k) {
                QCOMPARE(std::isnan(after.thinning[k]), std::isnan(before.thinning[k])); // Unit by unit: more than can be free.
                const double expected = static_cast<double>(scale) * before.thinning[k];
                if (!std::isnan(expected))
                    COMPARE_WITHIN(after.thinning[k], expected, 1e-9 * std::abs(expected) + 1e-8);
            }
        }
    }
}

void PropertiesTest::orderOfTiedUnitsDoesNotMatter()
{
    std::mt19937_64 random(82);
    for (int round = 0; round < 150; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 40;
        spread.grain = 750; // Five prices only.
        spread.mixedStatus = true;
        spread.ownChances = true;
        Tier tier = randomTier(random, spread);
        std::vector<Measurement> before;
        for (const ModelKind kind : kModels)
            before.push_back(measure(tier, {kind, {}, {}}));
        std::ranges::shuffle(tier.units, random);
        for (std::size_t i = 0; i < kModels.size(); ++i) {
            const auto after = measure(tier, {kModels[i], {}, {}});
            for (const auto figure : kFiguresToCompare)
                compareOptional(after.gap.*figure, before[i].gap.*figure, 1, 0, 1e-9); // Sums in another order.
            compareOptional(after.gap.chanceFloorMet, before[i].gap.chanceFloorMet, 1, 0, 1e-12);
            QCOMPARE(after.curtain.size(), before[i].curtain.size());
            for (std::size_t k = 0; k < after.curtain.size(); ++k)
                COMPARE_WITHIN(after.curtain[k].chance, before[i].curtain[k].chance, 1e-12);
            for (std::size_t k = 0; k < after.thinning.size(); ++k)
                COMPARE_WITHIN(after.thinning[k], before[i].thinning[k], 1e-9);
        }
    }
}

void PropertiesTest::oneMoreLeftNeverRaisesThePerceivedGap()
{
    std::mt19937_64 random(83);
    for (int round = 0; round < 100; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 60;
        const Tier tier = randomTier(random, spread);
        for (const ModelKind kind : {ModelKind::perceived, ModelKind::fitted}) {
            double before = std::numeric_limits<double>::infinity();
            for (int n = 1; n <= 40; ++n) {
                const auto m = measure(tier, {kind, n, {}});
                if (!m.gap.gap)
                    break;
                QVERIFY(*m.gap.gap <= before + 1e-9); // Rounding.
                before = *m.gap.gap;
            }
        }
    }
}

void PropertiesTest::anotherCopyOfTheTierChangesNothingPerceived()
{
    // Fixed shape, fixed N: listing every unit twice is the same distribution.
    std::mt19937_64 random(84);
    for (int round = 0; round < 50; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 30;
        const Tier tier = randomTier(random, spread);
        Tier doubled = tier;
        doubled.units.insert(doubled.units.end(), tier.units.begin(), tier.units.end());
        for (const ModelKind kind : {ModelKind::perceived, ModelKind::fitted})
            compareOptional(measure(doubled, {kind, 5, {}}).gap.gap, measure(tier, {kind, 5, {}}).gap.gap, 1, 0, 1e-8);
    }
}

void PropertiesTest::leaningLeftHasTheLargerGap()
{
    // Same floor, top and count (common practice, no source): the more a ladder leans left, the larger its gap.
    for (int units : {5, 12, 60})
        for (const ModelKind kind : {ModelKind::perceived, ModelKind::fitted, ModelKind::remainder, ModelKind::unit, ModelKind::turnover}) {
            double gapBefore = std::numeric_limits<double>::infinity();
            double leanBefore = -std::numeric_limits<double>::infinity();
            for (double g : {0.2, 0.35, 0.6, 0.8, 1.0, 1.3, 2.0, 3.5, 5.0}) {
                Tier tier = bentLadder(units, 5000, 12000, g);
                for (Unit& unit : tier.units)
                    unit.vacancyChance = 0.4;
                const auto m = measure(tier, {kind, 3, units * 0.7});
                QVERIFY(*m.figures.skew.moment > leanBefore);
                QVERIFY2(
                    *m.gap.gap < gapBefore,
                    qPrintable(QStringLiteral("%1, %2 units, bent by %3").arg(QLatin1String(modelWord(kind).data())).arg(units).arg(g)));
                leanBefore = *m.figures.skew.moment;
                gapBefore = *m.gap.gap;
            }
        }
}

void PropertiesTest::aWiderRangeHasTheLargerGap()
{
    // Common practice, no source: larger sizes have wider ranges, and with the same shape the larger gap.
    for (const ModelKind kind : {ModelKind::perceived, ModelKind::fitted, ModelKind::remainder, ModelKind::unit, ModelKind::turnover}) {
        double before = 0;
        for (std::int64_t top : {6000, 7000, 9000, 15000}) {
            const double gap = *measure(bentLadder(12, 5000, top, 0.6), {kind, 4, 8.0}).gap.gap;
            QVERIFY(gap > before || kind == ModelKind::unit); // All are on offer: unit by unit is sure of the cheapest.
            before = gap;
        }
    }
}

void PropertiesTest::noGapIsNegativeWithoutAUnitBelowTheFloor()
{
    // Common practice, no source.
    std::mt19937_64 random(85);
    for (int round = 0; round < 200; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 30;
        spread.mixedStatus = true;
        spread.ownChances = true;
        const Tier tier = randomTier(random, spread);
        for (const ModelKind kind : kModels) {
            const auto m = measure(tier, {kind, {}, {}});
            if (!m.gap.gap)
                continue;
            QVERIFY(*m.gap.gap >= 0);
            for (const double gap : m.thinning)
                QVERIFY(!(gap < -1e-9)); // Rounding; NaN where unit by unit has no such number.
        }
    }
}

void PropertiesTest::perceivedIsTheIntegralOfTheTail()
{
    // E = s + integral from s of (1 - F)^N with F the ladder's own steps: constant over each minor unit, so summed one by one.
    std::mt19937_64 random(86);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 25;
        spread.grain = round % 2 ? 1 : 400;
        const Tier tier = randomTier(random, spread);
        const int n = 1 + static_cast<int>(random() % 30);
        double integral = 0;
        for (std::int64_t p = spread.floor; p < spread.floor + spread.range; ++p) {
            const auto above = std::ranges::count_if(tier.units, [p](const Unit& unit) { return unit.asking.minor > p; });
            integral += std::pow(static_cast<double>(above) / static_cast<double>(tier.units.size()), n);
        }
        COMPARE_WITHIN(*measure(tier, {ModelKind::perceived, n, {}}).gap.gap, integral, 1e-8); // 3,000 additions.
    }
}

void PropertiesTest::oneLeftIsTheMean()
{
    std::mt19937_64 random(87);
    for (int round = 0; round < 50; ++round) {
        TierSpread spread;
        spread.units = 3 + random() % 30;
        const Tier tier = randomTier(random, spread);
        for (const ModelKind kind : {ModelKind::perceived, ModelKind::fitted, ModelKind::remainder}) {
            const auto m = measure(tier, {kind, 1, {}});
            if (m.gap.expectedCheapest)
                COMPARE_CLOSE(*m.gap.expectedCheapest, *m.figures.mean, 1e-10);
        }
    }
}

void PropertiesTest::raisingOnePriceNeverLowersTheGap()
{
    // E is a sum of sorted prices with odds >= 0. (Not so for the fitted form, whose whole shape moves.)
    std::mt19937_64 random(88);
    for (int round = 0; round < 200; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 30;
        spread.mixedStatus = true;
        Tier tier = randomTier(random, spread);
        for (const ModelKind kind : {ModelKind::perceived, ModelKind::remainder, ModelKind::unit, ModelKind::turnover, ModelKind::onHand}) {
            const auto before = measure(tier, {kind, {}, {}});
            Tier raised = tier;
            raised.units[random() % raised.units.size()].asking.minor += static_cast<std::int64_t>(random() % 900);
            const auto after = measure(raised, {kind, {}, {}});
            if (before.gap.gap)
                QVERIFY(*after.gap.gap >= *before.gap.gap - 1e-9); // Rounding.
        }
    }
}

QTEST_APPLESS_MAIN(PropertiesTest)
#include "properties_test.moc"
