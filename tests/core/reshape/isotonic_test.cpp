// SPDX-License-Identifier: GPL-3.0-or-later
// Isotonic regression under bounds: worked examples, and the definition of a minimum taken literally.
#include <QtTest>

#include "reshape/isotonic.h"

#include "core/close.h"

#include <algorithm>
#include <limits>
#include <numeric>
#include <random>

using namespace rungwright;

namespace
{

constexpr double kFar = std::numeric_limits<double>::infinity();
using Numbers = std::vector<double>;

Numbers fitted(const Numbers& y, Numbers weight = {}, Numbers lo = {}, Numbers hi = {})
{
    weight.resize(y.size(), 1);
    lo.resize(y.size(), -kFar);
    hi.resize(y.size(), kFar);
    if (tightenBounds(lo, hi))
        return {};
    std::vector<IsotonicBlock> blocks;
    fitIsotonic(y, weight, lo, hi, blocks);
    Numbers x(y.size());
    spreadBlocks(blocks, x);
    return x;
}

void compare(const Numbers& actual, const Numbers& expected, double absolute)
{
    QCOMPARE(actual.size(), expected.size());
    for (std::size_t i = 0; i < actual.size(); ++i)
        COMPARE_WITHIN(actual[i], expected[i], absolute);
}

/// Calls `use` with every nondecreasing sequence of whole numbers within the bounds.
template <class Use>
void everySequence(const Numbers& lo, const Numbers& hi, Numbers& x, const Use& use)
{
    if (x.size() == lo.size()) {
        use(x);
        return;
    }
    const std::size_t i = x.size();
    const int from = static_cast<int>(i == 0 ? lo[i] : std::max(lo[i], x.back()));
    for (int value = from; value <= static_cast<int>(hi[i]); ++value) {
        x.push_back(value);
        everySequence(lo, hi, x, use);
        x.pop_back();
    }
}

} // namespace

class IsotonicTest : public QObject
{
    Q_OBJECT

private slots:
    void isoregExamples();
    void weightedExample();
    void commonBox();
    void boxPerUnit();
    void conflicts();
    void linearIsTheLeast();
    void noNeighbourIsBetter();
    void emptyChain();
};

void IsotonicTest::isoregExamples()
{
    // The examples on the manual page of stats::isoreg, values recomputed in R 4.2.2: isoreg(y)$yf.
    compare(fitted({1, 0, 4, 3, 3, 5, 4, 2, 0}), {0.5, 0.5, 3, 3, 3, 3, 3, 3, 3}, 1e-14);
    const double third = 10.0 / 3;
    compare(fitted({1, 0, 4, 3, 3, 5, 4, 2, 3}), {0.5, 0.5, third, third, third, 3.5, 3.5, 3.5, 3.5}, 1e-14);
    compare(fitted({5, 9, 1, 2, 5, 6, 7, 8, 3, 8}), {4.25, 4.25, 4.25, 4.25, 5, 6, 6, 6, 6, 8}, 1e-14);
}

void IsotonicTest::weightedExample()
{
    // quadprog 1.5-8, solve.QP(diag(w), w * y, ...): printed to 12 digits, the block's mean is 785 / 7.
    const double block = 785.0 / 7;
    compare(fitted({100, 120, 110, 115, 90, 130, 125}, {1, 2, 1, 3, 1, 1, 4}), {100, block, block, block, block, 126, 126}, 1e-12);
    COMPARE_CLOSE(block, 112.142857143, 1e-11);
}

void IsotonicTest::commonBox()
{
    // quadprog 1.5-8; the sum of squares is 18.75. With one box for all, clipping the unbounded fit gives the same.
    const Numbers y{1, 0, 4, 3, 3, 5, 4, 2, 0};
    const Numbers x = fitted(y, {}, Numbers(9, 1), Numbers(9, 2.5));
    compare(x, {1, 1, 2.5, 2.5, 2.5, 2.5, 2.5, 2.5, 2.5}, 0);
    double squares = 0;
    for (std::size_t i = 0; i < y.size(); ++i)
        squares += (x[i] - y[i]) * (x[i] - y[i]);
    COMPARE_CLOSE(squares, 18.75, 1e-14);
}

