// SPDX-License-Identifier: GPL-3.0-or-later
// Cheapest-first turnover against the stationary state of its Markov chain, solved here as linear equations.
#include <QtTest>

#include "cheapest/erlang.h"
#include "cheapest/odds.h"

#include "core/close.h"
#include "core/sample_tiers.h"

#include <Eigen/Dense>

using namespace rungwright;

namespace
{

/// Stationary distribution of `units` rungs that are let cheapest first to a Poisson stream of load `a`, where a stay is `phases`
/// exponential phases in a row (one phase: exponential; two: half as variable) with mean 1 in all. A state writes each rung's phase as a
/// digit, 0 for free, the cheapest rung first.
Eigen::VectorXd stationary(int units, double a, int phases)
{
    const int digits = phases + 1;
    int states = 1;
    for (int i = 0; i < units; ++i)
        states *= digits;
    Eigen::MatrixXd rates = Eigen::MatrixXd::Zero(states, states);
    const auto go = [&](int from, int to, double rate) {
        rates(to, from) += rate;
        rates(from, from) -= rate;
    };
    for (int state = 0; state < states; ++state) {
        bool let = false;
        for (int i = 0, weight = 1; i < units; ++i, weight *= digits) {
            const int phase = state / weight % digits;
            if (phase == 0 && !let) {
                go(state, state + weight, a);
                let = true;
            } else if (phase == phases) {
                go(state, state - phase * weight, phases);
            } else if (phase > 0) {
                go(state, state + weight, phases);
            }
        }
    }
    rates.row(0).setOnes(); // One balance equation is redundant; the sum of all chances takes its place.
    Eigen::VectorXd right = Eigen::VectorXd::Zero(states);
    right(0) = 1;
    return rates.fullPivLu().solve(right);
}

bool isFree(int state, int rung, int digits)
{
    for (; rung > 0; --rung)
        state /= digits;
    return state % digits == 0;
}

} // namespace

class HuntingTest : public QObject
{
    Q_OBJECT

private slots:
    void agreesWithTheMarkovChain_data();
    void agreesWithTheMarkovChain();
};

void HuntingTest::agreesWithTheMarkovChain_data()
{
    QTest::addColumn<int>("units");
    QTest::addColumn<double>("load");
    QTest::addColumn<int>("phases");
    for (double load : {0.3, 1.0, 2.0, 4.5, 20.0}) {
        for (int units = 1; units <= 5; ++units)
            QTest::addRow("%d rungs, load %g, exponential stays", units, load) << units << load << 1;
        for (int units = 1; units <= 4; ++units)
            QTest::addRow("%d rungs, load %g, two-phase stays", units, load) << units << load << 2;
    }
}

void HuntingTest::agreesWithTheMarkovChain()
{
    QFETCH(int, units);
    QFETCH(double, load);
    QFETCH(int, phases);
    const auto chance = stationary(units, load, phases);

    std::vector<std::int64_t> prices;
    for (int i = 0; i < units; ++i)
        prices.push_back(5000 + 100 * i);
    const Tier tier = tierOf(prices, 5000);
    ModelSettings settings{ModelKind::turnover, {}, load};
    CheapestOdds odds;
    cheapestOdds(sortedLadder(tier.units, askingPrices(tier.units), Among::rentable), tier.units, settings, odds);
    QCOMPARE(odds.perRung.size(), static_cast<std::size_t>(units));
    QCOMPARE(*odds.load, load);

    std::vector<double> cheapest(static_cast<std::size_t>(units), 0.0);
    std::vector<double> allTaken(static_cast<std::size_t>(units), 0.0);
    double none = 0;
    double free = 0;
    for (int state = 0; state < chance.size(); ++state) {
        int first = 0;
        while (first < units && !isFree(state, first, phases + 1))
            ++first;
        if (first < units)
            cheapest[static_cast<std::size_t>(first)] += chance[state];
        else
            none += chance[state];
        for (int i = 0; i < first; ++i)
            allTaken[static_cast<std::size_t>(i)] += chance[state];
        for (int i = 0; i < units; ++i)
            free += isFree(state, i, phases + 1) ? chance[state] : 0;
    }
    // 1e-11: dense LU on up to 81 equations loses a few of sixteen digits. The stay's distribution must not matter (insensitivity).
    for (int i = 0; i < units; ++i) {
        COMPARE_WITHIN(odds.perRung[static_cast<std::size_t>(i)], cheapest[static_cast<std::size_t>(i)], 1e-11);
        COMPARE_WITHIN(erlangB(i + 1, load), allTaken[static_cast<std::size_t>(i)], 1e-11);
    }
    COMPARE_WITHIN(odds.none, none, 1e-11);
    COMPARE_WITHIN(meanFree(units, load), free, 1e-10);
}

QTEST_APPLESS_MAIN(HuntingTest)
#include "hunting_test.moc"
