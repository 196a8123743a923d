// SPDX-License-Identifier: GPL-3.0-or-later
// Rows of a unit list that are refused: each with line, column, what was found and what is wanted; and what is taken without them.
#include "file_helpers.h"

#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

class TestRefusedRows : public QObject
{
    Q_OBJECT

private slots:
    void badCells_data()
    {
        QTest::addColumn<QByteArray>("row");
        QTest::addColumn<QString>("begins");
        QTest::addColumn<QString>("wanted");
        const auto add = [](const char* name, const char* row, const char* begins, const char* wanted) {
            QTest::newRow(name) << QByteArray(row) << QStringLiteral("F:2: column ") + QString::fromUtf8(begins) << wanted;
        };
        add("no site", " ,T,U,7,vacant,6,,,,,", "'site': nothing in it; found nothing", "a name");
        add("no tier", "Q,,U,7,vacant,6,,,,,", "'tier': nothing in it; found nothing", "a name");
        add("no unit", "Q,T,\"\u00a0\",7,vacant,6,,,,,", "'unit': nothing in it; found nothing", "a name");
        add("no price", "Q,T,U,,vacant,6,,,,,", "'asking_price': no price; found nothing", "an amount above 0 such as 69.00");
        add("word", "Q,T,U,abc,vacant,6,,,,,", "'asking_price': not a price; found 'abc'", "an amount above 0");
        add("decimal comma", "Q,T,U,\"7,50\",vacant,6,,,,,", "'asking_price': not a price; found '7,50'", "decimal point");
        add("grouping", "Q,T,U,\"1,700.00\",vacant,6,,,,,", "'asking_price': not a price; found '1,700.00'",
            "without currency sign or grouping");
        add("currency sign", "Q,T,U,€70,vacant,6,,,,,", "'asking_price': not a price; found '€70'", "without currency sign");
        add("exponent", "Q,T,U,7e1,vacant,6,,,,,", "'asking_price': not a price; found '7e1'", "an amount");
        add("Arabic figures", "Q,T,U,٧٠,vacant,6,,,,,", "'asking_price': not a price; found '٧٠'", "an amount");
        add("nan", "Q,T,U,nan,vacant,6,,,,,", "'asking_price': not a price; found 'nan'", "an amount");
        add("point alone", "Q,T,U,.,vacant,6,,,,,", "'asking_price': not a price; found '.'", "an amount");
        add("zero", "Q,T,U,0.00,vacant,6,,,,,", "'asking_price': not above 0; found '0.00'", "above 0");
        add("negative", "Q,T,U,-7,vacant,6,,,,,", "'asking_price': not above 0; found '-7'", "above 0");
        add("too large", "Q,T,U,9000000000.01,vacant,6,,,,,", "'asking_price': too large a price; found '9000000000.01'",
            "at most 9000000000.00");
        add("far too large", "Q,T,U,99999999999999999999999999,vacant,6,,,,,", "'asking_price': too large a price",
            "at most 9000000000.00");
        add("no status", "Q,T,U,7,,6,,,,,", "'status': no status; found nothing", "vacant, occupied, reserved or closed");
        add("other status", "Q,T,U,7,free,6,,,,,", "'status': not a status; found 'free'", "vacant, occupied, reserved or closed");
        add("bad floor", "Q,T,U,7,vacant,from 6,,,,,", "'advertised_floor': not a price; found 'from 6'", "an amount above 0");
        add("zero floor", "Q,T,U,7,vacant,0,,,,,", "'advertised_floor': not above 0; found '0'", "above 0");
        add("grade with decimals", "Q,T,U,7,vacant,6,,1.5,,,", "'grade': not a grade; found '1.5'", "a whole number");
        add("grade beyond int", "Q,T,U,7,vacant,6,,2147483648,,,", "'grade': not a grade; found '2147483648'", "a whole number");
        add("grade word", "Q,T,U,7,vacant,6,,A,,,", "'grade': not a grade; found 'A'", "a whole number");
        add("zero area", "Q,T,U,7,vacant,6,,,0,,", "'area': not above 0; found '0'", "square metres");
        add("area word", "Q,T,U,7,vacant,6,,,4 m2,,", "'area': not an area; found '4 m2'", "square metres");
        add("area inf", "Q,T,U,7,vacant,6,,,inf,,", "'area': not an area; found 'inf'", "square metres");
        add("chance above 1", "Q,T,U,7,vacant,6,,,,1.01,", "'vacancy_chance': not between 0 and 1; found '1.01'", "0 to 1");
        add("chance below 0", "Q,T,U,7,vacant,6,,,,-0.1,", "'vacancy_chance': not between 0 and 1; found '-0.1'", "0 to 1");
        add("chance in percent", "Q,T,U,7,vacant,6,,,,25%,", "'vacancy_chance': not a chance; found '25%'", "0 to 1");
        add("locked", "Q,T,U,7,vacant,6,,,,,true", "'locked': neither yes nor no; found 'true'", "yes or no");
        add("several", "Q,T,U,x,y,6,,z,,,", "'asking_price': not a price (wrong in this row too: status, grade); found 'x'", "an amount");
    }