void IsotonicTest::boxPerUnit()
{
    // quadprog 1.5-8. Clipping the unbounded fit would give 2, 2, 3.51, 3.51.
    compare(fitted({5.66, 5.45, 0.61, 2.32}, {}, {0, 0, 1, 2}, {2, 2, 6, 6}), {2, 2, 2, 2.32}, 1e-14);
}

void IsotonicTest::conflicts()
{
    Numbers lo{0, 5, 1, 4};
    Numbers hi{9, 8, 4, 9};
    const auto conflict = tightenBounds(lo, hi);
    QVERIFY(conflict);
    QCOMPARE(conflict->lower, std::size_t{1});
    QCOMPARE(conflict->upper, std::size_t{2});

    Numbers fineLo{0, 3, 1, -kFar};
    Numbers fineHi{kFar, 8, 4, 9};
    QVERIFY(!tightenBounds(fineLo, fineHi));
    QCOMPARE(fineLo, (Numbers{0, 3, 3, 3}));
    QCOMPARE(fineHi, (Numbers{4, 4, 4, 9}));
}

void IsotonicTest::linearIsTheLeast()
{
    std::mt19937_64 random(31);
    for (int round = 0; round < 400; ++round) {
        const std::size_t n = 1 + random() % 5;
        Numbers slope;
        Numbers lo;
        Numbers hi;
        for (std::size_t i = 0; i < n; ++i) {
            slope.push_back(static_cast<double>(random() % 9) - 4);
            lo.push_back(static_cast<double>(random() % 4));
            hi.push_back(lo.back() + static_cast<double>(random() % 4));
        }
        if (tightenBounds(lo, hi))
            continue;
        std::vector<IsotonicBlock> blocks;
        fitLinear(slope, lo, hi, blocks);
        Numbers x(n);
        spreadBlocks(blocks, x);
        const auto value = [&](const Numbers& z) { return std::inner_product(z.begin(), z.end(), slope.begin(), 0.0); };
        double best = kFar;
        Numbers z;
        everySequence(lo, hi, z, [&](const Numbers& tried) { best = std::min(best, value(tried)); });
        QVERIFY(std::ranges::is_sorted(x));
        QCOMPARE(value(x), best); // Whole numbers: exact.
    }
}

void IsotonicTest::noNeighbourIsBetter()
{
    // A convex problem: x is the minimum exactly if moving towards any other allowed sequence does not lower the sum. Those tried are all
    // sequences on whole numbers, among them every corner of the allowed set.
    std::mt19937_64 random(32);
    std::uniform_real_distribution<double> uniform;
    int held = 0;
    for (int round = 0; round < 300; ++round) {
        const std::size_t n = 2 + random() % 4;
        Numbers y;
        Numbers weight;
        Numbers lo;
        Numbers hi;
        for (std::size_t i = 0; i < n; ++i) {
            y.push_back(8 * uniform(random) - 1);
            weight.push_back(0.2 + uniform(random));
            lo.push_back(static_cast<double>(random() % 4));
            hi.push_back(lo.back() + static_cast<double>(random() % 4));
        }
        const Numbers x = fitted(y, weight, lo, hi);
        if (x.empty())
            continue;
        QVERIFY(std::ranges::is_sorted(x));
        Numbers z;
        bool minimal = true;
        everySequence(lo, hi, z, [&](const Numbers& tried) {
            double slope = 0;
            for (std::size_t i = 0; i < n; ++i)
                slope += weight[i] * (x[i] - y[i]) * (tried[i] - x[i]);
            minimal = minimal && slope >= -1e-12;
        });
        QVERIFY(minimal);
        for (std::size_t i = 0; i < n; ++i) {
            QVERIFY(x[i] >= lo[i] && x[i] <= hi[i]);
            held += x[i] == lo[i] || x[i] == hi[i];
        }
    }
    QVERIFY(held > 100);
}

void IsotonicTest::emptyChain() { QVERIFY(fitted({}).empty()); }

QTEST_GUILESS_MAIN(IsotonicTest)
#include "isotonic_test.moc"
