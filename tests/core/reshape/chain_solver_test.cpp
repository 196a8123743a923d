// SPDX-License-Identifier: GPL-3.0-or-later
// The least change of a chain: the conditions of Karush, Kuhn and Tucker at size, a second method, and what is out of reach.
#include <QtTest>

#include "reshape/chain_solver.h"

#include "core/close.h"
#include "core/reshape/random_chains.h"

#include <numeric>

using namespace rungwright;

namespace
{

double product(const std::vector<double>& a, const std::vector<double>& b)
{
    return std::inner_product(a.begin(), a.end(), b.begin(), 0.0);
}

/// How far the answer is from fulfilling the conditions, relative to the slopes. The slope of the Lagrangian must be balanced by order
/// multipliers e_i >= 0 of x_i <= x_{i+1} (0 where x_i < x_{i+1}) and by bound multipliers where a price is at its bound:
///   slope_i + e_i - e_{i-1} - (>= 0 at lo) + (>= 0 at hi) = 0.
/// Walking up, the e_i that are possible form an interval.
double kktMiss(const Chain& chain, const ChainAnswer& answer)
{
    const std::size_t n = chain.today.size();
    double least = 0;
    double most = 0;
    double miss = 0;
    double largest = 1e-9;
    for (std::size_t i = 0; i < n; ++i) {
        const double x = answer.x[i];
        const double slope =
            2 * chain.weight[i] * (x - chain.today[i]) - 2 * answer.mu * chain.counted[i] + 2 * answer.lambda * chain.odds[i];
        largest = std::max({largest, std::abs(2 * chain.weight[i] * (x - chain.today[i])), std::abs(2 * answer.mu * chain.counted[i])});
        least -= slope;
        most -= slope;
        if (x <= chain.lo[i])
            most = std::numeric_limits<double>::infinity();
        if (x >= chain.hi[i])
            least = -std::numeric_limits<double>::infinity();
        const bool tied = i + 1 < n && answer.x[i + 1] == x;
        miss = std::max({miss, -most, tied ? 0 : least}); // e_i >= 0, and = 0 where the next price is higher.
        least = std::max(least, 0.0);
        most = std::max(most, least);
        if (!tied)
            least = most = 0;
    }
    return miss / largest;
}

/// Dykstra's alternating projections (Boyle & Dykstra 1986, from memory): another way to the same point, slow and sure. All weights 1.
std::vector<double> projected(const Chain& chain, int rounds)
{
    const std::size_t n = chain.today.size();
    std::vector<double> x = chain.today;
    // One correction a constraint: order pairs and bounds by place, then total and target.
    std::vector<std::pair<double, double>> pairs(n);
    std::vector<double> box(n);
    std::vector<double> target(n);
    for (int round = 0; round < rounds; ++round) {
        for (std::size_t i = 0; i + 1 < n; ++i) {
            const double a = x[i] + pairs[i].first;
            const double b = x[i + 1] + pairs[i].second;
            const double mean = (a + b) / 2;
            x[i] = a > b ? mean : a;
            x[i + 1] = a > b ? mean : b;
            pairs[i] = {a - x[i], b - x[i + 1]};
        }
        for (std::size_t i = 0; i < n; ++i) {
            const double a = x[i] + box[i];
            x[i] = std::clamp(a, chain.lo[i], chain.hi[i]);
            box[i] = a - x[i];
        }
        if (chain.total) {
            const double by = (*chain.total - product(chain.counted, x)) / product(chain.counted, chain.counted);
            for (std::size_t i = 0; i < n; ++i)
                x[i] += by * chain.counted[i]; // A plane needs no correction.
        }
        if (chain.expectedMost) {
            for (std::size_t i = 0; i < n; ++i)
                x[i] += target[i];
            const double by = std::min(0.0, (*chain.expectedMost - product(chain.odds, x)) / product(chain.odds, chain.odds));
            for (std::size_t i = 0; i < n; ++i) {
                target[i] = -by * chain.odds[i];
                x[i] -= target[i];
            }
        }
    }
    return x;
}

} // namespace

class ChainSolverTest : public QObject
{
    Q_OBJECT

private slots:
    void kktAtTenThousand();
    void kktOfSmallOnes();
    void alternatingProjections();
    void constraintsHold();
    void leastExpectedIsReached();
    void outOfReach();
    void totalBetweenLimits();
    void nothingToDo();
    void shiftAndScale();
    void solvesAgainWithoutMemory();
};

