// SPDX-License-Identifier: GPL-3.0-or-later
// One ladder measured: what goes into a measurement, its degenerate cases, and that a second look allocates nothing.
#include <QtTest>

#include "gap/measure.h"

#include "core/close.h"
#include "core/sample_tiers.h"

#include <atomic>
#include <cstdlib>
#include <new>

#if defined(__SANITIZE_ADDRESS__)
#define RUNGWRIGHT_OWN_MALLOC 0
#elif defined(__has_feature)
#if __has_feature(address_sanitizer)
#define RUNGWRIGHT_OWN_MALLOC 0
#endif
#endif
#if !defined(RUNGWRIGHT_OWN_MALLOC) && defined(__GLIBC__)
#define RUNGWRIGHT_OWN_MALLOC 1
#endif

namespace
{
std::atomic<bool> counting{false};
std::atomic<int> allocations{0};

void note()
{
    if (counting)
        ++allocations;
}
} // namespace

#if RUNGWRIGHT_OWN_MALLOC
// Everything ends in malloc, Eigen's own storage as well as operator new; glibc keeps its real ones under these names.
extern "C" {
void* __libc_malloc(std::size_t size);
void* __libc_realloc(void* old, std::size_t size);
void* __libc_memalign(std::size_t alignment, std::size_t size);
void* malloc(std::size_t size)
{
    note();
    return __libc_malloc(size);
}
void* realloc(void* old, std::size_t size)
{
    note();
    return __libc_realloc(old, size);
}
void* aligned_alloc(std::size_t alignment, std::size_t size)
{
    note();
    return __libc_memalign(alignment, size);
}
}
#else
// The sanitizer owns malloc; operator new can still be counted.
void* operator new(std::size_t size)
{
    note();
    if (void* memory = std::malloc(size))
        return memory;
    throw std::bad_alloc();
}
void operator delete(void* memory) noexcept { std::free(memory); }
void operator delete(void* memory, std::size_t) noexcept { std::free(memory); }
#endif

using namespace rungwright;

namespace
{

bool finite(const std::optional<double>& figure) { return !figure || std::isfinite(*figure); }

/// No NaN or infinity anywhere but in `thinning`, which documents it, and the figures either all there or all absent.
void verifySane(const Measurement& m)
{
    const GapFigures& g = m.gap;
    for (const auto& figure : {g.expectedCheapest, g.gap, g.gapShare, g.claimPart, g.shapePart, g.chanceFloorMet, g.gapMedian, g.gapP90}) {
        QCOMPARE(figure.has_value(), m.odds.defined());
        QVERIFY(finite(figure));
    }
    const LadderFigures& f = m.figures;
    for (const auto& figure : {f.mean, f.median, f.meanStanding, f.skew.moment, f.skew.adjusted, f.skew.medcouple, f.skew.l})
        QVERIFY(finite(figure));
    QCOMPARE(f.count, m.onOffer);
    QVERIFY(m.odds.none >= 0 && m.odds.none <= 1);
    QVERIFY(m.odds.defined() || m.odds.note.has_value());
    QCOMPARE(m.curtain.empty(), !m.odds.defined());
    QCOMPARE(m.thinning.empty(), !m.odds.defined());
    for (const CurtainStep& step : m.curtain)
        QVERIFY(std::isfinite(step.price) && step.chance >= 0 && step.chance <= 1);
    if (m.odds.defined())
        QVERIFY(*g.chanceFloorMet >= 0 && *g.chanceFloorMet <= 1 + 1e-12);
    for (const double gap : m.thinning)
        QVERIFY(m.model == ModelKind::unit || std::isfinite(gap));
}

Tier withStatus(Tier tier, const std::vector<Status>& statuses)
{
    for (std::size_t i = 0; i < tier.units.size(); ++i)
        tier.units[i].status = statuses[i % statuses.size()];
    return tier;
}

} // namespace

