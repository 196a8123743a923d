// SPDX-License-Identifier: GPL-3.0-or-later
// Cheapest odds against the enumeration of every case, and their degenerate ends.
#include <QtTest>

#include "cheapest/odds.h"

#include "core/close.h"
#include "core/enumerated.h"
#include "core/sample_tiers.h"
#include "published/expected_least.h"

#include <numeric>

using namespace rungwright;

namespace
{

struct Answer {
    std::vector<Rung> ladder;
    CheapestOdds odds;
};

Answer answer(const Tier& tier, const ModelSettings& settings)
{
    Answer result;
    result.ladder = sortedLadder(tier.units, askingPrices(tier.units), modelUnits(settings.kind));
    cheapestOdds(result.ladder, tier.units, settings, result.odds);
    return result;
}

std::vector<std::int64_t> pricesOf(const Tier& tier, const std::vector<Rung>& ladder)
{
    std::vector<std::int64_t> prices;
    for (const Rung& rung : ladder)
        prices.push_back(tier.units[rung.unit].asking.minor);
    return prices;
}

/// Compares block by block of equal prices: within one, only the sum has a meaning.
void compareBlocks(const Answer& given, const Enumerated& expected)
{
    std::map<std::int64_t, double> blocks;
    double sum = 0;
    for (std::size_t i = 0; i < given.ladder.size(); ++i) {
        QVERIFY(given.odds.perRung[i] >= 0);
        blocks[given.ladder[i].price.minor] += given.odds.perRung[i];
        sum += given.odds.perRung[i];
    }
    for (const auto& [price, chance] : blocks) {
        const auto there = expected.cheapest.find(price);
        // Against the whole: adding up thousands of cases by hand rounds in the last digits.
        COMPARE_WITHIN(chance, there == expected.cheapest.end() ? 0 : there->second, 1e-12);
    }
    COMPARE_WITHIN(given.odds.none, expected.none, 1e-12);
    COMPARE_WITHIN(sum + given.odds.none, 1, 1e-12);
}

} // namespace

class OddsTest : public QObject
{
    Q_OBJECT

private slots:
    void namesItsModels();
    void perceivedIsAllDraws();
    void remainderIsAllSetsOfThatSize();
    void unitByUnitIsAllSets();
    void onHandIsTheCheapest();
    void fittedShowsThePerceivedSteps();
    void agreesWithListedExamples();
    void addsUpForLargeTiers();
    void infersWhatIsNotSet();
    void saysWhyThereAreNone();
    void isCertainWhereAUnitIs();
    void sharesAmongTies();
    void reusesWhatItIsGiven();
};

void OddsTest::namesItsModels()
{
    QCOMPARE(kModels.size(), 6U);
    for (const ModelKind kind : kModels)
        QVERIFY(modelFromWord(modelWord(kind)) == kind);
    QVERIFY(modelWord(ModelKind::onHand) == "on-hand");
    QVERIFY(!modelFromWord("onHand"));
    QVERIFY(modelUnits(ModelKind::perceived) == Among::onOffer);
    QVERIFY(modelUnits(ModelKind::turnover) == Among::rentable);
    QVERIFY(takesLeft(ModelKind::remainder) && !takesLeft(ModelKind::unit));
}

void OddsTest::perceivedIsAllDraws()
{
    std::mt19937_64 random(31);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 1 + random() % 6;
        spread.grain = round % 2 ? 1 : 1000;
        const Tier tier = randomTier(random, spread);
        for (int n = 1; n <= 6; ++n) {
            const auto given = answer(tier, {ModelKind::perceived, n, {}});
            QCOMPARE(*given.odds.left, n);
            compareBlocks(given, allDraws(pricesOf(tier, given.ladder), n));
        }
    }
}

void OddsTest::remainderIsAllSetsOfThatSize()
{
    std::mt19937_64 random(32);
    for (int round = 0; round < 40; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 10;
        spread.grain = round % 2 ? 1 : 700;
        spread.mixedStatus = true;
        const Tier tier = randomTier(random, spread);
        const auto rentable = static_cast<int>(std::ranges::count_if(tier.units, &Unit::rentable));
        for (int k = 1; k <= rentable; ++k) {
            const auto given = answer(tier, {ModelKind::remainder, k, {}});
            compareBlocks(given, allSetsOf(pricesOf(tier, given.ladder), k));
        }
    }
}

