// SPDX-License-Identifier: GPL-3.0-or-later
// What a mapped list is refused for: told with their line, their column and their text, and a remedy.
#include "mapped_list.h"

#include <QtTest>

using namespace rungwright;

namespace
{

ImportMapping german()
{
    ImportMapping mapping;
    mapping.encoding = TextEncoding::windows1252;
    mapping.delimiter = ';';
    mapping.from(Column::site) = ColumnSource::of("Standort");
    mapping.from(Column::tier) = ColumnSource::of("Klasse");
    mapping.from(Column::unit) = ColumnSource::of("Einheit");
    mapping.from(Column::askingPrice) = ColumnSource::of("Miete");
    mapping.from(Column::status) = ColumnSource::of("Belegung");
    mapping.from(Column::advertisedFloor) = ColumnSource::of("ab");
    mapping.numbers.decimal = DecimalMark::comma;
    mapping.statuses = {{"frei", Status::vacant}, {"belegt", Status::occupied}};
    return mapping;
}

const QByteArray kHeader = "Standort;Klasse;Einheit;Belegung;Miete;ab\n";

MappedListResult read(const QByteArray& bytes, const ImportMapping& mapping = german(), const UnitListOptions& options = {})
{
    return readMappedList(bytes, QStringLiteral("F"), mapping, {}, {}, options);
}

MappedListResult readWithFloors(const QByteArray& floors, bool mayBeMissing = false)
{
    ImportMapping mapping = german();
    mapping.from(Column::advertisedFloor) = {};
    mapping.floorsFromFile = true;
    mapping.floorsMayBeMissing = mayBeMissing;
    mapping.from(Column::currency) = ColumnSource::always(QStringLiteral("EUR"));
    mapping.numbers.marks = {{QStringLiteral("€"), "EUR"}, {"CHF", "CHF"}};
    return readMappedList(kHeader + "A;T;1;frei;70,00;\nA;U;2;frei;80,00;\n", "F", mapping, floors, "floors.csv");
}

} // namespace

class TestMappingRefusals : public QObject
{
    Q_OBJECT

private slots:
    void rows_data()
    {
        QTest::addColumn<QByteArray>("row");
        QTest::addColumn<QString>("told");
        const auto row = [](const char* name, const QByteArray& text, const QString& told) { QTest::newRow(name) << text << told; };
        row("status word", "A;T;1;vermietet;70,00;69,00",
            "F:3: column 'Belegung': a status word that the mapping does not know; found 'vermietet'; wanted: one of 'frei', 'belegt'; or "
            "say in "
            "the mapping which status it stands for");
        row("no status", "A;T;1;;70,00;69,00", "F:3: column 'Belegung': no status; found nothing; wanted: one of 'frei', 'belegt'");
        row("number style", "A;T;1;frei;70.00;69,00",
            "F:3: column 'Miete': not a number as the mapping has them; found '70.00'; wanted: one such as 1234,50 without a sign beside "
            "it");
        row("no price", "A;T;1;frei;;69,00", "F:3: column 'Miete': no price; found nothing; wanted: an amount above 0 such as 1234,50");
        row("not above 0", "A;T;1;frei;0,00;69,00",
            "F:3: column 'Miete': not above 0; found '0,00'; wanted: an amount above 0 such as 1234,50");
        row("decimals", "A;T;1;frei;70,005;69,00",
            "F:3: column 'Miete': can be read in two ways, with decimals or as thousands; found '70,005'; wanted: the grouping mark in the "
            "mapping, or an amount with two decimals (XXX)");
        row("more decimals", "A;T;1;frei;70,0051;69,00",
            "F:3: column 'Miete': more decimals than the currency has; found '70,0051'; wanted: an amount above 0 such as 1234,50, with at "
            "most 2 decimals (XXX)");
        row("a thousand or one", "A;T;1;frei;1,250;69,00", "F:3: column 'Miete': can be read in two ways, with decimals or as thousands");
        row("a floor of a thousand or one", "A;U;1;frei;70,00;1,300", "F:3: column 'ab': can be read in two ways");
        row("percent price", "A;T;1;frei;70 %;69,00", "F:3: column 'Miete': not a number as the mapping has them; found '70 %'");
        row("no unit", "A;T; ;frei;70,00;69,00", "F:3: column 'Einheit': nothing in it; found nothing; wanted: a name");
        row("two troubles", "A;T;1;weg;abc;69,00",
            "F:3: column 'Miete': not a number as the mapping has them (wrong in this row too: Belegung)");
        row("too few cells", "A;T;1", "F:3: too few cells; found '3'; wanted: 6, as in the header row");
        row("too many cells", "A;T;1;frei;70,00;69,00;x",
            "F:3: too many cells; found '7'; wanted: 6, as in the header row (';' inside a cell");
        row("duplicate", "A;T;0;frei;70,00;69,00", "F:3: column 'Einheit': the unit is there already, on line 2; found '0'");
        row("floor clash", "A;T;1;frei;70,00;68,50", "F:3: column 'ab': another floor than on line 2; found '68,50'");
        row("no floor", "A;U;1;frei;70,00;", "F:3: column 'ab': no row that can be taken gives the floor of the tier 'U' at 'A'");
    }
    void rows()
    {
        QFETCH(QByteArray, row);
        QFETCH(QString, told);
        const MappedListResult result = read(kHeader + "A;T;0;frei;70,00;69,00\n" + row + '\n');
        QCOMPARE(result.list.fileTrouble, QString());
        QCOMPARE(result.list.refusedCount, qint64(1));
        QVERIFY2(result.list.refused.at(0).text("F").startsWith(told), qPrintable(result.list.refused.at(0).text("F")));
        QVERIFY(result.list.tiers.empty());
        // And the rest is taken once that is asked for.
        const MappedListResult without = read(kHeader + "A;T;0;frei;70,00;69,00\n" + row + '\n', german(), {{}, true});
        QCOMPARE(without.list.rowsTaken, qint64(1));
    }

