// SPDX-License-Identifier: GPL-3.0-or-later
// Comparison with R as installed, by way of published/r/live_values.R. Without R, or without one of its packages, the tests say that they
// were skipped; with RUNGWRIGHT_REQUIRE_R=1 in the environment they fail instead.
#include <QtTest>

#include "cheapest/odds.h"
#include "gap/measure.h"
#include "ladder/skew.h"

#include "core/close.h"
#include "core/r/ask_r.h"
#include "core/sample_tiers.h"

#include <algorithm>
#include <numeric>
#include <random>

using namespace rungwright;

namespace
{

const std::vector<double> kShapes{0.3, 0.7, 1.0, 1.6, 3.0, 8.0, 40.0};

void compareSkewness(const Numbers& values, const double* expected)
{
    Numbers sorted = values;
    std::ranges::sort(sorted);
    const SkewFigures figures = skewFigures(sorted);
    // 1e-10 of a coefficient about 1: the two sum in different orders.
    COMPARE_WITHIN(*figures.moment, expected[0], 1e-10);
    COMPARE_WITHIN(*figures.adjusted, expected[1], 1e-10);
    COMPARE_WITHIN(*figures.medcouple, expected[2], 1e-12);
    COMPARE_WITHIN(*figures.l, expected[3], 1e-10);
}

std::vector<Numbers> randomLists(std::mt19937_64& random, int grain)
{
    std::vector<Numbers> lists;
    for (int round = 0; round < 60; ++round) {
        Numbers list(3 + random() % 90);
        for (double& value : list)
            value = 5000 + grain * static_cast<double>(random() % (static_cast<std::uint64_t>(4000 / grain)));
        if (std::ranges::min(list) != std::ranges::max(list))
            lists.push_back(list);
    }
    return lists;
}

} // namespace

class LiveRTest : public QObject
{
    Q_OBJECT

private slots:
    void expectedCheapestOfTheFittedRange();
    void measuredFittedTier();
    void quantilesOfTheFittedRange();
    void survivalOfTheFittedRange();
    void skewnessOfRandomLadders();
    void skewnessOfTiedLadders();
    void medcoupleOfRobustbase();
    void skewnessOfItsOwnDataSets();
    void oddsOfTheRandomRemainder();
    void hypergeometricTails();
};

