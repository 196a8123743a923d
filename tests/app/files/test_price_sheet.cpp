// SPDX-License-Identifier: GPL-3.0-or-later
// The price sheet: rows in ladder order, cells safe in a spreadsheet, and exact when read back.
#include "file_helpers.h"
#include "price_sheet.h"
#include "sheet_cells.h"

#include <QTemporaryDir>
#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

class TestPriceSheet : public QObject
{
    Q_OBJECT

private slots:
    // Source: OWASP, "CSV Injection" (www-community, commit 0e5e8f00): the first characters to guard and two worked cells.
    void formulaCells_data()
    {
        QTest::addColumn<QByteArray>("text");
        QTest::addColumn<QByteArray>("cell");
        QTest::newRow("worked 1") << QByteArray("=1+2\";=1+2") << QByteArray("\"'=1+2\"\";=1+2\"");
        QTest::newRow("worked 2") << QByteArray("=1+2'\" ;,=1+2") << QByteArray("\"'=1+2'\"\" ;,=1+2\"");
        QTest::newRow("equals") << QByteArray("=cmd|' /C calc'!A0") << QByteArray("'=cmd|' /C calc'!A0");
        QTest::newRow("plus") << QByteArray("+1") << QByteArray("'+1");
        QTest::newRow("minus") << QByteArray("-1") << QByteArray("'-1");
        QTest::newRow("at") << QByteArray("@SUM(1)") << QByteArray("'@SUM(1)");
        QTest::newRow("tab") << QByteArray("\t=1") << QByteArray("\"'\t=1\"");
        QTest::newRow("CR") << QByteArray("\r=1") << QByteArray("\"'\r=1\"");
        QTest::newRow("LF") << QByteArray("\n=1") << QByteArray("\"'\n=1\"");
        QTest::newRow("own apostrophe before a formula") << QByteArray("'=1") << QByteArray("''=1");
        QTest::newRow("own apostrophes before a formula") << QByteArray("'''@x") << QByteArray("''''@x");
        QTest::newRow("apostrophe alone") << QByteArray("'") << QByteArray("'");
        QTest::newRow("apostrophe and letter") << QByteArray("'t Hof") << QByteArray("'t Hof");
        QTest::newRow("formula not at the start") << QByteArray("a=1") << QByteArray("a=1");
        QTest::newRow("spaces at the ends") << QByteArray(" a ") << QByteArray("\" a \"");
        QTest::newRow("empty") << QByteArray("") << QByteArray("");
    }

    void formulaCells()
    {
        QFETCH(QByteArray, text);
        QFETCH(QByteArray, cell);
        QCOMPARE(csvCell(guarded(text.toStdString())), cell.toStdString());
        QCOMPARE(unguarded(guarded(text.toStdString())), text.toStdString());
    }

    // No guarded cell begins as a formula does, and every text comes back.
    void guardingIsUndoneExactly()
    {
        Dice dice(7);
        for (int i = 0; i < 20'000; ++i) {
            const std::string text = std::string(static_cast<std::size_t>(dice.whole(0, 2)), '\'') + oddText(dice, 4);
            const std::string cell = guarded(text);
            QVERIFY(cell.empty() || std::string_view("=+-@\t\r\n").find(cell.front()) == std::string_view::npos);
            QCOMPARE(unguarded(cell), text);
        }
    }

    void percentOfChange_data()
    {
        QTest::addColumn<qint64>("before");
        QTest::addColumn<qint64>("now");
        QTest::addColumn<QString>("percent");
        QTest::newRow("none") << qint64(8200) << qint64(8200) << "0.00";
        QTest::newRow("down") << qint64(8200) << qint64(7900) << "-3.66"; // 300 / 8200 = 3.6585...%
        QTest::newRow("up") << qint64(6900) << qint64(9000) << "30.43";   // 2100 / 6900 = 30.4347...%
        QTest::newRow("half away from zero, up") << qint64(20'000) << qint64(20'001) << "0.01";
        QTest::newRow("half away from zero, down") << qint64(20'000) << qint64(19'999) << "-0.01";
        QTest::newRow("just under half") << qint64(20'001) << qint64(20'000) << "0.00";
        QTest::newRow("odd base, half needs more") << qint64(3) << qint64(4) << "33.33";
        QTest::newRow("two thirds") << qint64(3) << qint64(1) << "-66.67";
        QTest::newRow("all of it") << qint64(1) << qint64(kGreatestPrice.minor) << "89999999999900.00";
        QTest::newRow("almost nothing") << qint64(kGreatestPrice.minor) << qint64(1) << "-100.00";
        QTest::newRow("no base") << qint64(0) << qint64(1) << "";
    }

