// SPDX-License-Identifier: GPL-3.0-or-later
// How others' numbers, headers and words are understood, what is proposed, and what the preview shows.
#include "mapped_list.h"
#include "mapping_numbers.h"
#include "mapping_preview.h"
#include "trade_words.h"

#include <QtTest>

using namespace rungwright;

namespace
{

NumberStyle style(DecimalMark decimal, Grouping grouping, std::vector<NumberMark> marks = {})
{
    return {decimal, grouping, std::move(marks), false};
}

QString plain(const NumberStyle& how, const QString& text)
{
    ReadNumber number;
    const std::string utf8 = text.toStdString();
    return NumberReader(how).read(utf8, number) ? QString::fromStdString(number.plain) : QStringLiteral("refused");
}

QByteArray rowsOf(const QByteArray& header, const QByteArray& row, int times)
{
    QByteArray out = header + '\n';
    for (int i = 0; i < times; ++i)
        out += QByteArray(row).replace("#", QByteArray::number(i)) + '\n';
    return out;
}

} // namespace

class TestMapping : public QObject
{
    Q_OBJECT

private slots:
    void numbers_data()
    {
        QTest::addColumn<int>("decimal");
        QTest::addColumn<int>("grouping");
        QTest::addColumn<QString>("text");
        QTest::addColumn<QString>("plain");
        const auto row = [](DecimalMark decimal, Grouping grouping, const QString& text, const QString& want) {
            QTest::addRow("%d %d '%s'", int(decimal), int(grouping), qPrintable(text)) << int(decimal) << int(grouping) << text << want;
        };
        const auto no = QStringLiteral("refused");
        row(DecimalMark::point, Grouping::none, "1234.50", "1234.50");
        row(DecimalMark::point, Grouping::none, "1,234.50", no);
        row(DecimalMark::point, Grouping::comma, "1,234.50", "1234.50");
        row(DecimalMark::point, Grouping::comma, "1,234,567", "1234567");
        row(DecimalMark::point, Grouping::comma, "1,23", no);
        row(DecimalMark::point, Grouping::comma, "1234,567", no);
        row(DecimalMark::point, Grouping::comma, "1,2345", no);
        row(DecimalMark::point, Grouping::comma, ",123", no);
        row(DecimalMark::point, Grouping::comma, "1,234,", no);
        row(DecimalMark::comma, Grouping::point, "1.234,50", "1234.50");
        row(DecimalMark::comma, Grouping::point, "1234,50", "1234.50");
        row(DecimalMark::comma, Grouping::point, "0.500", no); // Half of something, not five hundred.
        row(DecimalMark::comma, Grouping::point, "1.50", no);
        row(DecimalMark::comma, Grouping::none, "1.234", no);
        row(DecimalMark::comma, Grouping::space, "1 234,5", "1234.5");
        row(DecimalMark::comma, Grouping::space, QStringLiteral("1\u00A0234,5"), "1234.5");
        row(DecimalMark::comma, Grouping::space, QStringLiteral("1\u202F234\u202F567"), "1234567");
        row(DecimalMark::point, Grouping::apostrophe, "1'234.05", "1234.05");
        row(DecimalMark::point, Grouping::apostrophe, QStringLiteral("1\u2019234.05"), "1234.05");
        row(DecimalMark::point, Grouping::none, "45.-", "45");
        row(DecimalMark::comma, Grouping::none, QStringLiteral("45,\u2013"), "45");
        row(DecimalMark::point, Grouping::none, "-5", "-5");
        row(DecimalMark::point, Grouping::none, "+5", "5");
        row(DecimalMark::point, Grouping::none, "--5", no);
        row(DecimalMark::point, Grouping::none, "1e3", no);
        row(DecimalMark::point, Grouping::none, "12.", no);
        row(DecimalMark::point, Grouping::none, ".5", no);
        row(DecimalMark::point, Grouping::none, "", no);
        row(DecimalMark::point, Grouping::none, "(5)", no);
        row(DecimalMark::point, Grouping::none, "1.2.3", no);
    }
    void numbers()
    {
        QFETCH(int, decimal);
        QFETCH(int, grouping);
        QFETCH(QString, text);
        QTEST(plain(style(DecimalMark(decimal), Grouping(grouping)), text), "plain");
    }

