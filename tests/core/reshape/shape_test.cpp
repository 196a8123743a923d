// SPDX-License-Identifier: GPL-3.0-or-later
// Ladders made from a shape.
#include <QtTest>

#include "reshape/shape.h"

#include "core/close.h"
#include "core/r/ask_r.h"
#include "core/sample_tiers.h"

#include <numeric>

using namespace rungwright;

namespace
{

std::vector<Price> prices(const std::vector<std::int64_t>& minor)
{
    std::vector<Price> out;
    for (const auto m : minor)
        out.push_back({m});
    return out;
}

} // namespace

class ShapeTest : public QObject
{
    Q_OBJECT

private slots:
    void evenSteps();
    void leanByOneDial();
    void methodOfLMoments();
    void momentsAgainstR();
    void rungsAgainstR();
    void priceSteps();
    void placing();
    void lMomentsOfALadder();
    void troubles();
};

void ShapeTest::evenSteps()
{
    QCOMPARE(shapeRungs({{5000}, {6000}, {1, 1}, {}}, 5), prices({5000, 5250, 5500, 5750, 6000}));
    QCOMPARE(shapeRungs({{5000}, {6000}, {1, 1}, {}}, 2), prices({5000, 6000}));
    QCOMPARE(shapeRungs({{5000}, {6000}, {1, 1}, {}}, 1), prices({5000}));
    QVERIFY(shapeRungs({{5000}, {6000}, {1, 1}, {}}, 0).empty());
    QCOMPARE(shapeRungs({{5000}, {5000}, {2, 3}, {}}, 3), prices({5000, 5000, 5000}));
}

void ShapeTest::leanByOneDial()
{
    QVERIFY(!betaFromLean(0.34) && !betaFromLean(-0.34));
    for (const double t : {-0.32, -0.2, -0.05, 0.0, 0.1, 0.3}) {
        const auto shape = betaFromLean(t);
        QVERIFY(shape);
        COMPARE_WITHIN(lMomentsOf(*shape).skewness, t, 1e-9); // The quadrature's own error.
    }
    // Beta (2, 1), F = x^2: quantiles are square roots. Prices crowd near the top: lean to the left.
    const auto left = betaFromLean((0.5 - 1) / (0.5 + 3));
    COMPARE_CLOSE(left->alpha, 2, 1e-14);
    QCOMPARE(shapeRungs({{5000}, {6000}, *left, {}}, 5), prices({5000, 5500, 5707, 5866, 6000}));
    // Mirrored, the gaps from the other end.
    QCOMPARE(shapeRungs({{5000}, {6000}, {1, 2}, {}}, 5), prices({5000, 5134, 5293, 5500, 6000}));
}

void ShapeTest::methodOfLMoments()
{
    for (const double a : {0.2, 1.0, 2.5, 40.0})
        for (const double b : {0.3, 1.0, 7.0}) {
            const BetaLMoments moments = lMomentsOf({a, b});
            const auto back = betaFromLMoments(moments.mean, moments.scale);
            QVERIFY(back);
            COMPARE_CLOSE(back->alpha, a, 1e-9);
            COMPARE_CLOSE(back->beta, b, 1e-9);
        }
    // Uniform: mean 1/2, scale 1/6, no skewness.
    COMPARE_CLOSE(lMomentsOf({1, 1}).scale, 1.0 / 6, 1e-13);
    COMPARE_WITHIN(lMomentsOf({1, 1}).skewness, 0, 1e-13);
    QVERIFY(!betaFromLMoments(0.5, 0.25) && !betaFromLMoments(0.5, 0) && !betaFromLMoments(0, 0.1) && !betaFromLMoments(1, 0.1));
}

