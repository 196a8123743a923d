// SPDX-License-Identifier: GPL-3.0-or-later
// Currencies, plain amounts and price points.
#include <QtTest>

#include "ladder/currency.h"
#include "ladder/price_points.h"

#include <array>
#include <limits>
#include <random>
#include <set>

using namespace rungwright;

class MoneyTest : public QObject
{
    Q_OBJECT

private slots:
    void knowsEveryActiveCurrency();
    void refusesCodesWithoutMinorUnit();
    void writesPlainAmounts_data();
    void writesPlainAmounts();
    void readsPlainAmounts_data();
    void readsPlainAmounts();
    void readsBackWhatItWrites();
    void answersAsAWalkOverAllPointsWould();
    void stepsAsAWalkOverAllPointsWould();
    void stopsAtTheLastPoint();
    void knowsNoPointWhereNoneIsAllowed();
    void stepsFarWithoutOverflow();
};

void MoneyTest::knowsEveryActiveCurrency()
{
    // ISO 4217 list one by way of "datasets/currency-codes" (2026-02-01): 17 codes without decimals, 7 with three, 2 with four, 139 with
    // two.
    std::array<int, 5> byDecimals{};
    for (const std::string_view code : currencyCodes()) {
        const auto currency = findCurrency(code);
        QVERIFY(currency.has_value());
        QCOMPARE(currency->code, std::string(code));
        if (code != "XXX")
            ++byDecimals[static_cast<std::size_t>(currency->decimals)];
    }
    QCOMPARE(byDecimals[0], 17);
    QCOMPARE(byDecimals[1], 0);
    QCOMPARE(byDecimals[2], 139);
    QCOMPARE(byDecimals[3], 7);
    QCOMPARE(byDecimals[4], 2);
    for (const char* code : {"JPY", "KRW", "ISK", "CLP", "XPF", "UYI"})
        QCOMPARE(findCurrency(code)->decimals, 0);
    for (const char* code : {"BHD", "IQD", "JOD", "KWD", "LYD", "OMR", "TND"})
        QCOMPARE(findCurrency(code)->decimals, 3);
    for (const char* code : {"CLF", "UYW"})
        QCOMPARE(findCurrency(code)->decimals, 4);
    for (const char* code : {"EUR", "USD", "MRU", "MGA", "XXX"})
        QCOMPARE(findCurrency(code)->decimals, 2);
    QCOMPARE(findCurrency("KWD")->minorPerMajor(), std::int64_t{1000});
    QCOMPARE(findCurrency("KWD")->major(1500), 1.5);
}

void MoneyTest::refusesCodesWithoutMinorUnit()
{
    for (const char* code : {"XAG", "XAU", "XBA", "XBB", "XBC", "XBD", "XDR", "XPD", "XPT", "XSU", "XTS", "XUA", // no minor unit
                             "HRK", "ZWL", "CUC", "SLL", "ANG", "BGN",                                           // withdrawn
                             "eur", "EU",  "",    "EURO"})
        QVERIFY2(!findCurrency(code), code);
}

void MoneyTest::writesPlainAmounts_data()
{
    QTest::addColumn<qint64>("minor");
    QTest::addColumn<QString>("code");
    QTest::addColumn<QString>("text");
    QTest::newRow("two decimals") << qint64{6900} << "EUR"
                                  << "69.00";
    QTest::newRow("cents only") << qint64{5} << "EUR"
                                << "0.05";
    QTest::newRow("nothing") << qint64{0} << "EUR"
                             << "0.00";
    QTest::newRow("negative") << qint64{-50} << "EUR"
                              << "-0.50";
    QTest::newRow("no decimals") << qint64{12} << "JPY"
                                 << "12";
    QTest::newRow("no decimals, negative") << qint64{-12} << "JPY"
                                           << "-12";
    QTest::newRow("three decimals") << qint64{1500} << "KWD"
                                    << "1.500";
    QTest::newRow("four decimals") << qint64{-7} << "CLF"
                                   << "-0.0007";
    QTest::newRow("least value of the type") << std::numeric_limits<qint64>::min() << "EUR"
                                             << "-92233720368547758.08";
}