    void thousandsOrDecimals_data()
    {
        QTest::addColumn<int>("decimal");
        QTest::addColumn<int>("grouping");
        QTest::addColumn<QByteArray>("currency");
        QTest::addColumn<QByteArray>("price");
        QTest::addColumn<qint64>("minor"); // 0: can be read in two ways.
        const auto row = [](DecimalMark decimal, Grouping grouping, const QByteArray& currency, const QByteArray& price, qint64 minor) {
            QTest::addRow("%d %d %s %s", int(decimal), int(grouping), currency.constData(), price.constData())
                << int(decimal) << int(grouping) << currency << price << minor;
        };
        row(DecimalMark::point, Grouping::none, "EUR", "1.250", 0);
        row(DecimalMark::point, Grouping::none, "EUR", "1.300", 0);
        row(DecimalMark::point, Grouping::none, "EUR", "1.000", 0);
        row(DecimalMark::point, Grouping::none, "JPY", "100.000", 0);
        row(DecimalMark::comma, Grouping::none, "EUR", "1,250", 0);
        row(DecimalMark::point, Grouping::none, "EUR", "1.25", 125);
        row(DecimalMark::point, Grouping::none, "EUR", "1.2500", 125);      // No group has four figures,
        row(DecimalMark::point, Grouping::none, "EUR", "1234.500", 123450); // nor is there one before four.
        row(DecimalMark::point, Grouping::none, "EUR", "0.500", 50);
        row(DecimalMark::comma, Grouping::point, "EUR", "1.250", 125000);
        row(DecimalMark::point, Grouping::comma, "EUR", "1,250", 125000);
        row(DecimalMark::point, Grouping::comma, "EUR", "1.250", 125); // The mapping says that the comma groups.
        row(DecimalMark::point, Grouping::none, "KWD", "1.250", 1250); // Three decimals by ISO 4217.
    }
    void thousandsOrDecimals()
    {
        QFETCH(int, decimal);
        QFETCH(int, grouping);
        QFETCH(QByteArray, currency);
        QFETCH(QByteArray, price);
        QFETCH(qint64, minor);
        ImportMapping mapping = german();
        mapping.numbers.decimal = DecimalMark(decimal);
        mapping.numbers.grouping = Grouping(grouping);
        mapping.from(Column::currency) = ColumnSource::always(QString::fromLatin1(currency));
        mapping.from(Column::advertisedFloor) = {};
        mapping.floorsMayBeMissing = true;
        const MappedListResult result = read(kHeader + "A;T;1;frei;" + price + ";\n", mapping);
        QCOMPARE(result.list.fileTrouble, QString());
        if (minor == 0) {
            QVERIFY(result.list.refused.at(0).wrong.startsWith("can be read in two ways"));
            QVERIFY(result.list.refused.at(0).wanted.startsWith("the grouping mark in the mapping, or an amount with"));
        } else {
            QCOMPARE(result.list.tiers.at(0).tier.units.at(0).asking.minor, std::int64_t(minor));
        }
    }