    void marksAreTakenOff()
    {
        const NumberStyle how =
            style(DecimalMark::point, Grouping::comma,
                  {{QStringLiteral("$"), {}}, {QStringLiteral("US$"), QStringLiteral("USD")}, {QStringLiteral("/month"), {}}});
        const NumberReader reader(how);
        ReadNumber number;
        for (const char* text : {"US$ 1,234.50", "1,234.50 us$", "US$1,234.50 /month", "US$ 1,234.50 US$"}) {
            QVERIFY2(reader.read(text, number), text);
            QCOMPARE(number.plain, std::string("1234.50"));
            QCOMPARE(number.currency, std::string_view("USD"));
        }
        QVERIFY(reader.read("$5", number));
        QVERIFY(number.currency.empty());
        QVERIFY(reader.read("-$5", number));
        QCOMPARE(number.plain, std::string("-5"));
        QVERIFY(!reader.read("EUR 5", number));
        QVERIFY(!reader.read("$", number));
        QVERIFY(reader.read("25 %", number) && number.percent);
    }

    void hundredths()
    {
        // Powers of ten move the point and nothing else.
        for (const auto& [text, want] :
             {std::pair("25", "0.25"), {"100", "1.00"}, {"12.5", "0.125"}, {"0", "0.00"}, {"-3", "-0.03"}, {"1234", "12.34"}})
            QCOMPARE(hundredthOf(text), std::string(want));
    }

    void twoHeaderLinesAreJoined()
    {
        QCOMPARE(joinedHeaders({"Rent", "", " Area "}), QStringList({"Rent", "", "Area"}));
        QCOMPARE(joinedHeaders({"Unit", "", "Rent", "", "State"}, {"no.", "size", "net", "gross", ""}),
                 QStringList({"Unit no.", "Unit size", "Rent net", "Rent gross", "State"}));
        QCOMPARE(joinedHeaders({"", "Rent\r\nper month", ""}, {"no.", "net", "", "more"}),
                 QStringList({"no.", "Rent per month net", "", "Rent per month more"}));
    }

    void ourOwnFormatIsAMappingToo()
    {
        QCOMPARE(mappingTrouble(ownFormatMapping()), QString());
        const QByteArray bytes = "site,tier,unit,asking_price,status,advertised_floor,currency,grade,area,vacancy_chance,locked\n"
                                 "A,T,1,70.00,vacant,69.00,EUR,3,4.5,0.25,yes\nA,T,2,80,occupied,,EUR,,,,\n";
        const UnitListResult own = readUnitList(bytes, "F", {});
        const MappedListResult mapped = readMappedList(bytes, "F", ownFormatMapping());
        QVERIFY2(mapped.list.clean(), qPrintable(mapped.list.fileTrouble));
        QVERIFY(mapped.list.tiers == own.tiers);
        QVERIFY(isOwnFormat(bytes));
        QVERIFY(!isOwnFormat("site;tier;unit\n"));
    }

    // A proposal of our own columns is our own mapping's columns.
    void ourOwnHeaderIsProposedWhole()
    {
        const QByteArray bytes = rowsOf("site,tier,unit,asking_price,status,advertised_floor,currency,grade,area,vacancy_chance,locked",
                                        "A,T,#x,70.00,vacant,69.00,EUR,3,4.5,0.25,yes", 5);
        QVERIFY(proposeMapping({bytes, true}).mapping.sources == ownFormatMapping().sources);
    }

