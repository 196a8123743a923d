// SPDX-License-Identifier: GPL-3.0-or-later
// Figures in words: money of any number of decimals, other locales, and a fitting sentence for every special case.
#include "invented_tier.h"
#include "wording.h"

#include <QTest>

using namespace rungwright;

class WordingTest : public QObject
{
    Q_OBJECT
private slots:
    void moneyFollowsCurrencyAndLocale();
    void typedMoneyIsUnderstood();
    void readingSays_data();
    void readingSays();
    void everyFigureIsExplained();
    void changesCarryTheirSign();
};

namespace
{

const QLocale kEnglish(QLocale::English, QLocale::UnitedStates);
const QLocale kGerman(QLocale::German, QLocale::Germany);
const Currency kEuro{"EUR", 2};

Tier tierOf(std::int64_t floor, const QList<int>& vacant, const QList<int>& occupied = {})
{
    Tier tier;
    tier.site = "Mill Quay";
    tier.name = "Room";
    tier.advertisedFloor = Price{floor};
    const auto add = [&tier](int price, Status status) {
        Unit unit;
        unit.name = "u" + std::to_string(tier.units.size());
        unit.asking = Price{price};
        unit.status = status;
        tier.units.push_back(unit);
    };
    for (const int price : vacant)
        add(price, Status::vacant);
    for (const int price : occupied)
        add(price, Status::occupied);
    return tier;
}

} // namespace

void WordingTest::moneyFollowsCurrencyAndLocale()
{
    const QChar minus(0x2212);
    QCOMPARE(moneyText(Price{141950}, kEuro, kEnglish), QStringLiteral("1,419.50"));
    QCOMPARE(moneyText(Price{141950}, kEuro, kGerman), QStringLiteral("1.419,50"));
    QCOMPARE(moneyText(Price{12300}, Currency{"JPY", 0}, kEnglish), QStringLiteral("12,300"));
    QCOMPARE(moneyText(Price{1500}, Currency{"KWD", 3}, kEnglish), QStringLiteral("1.500"));
    QCOMPARE(moneyText(Price{-50}, kEuro, kEnglish), minus + QStringLiteral("0.50"));
    QCOMPARE(moneyText(-0.3, kEuro, kEnglish), QStringLiteral("0.00"));
    QCOMPARE(signedMoneyText(50, kEuro, kEnglish), QStringLiteral("+0.50"));
    QCOMPARE(signedMoneyText(0, kEuro, kEnglish), QStringLiteral("0.00"));
}

void WordingTest::typedMoneyIsUnderstood()
{
    QCOMPARE(moneyFromText(QStringLiteral("1.419,50"), kEuro, kGerman), std::optional(Price{141950}));
    QCOMPARE(moneyFromText(QStringLiteral("82,5"), kEuro, kGerman), std::optional(Price{8250}));
    QCOMPARE(moneyFromText(QStringLiteral(" 82.5 "), kEuro, kEnglish), std::optional(Price{8250}));
    QCOMPARE(moneyFromText(QStringLiteral("1,419.50"), kEuro, kEnglish), std::optional(Price{141950}));
    QVERIFY(!moneyFromText(QStringLiteral("82,50"), kEuro, kEnglish)); // not 8250
    QCOMPARE(moneyFromText(QStringLiteral("82.50"), kEuro, kGerman), std::optional(Price{8250}));
    QCOMPARE(moneyFromText(QStringLiteral("1.250"), Currency{"KWD", 3}, kGerman), std::optional(Price{1250000}));
    QVERIFY(!moneyFromText(QStringLiteral("eighty"), kEuro, kEnglish));
    QVERIFY(!moneyFromText(QString(), kEuro, kEnglish));
    QVERIFY(!moneyFromText(QStringLiteral("82.555"), kEuro, kEnglish));
}