class MeasureTest : public QObject
{
    Q_OBJECT

private slots:
    void countsAndDescribes();
    void measuresACandidatesPrices();
    void survivesDegenerateTiers_data();
    void survivesDegenerateTiers();
    void saysThatAFitIsNotFeasible();
    void leavesCurvesOutWhenNotAsked();
    void forgetsTheLastTier();
    void allocatesNothingAgain_data();
    void allocatesNothingAgain();
};

void MeasureTest::countsAndDescribes()
{
    const Tier tier = withStatus(tierOf({4800, 5000, 5200, 5000, 9000, 5100}, 5000),
                                 {Status::vacant, Status::vacant, Status::vacant, Status::vacant, Status::closed, Status::occupied});
    const auto m = measured(tier, askingPrices(tier.units), {ModelKind::remainder, 2, {}});
    QCOMPARE(m.units, 6U);
    QCOMPARE(m.rentable, 5U);
    QCOMPARE(m.onOffer, 4U);
    QCOMPARE(m.belowFloor, 1U);
    QCOMPARE(m.atFloor, 3U);
    QCOMPARE(m.figures.highest->minor, 5200); // On offer, though dearer ones are rentable or closed.
    QCOMPARE(m.ladder.size(), 5U);            // The model works on the rentable ones.
    QVERIFY(m.model == ModelKind::remainder);
    QVERIFY(!m.fit);
    QCOMPARE(*m.gap.claimPart, -200.0); // A unit asked below the floor shows.
}

void MeasureTest::measuresACandidatesPrices()
{
    const Tier tier = tierOf({5000, 6000}, 5000);
    const auto m = measured(tier, std::vector<Price>{{5500}, {5200}}, {ModelKind::onHand, {}, {}});
    QCOMPARE(*m.gap.gap, 200.0);
    QCOMPARE(m.ladder.front().unit, 1U);
}

void MeasureTest::survivesDegenerateTiers_data()
{
    QTest::addColumn<int>("kind");
    QTest::addColumn<int>("left");
    for (const ModelKind kind : kModels)
        for (int left : {0, 1, 2, 1000})
            QTest::addRow("%s, left %d", modelWord(kind).data(), left) << static_cast<int>(kind) << left;
}