void ChainSolverTest::kktAtTenThousand()
{
    std::mt19937_64 random(51);
    ChainSolver solver;
    int solved = 0;
    double worst = 0;
    for (int round = 0; round < 60; ++round) {
        const Chain chain = randomChain(random, 10'000);
        const ChainAnswer& answer = solver.solve(chain.problem());
        if (answer.status != ChainStatus::solved)
            continue;
        ++solved;
        worst = std::max(worst, kktMiss(chain, answer));
    }
    qInfo("10,000 units: %d solved, conditions fulfilled to %.2g of the largest slope", solved, worst);
    QVERIFY(solved >= 15);
    QVERIFY(worst < 1e-9); // Block sums of up to 10,000 slopes, each rounded.
}

void ChainSolverTest::kktOfSmallOnes()
{
    std::mt19937_64 random(52);
    ChainSolver solver;
    int binding = 0;
    for (int round = 0; round < 3000; ++round) {
        const Chain chain = randomChain(random, 1 + random() % 30);
        const ChainAnswer& answer = solver.solve(chain.problem());
        if (answer.status != ChainStatus::solved)
            continue;
        binding += answer.lambda > 0;
        QVERIFY(answer.lambda >= 0);
        QVERIFY2(kktMiss(chain, answer) < 1e-9, qPrintable(QString::number(round)));
    }
    QVERIFY(binding > 1000);
}

void ChainSolverTest::alternatingProjections()
{
    std::mt19937_64 random(53);
    ChainSolver solver;
    int compared = 0;
    while (compared < 40) {
        Chain chain = randomChain(random, 2 + random() % 5);
        std::ranges::fill(chain.weight, 1.0);
        const ChainAnswer& answer = solver.solve(chain.problem());
        if (answer.status != ChainStatus::solved)
            continue;
        const std::vector<double> x = projected(chain, 200'000);
        for (std::size_t i = 0; i < x.size(); ++i)
            COMPARE_WITHIN(answer.x[i], x[i], 0.01); // Of thousands: the projections converge slowly where constraints are nearly parallel.
        ++compared;
    }
}

void ChainSolverTest::constraintsHold()
{
    std::mt19937_64 random(54);
    ChainSolver solver;
    for (int round = 0; round < 2000; ++round) {
        const Chain chain = randomChain(random, 1 + random() % 60);
        const ChainAnswer& answer = solver.solve(chain.problem());
        if (answer.status != ChainStatus::solved)
            continue;
        QVERIFY(std::ranges::is_sorted(answer.x));
        for (std::size_t i = 0; i < answer.x.size(); ++i)
            QVERIFY(answer.x[i] >= chain.lo[i] - 1e-9 && answer.x[i] <= chain.hi[i] + 1e-9); // The base is taken off and put on again.
        if (chain.total)
            COMPARE_CLOSE(product(chain.counted, answer.x), *chain.total, 1e-13);
        if (chain.expectedMost)
            QVERIFY(product(chain.odds, answer.x) <= *chain.expectedMost + 1e-6);
        COMPARE_CLOSE(product(chain.odds, answer.x), answer.expected, 1e-12);
        COMPARE_CLOSE(product(chain.counted, answer.x), answer.total, 1e-12);
    }
}

void ChainSolverTest::leastExpectedIsReached()
{
    // What is said to be the least can be had, and a hair less cannot; and no random allowed ladder with the total is below it.
    std::mt19937_64 random(55);
    ChainSolver solver;
    int tried = 0;
    for (int round = 0; round < 1000; ++round) {
        Chain chain = randomChain(random, 1 + random() % 30);
        chain.expectedMost.reset();
        const ChainAnswer bounds = solver.leastExpected(chain.problem());
        if (bounds.status != ChainStatus::solved)
            continue;
        ++tried;
        chain.expectedMost = *bounds.leastExpected;
        const ChainAnswer atEnd = solver.solve(chain.problem());
        QCOMPARE(atEnd.status, ChainStatus::solved);
        COMPARE_WITHIN(atEnd.expected, *bounds.leastExpected, 1e-5); // 1e-9 of the way, see the solver.
        chain.expectedMost = *bounds.leastExpected - 1e-4;
        const ChainAnswer below = solver.solve(chain.problem());
        // Without room to move nothing needs the least to be known.
        QCOMPARE(below.status, ChainStatus::expectedOutOfReach);
        COMPARE_WITHIN(*below.leastExpected, *bounds.leastExpected, 1e-7);
    }
    QVERIFY(tried > 500);
}

void ChainSolverTest::outOfReach()
{
    Chain chain{{100, 200, 300}, {1, 1, 1}, {90, 200, 250}, {110, 200, 310}, {1, 1, 1}, {0.5, 0.3, 0.2}, 700, {}};
    ChainSolver solver;
    const ChainAnswer& far = solver.solve(chain.problem());
    QCOMPARE(far.status, ChainStatus::totalOutOfReach);
    QCOMPARE(far.leastTotal, 540.0);
    QCOMPARE(far.mostTotal, 620.0);

    chain.total = 600;
    chain.expectedMost = 100;
    const ChainAnswer& deep = solver.solve(chain.problem());
    QCOMPARE(deep.status, ChainStatus::expectedOutOfReach);
    COMPARE_CLOSE(*deep.leastExpected, 0.5 * 90 + 0.3 * 200 + 0.2 * 310, 1e-14); // 90 + 200 + 310 = 600.

    chain.lo = {150, 200, 250};
    chain.hi = {160, 140, 310};
    const ChainAnswer& crossed = solver.solve(chain.problem());
    QCOMPARE(crossed.status, ChainStatus::boundsCross);
    QCOMPARE(crossed.conflict.upper, std::size_t{1});
}

void ChainSolverTest::totalBetweenLimits()
{
    std::mt19937_64 random(56);
    ChainSolver solver;
    int ends = 0;
    for (int round = 0; round < 500; ++round) {
        Chain chain = randomChain(random, 2 + random() % 20);
        chain.total.reset();
        const ChainAnswer freely = solver.solve(chain.problem());
        if (freely.status != ChainStatus::solved)
            continue;
        ChainProblem between = chain.problem();
        between.totalLeast = freely.total - 50 + 100 * static_cast<double>(random() % 2);
        between.totalMost = *between.totalLeast + 70;
        const ChainAnswer within = solver.solve(between);
        if (within.status != ChainStatus::solved)
            continue;
        // By convexity: the free optimum if it lies between, else the better of the ends.
        const double held = std::clamp(freely.total, *between.totalLeast, *between.totalMost);
        chain.total = held;
        const ChainAnswer atHeld = solver.solve(chain.problem());
        QCOMPARE(atHeld.status, ChainStatus::solved);
        COMPARE_CLOSE(within.cost, atHeld.cost, 1e-8);
        ends += held != freely.total;
    }
    QVERIFY(ends > 50);
}

void ChainSolverTest::nothingToDo()
{
    ChainSolver solver;
    QCOMPARE(solver.solve({}).status, ChainStatus::solved);
    const Chain chain{{100, 200, 300}, {1, 1, 1}, {50, 50, 50}, {400, 400, 400}, {1, 1, 1}, {0.5, 0.3, 0.2}, 600, 170};
    const ChainAnswer& answer = solver.solve(chain.problem());
    QCOMPARE(answer.cost, 0.0);
    QCOMPARE(answer.lambda, 0.0);
    QCOMPARE(answer.x, chain.today);
}

void ChainSolverTest::shiftAndScale()
{
    std::mt19937_64 random(57);
    ChainSolver solver;
    for (int round = 0; round < 300; ++round) {
        const Chain chain = randomChain(random, 2 + random() % 30);
        const ChainAnswer before = solver.solve(chain.problem());
        Chain moved = chain;
        const double shift = 4'000'000;
        const double scale = 8;
        for (auto* part : {&moved.today, &moved.lo, &moved.hi})
            for (double& price : *part)
                price = scale * (price + shift);
        const double counts = std::accumulate(chain.counted.begin(), chain.counted.end(), 0.0);
        if (moved.total)
            moved.total = scale * (*moved.total + shift * counts);
        if (moved.expectedMost)
            moved.expectedMost = scale * (*moved.expectedMost + shift * std::accumulate(chain.odds.begin(), chain.odds.end(), 0.0));
        const ChainAnswer after = solver.solve(moved.problem());
        QCOMPARE(after.status, before.status);
        if (before.status == ChainStatus::solved)
            COMPARE_WITHIN(after.cost, scale * scale * before.cost, 1e-6 * scale * scale * before.cost + 1e-4); // Totals of 1e9 round.
    }
}

void ChainSolverTest::solvesAgainWithoutMemory()
{
    std::mt19937_64 random(58);
    ChainSolver reused;
    for (int round = 0; round < 200; ++round) {
        const Chain chain = randomChain(random, 1 + random() % 40);
        ChainSolver fresh;
        const ChainAnswer& a = reused.solve(chain.problem());
        const ChainAnswer& b = fresh.solve(chain.problem());
        QCOMPARE(a.status, b.status);
        QCOMPARE(a.cost, b.cost);
        if (a.status == ChainStatus::solved)
            QCOMPARE(a.x, b.x);
    }
}

QTEST_GUILESS_MAIN(ChainSolverTest)
#include "chain_solver_test.moc"
