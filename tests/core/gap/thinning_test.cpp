// SPDX-License-Identifier: GPL-3.0-or-later
// The gap against the number left: every k at once against each k on its own.
#include <QtTest>

#include "gap/measure.h"

#include "cheapest/erlang.h"
#include "core/close.h"
#include "core/enumerated.h"
#include "core/sample_tiers.h"

using namespace rungwright;

namespace
{

Measurement measure(const Tier& tier, const ModelSettings& settings) { return measured(tier, askingPrices(tier.units), settings); }

Tier sampleTier(std::mt19937_64& random, std::size_t units, bool ownChances = false)
{
    TierSpread spread;
    spread.units = units;
    spread.grain = random() % 2 ? 1 : 300;
    spread.mixedStatus = true;
    spread.ownChances = ownChances;
    return randomTier(random, spread);
}

/// 1e-9 of the expected gap; 1e-9 minor units where the gap is nothing.
void compareGap(double actual, double expected) { COMPARE_WITHIN(actual, expected, 1e-9 * std::abs(expected) + 1e-9); }

std::vector<std::int64_t> pricesOf(const std::vector<Rung>& ladder)
{
    std::vector<std::int64_t> prices;
    for (const Rung& rung : ladder)
        prices.push_back(rung.price.minor);
    return prices;
}

} // namespace

class ThinningTest : public QObject
{
    Q_OBJECT

private slots:
    void agreesWithOneNumberLeftAtATime_data();
    void agreesWithOneNumberLeftAtATime();
    void turnoverTakesTheLoadThatLeavesSoMany();
    void unitByUnitIsAllSetsOfThatSize();
    void unitByUnitKnowsCertainAndImpossibleUnits();
    void unitByUnitWithEqualChancesIsRandomRemainder_data();
    void unitByUnitWithEqualChancesIsRandomRemainder();
    void onHandLetsTheCheapestGoFirst();
    void fallsAsMoreAreLeft();
    void isEmptyWhereTheOddsAre();
};

void ThinningTest::agreesWithOneNumberLeftAtATime_data()
{
    QTest::addColumn<int>("kind");
    for (const ModelKind kind : {ModelKind::perceived, ModelKind::fitted, ModelKind::remainder})
        QTest::addRow("%s", modelWord(kind).data()) << static_cast<int>(kind);
}

void ThinningTest::agreesWithOneNumberLeftAtATime()
{
    QFETCH(int, kind);
    const auto model = static_cast<ModelKind>(kind);
    std::mt19937_64 random(61);
    for (const std::size_t units : {1U, 2U, 3U, 7U, 12U, 40U, 120U, 600U}) {
        const Tier tier = sampleTier(random, units);
        const auto whole = measure(tier, {model, {}, {}});
        if (!whole.odds.defined())
            continue; // The fit of very small tiers may not be feasible.
        QCOMPARE(whole.thinning.size(), whole.rentable);
        for (std::size_t k = 1; k <= whole.rentable; k += 1 + k / 8)
            compareGap(whole.thinning[k - 1], *measure(tier, {model, static_cast<int>(k), {}}).gap.gap);
        QCOMPARE(whole.thinning[static_cast<std::size_t>(*whole.odds.left) - 1] < 1e300, true);
        compareGap(whole.thinning[static_cast<std::size_t>(*whole.odds.left) - 1], *whole.gap.gap);
    }
}

void ThinningTest::turnoverTakesTheLoadThatLeavesSoMany()
{
    std::mt19937_64 random(62);
    for (const std::size_t units : {2U, 3U, 7U, 17U, 40U, 120U, 600U, 1000U}) {
        const Tier tier = sampleTier(random, units);
        const auto whole = measure(tier, {ModelKind::turnover, {}, {}});
        const auto rentable = static_cast<int>(whole.rentable);
        QCOMPARE(whole.thinning.size(), whole.rentable);
        for (int k = 1; k < rentable; k += 1 + k / 8) {
            const double load = *loadForCarried(rentable, rentable - k);
            compareGap(whole.thinning[static_cast<std::size_t>(k - 1)], *measure(tier, {ModelKind::turnover, {}, load}).gap.gap);
        }
        // No load: everything is free, the lowest price with it. Inferred: as many free as are on offer.
        compareGap(whole.thinning.back(), *whole.gap.claimPart);
        compareGap(whole.thinning[whole.onOffer - 1], *whole.gap.gap);
    }
}

void ThinningTest::unitByUnitIsAllSetsOfThatSize()
{
    std::mt19937_64 random(63);
    for (int round = 0; round < 60; ++round) {
        const Tier tier = sampleTier(random, 2 + random() % 11, true);
        const auto whole = measure(tier, {ModelKind::unit, {}, {}});
        std::vector<double> chances;
        for (const Rung& rung : whole.ladder)
            chances.push_back(
                tier.units[rung.unit].vacancyChance.value_or(static_cast<double>(whole.onOffer) / static_cast<double>(whole.rentable)));
        QCOMPARE(whole.thinning.size(), whole.rentable);
        for (int k = 1; k <= static_cast<int>(whole.rentable); ++k)
            compareGap(whole.thinning[static_cast<std::size_t>(k - 1)],
                       allSets(pricesOf(whole.ladder), chances, k).expected() - static_cast<double>(tier.advertisedFloor.minor));
    }
}