    void percentOfChange()
    {
        QFETCH(qint64, before);
        QFETCH(qint64, now);
        QFETCH(QString, percent);
        QCOMPARE(QString::fromStdString(changePercent({before}, {now})), percent);
    }

    void rowsInLadderOrderOfTheNewPrices()
    {
        const Scenario scenario = small();
        const std::vector<SheetRow> rows = sheetRows(scenario, scenario.tiers[0], 0);
        QCOMPARE(rows.size(), std::size_t(4)); // The closed unit too.
        QCOMPARE(rows[0].unit, std::string("c"));
        QCOMPARE(rows[1].unit, std::string("a")); // Tied with b: list order.
        QCOMPARE(rows[2].unit, std::string("b"));
        QCOMPARE(rows[3].unit, std::string("=d"));
        QVERIFY(rows[0] == (SheetRow{"Quay", "Room 4", "c", Status::closed, {8200}, {6900}, "EUR", "Even, steps"}));
        QCOMPARE(sheetRows(scenario, scenario.tiers[0], -1)[0].candidate, std::string("current"));
    }

    void bytesOfASheet()
    {
        const Scenario scenario = small();
        QCOMPARE(sheetToCsv(sheetRows(scenario, scenario.tiers[0], 0), scenario.currency),
                 QByteArray("site,tier,unit,status,current_price,new_price,change,change_percent,currency,candidate\r\n"
                            "Quay,Room 4,c,closed,82.00,69.00,-13.00,-15.85,EUR,\"Even, steps\"\r\n"
                            "Quay,Room 4,a,vacant,70.00,70.00,0.00,0.00,EUR,\"Even, steps\"\r\n"
                            "Quay,Room 4,b,occupied,69.00,70.00,1.00,1.45,EUR,\"Even, steps\"\r\n"
                            "Quay,Room 4,'=d,reserved,99.50,120.00,20.50,20.60,EUR,\"Even, steps\"\r\n"));
    }

    void comesBackExactly()
    {
        Dice dice(99);
        const Currency currencies[]{{"JPY", 0}, {"EUR", 2}, {"KWD", 3}, {"CLF", 4}, {"XXX", 2}};
        for (int round = 0; round < 400; ++round) {
            const Currency& currency = currencies[round % 5];
            std::vector<SheetRow> rows;
            for (int i = dice.whole(0, 6); i > 0; --i) {
                rows.push_back({oddText(dice, 8),
                                oddText(dice, 8),
                                oddText(dice, 8),
                                static_cast<Status>(dice.whole(0, 3)),
                                {dice.whole(1, 2'000'000)},
                                {dice.whole(0, 20) == 0 ? kGreatestPrice.minor : dice.whole(1, 2'000'000)},
                                currency.code,
                                oddText(dice, 8)});
            }
            const auto read = sheetFromCsv(sheetToCsv(rows, currency), QStringLiteral("F"));
            QVERIFY2(read.ok(), read.ok() ? "" : read.trouble().c_str());
            QVERIFY(read.value() == rows);
        }
    }

    void longNames()
    {
        const std::string five(5000, '=');
        const std::vector<SheetRow> rows{{five, five, five, Status::vacant, {1}, {2}, "EUR", five}};
        QVERIFY(sheetFromCsv(sheetToCsv(rows, {"EUR", 2}), QStringLiteral("F")).value() == rows);
    }