    void ambiguousNumbers_data()
    {
        QTest::addColumn<QByteArray>("prices");
        QTest::addColumn<bool>("ambiguous");
        QTest::addColumn<int>("decimal");
        QTest::addColumn<int>("grouping");
        const auto row = [](const char* name, const QByteArray& prices, bool ambiguous, DecimalMark decimal, Grouping grouping) {
            QTest::newRow(name) << prices << ambiguous << int(decimal) << int(grouping);
        };
        row("could be either", "1.234 2.345 3.456", true, DecimalMark::comma, Grouping::point);
        row("another price tells", "1.234 2.345 12,50", false, DecimalMark::comma, Grouping::point);
        row("decimals tell", "1.234 2.34 3.4", false, DecimalMark::point, Grouping::none);
        row("two groups tell", "1.234 1.234.567 3.456", false, DecimalMark::comma, Grouping::point);
        row("whole numbers", "85 95 105", false, DecimalMark::comma, Grouping::none); // A semicolon list: the comma is likelier.
        row("english", "1,234.50 85.00 95.00", false, DecimalMark::point, Grouping::comma);
    }
    void ambiguousNumbers()
    {
        QFETCH(QByteArray, prices);
        QFETCH(bool, ambiguous);
        QFETCH(int, decimal);
        QFETCH(int, grouping);
        QByteArray bytes = "Site;Tier;Unit;Price;Status\n";
        int n = 0;
        for (const QByteArray& price : prices.split(' '))
            bytes += "A;T;u" + QByteArray::number(++n) + ';' + price + ";free\n";
        const MappingProposal proposal = proposeMapping({bytes, true});
        QCOMPARE(proposal.numbersAmbiguous, ambiguous);
        QCOMPARE(int(proposal.mapping.numbers.decimal), decimal);
        QCOMPARE(int(proposal.mapping.numbers.grouping), grouping);
        QCOMPARE(proposal.notes.filter(QStringLiteral("two ways")).size(), qsizetype(ambiguous ? 1 : 0));
    }

    // The sample does not reach the total, but its end is looked at.
    void proposedRulesSeeTheEnd()
    {
        QByteArray rows = "Site,Size,Unit,Rent,Status\n";
        for (int i = 1; i <= 5000; ++i)
            rows += "Reed Lane,A,u" + QByteArray::number(i) + ",80.00,free\n";
        const std::vector<SkipRule> wanted{{SkipRule::Kind::beginsWith, {QStringLiteral("Site"), 1}, QStringLiteral("Total")}};
        const auto skipOf = [](const QByteArray& bytes) {
            QTemporaryFile file;
            if (!file.open() || file.write(bytes) != bytes.size() || !file.flush())
                qFatal("no temporary file");
            const ListSample sample = takeSample(file.fileName()).value();
            if (sample.whole)
                qFatal("the sample holds the whole file");
            return proposeMapping(sample).mapping.skip;
        };
        QVERIFY(skipOf(rows).empty());
        QCOMPARE(skipOf(rows + "Total Reed Lane,,5000,400000.00,\n"), wanted);
        // A tail that begins inside of quotes, and is read as no units at all, proposes nothing.
        QVERIFY(skipOf(rows + "Reed Lane,A,\"" + QByteArray(9000, 'x') + "\nTotal,,,\n\",80.00,free\n").empty());
    }

    // No rule that would pass over a unit of the sample.
    void proposedRulesLeaveUnitsAlone()
    {
        const QByteArray header = "Site,Size,Unit,Rent,Status\n";
        const QByteArray lane = "Summer Lane,A,u1,80.00,free\nSummer Lane,A,u2,81.00,let\nWinter Row,A,u3,82.00,free\n";
        // The total stands in the unit's column, so that only its word tells it.
        const QByteArray total = ",,Sum,243.00,\n";
        const auto skipOf = [&](const QByteArray& rows) { return proposeMapping({header + rows, true}).mapping.skip; };
        QCOMPARE(skipOf(lane + total), (std::vector<SkipRule>{{SkipRule::Kind::beginsWith, {"Unit", 1}, "Sum"}}));
        const MappedListResult read = readMappedList(header + QByteArray(lane).replace(",u1,", ",Summer 1,") + total, "F", [&] {
            ImportMapping mapping = proposeMapping({header + lane + total, true}).mapping;
            mapping.floorsMayBeMissing = true;
            return mapping;
        }());
        QVERIFY2(read.list.clean(), qPrintable(read.list.fileTrouble));
        QCOMPARE(read.list.rowsTaken, qint64(3));
        QCOMPARE(read.rowsPassedOver, qint64(1));
        // A unit that is called so: the rule would take it along.
        QVERIFY(skipOf(QByteArray(lane).replace(",u1,", ",Sum 1,") + total).empty());
        QCOMPARE(proposeMapping({header + QByteArray(lane).replace(",u1,", ",Sum 1,") + total, true}).notes.filter("passed over").size(),
                 qsizetype(0));
    }

