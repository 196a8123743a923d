// SPDX-License-Identifier: GPL-3.0-or-later
// `measure --json` end to end, from the bytes of a unit list to the printed figures, against counting every case by hand and against
// closed forms. Tolerance 1e-9 relative throughout: the counting below adds up to a few thousand doubles, which costs 1e-13 or so.
#include "program.h"

#include <QJsonArray>
#include <QJsonDocument>
#include <QJsonObject>
#include <QTemporaryDir>
#include <QTest>

#include <algorithm>
#include <bit>
#include <cmath>
#include <vector>

using namespace rungwright;

namespace
{

constexpr double kFloor = 50;

/// A tier with a tie, a unit below the floor, a closed unit and chances of their own; prices in money. Invented.
struct Row {
    double price;
    const char* status;
    double chance;
};
const std::vector<Row> kRows{{61, "vacant", 0.3}, {48.5, "occupied", 0.9}, {55, "vacant", 0.25},  {70, "reserved", 0.5},
                             {55, "vacant", 0.6}, {40, "closed", 1},       {83.25, "vacant", 0.1}};

std::vector<Row> sorted(bool onOfferOnly)
{
    std::vector<Row> rows;
    for (const Row& row : kRows) {
        const bool vacant = qstrcmp(row.status, "vacant") == 0;
        if (onOfferOnly ? vacant : qstrcmp(row.status, "closed") != 0)
            rows.push_back(row);
    }
    std::sort(rows.begin(), rows.end(), [](const Row& a, const Row& b) { return a.price < b.price; });
    return rows;
}

/// Cases of "the cheapest found", each with its weight; a case that finds nothing only adds to `none`.
struct Cases {
    double weight = 0;
    double sum = 0;
    double none = 0;
    double floorMet = 0;

    void found(double price, double w)
    {
        weight += w;
        sum += w * price;
        if (price <= kFloor)
            floorMet += w;
    }
    double expected() const { return sum / weight; }
};

bool close(double found, double wanted) { return std::abs(found - wanted) <= 1e-9 * std::max(1e-3, std::abs(wanted)); }

} // namespace

class TestHeadlessNumbers : public QObject
{
    Q_OBJECT

private slots:
    void initTestCase();
    void perceivedByEveryDraw();
    void remainderByEverySubset();
    void unitByEverySetOfFreeUnits();
    void turnoverByErlangsSum();
    void onHandIsTheCheapestOnOffer();
    void fittedIsUniformHere();

private:
    QJsonObject measure(const QStringList& options, const QString& file = {}) const;
    void compare(const QJsonObject& found, const Cases& cases, double lowest) const;

    QTemporaryDir m_dir;
    QString m_file;
};

void TestHeadlessNumbers::initTestCase()
{
    QByteArray csv = "site,tier,unit,asking_price,status,advertised_floor,vacancy_chance,currency\n";
    int number = 0;
    for (const Row& row : kRows)
        csv += "A,B,U" + QByteArray::number(++number) + ',' + QByteArray::number(row.price, 'f', 2) + ',' + row.status + ",50," +
               QByteArray::number(row.chance) + ",EUR\n";
    m_file = written(m_dir.filePath(QStringLiteral("tier.csv")), csv);
}

QJsonObject TestHeadlessNumbers::measure(const QStringList& options, const QString& file) const
{
    const Ran ran = run(QStringList{QStringLiteral("measure"), file.isEmpty() ? m_file : file, QStringLiteral("--json")} + options);
    if (ran.status != 0)
        qWarning("%s", ran.message.constData());
    return QJsonDocument::fromJson(ran.out).object()[QStringLiteral("tiers")].toArray().at(0).toObject();
}

void TestHeadlessNumbers::compare(const QJsonObject& found, const Cases& cases, double lowest) const
{
    const auto is = [&](const char* key, double wanted) {
        const double value = found[QLatin1String(key)].toDouble(NAN);
        return close(value, wanted)
                   ? QByteArray()
                   : QByteArray(key) + ": " + QByteArray::number(value, 'g', 17) + " instead of " + QByteArray::number(wanted, 'g', 17);
    };
    for (const QByteArray& wrong :
         {is("expected_cheapest", cases.expected()), is("gap", cases.expected() - kFloor), is("gap_share", cases.expected() / kFloor - 1),
          is("claim_part", lowest - kFloor), is("shape_part", cases.expected() - lowest),
          is("chance_floor_met", cases.floorMet / cases.weight), is("chance_none", cases.none / (cases.weight + cases.none))})
        QVERIFY2(wrong.isEmpty(), wrong);
}

void TestHeadlessNumbers::perceivedByEveryDraw()
{
    const std::vector<Row> rows = sorted(true);
    const std::size_t m = rows.size();
    for (const int draws : {1, 2, 5}) {
        Cases cases;
        std::size_t outcomes = 1;
        for (int i = 0; i < draws; ++i)
            outcomes *= m;
        for (std::size_t outcome = 0; outcome < outcomes; ++outcome) {
            double cheapest = INFINITY;
            for (std::size_t rest = outcome, i = 0; i < std::size_t(draws); ++i, rest /= m)
                cheapest = std::min(cheapest, rows[rest % m].price);
            cases.found(cheapest, 1);
        }
        compare(measure({QStringLiteral("--left"), QString::number(draws)}), cases, rows.front().price);
    }
    // The default is the number on offer: 4.
    QCOMPARE(measure({}), measure({QStringLiteral("--left"), QStringLiteral("4")}));
}