void WordingTest::readingSays_data()
{
    QTest::addColumn<qlonglong>("floor");
    QTest::addColumn<QList<int>>("vacant");
    QTest::addColumn<QList<int>>("occupied");
    QTest::addColumn<int>("model");
    QTest::addColumn<QString>("headline");
    QTest::addColumn<QStringList>("says");
    QTest::addColumn<QStringList>("saysNot");
    const int perceived = static_cast<int>(ModelKind::perceived);
    const int onHand = static_cast<int>(ModelKind::onHand);
    const int turnover = static_cast<int>(ModelKind::turnover);
    const QStringList none;
    // On hand the gap is by hand: lowest price minus floor.
    QTest::newRow("floor gone") << 6900LL << QList<int>{9000, 9500} << QList<int>{} << onHand << "Gap 21.00"
                                << QStringList{"21.00 because nothing is on sale at the floor"} << QStringList{"low end"};
    QTest::newRow("floor on sale, thin") << 6000LL << QList<int>{6000, 9000} << QList<int>{} << perceived << "Gap 7.50"
                                         << QStringList{"7.50 because the low end is thin"} << QStringList{"nothing is on sale"};
    QTest::newRow("both") << 6900LL << QList<int>{9000, 9500} << QList<int>{} << perceived << "Gap 22.25"
                          << QStringList{"21.00 because nothing is on sale", "1.25 because the low end is thin"} << none;
    QTest::newRow("no gap") << 6000LL << QList<int>{6000, 6000} << QList<int>{} << perceived << "Gap 0.00"
                            << QStringList{"the floor that was advertised", "All 2 units on offer ask 60.00"} << QStringList{"because"};
    QTest::newRow("one unit") << 6000LL << QList<int>{6500} << QList<int>{} << perceived << "Gap 5.00" << QStringList{"Only one unit"}
                              << none;
    QTest::newRow("none on offer") << 6000LL << QList<int>{} << QList<int>{6500, 7000} << perceived << "Nothing on offer"
                                   << QStringList{"all 2 rentable units are taken"} << QStringList{"Gap"};
    QTest::newRow("floor above all") << 9900LL << QList<int>{6500, 6500} << QList<int>{} << onHand
                                     << QString("Gap %1").arg(QChar(0x2212)) + "34.00" << QStringList{"34.00 below the advert"}
                                     << QStringList{"because"};
    QTest::newRow("one below") << 6600LL << QList<int>{6500, 9000} << QList<int>{} << perceived << "Gap 5.25"
                               << QStringList{"One unit is asked below the advertised floor"} << none;
    QTest::newRow("fitted below the lowest") << 6900LL << QList<int>{9000, 9000, 9000, 12000, 12000, 12000} << QList<int>{}
                                             << static_cast<int>(ModelKind::fitted) << ""
                                             << QStringList{"because nothing is on sale at the floor, less", "fitted curve"} << none;
    QTest::newRow("no load") << 6000LL << QList<int>{6500, 7000} << QList<int>{} << turnover << "Gap undefined"
                             << QStringList{"No unit is taken, so the demand cannot be inferred"} << none;
    QTest::newRow("no units") << 6000LL << QList<int>{} << QList<int>{} << perceived << "Nothing on offer"
                              << QStringList{"The tier has no units"} << none;
}

void WordingTest::readingSays()
{
    QFETCH(qlonglong, floor);
    QFETCH(QList<int>, vacant);
    QFETCH(QList<int>, occupied);
    QFETCH(int, model);
    QFETCH(QString, headline);
    QFETCH(QStringList, says);
    QFETCH(QStringList, saysNot);
    const Tier tier = tierOf(floor, vacant, occupied);
    const ModelSettings settings{static_cast<ModelKind>(model), {}, {}};
    const Reading r = reading(measured(tier, askingPrices(tier.units), settings), kEuro, kEnglish);
    if (!headline.isEmpty()) // the fitted figures are checked against R elsewhere
        QCOMPARE(r.headline, headline);
    for (const QString& words : says)
        QVERIFY2(r.sentence.contains(words), qPrintable(r.sentence));
    for (const QString& words : saysNot)
        QVERIFY2(!r.sentence.contains(words), qPrintable(r.sentence));
    QVERIFY(r.sentence.endsWith(QLatin1Char('.')));
    QVERIFY(!r.sentence.contains(QStringLiteral("nan")));
}

void WordingTest::everyFigureIsExplained()
{
    QStringList keys;
    for (const FigureRow& row : figureRows()) {
        keys << QString::fromLatin1(row.key);
        for (const char* text : {row.label, row.formula, row.unit, row.source})
            QVERIFY2(text && *text, row.key);
        // Each figure copes with a ladder of which nothing is known.
        QVERIFY(!figureText(row, row.value(Measurement{}), kEuro, kEnglish).contains(QStringLiteral("nan")));
    }
    QCOMPARE(keys.removeDuplicates(), 0);
}

void WordingTest::changesCarryTheirSign()
{
    const FigureRow& gap = figureRows()[1];
    QCOMPARE(figureChangeText(gap, 500.0, 750.0, kEuro, kEnglish), QStringLiteral("+2.50"));
    QCOMPARE(figureChangeText(gap, 750.0, 500.0, kEuro, kEnglish), QChar(0x2212) + QStringLiteral("2.50"));
    QCOMPARE(figureChangeText(gap, 750.0, 750.2, kEuro, kEnglish), QString());
    const FigureRow& met = figureRows()[7];
    QCOMPARE(QLatin1String(met.key), QLatin1String("chance_floor_met"));
    QCOMPARE(figureChangeText(met, 0.0, 0.65, kEuro, kEnglish), QStringLiteral("+65%1pp").arg(QChar(0x00A0)));
    QCOMPARE(figureChangeText(gap, {}, 750.0, kEuro, kEnglish), QString());
}

QTEST_GUILESS_MAIN(WordingTest)
#include "wording_test.moc"