    // A footer of one cell gives its first word to a rule, unless units' rows have the word in that column.
    void footersThatBeginAsUnitsDo()
    {
        const QByteArray header = "Unit,Size,Rent,Status\n";
        const QByteArray units = "Print shop,A,80.00,free\nu2,A,81.00,let\nu3,A,82.00,free\nBack Room,A,83.00,no such word\n";
        const auto skipOf = [&](const QByteArray& footer) { return proposeMapping({header + units + footer + '\n', true}).mapping.skip; };
        QCOMPARE(skipOf("Printed today"), (std::vector<SkipRule>{{SkipRule::Kind::beginsWith, {"Unit", 1}, "Printed"}}));
        QVERIFY(skipOf("Print date 1 May").empty());
        QVERIFY(skipOf("Room count 4").empty()); // The word stands there, though the unit does not begin with it.
        QVERIFY(skipOf("Back office").empty());  // Whatever its status is called.
    }

    void marksThatChangeAnAmountAreNotProposed_data()
    {
        QTest::addColumn<QString>("prices");
        QTest::addColumn<QStringList>("marks");
        QTest::addColumn<QString>("told"); // Empty: no note on marks.
        const auto row = [](const char* name, const QString& prices, const QStringList& marks, const QString& told = {}) {
            QTest::newRow(name) << prices << marks << told;
        };
        row("thousands", "1.5k|2.5K|3.5 k", {});
        row("thousands beside a currency", "1.5 k€|€2.5|T€ 3.5", {"€"});
        row("millions", "1.5m|2.5M|3.5 Mio", {});
        row("brackets", "(69.00)|70.00|(71.00", {});
        row("brackets around words", "69.00 (net)|70.00|71.00", {});
        row("currency", "€ 69.00|70.00 EUR|71.00", {"€", "EUR"});
        row("one period", "69.00/month|70.00 per month|71.00 p.m.", {"/month", "per month", "p.m."});
        row("currency and period", "€69.00 /mes|€70.00 al mese|71.00 € pro Monat", {"€", "/mes", "al mese", "€ pro Monat"});
        row("two periods", "90/month|25/week|95/month", {"/month"},
            "prices are for different periods: '/month', and '/week' too. Only '/month' will be taken off");
        row("two periods, the other way", "90/month|25/week|26 a week", {"/week", "a week"}, "Only '/week' will be taken off");
        row("unknown", "ca. 69.00|70.00|71.00", {"ca."}, "it will be taken off: 'ca.'. Take out");
        row("price for an area", "69.00 €/m²|70.00|71.00", {"€/m²"}, "it will be taken off: '€/m²'. Take out");
        row("many currencies", "$69.00|70.00|71.00", {"$"});
    }
    void marksThatChangeAnAmountAreNotProposed()
    {
        QFETCH(QString, prices);
        QFETCH(QStringList, marks);
        QFETCH(QString, told);
        QByteArray bytes = "Site,Size,Unit,Rent,Status\n";
        int n = 0;
        for (const QString& price : prices.split('|'))
            bytes += "A,T,u" + QByteArray::number(++n) + ',' + price.toUtf8() + ",free\n";
        const MappingProposal proposal = proposeMapping({bytes, true});
        QCOMPARE(proposal.mapping.from(Column::askingPrice).column.header, QStringLiteral("Rent"));
        QStringList proposed;
        for (const NumberMark& mark : proposal.mapping.numbers.marks)
            proposed << mark.text;
        QCOMPARE(proposed, marks);
        const QStringList notes = proposal.notes.filter(QStringLiteral("taken off"));
        QCOMPARE(notes.size(), qsizetype(told.isEmpty() ? 0 : 1));
        QVERIFY2(told.isEmpty() || notes[0].contains(told), qPrintable(notes.join('\n')));
    }