void TestHeadlessNumbers::remainderByEverySubset()
{
    const std::vector<Row> rows = sorted(false);
    for (int left = 1; left <= int(rows.size()); ++left) {
        Cases cases;
        for (unsigned set = 0; set < (1U << rows.size()); ++set) {
            if (std::popcount(set) == left)
                cases.found(rows[std::size_t(std::countr_zero(set))].price, 1);
        }
        compare(measure({QStringLiteral("--model"), QStringLiteral("remainder"), QStringLiteral("--left"), QString::number(left)}), cases,
                rows.front().price);
    }
}

void TestHeadlessNumbers::unitByEverySetOfFreeUnits()
{
    const std::vector<Row> rows = sorted(false);
    Cases cases;
    for (unsigned set = 0; set < (1U << rows.size()); ++set) {
        double chance = 1;
        for (std::size_t i = 0; i < rows.size(); ++i)
            chance *= set >> i & 1U ? rows[i].chance : 1 - rows[i].chance;
        if (set == 0)
            cases.none += chance;
        else
            cases.found(rows[std::size_t(std::countr_zero(set))].price, chance);
    }
    compare(measure({QStringLiteral("--model"), QStringLiteral("unit")}), cases, rows.front().price);
}

void TestHeadlessNumbers::turnoverByErlangsSum()
{
    // Erlang's formula as it is usually printed, a^n/n! over the sum of a^k/k! (A. K. Erlang 1917; from memory).
    const auto lossOf = [](int n, double a) {
        double term = 1;
        double sum = 1;
        for (int k = 1; k <= n; ++k) {
            term *= a / k;
            sum += term;
        }
        return term / sum;
    };
    const std::vector<Row> rows = sorted(false);
    const int rentable = int(rows.size());
    const auto casesAt = [&](double load) {
        Cases cases;
        for (int i = 0; i < rentable; ++i)
            cases.found(rows[std::size_t(i)].price, lossOf(i, load) - lossOf(i + 1, load));
        cases.none = lossOf(rentable, load);
        return cases;
    };
    for (const double load : {0.25, 2.0, 9.5})
        compare(measure({QStringLiteral("--model"), QStringLiteral("turnover"), QStringLiteral("--load"), QString::number(load)}),
                casesAt(load), rows.front().price);

    // Inferred: the load that keeps as many units taken as are taken now, here two of six.
    const QJsonObject inferred = measure({QStringLiteral("--model"), QStringLiteral("turnover")});
    const double load = inferred[QStringLiteral("load")].toDouble();
    QVERIFY2(close(load * (1 - lossOf(rentable, load)), 2), qPrintable(QString::number(load, 'g', 17)));
    compare(inferred, casesAt(load), rows.front().price);
}

void TestHeadlessNumbers::onHandIsTheCheapestOnOffer()
{
    Cases cases;
    cases.found(55, 1);
    compare(measure({QStringLiteral("--model"), QStringLiteral("on-hand")}), cases, 55);
}

void TestHeadlessNumbers::fittedIsUniformHere()
{
    // On the unit scale 0, 1/3 (three times), 2/3 (three times) and 1 have mean 1/2 and variance 1/12, those of the uniform distribution,
    // so the fitted beta is the uniform one and the gap of N draws is (highest - floor) / (N + 1).
    QByteArray csv = "site,tier,unit,asking_price,status,advertised_floor\n";
    int number = 0;
    for (const int price : {50, 70, 70, 70, 90, 90, 90, 110})
        csv += "A,B,U" + QByteArray::number(++number) + ',' + QByteArray::number(price) + ",vacant,50\n";
    const QString file = written(m_dir.filePath(QStringLiteral("uniform.csv")), csv);
    for (const int draws : {1, 3, 8, 40}) {
        const QJsonObject found =
            measure({QStringLiteral("--model"), QStringLiteral("fitted"), QStringLiteral("--left"), QString::number(draws)}, file);
        const double gap = found[QStringLiteral("gap")].toDouble(NAN);
        QVERIFY2(close(gap, 60.0 / (draws + 1)), qPrintable(QString::number(gap, 'g', 17)));
        // The median of the least of N uniform draws: 1 - (1/2)^(1/N). 1e-7: the quantile is found by iteration.
        const double median = found[QStringLiteral("gap_median")].toDouble(NAN);
        QVERIFY2(std::abs(median - 60 * (1 - std::pow(0.5, 1.0 / draws))) < 60 * 1e-7, qPrintable(QString::number(median, 'g', 17)));
    }
}

QTEST_GUILESS_MAIN(TestHeadlessNumbers)
#include "test_headless_numbers.moc"
