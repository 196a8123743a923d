// SPDX-License-Identifier: GPL-3.0-or-later
// The four coefficients of skewness against published values, the written-out kernel and their own invariances.
#include <QtTest>

#include "ladder/skew.h"

#include "core/close.h"
#include "published/skewness.h"

#include <algorithm>
#include <functional>
#include <random>
#include <vector>

using namespace rungwright;

namespace
{

std::vector<double> sortedCopy(std::span<const double> values)
{
    std::vector<double> sorted(values.begin(), values.end());
    std::ranges::sort(sorted);
    return sorted;
}

/// The whole kernel of Brys, Hubert & Struyf (2004) written out, ties at the median by their rule, and its ordinary median.
double medcoupleByHand(const std::vector<double>& sorted)
{
    const std::size_t half = sorted.size() / 2;
    const double median = sorted.size() % 2 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
    std::vector<double> above, below;
    for (double x : sorted) {
        if (x >= median)
            above.push_back(x - median);
        if (x <= median)
            below.push_back(x - median);
    }
    std::ranges::reverse(above);
    std::ranges::reverse(below);
    const auto ties = static_cast<int>(std::ranges::count(above, 0.0));
    std::vector<double> kernel;
    for (std::size_t i = 0; i < above.size(); ++i)
        for (std::size_t j = 0; j < below.size(); ++j) {
            if (above[i] == 0 && below[j] == 0) {
                const int place = static_cast<int>(i) - (static_cast<int>(above.size()) - ties) + static_cast<int>(j);
                kernel.push_back(place < ties - 1 ? 1 : place == ties - 1 ? 0 : -1);
            } else {
                kernel.push_back((above[i] + below[j]) / (above[i] - below[j]));
            }
        }
    std::ranges::sort(kernel);
    const std::size_t middle = kernel.size() / 2;
    return kernel.size() % 2 ? kernel[middle] : (kernel[middle - 1] + kernel[middle]) / 2;
}

std::vector<double> randomLadder(std::mt19937_64& random, std::size_t size, int grains)
{
    std::uniform_int_distribution<int> price(0, grains);
    std::vector<double> values(size);
    for (double& value : values)
        value = 5000 + 7 * price(random);
    std::ranges::sort(values);
    return values;
}

} // namespace

class SkewTest : public QObject
{
    Q_OBJECT

private slots:
    void agreesWithPublishedValues_data();
    void agreesWithPublishedValues();
    void agreesWithPrintedMedcouple();
    void lSkewnessTendsToThePopulations();
    void medcoupleIsTheMedianOfTheKernel();
    void medcoupleTiesAtTheMedian();
    void doesNotSeeShiftOrScale();
    void turnsWithTheLadder();
    void anEvenLadderLeansNowhere();
    void isUndefinedWhereItMustBe();
    void saysWhenSignsDisagree();
};

void SkewTest::agreesWithPublishedValues_data()
{
    QTest::addColumn<int>("row");
    for (std::size_t i = 0; i < std::size(published::kSkewed); ++i)
        QTest::newRow(published::kSkewed[i].name) << static_cast<int>(i);
}

void SkewTest::agreesWithPublishedValues()
{
    QFETCH(int, row);
    const auto& expected = published::kSkewed[row];
    const auto sorted = sortedCopy(expected.values);
    const auto figures = skewFigures(sorted);
    // 1e-11: the table gives 13 digits.
    COMPARE_CLOSE(*figures.moment, expected.g1, 1e-11);
    COMPARE_CLOSE(*figures.adjusted, expected.G1, 1e-11);
    COMPARE_CLOSE(*figures.medcouple, expected.medcouple, 1e-11);
    COMPARE_CLOSE(*figures.l, expected.l, 1e-11);
    // The third of e1071's coefficients, b1 = g1 ((n-1)/n)^1.5, is not shown by the tool; it pins which one g1 is.
    const auto n = static_cast<double>(sorted.size());
    COMPARE_CLOSE(*figures.moment * std::pow((n - 1) / n, 1.5), expected.b1, 1e-11);
}

void SkewTest::agreesWithPrintedMedcouple()
{
    // 1e-14: both are exact fractions, computed with a few roundings.
    COMPARE_CLOSE(*medcouple(published::kCushny), published::kCushnyMedcouple, 1e-14);
    COMPARE_CLOSE(*medcouple(published::kC12710), -1.0 / 3, 1e-14);
}

void SkewTest::lSkewnessTendsToThePopulations()
{
    // Values at the quantiles (i - 1/2) / n stand for the population. 2e-3: the sample's t3 is off by about 1/n and the cut tails' share.
    constexpr int n = 20000;
    const auto ofQuantiles = [](const std::function<double(double)>& quantile) {
        std::vector<double> values(n);
        for (int i = 0; i < n; ++i)
            values[static_cast<std::size_t>(i)] = quantile((i + 0.5) / n);
        return *lSkewness(values);
    };
    COMPARE_WITHIN(ofQuantiles([](double p) { return p; }), published::kLUniform, 2e-3);
    COMPARE_WITHIN(ofQuantiles([](double p) { return -std::log1p(-p); }), published::kLExponential, 2e-3);
    COMPARE_WITHIN(ofQuantiles([](double p) { return -std::log(-std::log(p)); }), published::kLGumbel, 2e-3);
    COMPARE_WITHIN(ofQuantiles([](double p) { return std::log(p / (1 - p)); }), published::kLLogistic, 2e-3);
    COMPARE_WITHIN(ofQuantiles([](double p) { return 2 * (1 - std::sqrt(1 - p)); }), published::kLParetoHalf, 2e-3);
}