    void valuesSpeakWhereHeadersDoNot()
    {
        const QByteArray bytes = rowsOf("f1|f2|f3|f4", "Room #|free|EUR #9.50|x", 9);
        const ImportMapping mapping = proposeMapping({bytes, true}).mapping;
        QCOMPARE(mapping.delimiter, '|');
        QCOMPARE(mapping.from(Column::unit).column.header, QStringLiteral("f1"));
        QCOMPARE(mapping.from(Column::status).column.header, QStringLiteral("f2"));
        QCOMPARE(mapping.from(Column::askingPrice).column.header, QStringLiteral("f3"));
    }

    void yesAndNoCanBeAStatus()
    {
        const QByteArray bytes = "Site,Size,Unit,Rent,Let\nA,T,u1,80.00,yes\nA,T,u2,81.00,no\nA,T,u3,82.00,no\n";
        const ImportMapping mapping = proposeMapping({bytes, true}).mapping;
        QCOMPARE(mapping.from(Column::status).column.header, QStringLiteral("Let"));
        QCOMPARE(mapping.statuses, (std::vector<StatusWord>{{"yes", Status::occupied}, {"no", Status::vacant}}));
    }

    void otherPricesAndSquareFeetAreLeftAlone()
    {
        const QByteArray bytes =
            rowsOf("Site,Size,Unit,Deposit,Contract rent,Rent,Status,Area sq ft", "A,T,u#,50.00,70.00,8#.00,free,100", 5);
        const ImportMapping mapping = proposeMapping({bytes, true}).mapping;
        QCOMPARE(mapping.from(Column::askingPrice).column.header, QStringLiteral("Rent"));
        QCOMPARE(mapping.from(Column::area).kind, ColumnSource::Kind::absent);
    }

    // Two columns of one name are told apart by which of them it is.
    void sameHeaderTwice()
    {
        ImportMapping mapping = ownFormatMapping();
        mapping.sources.fill({});
        mapping.from(Column::site) = ColumnSource::of("name", 1);
        mapping.from(Column::tier) = ColumnSource::of("NAME", 2);
        mapping.from(Column::unit) = ColumnSource::of("name", 3);
        mapping.from(Column::askingPrice) = ColumnSource::of("p");
        mapping.from(Column::status) = ColumnSource::always("vacant");
        mapping.from(Column::advertisedFloor) = ColumnSource::always("60.00");
        const MappedListResult mapped = readMappedList("name,Name,p, name \nA,B,70,C\n", "F", mapping);
        QVERIFY2(mapped.list.clean(), qPrintable(mapped.list.fileTrouble));
        const Tier& tier = mapped.list.tiers.at(0).tier;
        QCOMPARE(tier.site + tier.name + tier.units.at(0).name, std::string("ABC"));
        QCOMPARE(tier.advertisedFloor.minor, std::int64_t(6000));
    }

