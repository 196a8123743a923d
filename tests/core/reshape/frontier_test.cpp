// SPDX-License-Identifier: GPL-3.0-or-later
// The frontier: each of its points is the least change for its gap, and nothing lies beyond its ends.
#include <QtTest>

#include "reshape/frontier.h"

#include "core/close.h"
#include "core/sample_tiers.h"

using namespace rungwright;

namespace
{

PriceRules house()
{
    PriceRules rules;
    rules.points.step = {50};
    rules.greatestChangePercent = 15;
    return rules;
}

Tier invented(std::mt19937_64& random, std::size_t units)
{
    TierSpread spread;
    spread.units = units;
    spread.grain = 50;
    spread.mixedStatus = true;
    return randomTier(random, spread);
}

} // namespace

class FrontierTest : public QObject
{
    Q_OBJECT

private slots:
    void pointsAreLeastChanges();
    void shapeOfTheCurve();
    void byTotalIsTheSmallestGap();
    void nothingToTrace();
    void fittedRange();
};

void FrontierTest::pointsAreLeastChanges()
{
    std::mt19937_64 random(91);
    FrontierTracer tracer;
    LeastChange solver;
    for (const ModelKind kind : {ModelKind::perceived, ModelKind::remainder, ModelKind::turnover, ModelKind::onHand, ModelKind::unit}) {
        const Tier tier = invented(random, 40);
        const ModelSettings model{kind, {}, {}};
        ChangeWish wish;
        wish.total.free = kind == ModelKind::remainder;
        const auto points = tracer.byChange(tier, model, house(), wish, 20);
        QVERIFY(points.size() == 20);
        QCOMPARE(points.front().rmsChange, 0.0);
        for (std::size_t i = 1; i < points.size(); ++i) {
            wish.target = {TargetKind::gap, points[i].gap + 1e-9};
            const LeastChangeAnswer& answer = solver.solve(tier, model, house(), wish);
            QCOMPARE(answer.obstacle, Obstacle::none);
            // At the very end the change is steep in the gap.
            COMPARE_CLOSE(answer.rmsLeast, points[i].rmsChange, i + 1 == points.size() ? 1e-4 : 1e-6);
        }
        wish.target.value = points.back().gap - 1;
        const LeastChangeAnswer& beyond = solver.solve(tier, model, house(), wish);
        QCOMPARE(beyond.obstacle, Obstacle::target);
        COMPARE_WITHIN(*beyond.nearestTarget, points.back().gap, 1e-3);
    }
}

void FrontierTest::shapeOfTheCurve()
{
    std::mt19937_64 random(92);
    FrontierTracer tracer;
    for (int round = 0; round < 30; ++round) {
        const Tier tier = invented(random, 5 + random() % 60);
        const auto points = tracer.byChange(tier, {}, house(), {}, 30);
        for (std::size_t i = 1; i < points.size(); ++i) {
            QVERIFY(points[i].gap < points[i - 1].gap);
            QVERIFY(points[i].rmsChange > points[i - 1].rmsChange - 1e-9);
            COMPARE_WITHIN(points[i].totalChange, 0, 1e-6); // Held.
            if (i < 2)
                continue;
            const auto squared = [&](std::size_t k) { return points[k].rmsChange * points[k].rmsChange; };
            const double slope = (squared(i) - squared(i - 1)) / (points[i - 1].gap - points[i].gap);
            const double before = (squared(i - 1) - squared(i - 2)) / (points[i - 2].gap - points[i - 1].gap);
            QVERIFY(slope >= before * (1 - 1e-6) - 1e-6);
        }
    }
}

void FrontierTest::byTotalIsTheSmallestGap()
{
    std::mt19937_64 random(93);
    FrontierTracer tracer;
    LeastChange solver;
    const Tier tier = invented(random, 30);
    const auto points = tracer.byTotal(tier, {}, house(), {}, 8, 17);
    QCOMPARE(points.size(), std::size_t{17});
    for (std::size_t i = 1; i < points.size(); ++i)
        QVERIFY(points[i].gap >= points[i - 1].gap - 1e-9); // A higher total never makes a smaller gap easier.
    QVERIFY(points.back().gap > points.front().gap + 1);
    QCOMPARE(points[8].totalChange, 0.0);
    ChangeWish wish;
    wish.target = {TargetKind::gap, -1e5};
    COMPARE_WITHIN(*solver.solve(tier, {}, house(), wish).nearestTarget, points[8].gap, 1e-6);
}

void FrontierTest::nothingToTrace()
{
    FrontierTracer tracer;
    QVERIFY(tracer.byChange(tierOf({5000, 6000}, 0), {}, {}, {}, 10).empty());
    QVERIFY(tracer.byChange(tierOf({}, 5000), {}, {}, {}, 10).empty());
    Tier locked = tierOf({5000, 6000, 7000}, 5000);
    for (Unit& unit : locked.units)
        unit.locked = true;
    QCOMPARE(tracer.byChange(locked, {}, {}, {}, 10).size(), std::size_t{1});
    ChangeWish wish;
    wish.total.changePercent = 10;
    QVERIFY(tracer.byChange(locked, {}, {}, wish, 10).empty());
}

void FrontierTest::fittedRange()
{
    std::mt19937_64 random(94);
    TierSpread spread;
    spread.units = 30;
    const Tier tier = randomTier(random, spread);
    PriceRules rules = house();
    rules.points.least = Price{4000};
    FrontierTracer tracer;
    const auto points = tracer.byChange(tier, {ModelKind::fitted, {}, {}}, rules, {}, 12);
    QCOMPARE(points.size(), std::size_t{12});
    QVERIFY(points.back().gap < points.front().gap);
    QVERIFY(tracer.byTotal(tier, {ModelKind::fitted, {}, {}}, rules, {}, 5, 10).empty());
}

QTEST_GUILESS_MAIN(FrontierTest)
#include "frontier_test.moc"
