// SPDX-License-Identifier: GPL-3.0-or-later
// Unit lists: columns, values, names, currencies.
#include "file_helpers.h"

#include <QStringEncoder>
#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

class TestUnitList : public QObject
{
    Q_OBJECT

private slots:
    void takesEveryColumn()
    {
        const UnitListResult read =
            readList("locked,area,unit,tier,site,grade,status,asking_price,vacancy_chance,currency,advertised_floor\n"
                     "yes,4.5,B-14,Room 4,Quay,3,vacant,82.50,0.25,EUR,69\n"
                     "No,,B-15,Room 4,Quay,,OCCUPIED,90,,,\n"
                     ",,X,Room 4,Mill,-2,Reserved,7.1,1,eur,6.00\n"
                     ",,Y,Room 4,Mill,+2,closed,7.100,0,EUR,6\n");
        QVERIFY2(read.clean(), qPrintable(read.fileTrouble));
        QCOMPARE(read.rowsTaken, qint64(4));
        QCOMPARE(read.currency.code, std::string("EUR"));
        QCOMPARE(read.tiers.size(), std::size_t(2));
        Unit first{"B-14", {8250}, Status::vacant, true, 3, 4.5, 0.25};
        Unit second{"B-15", {9000}, Status::occupied, false, {}, {}, {}};
        QVERIFY(read.tiers[0].tier == (Tier{"Quay", "Room 4", {6900}, {first, second}}));
        Unit third{"X", {710}, Status::reserved, false, -2, {}, 1.0};
        Unit fourth{"Y", {710}, Status::closed, false, 2, {}, 0.0};
        QVERIFY(read.tiers[1].tier == (Tier{"Mill", "Room 4", {600}, {third, fourth}}));
        QCOMPARE(read.tiers[0].model, ModelSettings{});
    }

    void trimsAndTakesAnyCaseInTheHeader()
    {
        const UnitListResult read = readList(QStringLiteral("\u00a0Site ,TIER,Unit,Asking_Price,status,advertised_floor\n"
                                                            "\u3000Quay\u00a0, Room 4\t,\u2003A 1 , 70.00 , vacant ,\u00a069.00\n")
                                                 .toUtf8());
        QVERIFY2(read.clean(),
                 qPrintable(read.fileTrouble + (read.refused.empty() ? QString() : read.refused[0].text(QStringLiteral("F")))));
        QCOMPARE(read.tiers[0].tier.site, std::string("Quay"));
        QCOMPARE(read.tiers[0].tier.name, std::string("Room 4"));
        QCOMPARE(read.tiers[0].tier.units[0].name, std::string("A 1"));
    }

    void keepsUnknownColumnsAside()
    {
        const UnitListResult read =
            readList("site,colour,tier,unit,asking_price,status,advertised_floor,,colour\nQ,red,T,U,7,vacant,6,x,blue\n");
        QVERIFY(read.clean());
        QCOMPARE(read.unknownColumns, (QStringList{"colour", "(column 8, without a name)"}));
        QCOMPARE(read.tiers[0].tier.units[0].name, std::string("U"));
    }