void ThinningTest::unitByUnitKnowsCertainAndImpossibleUnits()
{
    std::mt19937_64 random(64);
    for (int round = 0; round < 200; ++round) {
        Tier tier = sampleTier(random, 2 + random() % 9, true);
        for (Unit& unit : tier.units)
            if (const auto draw = random() % 4; draw < 2)
                unit.vacancyChance = static_cast<double>(draw);
        const auto whole = measure(tier, {ModelKind::unit, {}, {}});
        if (!whole.odds.defined())
            continue;
        std::vector<double> chances;
        for (const Rung& rung : whole.ladder)
            chances.push_back(
                tier.units[rung.unit].vacancyChance.value_or(static_cast<double>(whole.onOffer) / static_cast<double>(whole.rentable)));
        for (int k = 1; k <= static_cast<int>(whole.rentable); ++k) {
            const auto sets = allSets(pricesOf(whole.ladder), chances, k);
            const double gap = whole.thinning[static_cast<std::size_t>(k - 1)];
            if (sets.cheapest.empty())
                QVERIFY(std::isnan(gap)); // That many are never free.
            else
                compareGap(gap, sets.expected() - static_cast<double>(tier.advertisedFloor.minor));
        }
    }
}

void ThinningTest::unitByUnitWithEqualChancesIsRandomRemainder_data()
{
    QTest::addColumn<int>("units");
    QTest::addColumn<double>("chance");
    // 1e-3 and 600 units: the chance of all being free is 1e-1800, far below the type's range, and must not matter.
    for (int units : {5, 60, 600})
        for (double chance : {1e-3, 0.2, 0.5, 0.999})
            QTest::addRow("%d units, chance %g", units, chance) << units << chance;
}

void ThinningTest::unitByUnitWithEqualChancesIsRandomRemainder()
{
    QFETCH(int, units);
    QFETCH(double, chance);
    std::mt19937_64 random(65);
    TierSpread spread;
    spread.units = static_cast<std::size_t>(units);
    Tier tier = randomTier(random, spread);
    for (Unit& unit : tier.units)
        unit.vacancyChance = chance;
    const auto unit = measure(tier, {ModelKind::unit, {}, {}});
    const auto remainder = measure(tier, {ModelKind::remainder, {}, {}});
    QCOMPARE(unit.thinning.size(), static_cast<std::size_t>(units));
    for (std::size_t k = 0; k < unit.thinning.size(); ++k)
        compareGap(unit.thinning[k], remainder.thinning[k]);
}

void ThinningTest::onHandLetsTheCheapestGoFirst()
{
    Tier tier = tierOf({5600, 5100, 5900, 5300}, 5000);
    tier.units[2].status = Status::occupied;
    QCOMPARE(measure(tier, {ModelKind::onHand, {}, {}}).thinning, (std::vector<double>{600, 300, 100}));
}

void ThinningTest::fallsAsMoreAreLeft()
{
    std::mt19937_64 random(66);
    for (const std::size_t units : {3U, 20U, 300U}) {
        const Tier tier = sampleTier(random, units);
        for (const ModelKind kind : kModels) {
            const auto whole = measure(tier, {kind, {}, {}});
            for (std::size_t k = 1; k < whole.thinning.size(); ++k)
                QVERIFY(whole.thinning[k] <= whole.thinning[k - 1] + 1e-9); // Rounding.
        }
    }
}

void ThinningTest::isEmptyWhereTheOddsAre()
{
    const Tier empty = tierOf({100, 200}, 100);
    QVERIFY(measure(empty, {ModelKind::turnover, {}, {}}).thinning.empty());
    Tier full = empty;
    for (Unit& unit : full.units)
        unit.status = Status::occupied;
    for (const ModelKind kind : kModels)
        QVERIFY(measure(full, {kind, {}, {}}).thinning.empty());
    QVERIFY(measure(tierOf({150, 150}, 100), {ModelKind::fitted, {}, {}}).thinning.empty());

    // Asked directly, without odds: the same.
    ThinningWorkspace work;
    std::vector<double> gap{1, 2, 3};
    const auto ladder = sortedLadder(empty.units, askingPrices(empty.units), Among::rentable);
    thinningCurve(ladder, empty.units, {ModelKind::turnover, {}, {}}, {}, {100}, work, gap);
    QVERIFY(gap.empty());
    thinningCurve(ladder, empty.units, {ModelKind::fitted, {}, {}}, std::nullopt, {100}, work, gap);
    QVERIFY(gap.empty());
}

QTEST_APPLESS_MAIN(ThinningTest)
#include "thinning_test.moc"