    void previewTellsTroublesByCell()
    {
        const QByteArray bytes =
            "list of units\nsite,tier,unit,asking_price,status,advertised_floor\nA,T,1,70,vacant,69\nA,T,2,abc,let,69\nA,T\n";
        ImportMapping mapping = ownFormatMapping();
        mapping.headerRow = 2;
        const MappingPreview preview = previewMapping({bytes, true}, mapping, 10);
        QCOMPARE(preview.trouble, QString());
        QCOMPARE(preview.missingColumns.size(), qsizetype(5));
        QCOMPARE(preview.above.size(), std::size_t(2));
        QCOMPARE(preview.rows.size(), std::size_t(3));
        QCOMPARE(preview.rows[0].cells[3].text, QStringLiteral("70"));
        QVERIFY(preview.rows[1].cells[3].trouble.contains(QStringLiteral("not a number as the mapping has them; found 'abc'")));
        QVERIFY(preview.rows[1].cells[4].trouble.contains(QStringLiteral("found 'let'")));
        QVERIFY(preview.rows[2].trouble.startsWith(QStringLiteral("too few cells; found '2'")));
        QCOMPARE(preview.rows[2].line, qint64(5));
        QCOMPARE(preview.rowsInTrouble, qint64(2));
        QCOMPARE(preview.troubles[3], qint64(1));
        QCOMPARE(previewMapping({bytes, true}, mapping, 1).rows.size(), std::size_t(1));
        QCOMPARE(previewMapping({bytes, true}, mapping, 1).rowsSeen, qint64(3));
    }

    // A sample that ends anywhere gives the rows that are whole in it, and no trouble.
    void tornSamplesGiveWholeRows()
    {
        const QByteArray bytes = "site,tier,unit,asking_price,status,advertised_floor,currency,grade,area,vacancy_chance,locked\n"
                                 "Gr\xC3\xBCn,T,\"1\r\na\",70,vacant,69,EUR,1,2,0.5,yes\nA,T,2,80,closed,69,EUR,1,2,0.5,no\n";
        for (qsizetype length = 100; length < bytes.size(); ++length) {
            const MappingPreview preview = previewMapping({bytes.left(length), false}, ownFormatMapping(), 10);
            QCOMPARE(preview.trouble, QString());
            QCOMPARE(preview.rowsInTrouble, qint64(0));
        }
    }

    void distinctValuesAreCounted()
    {
        const QByteArray bytes = "k;unit\nfree;1\nlet;2\nfree ;3\n;4\nfree;\n";
        ImportMapping mapping = ownFormatMapping();
        mapping.delimiter = ';';
        mapping.skip = {{SkipRule::Kind::isEmpty, {"unit", 1}, {}}};
        const auto values = distinctValues({bytes, true}, mapping, {"K", 1}, 10);
        QCOMPARE(values.size(), std::size_t(3));
        QCOMPARE(values[0].text, QStringLiteral("free"));
        QCOMPARE(values[0].count, qint64(2));
        QCOMPARE(values[2].text, QString());
        QCOMPARE(distinctValues({bytes, true}, mapping, {"k", 1}, 1).size(), std::size_t(1));
        QVERIFY(distinctValues({bytes, true}, mapping, {"none", 1}, 10).empty());
    }

    // Each status has a word in each of the seven languages (from memory, of everyday use).
    void statusWords()
    {
        for (const char* word : {"Available", "frei", "libre", "Disponible", "libero", "vrij", "livre", "VERFÜGBAR"})
            QCOMPARE(statusOfTradeWord(QString::fromUtf8(word)), std::optional(Status::vacant));
        for (const char* word : {"Occupied", "vermietet", "Occupé", "loué", "ocupada", "affittato", "verhuurd", "alugado"})
            QCOMPARE(statusOfTradeWord(QString::fromUtf8(word)), std::optional(Status::occupied));
        for (const char* word : {"Reserved", "reserviert", "réservée", "reservado", "prenotato", "gereserveerd"})
            QCOMPARE(statusOfTradeWord(QString::fromUtf8(word)), std::optional(Status::reserved));
        for (const char* word :
             {"Out of service", "gesperrt", "außer Betrieb", "hors service", "fuera de servicio", "chiuso", "gesloten", "fechado"})
            QCOMPARE(statusOfTradeWord(QString::fromUtf8(word)), std::optional(Status::closed));
        QVERIFY(!statusOfTradeWord(QStringLiteral("blau")));
    }
};

QTEST_GUILESS_MAIN(TestMapping)
#include "test_mapping.moc"