    void badCells()
    {
        QFETCH(QByteArray, row);
        QFETCH(QString, begins);
        QFETCH(QString, wanted);
        const UnitListResult read =
            readList(kNeededHeader + ",currency,grade,area,vacancy_chance,locked\n" + row + "\nQ,T,good,7,vacant,6,EUR,,,,\n");
        QCOMPARE(read.fileTrouble, QString());
        QCOMPARE(read.refusedCount, qint64(1));
        const QString text = read.refused[0].text(QStringLiteral("F"));
        QVERIFY2(text.startsWith(begins), qPrintable(text));
        const qsizetype at = text.indexOf(QStringLiteral("; wanted: "));
        QVERIFY2(at > 0 && text.mid(at).contains(wanted), qPrintable(text));
        QVERIFY(read.tiers.empty());
        const UnitListResult without =
            readList(kNeededHeader + ",currency,grade,area,vacancy_chance,locked\n" + row + "\nQ,T,good,7,vacant,6,EUR,,,,\n", true);
        QCOMPARE(without.rowsTaken, qint64(1));
        QCOMPARE(without.tiers[0].tier.units[0].name, std::string("good"));
    }

    void wrongNumberOfCells()
    {
        const UnitListResult read = readList(unitList({"Q,T,U,7,vacant", "Q,T,V,7,vacant,6,more", "\"Q\nQ\",T", "Q,T,W,7,vacant,6"}));
        QCOMPARE(read.refusedCount, qint64(3));
        QCOMPARE(read.refused[0].text(QStringLiteral("F")),
                 QStringLiteral("F:2: too few cells; found '5'; wanted: 6, as in the header row"));
        QCOMPARE(read.refused[0].column, 0);
        QVERIFY(read.refused[1]
                    .text(QStringLiteral("F"))
                    .startsWith(QStringLiteral("F:3: too many cells; found '7'; wanted: 6, as in the header row (a comma")));
        QCOMPARE(read.refused[2].line, qint64(4));
    }

    void columnsAreCountedInTheFile()
    {
        const UnitListResult read = readList("status,site,tier,unit,advertised_floor,asking_price\nvacant,Q,T,U,6,x\n");
        QCOMPARE(read.refused[0].column, 6);
        QCOMPARE(read.refused[0].columnName, QStringLiteral("asking_price"));
    }

    void duplicatesNameTheFirst()
    {
        const QByteArray bytes = unitList({"Q,T,U,7,vacant,6", "Q,T2,U,7,vacant,6", "R,T,U,7,vacant,6", "\"Q\",T,\" U \",8,vacant,6",
                                           "Q,T,u,7,vacant,6", "Q,T,U,9,vacant,6"});
        const UnitListResult read = readList(bytes);
        QCOMPARE(read.refusedCount, qint64(2));
        const QString text = read.refused[0].text(QStringLiteral("F"));
        QVERIFY2(text.startsWith(QStringLiteral("F:5: column 'unit': the unit is there already, on line 2; found 'U'")), qPrintable(text));
        QCOMPARE(read.refused[1].line, qint64(7));
        const UnitListResult without = readList(bytes, true);
        QCOMPARE(without.rowsTaken, qint64(4));
        QCOMPARE(without.tiers[0].tier.units[0].asking.minor, std::int64_t(700));
    }

    // A site and tier that only run together in the same letters are two.
    void keysDoNotRunTogether()
    {
        const UnitListResult read = readList(unitList({"ab,c,U,7,vacant,6", "a,bc,U,7,vacant,5"}));
        QVERIFY(read.clean());
        QCOMPARE(read.tiers.size(), std::size_t(2));
    }

    void conflictingFloorsNameBothLines()
    {
        const QByteArray bytes =
            unitList({"Q,T,A,7,vacant,", "Q,T,B,7,vacant,6.00", "Q,T,C,7,vacant,6", "Q,T,D,7,vacant,6.50", "Q,T2,E,7,vacant,6.50"});
        const UnitListResult read = readList(bytes);
        QCOMPARE(read.refusedCount, qint64(1));
        QCOMPARE(read.refused[0].text(QStringLiteral("F")),
                 QStringLiteral("F:5: column 'advertised_floor': another floor than on line 3; found '6.50'; wanted: "
                                "6.00 as on line 3, or nothing: a tier has one advertised floor"));
        const UnitListResult without = readList(bytes, true);
        QCOMPARE(without.rowsTaken, qint64(4));
        QCOMPARE(without.tiers[0].tier.advertisedFloor.minor, std::int64_t(600));
    }