void OddsTest::unitByUnitIsAllSets()
{
    std::mt19937_64 random(33);
    for (int round = 0; round < 60; ++round) {
        TierSpread spread;
        spread.units = 2 + random() % 11;
        spread.grain = round % 2 ? 1 : 700;
        spread.mixedStatus = true;
        spread.ownChances = true;
        const Tier tier = randomTier(random, spread);
        const auto given = answer(tier, {ModelKind::unit, {}, {}});
        // A unit without a chance of its own takes the tier's share on offer.
        const auto onOffer = static_cast<double>(std::ranges::count_if(tier.units, &Unit::onOffer));
        const auto rentable = static_cast<double>(std::ranges::count_if(tier.units, &Unit::rentable));
        std::vector<double> chances;
        for (const Rung& rung : given.ladder)
            chances.push_back(tier.units[rung.unit].vacancyChance.value_or(onOffer / rentable));
        compareBlocks(given, allSets(pricesOf(tier, given.ladder), chances));
    }
}

void OddsTest::onHandIsTheCheapest()
{
    const auto given = answer(tierOf({300, 100, 200}, 100), {ModelKind::onHand, {}, {}});
    QCOMPARE(given.odds.perRung, (std::vector<double>{1, 0, 0}));
    QCOMPARE(given.odds.none, 0.0);
}

void OddsTest::fittedShowsThePerceivedSteps()
{
    const Tier tier = tierOf({300, 100, 200, 400}, 100);
    QCOMPARE(answer(tier, {ModelKind::fitted, 3, {}}).odds.perRung, answer(tier, {ModelKind::perceived, 3, {}}).odds.perRung);
}

void OddsTest::agreesWithListedExamples()
{
    std::vector<std::int64_t> prices;
    for (const double price : published::kTenPrices)
        prices.push_back(static_cast<std::int64_t>(price));
    const Tier ten = tierOf(prices, 100);
    const auto expected = [](const Answer& given) {
        double sum = 0;
        for (std::size_t i = 0; i < given.ladder.size(); ++i)
            sum += given.odds.perRung[i] * static_cast<double>(given.ladder[i].price.minor);
        return sum;
    };
    for (const auto& row : published::kListedLeast) {
        // 1e-12: the table gives 13 digits.
        COMPARE_CLOSE(expected(answer(ten, {ModelKind::remainder, row.m, {}})), row.withoutReplacement, 1e-12);
        COMPARE_CLOSE(expected(answer(ten, {ModelKind::perceived, row.m, {}})), row.withReplacement, 1e-12);
    }
    const Tier ranks = tierOf({1, 2, 3, 4, 5, 6, 7, 8, 9, 10}, 1);
    COMPARE_CLOSE(expected(answer(ranks, {ModelKind::remainder, 3, {}})), published::kLeastRank3Of10, 1e-14);

    // 6 of 49: none of the 6 drawn is among the 6 lowest when the cheapest is rung 7 or beyond.
    std::vector<std::int64_t> balls(49);
    std::iota(balls.begin(), balls.end(), 1);
    const auto drawn = answer(tierOf(balls, 1), {ModelKind::remainder, 6, {}});
    COMPARE_CLOSE(std::accumulate(drawn.odds.perRung.begin() + 6, drawn.odds.perRung.end(), 0.0), published::kSixOfFortyNine[0], 1e-12);
}

void OddsTest::addsUpForLargeTiers()
{
    std::mt19937_64 random(34);
    TierSpread spread;
    spread.units = 1500;
    spread.mixedStatus = true;
    const Tier tier = randomTier(random, spread);
    for (const ModelKind kind : kModels)
        for (int left : {1, 2, 50, 700, 1500}) {
            const auto given = answer(tier, {kind, left, {}});
            double sum = given.odds.none;
            for (const double w : given.odds.perRung) {
                QVERIFY(w >= 0); // Also false for NaN.
                sum += w;
            }
            COMPARE_WITHIN(sum, 1, 1e-10); // Fifteen hundred roundings.
        }
}

void OddsTest::infersWhatIsNotSet()
{
    Tier tier = tierOf({100, 200, 300, 400, 500, 600}, 100);
    tier.units[0].status = Status::occupied;
    tier.units[1].status = Status::reserved;
    tier.units[2].status = Status::closed;
    QCOMPARE(*answer(tier, {ModelKind::perceived, {}, {}}).odds.left, 3);
    QCOMPARE(*answer(tier, {ModelKind::remainder, {}, {}}).odds.left, 3);
    QCOMPARE(*answer(tier, {ModelKind::remainder, 99, {}}).odds.left, 5); // More than there are counts as all.
    // Two of five rentable units are taken: the load that carries 2 of 5.
    const double load = *answer(tier, {ModelKind::turnover, {}, {}}).odds.load;
    double loss = 1;
    for (int i = 1; i <= 5; ++i)
        loss = load * loss / (i + load * loss);
    COMPARE_CLOSE(load * (1 - loss), 2, 1e-12);
    QCOMPARE(*answer(tier, {ModelKind::turnover, {}, 1.25}).odds.load, 1.25);
}