    void emptyCellsBehindTheLastColumnDoNoHarm() { QVERIFY(read(kHeader + "A;T;0;frei;70,00;69,00;;\n").list.clean()); }

    void files_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<QString>("told");
        const auto row = [](const char* name, const QByteArray& bytes, const QString& told) { QTest::newRow(name) << bytes << told; };
        row("empty", "", "F: the file is empty. Wanted is a header row");
        row("only a header", kHeader, "F: there is a header row but no unit below it");
        row("only a header and blanks", kHeader + ";;;;;\n\n", "F: there is a header row but no unit below it");
        row("header missing", "A;T;0;frei;70,00;69,00\n", "F:1: the header row lacks 'Standort', 'Klasse', 'Einheit'");
        row("wrong delimiter", "Standort,Klasse,Einheit,Belegung,Miete,ab\nA,T,1,frei,\"70,00\",\"69,00\"\n",
            "F:1: the header row lacks 'Standort', 'Klasse', 'Einheit', 'Miete', 'Belegung', 'ab'; found: Standort,Klasse");
        row("open quote", kHeader + "A;\"T;0;frei;70,00;69,00\n", "F:2: the file ends inside a quoted cell");
        row("stray quote", kHeader + "A;T\"x\";0;frei;70,00;69,00\n", "F:2: character 4: a quotation mark inside a cell");
        row("text after quote", kHeader + "A;\"T\"x;0;frei;70,00;69,00\n",
            "F:2: character 6: text after the quotation mark that closes a cell. Put a semicolon or a line end after it");
        row("utf-8 mark", "\xEF\xBB\xBF" + kHeader,
            "F:1: byte 1 of the file: the file begins with the byte-order mark of UTF-8, but is to be");
        row("byte of no meaning", kHeader + "A\x81;T;0;frei;70,00;69,00\n",
            "F:2: byte 44 of the file: the byte 81 stands for nothing in Windows-1252");
        row("utf-16", QByteArray("S\0t\0", 4), "F:1: byte 2 of the file: a NUL character");
    }
    void files()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(QString, told);
        const MappedListResult result = read(bytes);
        QVERIFY2(result.list.fileTrouble.startsWith(told), qPrintable(result.list.fileTrouble));
        QVERIFY(result.list.tiers.empty());
    }

    void wrongDelimiterIsNamed()
    {
        ImportMapping mapping = german();
        mapping.delimiter = '\t';
        const QString told = read(kHeader + "A;T;0;frei;70,00;69,00\n", mapping).list.fileTrouble;
        QVERIFY2(told.endsWith(QStringLiteral("The cells seem to be separated by ';': choose that delimiter.")), qPrintable(told));
    }

    void wrongEncodingIsRefused()
    {
        ImportMapping mapping = german();
        mapping.encoding = TextEncoding::utf8;
        const QString told = read(kHeader + "Gr\xFCn;T;0;frei;70,00;69,00\n", mapping).list.fileTrouble;
        QVERIFY2(told.startsWith(QStringLiteral("F:2: byte 45 of the file: the bytes FC")), qPrintable(told));
    }

    void headerRowBeyondTheEnd()
    {
        ImportMapping mapping = german();
        mapping.headerRow = 9;
        QVERIFY(read(kHeader + "A;T;0;frei;70,00;69,00\n", mapping)
                    .list.fileTrouble.contains("the header in row 9, and the file has 2 rows only"));
    }

    void currencies()
    {
        ImportMapping mapping = german();
        mapping.numbers.marks = {{QStringLiteral("€"), "EUR"}, {"CHF", "CHF"}};
        const QByteArray euro = "A;T;1;frei;\x80 70,00;69,00\n";
        QCOMPARE(read(kHeader + euro, mapping).list.currency.code, std::string("EUR"));
        QCOMPARE(read(kHeader + "A;T;0;frei;70,00;69,00\n" + euro, mapping).list.currency.code, std::string("EUR")); // Named later.
        const MappedListResult two = read(kHeader + euro + "A;T;2;frei;CHF 70,00;\n", mapping);
        QCOMPARE(two.list.refusedCount, qint64(1));
        QVERIFY2(two.list.refused[0].text("F").contains("another currency than on line 2"), qPrintable(two.list.refused[0].text("F")));
        const MappedListResult within = read(kHeader + "A;T;2;frei;CHF 70,00;\x80 69,00\n", mapping);
        QVERIFY(within.list.refused.at(0).wrong.startsWith("one currency beside the price and another beside the floor"));
        QVERIFY(read(kHeader + euro, mapping, {"USD", false}).list.fileTrouble.contains("the list's currency is EUR, but USD is wanted"));
        QCOMPARE(read(kHeader + "A;T;0;frei;70,00;69,00\n", german(), {"USD", false}).list.currency.code, std::string("USD"));
    }

    void unusableMappings()
    {
        const auto told = [](auto change) {
            ImportMapping mapping = german();
            change(mapping);
            return mappingTrouble(mapping);
        };
        QCOMPARE(mappingTrouble(german()), QString());
        QVERIFY(told([](auto& m) { m.from(Column::unit) = {}; }).startsWith("'unit' has no source"));
        QVERIFY(told([](auto& m) { m.from(Column::unit) = ColumnSource::always("x"); }).contains("one name"));
        QVERIFY(told([](auto& m) { m.from(Column::advertisedFloor) = ColumnSource::always("69,00"); }).contains("found '69,00'"));
        QVERIFY(told([](auto& m) { m.from(Column::advertisedFloor) = {}; }).startsWith("'advertised_floor' has no source"));
        QCOMPARE(told([](auto& m) {
                     m.from(Column::advertisedFloor) = {};
                     m.floorsMayBeMissing = true;
                 }),
                 QString());
        QVERIFY(told([](auto& m) { m.floorsFromFile = true; }).startsWith("the floors come from a file and from"));
        QVERIFY(
            told([](auto& m) { m.numbers.grouping = Grouping::comma; }).startsWith("one sign cannot stand for decimals and for groups"));
        QVERIFY(told([](auto& m) { m.numbers.marks = {{"-", {}}}; }).startsWith("a sign to be taken off numbers"));
        QVERIFY(told([](auto& m) { m.numbers.marks = {{"E", "EURO"}}; }).contains("not a currency; found 'EURO'"));
        QVERIFY(told([](auto& m) { m.statuses.push_back({" FREI ", Status::closed}); }).contains("stands for two statuses"));
        QVERIFY(told([](auto& m) { m.statuses.clear(); }).startsWith("no word is a status yet"));
        QVERIFY(told([](auto& m) {
                    m.yesWords = QStringList{"x"};
                    m.noWords = QStringList{"X"};
                }).contains("stands for yes and for no"));
        QVERIFY(told([](auto& m) { m.headerLines = 3; }).startsWith("a header has one line or two"));
        QVERIFY(told([](auto& m) { m.skip = {{SkipRule::Kind::beginsWith, {"Einheit", 1}, " "}}; }).startsWith("rows to be passed over"));
        ImportMapping unusable = german();
        unusable.from(Column::unit) = {};
        QVERIFY(read(kHeader, unusable).list.fileTrouble.startsWith("F: the mapping cannot be used: 'unit' has no source"));
    }

    void floorsFromAFile()
    {
        const MappedListResult fine = readWithFloors("tier,site,advertised_floor\nT,A,69.00\nU,A,79\n");
        QVERIFY2(fine.list.clean(), qPrintable(fine.list.fileTrouble));
        QCOMPARE(fine.list.tiers[0].tier.advertisedFloor.minor, std::int64_t(6900));
        QCOMPARE(fine.list.tiers[1].tier.advertisedFloor.minor, std::int64_t(7900));
        // A spreadsheet's semicolons bring its decimal comma with them.
        QVERIFY(readWithFloors("site;tier;advertised_floor\nA;T;69,00\nA;U;79,50\n").list.clean());
        // Empty cells behind the last column do no harm, nor does the list's own currency.
        QVERIFY(readWithFloors("site,tier,advertised_floor\nA,T,69.00,,\nA,U,79\n").list.clean());
        const MappedListResult euro = readWithFloors("site;tier;advertised_floor\nA;T;€ 69,00\nA;U;79,50 €\n");
        QVERIFY2(euro.list.clean(), qPrintable(euro.list.fileTrouble));
    }

    void floorsInTrouble_data()
    {
        QTest::addColumn<QByteArray>("floors");
        QTest::addColumn<QString>("told");
        const auto row = [](const char* name, const QByteArray& floors, const QString& told) { QTest::newRow(name) << floors << told; };
        row("twice", "site,tier,advertised_floor\nA,T,69.00\nA,U,70\nA,T,69.00\n",
            "floors.csv:4: the tier 'T' at 'A' is there already, on line 2; wanted: each tier once");
        row("no floor", "site,tier,advertised_floor\nA,T,x\nA,U,\n",
            "floors.csv:2: column 'advertised_floor': not a floor; found 'x'; wanted: an amount above 0 such as 1234.50");
        row("another file", "a,b,c\n",
            "floors.csv: not a file of floors; found the header 'a, b, c'; wanted: a header row with the columns site");
        row("empty", "", "floors.csv: not a file of floors; found the header ''");
        row("too few cells", "site,tier,advertised_floor\nA,T\n", "floors.csv:2: too few cells; found 2; wanted: 3");
        row("decimal comma", "site,tier,advertised_floor\nA,T,69,50\nA,U,70\n",
            "floors.csv:2: too many cells; found 4; wanted: 3, as in the header row (',' inside a cell, such as a decimal comma, needs");
        row("percentage", "site;tier;advertised_floor\nA;T;69%\nA;U;70\n",
            "floors.csv:2: column 'advertised_floor': a percentage, not a floor; found '69%'; wanted: an amount above 0 such as 1234,50");
        row("ours as a percentage", "site,tier,advertised_floor\nA,T,69%\n",
            "floors.csv:2: column 'advertised_floor': not a floor; found '69%'");
        row("another currency", "site;tier;advertised_floor\nA;T;CHF 69,00\nA;U;70\n",
            "floors.csv:2: column 'advertised_floor': the sign beside the floor stands for CHF and the list's currency is EUR; found 'CHF "
            "69,00'; wanted: floors in the list's currency");
        row("sign in our own spelling", "site,tier,advertised_floor\nA,T,CHF 69.00\n",
            "floors.csv:2: column 'advertised_floor': not a floor; found 'CHF 69.00'");
        row("thousands or decimals", "site;tier;advertised_floor\nA;T;69\nA;U;1,250\n",
            "floors.csv:3: column 'advertised_floor': can be read in two ways, with decimals or as thousands; found '1,250'; wanted: the "
            "grouping mark in the mapping, or an amount with two decimals (EUR)");
        row("no tier", "site,tier,advertised_floor\nA,,69\n", "floors.csv:2: no tier; found nothing");
    }
    void floorsInTrouble()
    {
        QFETCH(QByteArray, floors);
        QFETCH(QString, told);
        const MappedListResult result = readWithFloors(floors);
        QVERIFY2(result.list.fileTrouble.startsWith(told), qPrintable(result.list.fileTrouble));
    }

    void floorsOfOtherTiersAndNone()
    {
        const QByteArray floors = "site,tier,advertised_floor\nA,T,69.00\nB,T,50\n";
        const MappedListResult refused = readWithFloors(floors);
        QCOMPARE(refused.list.refusedCount, qint64(1));
        QVERIFY(refused.list.refused[0].wanted.startsWith("a row for it in floors.csv"));
        const MappedListResult taken = readWithFloors(floors, true);
        QVERIFY(taken.list.clean());
        QCOMPARE(taken.tiersWithoutFloor, qint64(1));
        QCOMPARE(taken.list.tiers[1].tier.advertisedFloor.minor, std::int64_t(0));
        QCOMPARE(taken.notes,
                 QStringList({"tiers taken without a floor: 1", "rows in floors.csv whose tier is not in the list: 1, B / T (line 3)"}));
    }

    void floorsWhereNoneAreWanted()
    {
        const QByteArray bytes = kHeader + "A;T;0;frei;70,00;69,00\n";
        QVERIFY(readMappedList(bytes, "F", german(), "site,tier,advertised_floor\n", "x.csv")
                    .list.fileTrouble.contains("takes the floors from the list"));
        ImportMapping mapping = german();
        mapping.from(Column::advertisedFloor) = {};
        mapping.floorsFromFile = true;
        QVERIFY(readMappedList(bytes, "F", mapping).list.fileTrouble.contains("from a second file, and none was given"));
        QVERIFY(loadMappedList("/nowhere/list.csv", german()).list.fileTrouble.startsWith("/nowhere/list.csv: cannot be opened"));
        QVERIFY(loadMappedList("/nowhere/list.csv", mapping, "/nowhere/floors.csv").list.fileTrouble.startsWith("/nowhere/floors.csv"));
    }

    void passedOverRowsAreCounted()
    {
        ImportMapping mapping = german();
        mapping.skip = {{SkipRule::Kind::isEmpty, {"Einheit", 1}, {}}, {SkipRule::Kind::beginsWith, {"Standort", 1}, "summe"}};
        const MappedListResult result =
            read(kHeader + "A;T;0;frei;70,00;69,00\nSumme Mai;;x;;70,00;\nZwischen\n;;;;;\nSUMME;;;;1;\n", mapping);
        QVERIFY2(result.list.clean(), qPrintable(result.list.fileTrouble));
        QCOMPARE(result.rowsPassedOver, qint64(3)); // A line in which nothing stands is no row.
        QCOMPARE(result.passedOver[0].rows, qint64(2));
        QCOMPARE(result.passedOver[1].firstLine, qint64(3));
    }

    // "Sum" is the beginning of a total, not of Summer Lane.
    void rulesMatchWholeWords()
    {
        ImportMapping mapping = german();
        mapping.skip = {{SkipRule::Kind::beginsWith, {"Standort", 1}, "Sum"}, {SkipRule::Kind::beginsWith, {"Standort", 1}, "#"}};
        const QByteArray unit = ";T;1;frei;70,00;69,00\n";
        const MappedListResult result = read(
            kHeader + "Summer Lane" + unit + "Sum\xFC" + unit + "sum;;;;;\nSum: 2;;;;;\nSUM of all;;;;;\nSum2;;;;;\n#note;;;;;\n", mapping);
        QVERIFY2(result.list.clean(), qPrintable(result.list.fileTrouble));
        QCOMPARE(result.list.rowsTaken, qint64(2));
        QCOMPARE(result.passedOver[0].rows, qint64(4));
        QCOMPARE(result.passedOver[1].rows, qint64(1)); // No word goes on behind a sign.
    }

    void cancelling()
    {
        const MappedListResult result =
            readMappedList(kHeader + "A;T;0;frei;70,00;69,00\n", "F", german(), {}, {}, {}, [](double) { return false; });
        QCOMPARE(result.list.fileTrouble, QStringLiteral("F: reading was cancelled; nothing was taken"));
    }
};

QTEST_GUILESS_MAIN(TestMappingRefusals)
#include "test_mapping_refusals.moc"