void MoneyTest::writesPlainAmounts()
{
    QFETCH(qint64, minor);
    QFETCH(QString, code);
    QFETCH(QString, text);
    QCOMPARE(QString::fromStdString(plainText({minor}, *findCurrency(code.toStdString()))), text);
}

void MoneyTest::readsPlainAmounts_data()
{
    QTest::addColumn<QString>("text");
    QTest::addColumn<QString>("code");
    QTest::addColumn<bool>("ok");
    QTest::addColumn<qint64>("minor");
    const auto good = [](const char* text, const char* code, qint64 minor) {
        QTest::addRow("%s %s", text, code) << text << code << true << minor;
    };
    const auto bad = [](const char* text, const char* code) {
        QTest::addRow("not %s %s", text, code) << text << code << false << qint64{0};
    };
    good("69", "EUR", 6900);
    good("69.5", "EUR", 6950);
    good("+1.00", "EUR", 100);
    good("-0.50", "EUR", -50);
    good("0069.10", "EUR", 6910);
    good("69.1000", "EUR", 6910);
    good("12", "JPY", 12);
    good("12.00", "JPY", 12);
    good("1.5", "KWD", 1500);
    good("9000000000.00", "EUR", 900'000'000'000);
    good("900000000000", "JPY", 900'000'000'000);
    bad("9000000000.01", "EUR");
    bad("-9000000000.01", "EUR");
    bad("99999999999999999999999999", "EUR");
    bad("69.105", "EUR");
    bad("12.5", "JPY");
    bad("", "EUR");
    bad("+", "EUR");
    bad(".5", "EUR");
    bad("5.", "EUR");
    bad("1,234.00", "EUR");
    bad("1e3", "EUR");
    bad(" 1", "EUR");
    bad("1 ", "EUR");
    bad("--1", "EUR");
    bad("1.2.3", "EUR");
    bad("NaN", "EUR");
    bad("0x10", "EUR");
}

void MoneyTest::readsPlainAmounts()
{
    QFETCH(QString, text);
    QFETCH(QString, code);
    QFETCH(bool, ok);
    QFETCH(qint64, minor);
    const auto price = parsePlain(text.toStdString(), *findCurrency(code.toStdString()));
    QCOMPARE(price.has_value(), ok);
    if (ok)
        QCOMPARE(price->minor, minor);
}

void MoneyTest::readsBackWhatItWrites()
{
    std::mt19937_64 random(1);
    std::uniform_int_distribution<std::int64_t> amount(-kGreatestPrice.minor, kGreatestPrice.minor);
    for (const std::string_view code : currencyCodes()) {
        const auto currency = findCurrency(code);
        for (int i = 0; i < 20; ++i) {
            const Price price{amount(random) >> (i % 40)};
            QCOMPARE(parsePlain(plainText(price, *currency), *currency)->minor, price.minor);
        }
    }
}

namespace
{

/// Every point there is up to 3,000 minor units, by asking the definition of each amount.
std::vector<std::int64_t> allPoints(const PricePoints& points)
{
    std::vector<std::int64_t> all;
    for (std::int64_t p = 1; p <= 3000; ++p) {
        const auto rest = p % points.step.minor;
        const bool isPoint = points.endings.empty() ? rest == 0 : std::ranges::count(points.endings, Price{rest}) > 0;
        if (isPoint && p >= points.least.value_or(Price{1}).minor && p <= points.greatest.value_or(Price{3000}).minor)
            all.push_back(p);
    }
    return all;
}

PricePoints randomPoints(std::mt19937_64& random)
{
    std::uniform_int_distribution<std::int64_t> step(1, 120);
    PricePoints points;
    points.step = {step(random)};
    std::uniform_int_distribution<std::int64_t> ending(0, points.step.minor - 1);
    std::set<std::int64_t> endings;
    for (auto count = step(random) % 5; count > 0; --count)
        endings.insert(ending(random));
    for (const auto e : endings)
        points.endings.push_back({e});
    std::uniform_int_distribution<std::int64_t> limit(1, 1500);
    if (step(random) % 2 == 0)
        points.least = Price{limit(random)};
    points.greatest = Price{limit(random) + 500};
    return points;
}

} // namespace

void MoneyTest::answersAsAWalkOverAllPointsWould()
{
    std::mt19937_64 random(2);
    std::uniform_int_distribution<std::int64_t> amount(-200, 2500);
    for (int round = 0; round < 400; ++round) {
        const PricePoints points = randomPoints(random);
        const auto all = allPoints(points);
        for (int i = 0; i < 50; ++i) {
            const Price price{amount(random)};
            std::optional<Price> below, above, nearest;
            for (const auto p : all) {
                if (p <= price.minor)
                    below = Price{p};
                if (p >= price.minor && !above)
                    above = Price{p};
                if (!nearest || std::abs(p - price.minor) < std::abs(nearest->minor - price.minor))
                    nearest = Price{p}; // Ascending, so the cheaper of two equally near ones stays.
            }
            QVERIFY(points.atOrBelow(price) == below);
            QVERIFY(points.atOrAbove(price) == above);
            QVERIFY(points.nearest(price) == nearest);
            QCOMPARE(points.allows(price), std::ranges::count(all, price.minor) == 1);
        }
    }
}

void MoneyTest::stepsAsAWalkOverAllPointsWould()
{
    std::mt19937_64 random(3);
    std::uniform_int_distribution<std::int64_t> amount(1, 2500);
    std::uniform_int_distribution<int> count(-30, 30);
    for (int round = 0; round < 400; ++round) {
        const PricePoints points = randomPoints(random);
        const auto all = allPoints(points);
        for (int i = 0; i < 30; ++i) {
            const Price from{amount(random)};
            const int steps = count(random);
            std::int64_t at = from.minor;
            for (int done = 0; done < std::abs(steps); ++done) {
                if (steps > 0) {
                    const auto next = std::ranges::upper_bound(all, at);
                    at = next == all.end() ? at : *next;
                } else {
                    const auto next = std::ranges::lower_bound(all, at);
                    at = next == all.begin() ? at : *std::prev(next);
                }
            }
            QCOMPARE(points.stepped(from, steps).minor, at);
        }
    }
}

void MoneyTest::stopsAtTheLastPoint()
{
    PricePoints points{{500}, {}, Price{1000}, Price{2000}};
    QCOMPARE(points.stepped({1900}, 5).minor, 2000);
    QCOMPARE(points.stepped({2000}, 5).minor, 2000);
    QCOMPARE(points.stepped({2300}, 1).minor, 2300);  // No point that way: it stays, though it is none.
    QCOMPARE(points.stepped({2300}, -1).minor, 2000); // The first step goes to the next point.
    QCOMPARE(points.stepped({700}, -1).minor, 700);
    QCOMPARE(points.stepped({700}, 1).minor, 1000);
}

void MoneyTest::knowsNoPointWhereNoneIsAllowed()
{
    const PricePoints points{{1000}, {Price{900}}, Price{1000}, Price{1800}};
    QVERIFY(!points.nearest({1500}));
    QVERIFY(!points.atOrBelow({5000}));
    QVERIFY(!points.atOrAbove({1}));
    QVERIFY(!points.allows({1900}));
    QCOMPARE(points.stepped({1500}, 3).minor, 1500);
    QCOMPARE(points.nearestWithoutLimits({1500}).minor, 1900);
}

void MoneyTest::stepsFarWithoutOverflow()
{
    const PricePoints points{{1'000'000'000}, {}, {}, {}};
    QCOMPARE(points.stepped({5}, std::numeric_limits<int>::max()).minor, kGreatestPrice.minor);
    QCOMPARE(points.stepped({kGreatestPrice.minor}, std::numeric_limits<int>::min()).minor, 1'000'000'000);
    QCOMPARE(points.nearest({1})->minor, 1'000'000'000); // 0 is no price.
}

QTEST_APPLESS_MAIN(MoneyTest)
#include "money_test.moc"
