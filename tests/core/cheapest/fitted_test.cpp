// SPDX-License-Identifier: GPL-3.0-or-later
// The integral of the survival function, and the beta distribution fitted to a ladder.
#include <QtTest>

#include "cheapest/fitted.h"

#include "core/close.h"
#include "core/sample_tiers.h"
#include "published/expected_least.h"
#include "published/normal_greatest.h"

#include <limits>

using namespace rungwright;

namespace
{

constexpr double kInfinity = std::numeric_limits<double>::infinity();

double normalSurvival(double x) { return std::erfc(x / std::sqrt(2.0)) / 2; }

/// The quadrature's answer to a row of the table of closed forms.
double byQuadrature(const published::ExpectedLeast& row)
{
    using published::Law;
    const double a = row.a;
    const double b = row.b;
    switch (row.law) {
    case Law::uniform:
        return expectedLeast([](double x) { return (200 - x) / 100; }, 100, 200, 100, row.n);
    case Law::exponential:
        return expectedLeast([](double x) { return std::exp((100 - x) / 50); }, 100, kInfinity, 100, row.n);
    case Law::power:
        return expectedLeast([a](double x) { return 1 - std::pow((x - 100) / 100, a); }, 100, 200, 100, row.n);
    case Law::kumaraswamy:
        return expectedLeast([a, b](double x) { return std::pow(1 - std::pow(x, a), b); }, 0, 1, 0, row.n);
    case Law::beta:
        return expectedCheapest(FittedRange{0, 1, a, b}, row.n);
    case Law::weibull:
        return expectedLeast([](double x) { return std::exp(-x * x / 1e4); }, 0, kInfinity, 0, row.n);
    case Law::pareto:
        return expectedLeast([](double x) { return std::pow(100 / x, 3); }, 100, kInfinity, 100, row.n);
    }
    return 0;
}

std::optional<FittedRange> fitOf(const std::vector<std::int64_t>& prices, std::int64_t floor)
{
    const Tier tier = tierOf(prices, floor);
    return fitRange(sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer), {floor});
}

} // namespace

class FittedTest : public QObject
{
    Q_OBJECT

private slots:
    void agreesWithTheNormalOrderStatistics();
    void agreesWithClosedForms();
    void doesNotDependOnTheAnchor();
    void fitsMeanAndVariance();
    void refusesWhatCannotBeFitted();
    void agreesWithClosedFormsOfTheBeta();
    void allAtOnceAgreesWithOneByOne();
    void staysSaneAtTheEdges();
    void quantilesUndoTheDistribution();
};

void FittedTest::agreesWithTheNormalOrderStatistics()
{
    for (const auto& row : published::kNormalGreatest) {
        const double least = expectedLeast(normalSurvival, -kInfinity, kInfinity, 0, row.n);
        COMPARE_CLOSE(-least, row.value, 1e-10);     // What the quadrature is asked for, less the rounding of erfc and pow.
        COMPARE_WITHIN(-least, row.printed, 5.1e-6); // Printed to five decimals.
    }
}

void FittedTest::agreesWithClosedForms()
{
    // 2e-11: the quadrature aims at 1e-11, and the table gives 13 digits.
    for (const auto& row : published::kExpectedLeast)
        COMPARE_CLOSE(byQuadrature(row), row.value, 2e-11);
}

void FittedTest::doesNotDependOnTheAnchor()
{
    for (double anchor : {-3.0, -1.0, 0.0, 0.5, 2.0})
        COMPARE_CLOSE(expectedLeast(normalSurvival, -kInfinity, kInfinity, anchor, 7), -published::kNormalGreatest[5].value, 1e-10);
    for (double anchor : {100.0, 120.0, 199.0, 200.0})
        COMPARE_CLOSE(expectedLeast([](double x) { return (200 - x) / 100; }, 100, 200, anchor, 3), 125, 1e-11);
    // N need not be whole: 100 / (N + 1) above the floor.
    COMPARE_CLOSE(expectedLeast([](double x) { return (200 - x) / 100; }, 100, 200, 100, 2.5), 100 + 100 / 3.5, 1e-11);
}