    void refusals_data()
    {
        QTest::addColumn<QByteArray>("from");
        QTest::addColumn<QByteArray>("to");
        QTest::addColumn<QString>("says");
        QTest::newRow("header") << QByteArray("site,") << QByteArray("place,") << "F:1: this is not the header of a price sheet";
        QTest::newRow("price") << QByteArray("82.00,69.00,") << QByteArray("82.00,69.oo,")
                               << "F:2: column 'new_price': not a price; found '69.oo'";
        QTest::newRow("change") << QByteArray("-13.00") << QByteArray("-12.00")
                                << "F:2: column 'change': not the new price minus the current one; found '-12.00'; wanted: -13.00";
        QTest::newRow("percent") << QByteArray("-15.85") << QByteArray("-15.84") << "F:2: column 'change_percent'";
        QTest::newRow("status") << QByteArray("closed") << QByteArray("shut") << "F:2: column 'status': not a status; found 'shut'";
        QTest::newRow("currency") << QByteArray("EUR") << QByteArray("EURO") << "F:2: column 'currency': not a currency";
        QTest::newRow("cells") << QByteArray("a,vacant") << QByteArray("a,b,vacant") << "F:3: 11 cells instead of 10";
        QTest::newRow("quote") << QByteArray("steps\"\r\n") << QByteArray("steps\"x\r\n") << "F:2: character";
    }

    void refusals()
    {
        QFETCH(QByteArray, from);
        QFETCH(QByteArray, to);
        QFETCH(QString, says);
        const Scenario scenario = small();
        QByteArray csv = sheetToCsv(sheetRows(scenario, scenario.tiers[0], 0), scenario.currency);
        const qsizetype at = csv.indexOf(from);
        QVERIFY(at >= 0);
        csv.replace(at, from.size(), to);
        const auto read = sheetFromCsv(csv, QStringLiteral("F"));
        QVERIFY(!read.ok());
        QVERIFY2(QString::fromStdString(read.trouble()).startsWith(says), read.trouble().c_str());
        QVERIFY(!sheetFromCsv({}, QStringLiteral("F")).ok());
    }

    void savesAndReadsAgain()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("sheet.csv"));
        const Scenario scenario = small();
        const std::vector<SheetRow> rows = sheetRows(scenario, scenario.tiers[0], 0);
        QVERIFY(saveSheet(rows, scenario.currency, path).ok());
        QFile file(path);
        QVERIFY(file.open(QIODevice::ReadOnly));
        QCOMPARE(file.readAll(), sheetToCsv(rows, scenario.currency));
    }

    // A sheet that cannot be read back as it was meant is not called done: here the rows' currency is not the one they are written in.
    void saysWhenASheetReadsDifferently()
    {
        const QTemporaryDir folder;
        const Scenario scenario = small();
        std::vector<SheetRow> rows = sheetRows(scenario, scenario.tiers[0], 0);
        const Outcome<bool> fine = saveSheet(rows, {"KWD", 3}, folder.filePath(QStringLiteral("a.csv")));
        QVERIFY(!fine.ok());
        QVERIFY2(fine.trouble().find("written but reads differently") != std::string::npos, fine.trouble().c_str());
        rows[1].site = std::string("NUL\0", 4);
        QVERIFY(!saveSheet(rows, scenario.currency, folder.filePath(QStringLiteral("b.csv"))).ok());
        rows[1].site = "not UTF-8: \xE9";
        QVERIFY(!saveSheet(rows, scenario.currency, folder.filePath(QStringLiteral("c.csv"))).ok());
    }

    void cannotBeWritten()
    {
        const QTemporaryDir folder;
        const Outcome<bool> saved = saveSheet({}, {}, folder.filePath(QStringLiteral("no/such/folder/sheet.csv")));
        QVERIFY(!saved.ok());
        QVERIFY2(saved.trouble().find("No such file or directory") != std::string::npos, saved.trouble().c_str());
    }

private:
    static Scenario small()
    {
        Scenario scenario;
        scenario.currency = {"EUR", 2};
        TierCase tierCase;
        tierCase.tier = {"Quay", "Room 4", {6900}, {}};
        for (const auto& [name, price, status] : {std::tuple("a", 7000, Status::vacant), std::tuple("b", 6900, Status::occupied),
                                                  std::tuple("c", 8200, Status::closed), std::tuple("=d", 9950, Status::reserved)}) {
            Unit unit;
            unit.name = name;
            unit.asking = {price};
            unit.status = status;
            tierCase.tier.units.push_back(unit);
        }
        tierCase.candidates = {{"Even, steps", "", {{7000}, {7000}, {6900}, {12'000}}}};
        scenario.tiers = {tierCase};
        return scenario;
    }
};

QTEST_GUILESS_MAIN(TestPriceSheet)
#include "test_price_sheet.moc"