    // Going on without a refused row means without what it said, too.
    void refusedRowsDoNotCount()
    {
        const QByteArray bytes = unitList({"Q,T,A,7,sold,5.00", "Q,T,A,7,vacant,6.00", "Q,T,B,8,vacant,6.00"});
        const UnitListResult read = readList(bytes, true);
        QCOMPARE(read.refusedCount, qint64(1));
        QCOMPARE(read.rowsTaken, qint64(2));
        QCOMPARE(read.tiers[0].tier.advertisedFloor.minor, std::int64_t(600));
    }

    void tierWithoutFloorIsRefusedWhole()
    {
        const QByteArray bytes =
            unitList({"Q,T,A,7,vacant,", "Q,T,B,7,vacant,", "Q,S,C,7,vacant,6", "Q,R,D,7,vacant,x", "Q,R,E,7,vacant,"});
        const UnitListResult read = readList(bytes, true);
        QCOMPARE(read.refusedCount, qint64(3));
        QCOMPARE(read.refused[0].line, qint64(5));
        QVERIFY(read.refused[1]
                    .text(QStringLiteral("F"))
                    .startsWith(QStringLiteral("F:2: column 'advertised_floor': no row that can be taken gives the floor of the tier 'T' "
                                               "at 'Q'; found nothing; wanted: ")));
        QCOMPARE(read.refused[2].line, qint64(6));
        QCOMPARE(read.rowsTaken, qint64(1));
        QCOMPARE(read.tiers.size(), std::size_t(1));
        QCOMPARE(read.tiers[0].tier.name, std::string("S"));
        QVERIFY(readList(bytes).tiers.empty());
        QCOMPARE(readList(bytes).rowsTaken, qint64(0));
    }

    void keepsTheFirstThousand()
    {
        QByteArray bytes = kNeededHeader + '\n';
        for (int i = 0; i < 1200; ++i)
            bytes += "Q,T,U" + QByteArray::number(i) + ",bad,vacant,6\n";
        for (int i = 0; i < 30; ++i)
            bytes += "Q,T,G" + QByteArray::number(i) + ",7,vacant,6\n";
        const UnitListResult read = readList(bytes);
        QCOMPARE(read.refusedCount, qint64(1200));
        QCOMPARE(read.refused.size(), kRefusedRowsKept);
        QCOMPARE(read.refused.front().line, qint64(2));
        QCOMPARE(read.refused.back().line, qint64(1001));
        QVERIFY(read.tiers.empty());
        const UnitListResult without = readList(bytes, true);
        QCOMPARE(without.refusedCount, qint64(1200));
        QCOMPARE(without.rowsTaken, qint64(30));
        QCOMPARE(without.tiers[0].tier.units.size(), std::size_t(30));
    }

    void foundIsShortAndShowsControls()
    {
        const QByteArray longText = QStringLiteral("倉").repeated(5000).toUtf8();
        const UnitListResult read = readList(unitList({"Q,T,U," + longText + ",vacant,6", "Q,T,V,\"a\n\x1b[31m\tb\",vacant,6",
                                                       "Q,T,W," + QStringLiteral("📦").repeated(70).toUtf8() + ",vacant,6"}));
        QCOMPARE(read.refused[0].found.size(), qsizetype(60));
        QCOMPARE(read.refused[0].found.count(QStringLiteral("倉")), qsizetype(59));
        QCOMPARE(read.refused[1].found, QStringLiteral("a\\n\\x1b[31m\\tb"));
        QVERIFY(read.refused[2].found.isValidUtf16()); // Cut between characters, not inside one.
        QVERIFY(read.refused[2].found.size() <= 60);
    }

    // A message must not be built by putting a name where another's place-holder stands.
    void percentSignsInNames()
    {
        const UnitListResult read = readList(unitList({"%1,%2,%3,%4,vacant,6", "%1,%2,%3,7,vacant,"}));
        QVERIFY(read.refused[0]
                    .text(QStringLiteral("%5"))
                    .startsWith(QStringLiteral("%5:2: column 'asking_price': not a price; found '%4'; wanted: ")));
        QVERIFY(read.refused[1].text(QStringLiteral("F")).contains(QStringLiteral("the tier '%2' at '%1';")));
    }
};

QTEST_GUILESS_MAIN(TestRefusedRows)
#include "test_refused_rows.moc"