void FittedTest::fitsMeanAndVariance()
{
    std::mt19937_64 random(41);
    for (int round = 0; round < 200; ++round) {
        TierSpread spread;
        spread.units = 3 + random() % 40;
        spread.grain = round % 3 ? 1 : 300;
        const Tier tier = randomTier(random, spread);
        const auto ladder = sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer);
        const auto fit = fitRange(ladder, tier.advertisedFloor);
        if (!fit)
            continue;
        double mean = 0;
        for (const Rung& rung : ladder)
            mean += static_cast<double>(rung.price.minor) / static_cast<double>(ladder.size());
        double variance = 0;
        for (const Rung& rung : ladder)
            variance += std::pow(static_cast<double>(rung.price.minor) - mean, 2) / static_cast<double>(ladder.size());
        // The beta distribution's own moments, textbook.
        const double total = fit->alpha + fit->beta;
        const double width = fit->highest - fit->floor;
        COMPARE_CLOSE(fit->floor + width * fit->alpha / total, mean, 1e-12);
        COMPARE_CLOSE(width * width * fit->alpha * fit->beta / (total * total * (total + 1)), variance, 1e-11);
        // One draw is the distribution itself.
        COMPARE_CLOSE(expectedCheapest(*fit, 1), mean, 1e-11);
    }
}

void FittedTest::refusesWhatCannotBeFitted()
{
    QVERIFY(!fitOf({}, 100));
    QVERIFY(!fitOf({150}, 100));                // Too few.
    QVERIFY(!fitOf({150, 150, 150}, 100));      // No variance.
    QVERIFY(!fitOf({100, 100, 200, 200}, 100)); // All at the ends: variance = mean (1 - mean).
    QVERIFY(!fitOf({100, 200}, 100));
    QVERIFY(!fitOf({90, 150, 200}, 100)); // Below the floor.
    QVERIFY(!fitOf({50, 60, 70}, 100));   // The floor above all.
    QVERIFY(!fitOf({90, 100}, 100));
    QVERIFY(!fitOf({100, 100}, 100));
    QVERIFY(fitOf({100, 150, 200}, 100).has_value());
    QVERIFY(fitOf({150, 200}, 100).has_value());
}

void FittedTest::agreesWithClosedFormsOfTheBeta()
{
    std::vector<double> all;
    for (const double shape : {0.2, 0.5, 1.0, 2.0, 7.5, 60.0}) {
        // F = x^c has E = Gamma(1 + 1/c) Gamma(N + 1) / Gamma(N + 1 + 1/c); 1 - F = (1 - x)^b has E = 1 / (b N + 1).
        const FittedRange power{0, 1, shape, 1};
        const FittedRange mirrored{0, 1, 1, shape};
        expectedCheapestForAll(power, 800, all);
        auto allMirrored = all;
        expectedCheapestForAll(mirrored, 800, allMirrored);
        for (int n : {1, 2, 3, 10, 47, 200, 800}) {
            const double ofPower = std::exp(std::lgamma(1 + 1 / shape) + std::lgamma(n + 1.0) - std::lgamma(n + 1 + 1 / shape));
            const double ofMirrored = 1 / (shape * n + 1);
            // 1e-10: lgamma of large arguments loses some digits itself. For all at once: as its header says, of the range's width.
            COMPARE_CLOSE(expectedCheapest(power, n), ofPower, 1e-10);
            COMPARE_CLOSE(expectedCheapest(mirrored, n), ofMirrored, 1e-10);
            COMPARE_WITHIN(all[static_cast<std::size_t>(n - 1)], ofPower, 1e-10);
            COMPARE_WITHIN(allMirrored[static_cast<std::size_t>(n - 1)], ofMirrored, 1e-10);
        }
    }
}

