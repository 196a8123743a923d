// SPDX-License-Identifier: GPL-3.0-or-later
// The figures of ladders side by side, and the best of each row.
#include "compared_tier.h"
#include "read_table.h"
#include "side_by_side_model.h"
#include "table_text.h"
#include "unit_prices_model.h"

#include <QAbstractItemModelTester>
#include <QRandomGenerator>
#include <QTest>

using namespace rungwright;

namespace
{

ComparedLadder compared(const Scenario& scenario, int candidate)
{
    const TierCase& tierCase = scenario.tiers.front();
    ComparedLadder ladder;
    ladder.candidate = candidate;
    ladder.name = candidate < 0 ? QStringLiteral("current") : QString::fromStdString(tierCase.candidates[std::size_t(candidate)].name);
    ladder.prices = pricesOf(tierCase, candidate);
    ladder.measurement = measured(tierCase.tier, ladder.prices, tierCase.model);
    ladder.change = ladderChange(tierCase.tier.units, ladder.prices);
    ladder.typicalChange = typicalChange(tierCase.tier.units, ladder.prices, modelUnits(tierCase.model.kind));
    return ladder;
}

} // namespace

class SideBySideModelTest : public QObject
{
    Q_OBJECT

private slots:
    void initTestCase() { QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom)); }

    void theFiguresStandSideBySide()
    {
        const Scenario scenario = comparedScenario();
        SideBySideModel model;
        const QAbstractItemModelTester tester(&model, QAbstractItemModelTester::FailureReportingMode::QtTest);
        model.show({compared(scenario, -1), compared(scenario, 0), compared(scenario, 1)}, scenario.currency);
        QCOMPARE(model.columnCount(), 3);
        const auto texts = [&](const char* key) {
            QStringList row;
            for (int column = 0; column < model.columnCount(); ++column)
                row << model.index(model.rowOf(key), column).data().toString();
            return row;
        };
        // Worked out in compared_tier.h.
        QCOMPARE(texts("gap"), (QStringList{QStringLiteral("12.50"), QStringLiteral("★ best  5.00"), QStringLiteral("12.75")}));
        QCOMPARE(texts("shape_part"), (QStringList{QStringLiteral("2.50"), QStringLiteral("5.00"), QStringLiteral("★ best  0.75")}));
        QCOMPARE(texts("chance_floor_met"),
                 (QStringList{QStringLiteral("0.0\u00a0%"), QStringLiteral("★ best  75\u00a0%"), QStringLiteral("0.0\u00a0%")}));
        QCOMPARE(texts("total_change"), (QStringList{QStringLiteral("0.00"), QStringLiteral("−10.00"), QStringLiteral("−3.00")}));
        QCOMPARE(texts("units_changed"), (QStringList{QStringLiteral("0"), QStringLiteral("1"), QStringLiteral("2")}));
        // Steeper: +5.00 of 80.00 is 6.25 %, -8.00 of 90.00 is -8.9 %.
        QCOMPARE(texts("greatest_change"), (QStringList{QStringLiteral("–"), QStringLiteral("−10.00"), QStringLiteral("−8.00")}));
        QCOMPARE(texts("greatest_change_share"),
                 (QStringList{QStringLiteral("–"), QStringLiteral("−13\u00a0%"), QStringLiteral("−8.9\u00a0%")}));
        // Both without an inversion are best; the asking total has no best.
        QCOMPARE(texts("inversions"), (QStringList{QStringLiteral("★ best  0"), QStringLiteral("★ best  0"), QStringLiteral("1")}));
        QCOMPARE(texts("asking_total"), (QStringList{QStringLiteral("170.00"), QStringLiteral("160.00"), QStringLiteral("167.00")}));
        QCOMPARE(model.headerData(0, Qt::Vertical).toString(), QStringLiteral("Gap"));
        QVERIFY(
            model.index(model.rowOf("gap"), 1).data(Qt::AccessibleTextRole).toString().endsWith(QStringLiteral("Lower end: 5.00, best")));
    }

    void everyFigureOfTheBenchIsThere()
    {
        SideBySideModel model;
        for (const FigureRow& figure : figureRows())
            QVERIFY2(model.rowOf(figure.key) >= 0, figure.key);
        QCOMPARE(model.rowCount(), static_cast<int>(figureRows().size()) + 5);
    }

    void laddersThatShowTheSameShareTheMark()
    {
        const Scenario scenario = comparedScenario();
        SideBySideModel model;
        model.show({compared(scenario, 0), compared(scenario, 2)}, scenario.currency); // alike on offer
        for (int row = 0; row < model.rowCount(); ++row)
            for (int column = 0; column < 2; ++column)
                QVERIFY(!model.index(row, column).data(SideBySideModel::bestRole).toBool()); // all equal: no mark
        model.show({compared(scenario, 0), compared(scenario, -1), compared(scenario, 2)}, scenario.currency);
        const int gap = model.rowOf("gap");
        QVERIFY(model.index(gap, 0).data(SideBySideModel::bestRole).toBool());
        QVERIFY(!model.index(gap, 1).data(SideBySideModel::bestRole).toBool());
        QVERIFY(model.index(gap, 2).data(SideBySideModel::bestRole).toBool());
    }

    /// Against a plain reading of the rule, on random ladders: marked are those that show the best of the defined figures, unless all do.
    void theBestIsMarkedOnRandomLadders()
    {
        QRandomGenerator random(7);
        for (int round = 0; round < 60; ++round) {
            Scenario scenario = comparedScenario();
            TierCase& tierCase = scenario.tiers.front();
            if (round % 5 == 0)
                tierCase.tier.units[0].status = tierCase.tier.units[1].status = Status::occupied; // undefined figures
            for (Candidate& candidate : tierCase.candidates)
                for (Price& price : candidate.prices)
                    price = Price{6900 + 50 * random.bounded(6)};
            SideBySideModel model;
            model.show({compared(scenario, -1), compared(scenario, 0), compared(scenario, 1), compared(scenario, 2)}, scenario.currency);
            for (const FigureRow& figure : figureRows()) {
                std::vector<std::optional<double>> values;
                for (const ComparedLadder& ladder : model.ladders())
                    values.push_back(figure.value(ladder.measurement));
                std::optional<double> best;
                for (const auto& value : values)
                    if (value && (!best || figure.better * *value > figure.better * *best))
                        best = value;
                QList<bool> wanted;
                qsizetype defined = 0;
                for (const auto& value : values) {
                    defined += value ? 1 : 0;
                    wanted << (figure.better != 0 && value &&
                               figureText(figure, value, scenario.currency) == figureText(figure, best, scenario.currency));
                }
                if (wanted.count(true) == defined)
                    wanted.fill(false);
                for (int column = 0; column < 4; ++column)
                    QVERIFY2(model.index(model.rowOf(figure.key), column).data(SideBySideModel::bestRole).toBool() == wanted[column],
                             figure.key);
            }
        }
    }

    void theTableForAFileIsPlainAndGuarded()
    {
        Scenario scenario = comparedScenario();
        scenario.tiers.front().candidates[0].name = "=SUM(A1), or \"so\"";
        SideBySideModel model;
        model.show({compared(scenario, -1), compared(scenario, 0)}, scenario.currency);
        QLocale::setDefault(QLocale(QLocale::German)); // files know no locale
        const QByteArray csv = model.csv();
        QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom));
        QVERIFY(csv.endsWith("\r\n") && csv.count("\r\n") == csv.count('\n'));
        const auto lines = readTable(csv);
        const QString guardedName = QStringLiteral("'=SUM(A1), or \"so\"");
        QCOMPARE(lines[0], (QStringList{QStringLiteral("key"), QStringLiteral("figure"), QStringLiteral("unit"), QStringLiteral("current"),
                                        guardedName, QStringLiteral("best")}));
        QCOMPARE(lines.size(), std::size_t(model.rowCount()) + 1);
        const auto line = [&](const char* key) { return lines[std::size_t(model.rowOf(key)) + 1].mid(2); };
        QCOMPARE(line("gap"), (QStringList{QStringLiteral("EUR"), QStringLiteral("12.50"), QStringLiteral("5.00"), guardedName}));
        QCOMPARE(line("total_change"), (QStringList{QStringLiteral("EUR"), QStringLiteral("0.00"), QStringLiteral("-10.00"), QString()}));
        QCOMPARE(line("greatest_change_share"), (QStringList{QStringLiteral("share"), QString(), QStringLiteral("-0.125"), QString()}));
        QCOMPARE(line("units_changed"), (QStringList{QStringLiteral("units"), QStringLiteral("0"), QStringLiteral("1"), QString()}));
        // 5 / 70 to the eight decimals of the file.
        QCOMPARE(line("gap_share")[2], QStringLiteral("0.07142857"));
    }

    void theAmountOfChangeIsTheRootMeanSquare()
    {
        Scenario scenario = comparedScenario();
        SideBySideModel model;
        model.show({compared(scenario, -1), compared(scenario, 0), compared(scenario, 1)}, scenario.currency);
        const int row = model.rowOf("rms_change");
        QCOMPARE(model.index(row, 0).data().toString(), QStringLiteral("0.00"));
        // By hand, the two units on offer: sqrt(10^2 / 2) = 7.071; sqrt((5^2 + 8^2) / 2) = 6.671.
        QCOMPARE(model.index(row, 1).data().toString(), QStringLiteral("+7.07"));
        QCOMPARE(model.index(row, 2).data().toString(), QStringLiteral("+6.67"));
        // A model of the rentable units looks at A-3 too, never at the closed one: sqrt(10^2 / 3) = 5.774; sqrt((10^2 + 5^2) / 3)
        // = 6.45497.
        scenario.tiers.front().model.kind = ModelKind::remainder;
        model.show({compared(scenario, 0), compared(scenario, 2)}, scenario.currency);
        QCOMPARE(model.index(row, 0).data().toString(), QStringLiteral("+5.77"));
        QCOMPARE(model.index(row, 1).data().toString(), QStringLiteral("+6.45"));
    }

    void differencesAgainstALadder()
    {
        const Scenario scenario = comparedScenario();
        SideBySideModel model;
        const QAbstractItemModelTester tester(&model, QAbstractItemModelTester::FailureReportingMode::QtTest);
        model.setAgainst(-1);
        model.show({compared(scenario, -1), compared(scenario, 0), compared(scenario, 1)}, scenario.currency);
        const int gap = model.rowOf("gap");
        QCOMPARE(model.index(gap, 0).data().toString(), QStringLiteral("12.50")); // what the others are held against stays as it is
        QCOMPARE(model.index(gap, 1).data().toString(), QStringLiteral("★ best  −7.50"));
        QCOMPARE(model.index(gap, 2).data().toString(), QStringLiteral("+0.25"));
        QCOMPARE(model.index(model.rowOf("inversions"), 1).data(kCopyRole).toString(), QStringLiteral("the same"));
        QVERIFY(model.index(gap, 2).data(Qt::AccessibleTextRole).toString().contains(QStringLiteral("against current")));
        const auto lines = readTable(model.csv());
        QCOMPARE(lines[0].mid(7), (QStringList{QStringLiteral("Lower end minus current"), QStringLiteral("Steeper minus current")}));
        QCOMPARE(lines[std::size_t(gap) + 1].mid(7), (QStringList{QStringLiteral("-7.50"), QStringLiteral("0.25")}));
        model.setAgainst(2); // not shown
        model.show({compared(scenario, -1), compared(scenario, 0)}, scenario.currency);
        QCOMPARE(model.index(gap, 0).data().toString(), QStringLiteral("12.50"));
        QCOMPARE(model.index(gap, 1).data().toString(), QStringLiteral("★ best  5.00"));
    }

    void aRankingByTheUsersWeights()
    {
        const Scenario scenario = comparedScenario();
        SideBySideModel model;
        const QAbstractItemModelTester tester(&model, QAbstractItemModelTester::FailureReportingMode::QtTest);
        QCOMPARE(model.rowOf("ranking"), -1);
        // By hand. Gaps 12.50, 5.00, 12.75 scale to 0.25/7.75, 1, 0; amounts of change 0, 7.071, 6.671 to 1, 0, 0.0566; with weights 3 and
        // 1: (3 x 0.03226 + 1) / 4 = 0.2742, 0.75, 0.01415.
        RankingWeights weights;
        weights.gap = 3;
        weights.amountOfChange = 1;
        model.setWeights(weights);
        model.show({compared(scenario, -1), compared(scenario, 0), compared(scenario, 1)}, scenario.currency);
        const int row = model.rowOf("ranking");
        QCOMPARE(row, 0);
        QCOMPARE(model.index(row, 0).data().toString(), QStringLiteral("2. with 27"));
        QCOMPARE(model.index(row, 1).data().toString(), QStringLiteral("★ best  1. with 75"));
        QCOMPARE(model.index(row, 2).data().toString(), QStringLiteral("3. with 1"));
        QCOMPARE(model.rankingText(), QStringLiteral("1. Lower end (75), 2. current (27), 3. Steeper (1)"));
        // Only what stays as it is counts: the current ladder, with nothing changed.
        weights = {};
        weights.totalChange = 1;
        model.setWeights(weights);
        model.show({compared(scenario, -1), compared(scenario, 0), compared(scenario, 1)}, scenario.currency);
        QVERIFY(model.rankingText().startsWith(QStringLiteral("1. current (100), 2. Steeper (70)"))); // 3.00 of 10.00
        model.setWeights({});
        model.show({compared(scenario, -1), compared(scenario, 0)}, scenario.currency);
        QCOMPARE(model.rowOf("ranking"), -1);
        QVERIFY(model.rankingText().isEmpty());
    }

    void pricesByUnit()
    {
        const Scenario scenario = comparedScenario();
        UnitPricesModel model;
        const QAbstractItemModelTester tester(&model, QAbstractItemModelTester::FailureReportingMode::QtTest);
        model.show(scenario.tiers.front().tier, {compared(scenario, 1), compared(scenario, -1), compared(scenario, 2)}, scenario.currency);
        QCOMPARE(model.rowCount(), 4);
        QCOMPARE(model.columnCount(), 5); // unit, status, today, Steeper, Same bottom
        const auto cells = [&](int row) {
            QStringList said;
            for (int column = 0; column < model.columnCount(); ++column)
                said << model.index(row, column).data().toString();
            return said;
        };
        QCOMPARE(cells(0), (QStringList{QStringLiteral("A-1"), QStringLiteral("on offer"), QStringLiteral("80.00"),
                                        QStringLiteral("85.00 ▲"), QStringLiteral("70.00 ▼")}));
        QCOMPARE(cells(3), (QStringList{QStringLiteral("=B-4"), QStringLiteral("closed"), QStringLiteral("110.00"),
                                        QStringLiteral("110.00"), QStringLiteral("110.00")}));
        const auto lines = readTable(model.csv());
        QCOMPARE(lines[0], (QStringList{QStringLiteral("unit"), QStringLiteral("status"), QStringLiteral("current"),
                                        QStringLiteral("Steeper"), QStringLiteral("Same bottom")}));
        QCOMPARE(lines[4], (QStringList{QStringLiteral("'=B-4"), QStringLiteral("closed"), QStringLiteral("110.00"),
                                        QStringLiteral("110.00"), QStringLiteral("110.00")}));
    }
};

QTEST_MAIN(SideBySideModelTest)
#include "side_by_side_model_test.moc"