void ShapeTest::momentsAgainstR()
{
    std::vector<Numbers> questions;
    for (const double a : {0.5, 1.0, 3.0, 12.0})
        for (const double b : {0.5, 2.0, 5.0})
            questions.push_back({a, b});
    const Answers answers = ask(QStringLiteral("lmoments"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < questions.size(); ++i) {
        const BetaLMoments moments = lMomentsOf({questions[i][0], questions[i][1]});
        COMPARE_CLOSE(moments.mean, answers.lines[i][0], 1e-8); // integrate() was asked for 1e-10.
        COMPARE_CLOSE(moments.scale, answers.lines[i][1], 1e-7);
        COMPARE_WITHIN(moments.skewness, answers.lines[i][2], 1e-7);
    }
}

void ShapeTest::rungsAgainstR()
{
    std::vector<Numbers> questions;
    const std::vector<BetaShape> shapes{{0.4, 0.7}, {2, 5}, {8, 1.5}, {30, 30}};
    for (const BetaShape& shape : shapes)
        questions.push_back({shape.alpha, shape.beta, 5000, 9000, 37});
    const Answers answers = ask(QStringLiteral("betaladder"), questions);
    NEED_ANSWERS(answers, questions.size());
    for (std::size_t i = 0; i < shapes.size(); ++i) {
        const auto rungs = shapeRungs({{5000}, {9000}, shapes[i], {}}, 37);
        QCOMPARE(answers.lines[i].size(), rungs.size());
        for (std::size_t k = 0; k < rungs.size(); ++k)
            COMPARE_WITHIN(static_cast<double>(rungs[k].minor), answers.lines[i][k], 0.5 + 1e-6); // Rounded to whole minor units.
    }
}

void ShapeTest::priceSteps()
{
    const LadderShape shape{{}, {}, {}, {{{6000}, 0.2}, {{5000}, 0.5}, {{5500}, 0.3}}};
    QCOMPARE(shapeRungs(shape, 10), prices({5000, 5000, 5000, 5000, 5000, 5500, 5500, 5500, 6000, 6000}));
    // Seven units: 3.5, 2.1, 1.4, so that the half gets the one left over.
    QCOMPARE(shapeRungs(shape, 7), prices({5000, 5000, 5000, 5000, 5500, 5500, 6000}));
    // Shares in proportion, whatever they add up to; equal remainders go to the cheaper.
    const LadderShape halves{{}, {}, {}, {{{6000}, 3}, {{5000}, 3}}};
    QCOMPARE(shapeRungs(halves, 3), prices({5000, 5000, 6000}));
    for (std::size_t m = 1; m < 60; ++m)
        QCOMPARE(shapeRungs(shape, m).size(), m);
}

void ShapeTest::placing()
{
    Tier tier = tierOf({5300, 5100, 5200, 9000}, 5000);
    tier.units[0].grade = 1;
    tier.units[1].grade = 3;
    tier.units[2].grade = 2;
    tier.units[3].status = Status::occupied;
    const LadderShape shape{{5000}, {6001}, {1, 1}, {}};
    ShapePlacing placing;
    placing.withinRules = false;
    PriceRules rules;
    rules.points.step = {25};
    const auto byPrice = shapedPrices(tier, rules, shape, placing);
    QVERIFY(byPrice.ok());
    QCOMPARE(byPrice.value(), prices({6000, 5000, 5500, 9000})); // On the points of 0.25; the taken one keeps its price.
    placing.order = OrderKept::grade;
    QCOMPARE(shapedPrices(tier, rules, shape, placing).value(), prices({5000, 6000, 5500, 9000}));
    placing.onPricePoints = false;
    QCOMPARE(shapedPrices(tier, rules, shape, placing).value(), prices({5000, 6001, 5501, 9000}));
    placing.among = Among::rentable;
    placing.order = OrderKept::present;
    QCOMPARE(shapedPrices(tier, rules, shape, placing).value(), prices({5667, 5000, 5334, 6001}));

    placing = {};
    rules.greatestChange = Price{200};
    tier.units[2].locked = true;
    QCOMPARE(shapedPrices(tier, rules, shape, placing).value(), prices({5500, 5000, 5200, 9000}));
}

void ShapeTest::lMomentsOfALadder()
{
    // Hosking's unbiased estimators written out over pairs and triples, on 0, 1/4, 1/2, 1: l2 is half the mean difference.
    const Tier tier = tierOf({5000, 5100, 5200, 5400}, 5000);
    const auto ladder = sortedLadder(tier.units, askingPrices(tier.units), Among::onOffer);
    const std::vector<double> u{0, 0.25, 0.5, 1};
    double pairs = 0;
    double triples = 0;
    for (std::size_t i = 0; i < 4; ++i)
        for (std::size_t j = i + 1; j < 4; ++j) {
            pairs += (u[j] - u[i]) / 2 / 6;
            for (std::size_t k = j + 1; k < 4; ++k)
                triples += (u[k] - 2 * u[j] + u[i]) / 3 / 4;
        }
    const auto moments = unitLMoments(ladder);
    QVERIFY(moments);
    COMPARE_CLOSE(moments->mean, 1.75 / 4, 1e-14);
    COMPARE_CLOSE(moments->scale, pairs, 1e-13);
    COMPARE_CLOSE(moments->skewness, triples / pairs, 1e-12);
    QVERIFY(!unitLMoments(std::span(ladder).first(1)));
}

void ShapeTest::troubles()
{
    const Tier tier = tierOf({5000, 6000}, 5000);
    const auto refused = [&](const LadderShape& shape) { return !shapedPrices(tier, {}, shape, {}).ok(); };
    QVERIFY(refused({{0}, {100}, {1, 1}, {}}));
    QVERIFY(refused({{200}, {100}, {1, 1}, {}}));
    QVERIFY(refused({{100}, {200}, {0, 1}, {}}));
    QVERIFY(refused({{100}, {200}, {1, 1}, {{{100}, 0}}}));
    QVERIFY(refused({{100}, {200}, {1, 1}, {{{100}, -1}, {{200}, 2}}}));
    QVERIFY(refused({{100}, {200}, {1, 1}, {{{0}, 1}}}));
    QVERIFY(!refused({{100}, {200}, {1, 1}, {}}));
}

QTEST_GUILESS_MAIN(ShapeTest)
#include "shape_test.moc"