void FittedTest::allAtOnceAgreesWithOneByOne()
{
    std::vector<double> all;
    for (const double a : {0.02, 0.3, 1.0, 2.5, 20.0, 400.0, 1e5})
        for (const double b : {0.02, 0.3, 1.0, 2.5, 20.0, 400.0, 1e4}) {
            const FittedRange fit{5000, 9000, a, b};
            expectedCheapestForAll(fit, 600, all);
            QCOMPARE(all.size(), 600U);
            for (int n : {1, 2, 5, 20, 100, 599, 600}) {
                const double one = expectedCheapest(fit, n);
                COMPARE_CLOSE(all[static_cast<std::size_t>(n - 1)], one, 1e-9);
                COMPARE_WITHIN(all[static_cast<std::size_t>(n - 1)], one, 1e-9 * (one - 5000) + 1e-11); // The gap too, down to rounding.
            }
        }
    expectedCheapestForAll(FittedRange{0, 1, 2, 2}, 0, all);
    QVERIFY(all.empty());
}

void FittedTest::staysSaneAtTheEdges()
{
    // Extreme fits: nearly all at the ends, or one dear unit over a crowd at one price.
    std::vector<std::int64_t> crowd(999, 5001);
    crowd.push_back(900'000'000);
    std::vector<std::int64_t> ends(500, 5000);
    ends.resize(1000, 900'000'000);
    ends[300] = 5001;
    std::vector<std::int64_t> top(999, 899'999'999);
    top.push_back(900'000'000);
    for (const auto& prices : {crowd, ends, top}) {
        const auto fit = fitOf(prices, 5000);
        QVERIFY(fit.has_value());
        std::vector<double> all;
        expectedCheapestForAll(*fit, 1000, all);
        double before = 9e8;
        for (const double expected : all) {
            QVERIFY(expected >= 5000 - 1e-6 && expected <= before + 1e-6); // Falls with N; rounding of 9e8 is 1e-7.
            before = expected;
        }
        for (int n : {1, 7, 1000}) {
            QVERIFY(std::isfinite(expectedCheapest(*fit, n)));
            for (double p : {0.0, 1e-9, 0.5, 0.9, 1.0}) {
                const double x = cheapestQuantile(*fit, n, p);
                QVERIFY(x >= fit->floor && x <= fit->highest);
            }
        }
    }
}

void FittedTest::quantilesUndoTheDistribution()
{
    for (const double a : {0.3, 1.0, 2.5, 20.0})
        for (const double b : {0.3, 1.0, 2.5, 20.0})
            for (const int n : {1, 3, 25, 400}) {
                const FittedRange fit{5000, 9000, a, b};
                double before = fit.floor;
                for (const double p : {0.01, 0.1, 0.5, 0.9, 0.99}) {
                    const double x = cheapestQuantile(fit, n, p);
                    QVERIFY(x >= before);
                    before = x;
                    // x is known to 1e-12 of 9,000; where the distribution is steep at the floor (a < 1) p moves much within that.
                    if (a >= 1 && x < 8999)
                        COMPARE_CLOSE(1 - std::pow(fit.survival(x), n), p, 1e-8);
                }
                QCOMPARE(cheapestQuantile(fit, n, 0), fit.floor);
                QCOMPARE(cheapestQuantile(fit, n, 1), fit.highest);
            }
    // F = x: the cheapest of n is at most x with chance 1 - (1 - x)^n.
    COMPARE_CLOSE(cheapestQuantile(FittedRange{0, 1, 1, 1}, 4, 0.5), 1 - std::pow(0.5, 0.25), 1e-12);
    // Far out, 1 - p is what counts: 1 - F = (1 - x)^20.
    const double p = 1 - 1e-10;
    COMPARE_CLOSE(cheapestQuantile(FittedRange{0, 1, 1, 20}, 1, p), 1 - std::pow(1 - p, 0.05), 1e-12);
}

QTEST_APPLESS_MAIN(FittedTest)
#include "fitted_test.moc"