void SkewTest::medcoupleIsTheMedianOfTheKernel()
{
    std::mt19937_64 random(11);
    MedcoupleWorkspace work;
    for (int round = 0; round < 3000; ++round) {
        const std::size_t size = 3 + random() % (round % 50 == 0 ? 250 : 40);
        const int grains = round % 3 == 0 ? 4 : round % 3 == 1 ? 40 : 100000; // Many ties, some, hardly any.
        const auto values = randomLadder(random, size, grains);
        const auto result = medcouple(values, work);
        QCOMPARE(result.has_value(), values.front() != values.back());
        if (result) // The same entries, so the same doubles: 1e-15 is for the median's own rounding.
            COMPARE_WITHIN(*result, medcoupleByHand(values), 1e-15);
    }
}

void SkewTest::medcoupleTiesAtTheMedian()
{
    // By hand from the tie rule: 5 5 5 5 9 has the kernel 1 (10 times), 0 (4), -1 (6); its median is the mean of 1 and 0.
    COMPARE_CLOSE(*medcouple(std::vector<double>{5, 5, 5, 5, 9}), 0.5, 1e-15);
    COMPARE_CLOSE(*medcouple(std::vector<double>{1, 5, 5, 5, 5}), -0.5, 1e-15);
    COMPARE_WITHIN(*medcouple(std::vector<double>{1, 5, 5, 5, 9}), 0.0, 1e-15);
}

void SkewTest::doesNotSeeShiftOrScale()
{
    std::mt19937_64 random(12);
    for (int round = 0; round < 300; ++round) {
        const auto values = randomLadder(random, 3 + random() % 60, 200);
        if (values.front() == values.back())
            continue;
        const auto figures = skewFigures(values);
        auto changed = values;
        const double scale = std::pow(10.0, static_cast<int>(random() % 9) - 4);
        for (double& value : changed)
            value = scale * (value + 12345);
        const auto after = skewFigures(changed);
        // 1e-9: the shift moves the last digits of values that are about ten times their spread.
        COMPARE_WITHIN(*after.moment, *figures.moment, 1e-9);
        COMPARE_WITHIN(*after.adjusted, *figures.adjusted, 1e-9);
        COMPARE_WITHIN(*after.l, *figures.l, 1e-9);
        // The medcouple compares with the median: whole numbers keep the ties that it counts, so it is asked of a whole scale and shift.
        auto whole = values;
        for (double& value : whole)
            value = 12 * value + 123456;
        COMPARE_WITHIN(*medcouple(whole), *figures.medcouple, 1e-13);
    }
}

void SkewTest::turnsWithTheLadder()
{
    std::mt19937_64 random(13);
    for (int round = 0; round < 300; ++round) {
        const auto values = randomLadder(random, 3 + random() % 60, 30);
        if (values.front() == values.back())
            continue;
        std::vector<double> mirrored;
        for (auto value = values.rbegin(); value != values.rend(); ++value)
            mirrored.push_back(-*value);
        const auto figures = skewFigures(values);
        const auto turned = skewFigures(mirrored);
        COMPARE_WITHIN(*turned.moment, -*figures.moment, 1e-12);
        COMPARE_WITHIN(*turned.l, -*figures.l, 1e-12);
        COMPARE_WITHIN(*turned.medcouple, -*figures.medcouple, 1e-14); // Holds for the ordinary median of the kernel.
    }
}

void SkewTest::anEvenLadderLeansNowhere()
{
    for (int size = 3; size < 60; ++size) {
        std::vector<double> values;
        for (int i = 0; i < size; ++i)
            values.push_back(6999 + 317.0 * i);
        const auto figures = skewFigures(values);
        QCOMPARE(*figures.moment, 0.0);
        QCOMPARE(*figures.adjusted, 0.0);
        QCOMPARE(*figures.l, 0.0);
        QCOMPARE(*figures.medcouple, 0.0);
        QVERIFY(!figures.signsDisagree());
    }
}

void SkewTest::isUndefinedWhereItMustBe()
{
    const auto none = skewFigures({});
    QVERIFY(!none.moment && !none.adjusted && !none.medcouple && !none.l);
    const auto one = skewFigures(std::vector<double>{7});
    QVERIFY(!one.moment && !one.adjusted && !one.medcouple && !one.l);
    const auto two = skewFigures(std::vector<double>{7, 9});
    QCOMPARE(two.moment, std::optional(0.0));
    QVERIFY(!two.adjusted && !two.medcouple && !two.l);
    const auto equal = skewFigures(std::vector<double>{7, 7, 7, 7});
    QVERIFY(!equal.moment && !equal.adjusted && !equal.medcouple && !equal.l);
    QVERIFY(!equal.signsDisagree());
}

void SkewTest::saysWhenSignsDisagree()
{
    // One far-off low price under a body that leans right: the third moment sees the first, the medcouple the second.
    const std::vector<double> values{0, 50, 51, 52, 54, 57, 61};
    const auto figures = skewFigures(values);
    QVERIFY(*figures.moment < 0);
    QVERIFY(*figures.medcouple > 0);
    QVERIFY(figures.signsDisagree());
    QVERIFY(!skewFigures(std::vector<double>{1, 2, 3, 5, 9}).signsDisagree());
}

QTEST_APPLESS_MAIN(SkewTest)
#include "skew_test.moc"