    void headerTroubles_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<QStringList>("says");
        QTest::newRow("empty") << QByteArray() << QStringList{"F: the file is empty", "header row"};
        QTest::newRow("BOM only") << QByteArray("\xEF\xBB\xBF") << QStringList{"the file is empty"};
        QTest::newRow("blank lines only") << QByteArray("\n , \n\r\n") << QStringList{"the file is empty"};
        QTest::newRow("header only") << kNeededHeader << QStringList{"header row but no unit below"};
        QTest::newRow("header and commas only") << kNeededHeader + "\n,,,,,\n" << QStringList{"header row but no unit below"};
        QTest::newRow("columns missing") << QByteArray("\nsite,unit,asking_price,status\nQ,U,7,vacant\n")
                                         << QStringList{"F:2: the header row lacks 'tier', 'advertised_floor'", "found: site, unit",
                                                        "Wanted"};
        QTest::newRow("no header") << QByteArray("Quay,Room 4,B-14,82.50,vacant,69.00\n")
                                   << QStringList{"F:1:", "lacks 'site'", "found: Quay, Room 4"};
        QTest::newRow("column twice") << kNeededHeader + ",Status\n"
                                      << QStringList{"F:1: the column 'Status' is there twice, as columns 5 and 7", "Remove or rename"};
        QTest::newRow("semicolons") << QByteArray("site;tier;unit;asking_price;status;advertised_floor\n")
                                    << QStringList{"separated by semicolons", "commas"};
        QTest::newRow("tabs") << QByteArray("site\ttier\tunit\tasking_price\tstatus\tadvertised_floor\n")
                              << QStringList{"separated by tabs"};
        QTest::newRow("malformed header") << QByteArray("site,ti\"er\n") << QStringList{"F:1: character 8: a quotation mark"};
        QTest::newRow("malformed below") << unitList({"Q,T,U,7,vacant,6", "Q,T,V,\"7\"x,vacant,6"})
                                         << QStringList{"F:3: character 10: text after"};
        QTest::newRow("ends inside a quote") << unitList({"Q,T,U,7,vacant,6", "Q,\"T,V,7,vacant,6"})
                                             << QStringList{"F:3: the file ends inside a quoted cell"};
        QTest::newRow("NUL") << unitList({"Q,T,U,7,vacant,6"}) + QByteArray("Q,T,\0,7", 7) << QStringList{"F:3: byte", "NUL"};
        QTest::newRow("Latin-1") << unitList({"Q,T,U,7,vacant,6", "Q,T,Caf\xE9,7,vacant,6"})
                                 << QStringList{"F:3: byte", "E9 2C", "Save the file as UTF-8"};
        QTest::newRow("UTF-32") << QByteArray("\xFF\xFE\0\0s\0\0\0", 8) << QStringList{"UTF-32", "UTF-8"};
    }

    void headerTroubles()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(QStringList, says);
        for (const bool withoutBadRows : {false, true}) {
            const UnitListResult read = readList(bytes, withoutBadRows);
            for (const QString& part : says)
                QVERIFY2(read.fileTrouble.contains(part), qPrintable(read.fileTrouble));
            QVERIFY(read.tiers.empty());
            QCOMPARE(read.rowsTaken, qint64(0));
            QVERIFY(!read.clean());
        }
    }

    void encodings()
    {
        const QString text = QString::fromUtf8(unitList({"מרינה,倉庫,📦,7,vacant,6"}));
        for (const auto& [encoding, name] :
             {std::pair(QStringConverter::Utf16LE, "UTF-16LE"), std::pair(QStringConverter::Utf16BE, "UTF-16BE"),
              std::pair(QStringConverter::Utf8, "UTF-8 with BOM")}) {
            QStringEncoder encoder(encoding, QStringConverter::Flag::WriteBom);
            const UnitListResult read = readList(QByteArray(encoder(text)));
            QVERIFY(read.clean());
            QCOMPARE(read.encoding, QString::fromLatin1(name));
            QCOMPARE(read.tiers[0].tier.site, std::string("מרינה"));
            QCOMPARE(read.tiers[0].tier.units[0].name, std::string("📦"));
        }
        QCOMPARE(readList(text.toUtf8()).encoding, QStringLiteral("UTF-8"));
    }

    void namesOfAnyScriptAndLength()
    {
        const QByteArray five(5000, 'w');
        const QByteArray fiveWide = QStringLiteral("倉").repeated(5000).toUtf8();
        for (const QByteArray& name : {QByteArray("مستودع ٣"), QByteArray("倉庫 三畳"), QByteArray("📦 👩‍👩‍👧"),
                                       QByteArray("e\u0301"), five, fiveWide, QByteArray("\"a\r\nb\"")}) {
            const UnitListResult read = readList(unitList({name + ',' + name + ',' + name + ",7,vacant,6"}));
            QVERIFY(read.clean());
            const std::string expected = name.startsWith('"') ? "a\r\nb" : name.toStdString();
            QCOMPARE(read.tiers[0].tier.site, expected);
            QCOMPARE(read.tiers[0].tier.name, expected);
            QCOMPARE(read.tiers[0].tier.units[0].name, expected);
        }
    }

    // Decimals of ISO 4217 (list one, by way of the open data set datasets/currency-codes, 2026-02-01).
    void decimalsOfTheCurrency_data()
    {
        QTest::addColumn<QByteArray>("code");
        QTest::addColumn<QByteArray>("fits");
        QTest::addColumn<qint64>("minor");
        QTest::addColumn<QByteArray>("tooFine");
        QTest::newRow("JPY 0") << QByteArray("JPY") << QByteArray("12500") << qint64(12500) << QByteArray("12500.5");
        QTest::newRow("EUR 2") << QByteArray("EUR") << QByteArray("69.05") << qint64(6905) << QByteArray("69.055");
        QTest::newRow("KWD 3") << QByteArray("KWD") << QByteArray("1.505") << qint64(1505) << QByteArray("1.5055");
        QTest::newRow("CLF 4") << QByteArray("CLF") << QByteArray("0.1234") << qint64(1234) << QByteArray("0.12345");
        QTest::newRow("XXX 2") << QByteArray("XXX") << QByteArray("3.5") << qint64(350) << QByteArray("3.505");
    }

    void decimalsOfTheCurrency()
    {
        QFETCH(QByteArray, code);
        QFETCH(QByteArray, fits);
        QFETCH(qint64, minor);
        QFETCH(QByteArray, tooFine);
        const QByteArray header = kNeededHeader + ",currency\n";
        const UnitListResult read = readList(header + "Q,T,U," + fits + ",vacant," + fits + ',' + code + '\n');
        QVERIFY(read.clean());
        QCOMPARE(read.tiers[0].tier.units[0].asking.minor, minor);
        QCOMPARE(read.tiers[0].tier.advertisedFloor.minor, minor);
        // Zeros beyond the currency's decimals change nothing.
        const QByteArray zeros = fits + (fits.contains('.') ? "000" : ".000");
        QCOMPARE(readList(header + "Q,T,U," + zeros + ",vacant,1," + code + '\n').tiers[0].tier.units[0].asking.minor, minor);
        const UnitListResult refused = readList(header + "Q,T,U," + tooFine + ",vacant,1," + code + '\n');
        QCOMPARE(refused.refusedCount, qint64(1));
        QVERIFY(refused.refused[0]
                    .text(QStringLiteral("F"))
                    .startsWith(QStringLiteral("F:2: column 'asking_price': more decimals than the currency has; found '")));
    }

    void whichCurrency()
    {
        const QByteArray header = kNeededHeader + ",currency\n";
        const QByteArray late = header + "Q,T,U,7000,vacant,6000,\nQ,T,V,7000,vacant,,JPY\n";
        QCOMPARE(readList(unitList({"Q,T,U,7,vacant,6"})).currency.code, std::string("XXX"));
        QCOMPARE(readList(unitList({"Q,T,U,7,vacant,6"}), false, QStringLiteral("kwd")).currency, (Currency{"KWD", 3}));
        QCOMPARE(readList(header + "Q,T,U,7,vacant,6,\n", false, QStringLiteral("KWD")).currency.code, std::string("KWD"));
        // Named on a later row only: it holds for the rows above too (7000 JPY, not 7000.00).
        const UnitListResult read = readList(late);
        QVERIFY(read.clean());
        QCOMPARE(read.currency.code, std::string("JPY"));
        QCOMPARE(read.tiers[0].tier.units[0].asking.minor, std::int64_t(7000));
        QVERIFY(readList(late, false, QStringLiteral("JPY")).clean());
        const QString quarrel = readList(late, false, QStringLiteral("EUR")).fileTrouble;
        QVERIFY2(quarrel.startsWith(QStringLiteral("F:3: the file's currency is JPY, but EUR is wanted")), qPrintable(quarrel));
        QVERIFY(readList(late, false, QStringLiteral("EURO")).fileTrouble.contains(QStringLiteral("'EURO' is not a currency")));
        QVERIFY(readList(late, false, QStringLiteral("XAU")).fileTrouble.contains(QStringLiteral("ISO 4217")));
        const UnitListResult two = readList(header + "Q,T,U,7000,vacant,6000,JPY\nQ,T,V,70.50,vacant,,EUR\nQ,T,W,7,vacant,,US$\n");
        QCOMPARE(two.refusedCount, qint64(2));
        QVERIFY(two.refused[0].text(QStringLiteral("F")).contains(QStringLiteral("wrong in this row too: currency")));
        QVERIFY2(two.refused[1].text(QStringLiteral("F")).startsWith(QStringLiteral("F:4: column 'currency': not a currency; found 'US$'")),
                 qPrintable(two.refused[1].text(QStringLiteral("F"))));
        const UnitListResult other = readList(header + "Q,T,U,7000,vacant,6000,JPY\nQ,T,V,70,vacant,,EUR\n");
        QVERIFY(other.refused[0]
                    .text(QStringLiteral("F"))
                    .startsWith(QStringLiteral("F:3: column 'currency': another currency than on line 2; found 'EUR'; wanted: JPY")));
    }
};

QTEST_GUILESS_MAIN(TestUnitList)
#include "test_unit_list.moc"