void MeasureTest::survivesDegenerateTiers()
{
    QFETCH(int, kind);
    QFETCH(int, left);
    ModelSettings settings{static_cast<ModelKind>(kind), {}, {}};
    if (left > 0)
        settings.left = left;
    const std::vector<Tier> tiers{
        Tier{"", "", {5000}, {}},
        tierOf({5000}, 5000),
        tierOf({6000}, 5000),
        tierOf({4000}, 5000),
        tierOf({5000, 5000, 5000, 5000}, 5000),
        tierOf({6000, 6000, 6000}, 5000),
        tierOf({3000, 4000, 4500}, 5000),
        tierOf({4900, 5000, 7000}, 5000),
        tierOf({5000, 7000}, 5000),
        tierOf({1, 900'000'000'000}, 1),
        tierOf({899'999'999'999, 900'000'000'000, 900'000'000'000}, 1),
        withStatus(tierOf({5000, 6000, 7000}, 5000), {Status::occupied}),
        withStatus(tierOf({5000, 6000, 7000}, 5000), {Status::closed}),
        withStatus(tierOf({5000, 6000, 7000}, 5000), {Status::occupied, Status::vacant}),
        withStatus(tierOf({5000, 6000, 7000}, 5000), {Status::closed, Status::vacant, Status::reserved}),
    };
    Measurer measurer;
    for (const Tier& tier : tiers) {
        verifySane(measurer.measure(tier, askingPrices(tier.units), settings));
        Tier chances = tier;
        for (std::size_t i = 0; i < chances.units.size(); ++i)
            chances.units[i].vacancyChance = static_cast<double>(i % 2);
        verifySane(measurer.measure(chances, askingPrices(chances.units), settings));
        for (double load : {1e-12, 1.0, 1e9}) {
            ModelSettings loaded = settings;
            loaded.load = load;
            verifySane(measurer.measure(tier, askingPrices(tier.units), loaded));
        }
    }
}

void MeasureTest::saysThatAFitIsNotFeasible()
{
    for (const Tier& tier :
         {tierOf({4900, 5500, 6000}, 5000), tierOf({5500, 5500}, 5000), tierOf({5000, 6000}, 5000), tierOf({5500}, 5000)}) {
        const auto m = measured(tier, askingPrices(tier.units), {ModelKind::fitted, {}, {}});
        QVERIFY(!m.fit && !m.odds.defined() && m.odds.note == OddsNote::fitNotFeasible && !m.gap.gap);
        verifySane(m);
    }
}

void MeasureTest::leavesCurvesOutWhenNotAsked()
{
    const Tier tier = tierOf({5000, 5500, 6100}, 5000);
    Measurer measurer;
    QVERIFY(!measurer.measure(tier, askingPrices(tier.units), {}).thinning.empty());
    const auto& m = measurer.measure(tier, askingPrices(tier.units), {}, MeasureParts::figuresOnly);
    QVERIFY(m.curtain.empty() && m.thinning.empty() && m.gap.gap);
}

void MeasureTest::forgetsTheLastTier()
{
    std::mt19937_64 random(71);
    Measurer measurer;
    for (int round = 0; round < 200; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 80;
        spread.mixedStatus = round % 3 != 0;
        spread.ownChances = round % 2 != 0;
        const Tier tier = randomTier(random, spread);
        const ModelSettings settings{kModels[random() % kModels.size()], {}, {}};
        const auto& again = measurer.measure(tier, askingPrices(tier.units), settings);
        const auto fresh = measured(tier, askingPrices(tier.units), settings);
        QCOMPARE(again.gap.gap, fresh.gap.gap);
        QCOMPARE(again.gap.gapP90, fresh.gap.gapP90);
        QCOMPARE(again.odds.perRung, fresh.odds.perRung);
        QVERIFY(again.odds.note == fresh.odds.note && again.odds.left == fresh.odds.left && again.odds.load == fresh.odds.load);
        QCOMPARE(again.figures.skew.medcouple, fresh.figures.skew.medcouple);
        QCOMPARE(again.thinning.size(), fresh.thinning.size());
        for (std::size_t k = 0; k < fresh.thinning.size(); ++k)
            QVERIFY(again.thinning[k] == fresh.thinning[k] || (std::isnan(again.thinning[k]) && std::isnan(fresh.thinning[k])));
        QCOMPARE(again.curtain.size(), fresh.curtain.size());
        QCOMPARE(again.belowFloor, fresh.belowFloor);
    }
}

void MeasureTest::allocatesNothingAgain_data()
{
    QTest::addColumn<int>("kind");
    for (const ModelKind kind : kModels)
        QTest::addRow("%s", modelWord(kind).data()) << static_cast<int>(kind);
}

void MeasureTest::allocatesNothingAgain()
{
    QFETCH(int, kind);
    std::mt19937_64 random(72);
    TierSpread spread;
    spread.units = 500;
    spread.grain = 100; // Many ties at first, fewer as it is dragged.
    spread.mixedStatus = true;
    spread.ownChances = true;
    const Tier tier = randomTier(random, spread);
    auto prices = askingPrices(tier.units);
    Measurer measurer;
    const ModelSettings settings{static_cast<ModelKind>(kind), {}, {}};
    measurer.measure(tier, prices, settings);

    allocations = 0;
    counting = true;
    { // The counter works.
        const std::vector<double> something(100, 1.0);
        prices[0].minor += static_cast<std::int64_t>(something[7]);
    }
    QVERIFY(allocations > 0);
    counting = false;
    int during = 0;
    for (int frame = 0; frame < 50; ++frame) {
        for (std::size_t i = 0; i < prices.size(); i += 7)
            prices[i].minor += static_cast<std::int64_t>(random() % 300) - 100; // A drag of many: order, ties and spread all change.
        allocations = 0;
        counting = true;
        measurer.measure(tier, prices, settings);
        counting = false;
        during += allocations;
    }
    QCOMPARE(during, 0);
}

QTEST_APPLESS_MAIN(MeasureTest)
#include "measure_test.moc"
