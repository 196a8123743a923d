// SPDX-License-Identifier: GPL-3.0-or-later
// The weighted ranking, on examples worked by hand.
#include <QtTest>

#include "claims/ranking.h"

#include <cmath>

using namespace rungwright;

class RankingTest : public QObject
{
    Q_OBJECT
private slots:
    void byHand()
    {
        // Gaps 12.50, 5.00, 10.00 (lower is better, weight 3): 0, 1, 1/3. Chances 0, 0.75, 0.75 (higher, weight 1): 0, 1, 1.
        // Averages: 0, 1, (3/3 + 1)/4 = 1/2.
        const std::vector<Criterion> criteria{{{12.5, 5.0, 10.0}, 3.0, true}, {{0.0, 0.75, 0.75}, 1.0, false}};
        const auto scores = weightedScores(criteria);
        QCOMPARE(*scores[0], 0.0);
        QCOMPARE(*scores[1], 1.0);
        QCOMPARE(*scores[2], 0.5);
        QCOMPARE(placesByScore(scores), (std::vector<int>{3, 1, 2}));
    }
    void whatDoesNotMatterDoesNotCount()
    {
        const std::vector<Criterion> criteria{{{1.0, 2.0}, 1.0, true}, {{std::nullopt, 7.0}, 0.0, true}};
        QCOMPARE(placesByScore(weightedScores(criteria)), (std::vector<int>{1, 2}));
        const std::vector<Criterion> nothing{{{1.0, 2.0}, 0.0, true}};
        QCOMPARE(placesByScore(weightedScores(nothing)), (std::vector<int>{0, 0}));
    }
    void whoLacksAValueIsNotRanked()
    {
        const std::vector<Criterion> criteria{{{1.0, std::nullopt, 3.0}, 1.0, true}, {{5.0, 5.0, 5.0}, 1.0, true}};
        const auto scores = weightedScores(criteria);
        QVERIFY(!scores[1]);
        QCOMPARE(*scores[0], 1.0);
        QCOMPARE(*scores[2], 0.5); // worst in the first, and as good as any in the second
        QCOMPARE(placesByScore(scores), (std::vector<int>{1, 0, 2}));
    }
    void equalsShareAPlace()
    {
        const std::vector<Criterion> criteria{{{2.0, 1.0, 1.0, 3.0}, 1.0, true}};
        QCOMPARE(placesByScore(weightedScores(criteria)), (std::vector<int>{3, 1, 1, 4}));
    }
    void scaleAndOriginDoNotMatter()
    {
        const std::vector<Criterion> criteria{{{12.5, 5.0, 10.0}, 3.0, true}, {{1.0, 9.0, 4.0}, 2.0, true}};
        std::vector<Criterion> others = criteria;
        for (auto& value : others[0].values)
            *value = 100.0 * *value - 7.0;
        const auto a = weightedScores(criteria);
        const auto b = weightedScores(others);
        for (std::size_t i = 0; i < a.size(); ++i)
            QVERIFY(std::abs(*a[i] - *b[i]) < 1e-12); // a few roundings
    }
};

QTEST_APPLESS_MAIN(RankingTest)
#include "ranking_test.moc"