void LiveRTest::expectedCheapestOfTheFittedRange()
{
    std::vector<Numbers> questions;
    for (const double a : kShapes)
        for (const double b : kShapes)
            for (const double n : {1.0, 2.0, 5.0, 30.0, 400.0})
                questions.push_back({a, b, 5000, 9000, n});
    const Answers answers = ask(QStringLiteral("fitted"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < questions.size(); ++i) {
        const auto& q = questions[i];
        const FittedRange fit{q[2], q[3], q[0], q[1]};
        // 1e-8 of the gap, which is harder than of the price: integrate() promises no more.
        COMPARE_WITHIN(expectedCheapest(fit, q[4]) - 5000, answers.lines[i][0] - 5000, 1e-8 * (answers.lines[i][0] - 5000) + 1e-9);
    }
}

void LiveRTest::measuredFittedTier()
{
    std::mt19937_64 random(121);
    std::vector<Numbers> questions;
    std::vector<Measurement> measurements;
    while (questions.size() < 60) {
        TierSpread spread;
        spread.units = 3 + random() % 60;
        const Tier tier = randomTier(random, spread);
        const int n = 1 + static_cast<int>(random() % 50);
        const Measurement m = measured(tier, askingPrices(tier.units), {ModelKind::fitted, n, {}});
        if (!m.fit)
            continue;
        // The method of moments written out again here, on the unit scale.
        Numbers u;
        for (const Rung& rung : m.ladder)
            u.push_back(static_cast<double>((rung.price - tier.advertisedFloor).minor) /
                        static_cast<double>((m.ladder.back().price - tier.advertisedFloor).minor));
        const double mean = std::accumulate(u.begin(), u.end(), 0.0) / static_cast<double>(u.size());
        double variance = 0;
        for (const double x : u)
            variance += (x - mean) * (x - mean) / static_cast<double>(u.size());
        const double total = mean * (1 - mean) / variance - 1;
        questions.push_back({mean * total, (1 - mean) * total, static_cast<double>(tier.advertisedFloor.minor),
                             static_cast<double>(m.ladder.back().price.minor), static_cast<double>(n)});
        measurements.push_back(m);
    }
    const Answers answers = ask(QStringLiteral("fitted"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < questions.size(); ++i) {
        COMPARE_CLOSE(*measurements[i].gap.expectedCheapest, answers.lines[i][0], 1e-8);
        const auto n = static_cast<std::size_t>(questions[i][4]);
        if (n <= measurements[i].thinning.size())
            COMPARE_WITHIN(measurements[i].thinning[n - 1] + questions[i][2], answers.lines[i][0], 1e-8 * answers.lines[i][0]);
    }
}

void LiveRTest::quantilesOfTheFittedRange()
{
    std::vector<Numbers> questions;
    for (const double a : kShapes)
        for (const double b : kShapes)
            for (const double n : {1.0, 4.0, 60.0})
                for (const double p : {0.01, 0.5, 0.9, 0.99})
                    questions.push_back({a, b, 5000, 9000, n, p});
    const Answers answers = ask(QStringLiteral("quantile"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < questions.size(); ++i) {
        const auto& q = questions[i];
        COMPARE_CLOSE(cheapestQuantile(FittedRange{q[2], q[3], q[0], q[1]}, q[4], q[5]), answers.lines[i][0], 1e-8); // As asked of both.
    }
}

void LiveRTest::survivalOfTheFittedRange()
{
    std::vector<Numbers> questions;
    for (const double a : kShapes)
        for (const double b : kShapes)
            for (const double u : {1e-6, 0.01, 0.2, 0.5, 0.9, 0.999})
                questions.push_back({a, b, u});
    const Answers answers = ask(QStringLiteral("survival"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < questions.size(); ++i) // 1e-11: two libraries, each good to about 1e-13.
        COMPARE_CLOSE((FittedRange{0, 1, questions[i][0], questions[i][1]}).survival(questions[i][2]), answers.lines[i][0], 1e-11);
}

void LiveRTest::skewnessOfRandomLadders()
{
    std::mt19937_64 random(122);
    const auto lists = randomLists(random, 1);
    const Answers answers = ask(QStringLiteral("skewness"), lists);
    NEED_ANSWERS(answers, lists.size());
    for (std::size_t i = 0; i < lists.size(); ++i)
        compareSkewness(lists[i], answers.lines[i].data());
}

void LiveRTest::skewnessOfTiedLadders()
{
    std::mt19937_64 random(123);
    const auto lists = randomLists(random, 500);
    const Answers answers = ask(QStringLiteral("skewness"), lists);
    NEED_ANSWERS(answers, lists.size());
    for (std::size_t i = 0; i < lists.size(); ++i)
        compareSkewness(lists[i], answers.lines[i].data());
}

void LiveRTest::medcoupleOfRobustbase()
{
    // Up to 100 values and none tied at the median: there robustbase differs from the ordinary median of the kernel, and from others.
    std::mt19937_64 random(124);
    std::vector<Numbers> lists;
    for (Numbers& list : randomLists(random, 1)) {
        std::ranges::sort(list);
        const std::size_t half = list.size() / 2;
        const bool tied = list[half] == list[half - 1] || (half + 1 < list.size() && list[half] == list[half + 1]);
        if (!tied)
            lists.push_back(list);
    }
    QVERIFY(lists.size() > 40);
    const Answers answers = ask(QStringLiteral("medcouple"), lists);
    NEED_ANSWERS(answers, lists.size());
    for (std::size_t i = 0; i < lists.size(); ++i)
        COMPARE_WITHIN(*medcouple(lists[i]), answers.lines[i][0], 1e-12); // Its iteration stops at 1e-14 or so.
}

void LiveRTest::skewnessOfItsOwnDataSets()
{
    const Answers answers = ask(QStringLiteral("datasets"), {});
    NEED_ANSWERS(answers, 15);
    for (const Numbers& line : answers.lines) {
        const auto count = static_cast<std::size_t>(line[0]);
        QCOMPARE(line.size(), count + 5);
        compareSkewness(Numbers(line.begin() + 1, line.begin() + 1 + static_cast<std::ptrdiff_t>(count)), line.data() + count + 1);
    }
}

void LiveRTest::oddsOfTheRandomRemainder()
{
    std::vector<Numbers> questions;
    for (const int units : {1, 2, 5, 12, 60, 400})
        for (const int k : {1, 2, units / 3, units - 1, units})
            if (k >= 1 && k <= units)
                questions.push_back({static_cast<double>(units), static_cast<double>(k)});
    const Answers answers = ask(QStringLiteral("remainder"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < questions.size(); ++i) {
        std::vector<std::int64_t> prices(static_cast<std::size_t>(questions[i][0]));
        std::iota(prices.begin(), prices.end(), 5000);
        const Measurement m = measured(tierOf(prices, 5000), askingPrices(tierOf(prices, 5000).units),
                                       {ModelKind::remainder, static_cast<int>(questions[i][1]), {}}, MeasureParts::figuresOnly);
        QCOMPARE(answers.lines[i].size(), m.odds.perRung.size());
        for (std::size_t rung = 0; rung < m.odds.perRung.size(); ++rung)
            COMPARE_WITHIN(m.odds.perRung[rung], answers.lines[i][rung],
                           1e-11 * answers.lines[i][rung] + 1e-290); // choose() by logarithms.
    }
}

void LiveRTest::hypergeometricTails()
{
    std::vector<Numbers> questions;
    for (const double k : {1.0, 3.0, 20.0, 49.0})
        for (const double i : {1.0, 4.0, 17.0, 40.0})
            questions.push_back({60, k, i});
    const Answers answers = ask(QStringLiteral("hypergeometric"), questions);
    NEED_ANSWERS(answers, questions.size());
    std::vector<std::int64_t> prices(60);
    std::iota(prices.begin(), prices.end(), 5000);
    const Tier tier = tierOf(prices, 5000);
    for (std::size_t i = 0; i < questions.size(); ++i) {
        const Measurement m = measured(tier, askingPrices(tier.units), {ModelKind::remainder, static_cast<int>(questions[i][1]), {}});
        const auto beyond = m.odds.perRung.begin() + static_cast<std::ptrdiff_t>(questions[i][2]);
        COMPARE_WITHIN(std::accumulate(beyond, m.odds.perRung.end(), 0.0), answers.lines[i][0], 1e-11 * answers.lines[i][0] + 1e-290);
    }
}

QTEST_GUILESS_MAIN(LiveRTest)
#include "live_r_test.moc"