void OddsTest::saysWhyThereAreNone()
{
    const auto note = [](const Tier& tier, const ModelSettings& settings) {
        const auto given = answer(tier, settings);
        return given.odds.defined() ? std::nullopt : given.odds.note;
    };
    Tier full = tierOf({100, 200}, 100);
    for (Unit& unit : full.units)
        unit.status = Status::occupied;
    QVERIFY(note(full, {ModelKind::perceived, {}, {}}) == OddsNote::nothingOnOffer);
    QVERIFY(note(full, {ModelKind::perceived, 3, {}}) == OddsNote::nothingOnOffer);
    QVERIFY(note(full, {ModelKind::fitted, {}, {}}) == OddsNote::nothingOnOffer);
    QVERIFY(note(full, {ModelKind::onHand, {}, {}}) == OddsNote::nothingOnOffer);
    QVERIFY(note(full, {ModelKind::remainder, {}, {}}) == OddsNote::nothingOnOffer);
    QVERIFY(answer(full, {ModelKind::remainder, 1, {}}).odds.defined()); // Set by the user: what if one were left?
    QVERIFY(note(full, {ModelKind::unit, {}, {}}) == OddsNote::neverFree);
    QVERIFY(note(full, {ModelKind::turnover, {}, {}}) == OddsNote::tierFull);
    QVERIFY(answer(full, {ModelKind::turnover, {}, 3.0}).odds.defined());

    const Tier empty = tierOf({100, 200}, 100);
    QVERIFY(note(empty, {ModelKind::turnover, {}, {}}) == OddsNote::tierEmpty);

    Tier closed = tierOf({100}, 100);
    closed.units[0].status = Status::closed;
    for (const ModelKind kind : {ModelKind::remainder, ModelKind::unit, ModelKind::turnover}) {
        QVERIFY(note(closed, {kind, 2, 2.0}) == OddsNote::nothingRentable);
        QVERIFY(note(Tier{}, {kind, 2, 2.0}) == OddsNote::nothingRentable);
    }
    QVERIFY(note(Tier{}, {ModelKind::perceived, {}, {}}) == OddsNote::nothingOnOffer);

    Tier never = tierOf({100, 200}, 100);
    for (Unit& unit : never.units)
        unit.vacancyChance = 0;
    QVERIFY(note(never, {ModelKind::unit, {}, {}}) == OddsNote::neverFree);
}

void OddsTest::isCertainWhereAUnitIs()
{
    Tier tier = tierOf({100, 200, 300}, 100);
    tier.units[0].vacancyChance = 0;
    tier.units[1].vacancyChance = 1;
    tier.units[2].vacancyChance = 0.5;
    const auto given = answer(tier, {ModelKind::unit, {}, {}});
    QCOMPARE(given.odds.perRung, (std::vector<double>{0, 1, 0}));
    QCOMPARE(given.odds.none, 0.0);
    for (const ModelKind kind : kModels) { // One unit: it is the cheapest, if it is there.
        const auto one = answer(tierOf({100}, 100), {kind, {}, 1.0});
        QCOMPARE(one.odds.perRung.size(), 1U);
        COMPARE_WITHIN(one.odds.perRung[0] + one.odds.none, 1, 1e-15);
    }
}

void OddsTest::sharesAmongTies()
{
    const auto given = answer(tierOf({200, 100, 100, 300, 200, 200}, 100), {ModelKind::perceived, 2, {}});
    const auto shared = sharedAmongTies(given.ladder, given.odds);
    // By hand: (1 - (4/6)^2) / 2, ((4/6)^2 - (1/6)^2) / 3, (1/6)^2.
    COMPARE_CLOSE(shared[0], 20.0 / 36 / 2, 1e-15);
    COMPARE_CLOSE(shared[1], 20.0 / 36 / 2, 1e-15);
    for (std::size_t i : {2U, 3U, 4U})
        COMPARE_CLOSE(shared[i], 15.0 / 36 / 3, 1e-14);
    COMPARE_CLOSE(shared[5], 1.0 / 36, 1e-14);
    QVERIFY(sharedAmongTies({}, CheapestOdds{}).empty());
}

void OddsTest::reusesWhatItIsGiven()
{
    // A second answer into the same odds leaves nothing of the first.
    const Tier tier = tierOf({100, 200, 300}, 100);
    const auto ladder = sortedLadder(tier.units, askingPrices(tier.units), Among::rentable);
    CheapestOdds odds;
    cheapestOdds(ladder, tier.units, {ModelKind::turnover, {}, 2.0}, odds);
    cheapestOdds(ladder, tier.units, {ModelKind::turnover, {}, {}}, odds);
    QVERIFY(!odds.defined() && !odds.load && odds.note == OddsNote::tierEmpty && odds.none == 1);
    cheapestOdds(ladder, tier.units, {ModelKind::perceived, 2, {}}, odds);
    QVERIFY(odds.defined() && !odds.note && odds.left == 2 && odds.none == 0);
}

QTEST_APPLESS_MAIN(OddsTest)
#include "odds_test.moc"
