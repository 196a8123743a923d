// SPDX-License-Identifier: GPL-3.0-or-later
// CSV lexing: published cases, RFC 4180, malformed input with its place, sizes.
#include "file_helpers.h"
#include "sheet_cells.h"

#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

using Rows = std::vector<std::vector<std::string>>;
Q_DECLARE_METATYPE(Rows)

class TestCsvRecords : public QObject
{
    Q_OBJECT

private slots:
    // Source: csv-spectrum (BSD-2-Clause), commit d30e80f8: its csvs/ and json/ folders.
    void csvSpectrum_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<Rows>("expected");
        QTest::newRow("comma_in_quotes") << QByteArray("first,last,address,city,zip\nJohn,Doe,120 any st.,\"Anytown, WW\",08123")
                                         << Rows{{"first", "last", "address", "city", "zip"},
                                                 {"John", "Doe", "120 any st.", "Anytown, WW", "08123"}};
        const Rows empty{{"a", "b", "c"}, {"1", "", ""}, {"2", "3", "4"}};
        QTest::newRow("empty") << QByteArray("a,b,c\n1,\"\",\"\"\n2,3,4") << empty;
        QTest::newRow("empty_crlf") << QByteArray("a,b,c\r\n1,\"\",\"\"\r\n2,3,4") << empty;
        QTest::newRow("escaped_quotes") << QByteArray("a,b\n1,\"ha \"\"ha\"\" ha\"\n3,4\n")
                                        << Rows{{"a", "b"}, {"1", "ha \"ha\" ha"}, {"3", "4"}};
        QTest::newRow("json") << QByteArray("key,val\n1,\"{\"\"type\"\": \"\"Point\"\", \"\"coordinates\"\": [102.0, 0.5]}\"\n")
                              << Rows{{"key", "val"}, {"1", R"({"type": "Point", "coordinates": [102.0, 0.5]})"}};
        QTest::newRow("newlines") << QByteArray("a,b,c\n1,2,3\n\"Once upon \na time\",5,6\n7,8,9\n")
                                  << Rows{{"a", "b", "c"}, {"1", "2", "3"}, {"Once upon \na time", "5", "6"}, {"7", "8", "9"}};
        QTest::newRow("newlines_crlf") << QByteArray("a,b,c\r\n1,2,3\r\n\"Once upon \r\na time\",5,6\r\n7,8,9\r\n")
                                       << Rows{{"a", "b", "c"}, {"1", "2", "3"}, {"Once upon \r\na time", "5", "6"}, {"7", "8", "9"}};
        QTest::newRow("quotes_and_newlines") << QByteArray("a,b\n1,\"ha \n\"\"ha\"\" \nha\"\n3,4\n")
                                             << Rows{{"a", "b"}, {"1", "ha \n\"ha\" \nha"}, {"3", "4"}};
        const Rows simple{{"a", "b", "c"}, {"1", "2", "3"}};
        QTest::newRow("simple") << QByteArray("a,b,c\n1,2,3\n") << simple;
        QTest::newRow("simple_crlf") << QByteArray("a,b,c\r\n1,2,3\r\n") << simple;
        QTest::newRow("utf8") << QByteArray("a,b,c\n1,2,3\n4,5,\xCA\xA4\n")
                              << Rows{{"a", "b", "c"}, {"1", "2", "3"}, {"4", "5", "\xCA\xA4"}};
    }
    void csvSpectrum() { compareRows(); }

    // The points of RFC 4180, section 2, by number.
    void rfc4180_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<Rows>("expected");
        QTest::newRow("1 records end with CRLF")
            << QByteArray("aaa,bbb,ccc\r\nzzz,yyy,xxx\r\n") << Rows{{"aaa", "bbb", "ccc"}, {"zzz", "yyy", "xxx"}};
        QTest::newRow("2 no line end after the last")
            << QByteArray("aaa,bbb,ccc\r\nzzz,yyy,xxx") << Rows{{"aaa", "bbb", "ccc"}, {"zzz", "yyy", "xxx"}};
        QTest::newRow("4 spaces are part of a cell")
            << QByteArray(" a , b,c \r\n\t,  ,x\r\n") << Rows{{" a ", " b", "c "}, {"\t", "  ", "x"}};
        QTest::newRow("4 a comma at the end opens a cell") << QByteArray("a,b,\r\n") << Rows{{"a", "b", ""}};
        QTest::newRow("5 quotes or none") << QByteArray("\"aaa\",\"bbb\",\"ccc\"\r\nzzz,yyy,xxx")
                                          << Rows{{"aaa", "bbb", "ccc"}, {"zzz", "yyy", "xxx"}};
        QTest::newRow("6 CRLF, comma inside quotes")
            << QByteArray("\"aaa\",\"b \r\nb,b\",\"ccc\"\r\nzzz,yyy,xxx") << Rows{{"aaa", "b \r\nb,b", "ccc"}, {"zzz", "yyy", "xxx"}};
        QTest::newRow("7 a quote is doubled") << QByteArray("\"aaa\",\"b\"\"bb\",\"ccc\"") << Rows{{"aaa", "b\"bb", "ccc"}};
        QTest::newRow("7 nothing but a quote") << QByteArray("\"\"\"\",\"\"\"\"\"\"") << Rows{{"\"", "\"\""}};
        QTest::newRow("beyond: CR alone") << QByteArray("a,b\rc,d\r") << Rows{{"a", "b"}, {"c", "d"}};
        QTest::newRow("beyond: empty lines are no records") << QByteArray("\n\na\r\n\r\nb\n\n") << Rows{{"a"}, {"b"}};
        QTest::newRow("beyond: one empty quoted cell is a record") << QByteArray("a\n\"\"\n") << Rows{{"a"}, {""}};
        QTest::newRow("beyond: no records") << QByteArray() << Rows{};
    }
    void rfc4180() { compareRows(); }

    void malformed_data()
    {
        QTest::addColumn<QByteArray>("bytes");
        QTest::addColumn<QString>("begins");
        QTest::addColumn<QString>("remedy");
        // csv-spectrum's location_coordinates is malformed in this way: a bare quote in an unquoted cell.
        QTest::newRow("quote in an unquoted cell") << QByteArray("a,b\n1,19\"\n") << "F:2: character 5: a quotation mark inside a cell"
                                                   << "double";
        QTest::newRow("quote after a space") << QByteArray("a, \"b\"\n") << "F:1: character 4: a quotation mark inside a cell"
                                             << "whole cell in quotation marks";
        QTest::newRow("characters, not bytes") << QByteArray("倉庫,\"é\"x\n") << "F:1: character 7: text after the quotation mark"
                                               << "comma or a line end";
        QTest::newRow("space after a quote") << QByteArray("\"a\" ,b\n") << "F:1: character 4: text after the quotation mark"
                                             << "comma";
        QTest::newRow("after two line ends in quotes") << QByteArray("a,\"x\n\ny\"z\n") << "F:3: character 3: text after the quotation mark"
                                                       << "double it";
        QTest::newRow("ends inside a quote") << QByteArray("a,b\n1,\"2\n3,4\n5,6\n") << "F:2: the file ends inside a quoted cell"
                                             << "cell 2";
        QTest::newRow("ends inside a quote, no line end") << QByteArray("a,b\n1,2\n3,\"") << "F:3: the file ends inside a quoted cell"
                                                          << "Close it";
        QTest::newRow("second quoted cell open") << QByteArray("\"a\nb\",\"c\nd\n") << "F:2: the file ends inside a quoted cell"
                                                 << "cell 2";
        QTest::newRow("open since the record's start") << QByteArray("x\n\"a\nb\n\n") << "F:2: the file ends inside a quoted cell"
                                                       << "cell 1";
        QTest::newRow("NUL") << QByteArray("a,b\n1,\0\n", 8) << "F:2: byte 7 of the file: a NUL"
                             << "UTF-8";
        QTest::newRow("not UTF-8") << QByteArray("a,b\n1,\xE9\n") << "F:2: byte 7 of the file: the bytes E9 0A"
                                   << "UTF-8";
        QTest::newRow("the earlier trouble is told") << QByteArray("a\"\n1,\xE9\n") << "F:1: character 2: a quotation mark"
                                                     << "quotation marks";
    }

    void malformed()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(QString, begins);
        QFETCH(QString, remedy);
        const QString trouble = readRecords(bytes).trouble;
        QVERIFY2(trouble.startsWith(begins), qPrintable(trouble));
        QVERIFY2(trouble.contains(remedy), qPrintable(trouble));
    }

    void linesAreTheFilesOwn()
    {
        // Records start on these lines whatever ends the lines; lines inside quotes count.
        const Records records = readRecords("a\r\n\"b\nb\rb\r\nb\"\nc\r\rd\n\n\ne");
        QCOMPARE(records.trouble, QString());
        QCOMPARE(records.rows.size(), std::size_t(5));
        QCOMPARE(records.lines, (std::vector<qint64>{1, 2, 6, 8, 11}));
    }

    // Random records, every cell in quotes as this test writes them; the lexer must give them back in whatever pieces they come.
    void randomRecordsInPieces()
    {
        Dice dice(4180);
        for (int round = 0; round < 60; ++round) {
            Rows rows;
            std::vector<qint64> lines;
            std::string text;
            qint64 line = 1;
            for (int r = dice.whole(1, 8); r > 0; --r) {
                std::vector<std::string> row;
                lines.push_back(line);
                for (int c = dice.whole(1, 5); c > 0; --c) {
                    std::string cell = oddText(dice, 12);
                    std::erase(cell, '\r'); // Counted below by LF alone.
                    line += std::count(cell.begin(), cell.end(), '\n');
                    text += row.empty() ? "\"" : ",\"";
                    for (const char ch : cell)
                        text += ch == '"' ? std::string("\"\"") : std::string(1, ch);
                    text += '"';
                    row.push_back(std::move(cell));
                }
                text += dice.coin() ? "\n" : "\r\n";
                ++line;
                rows.push_back(std::move(row));
            }
            for (const std::size_t size : {1U, 2U, 3U, 7U, 64U, 100000U}) {
                const Records records = lexInPieces(text, size);
                QCOMPARE(records.trouble, QString());
                QVERIFY(records.rows == rows);
                QCOMPARE(records.lines, lines);
            }
        }
    }

    void troubleIsTheSameInPieces()
    {
        for (const std::string text : {"a,b\r\n1,\"x\r\ny\"z\r\n", "a,b\n1,\"2\n", "é,倉\"\n", "a\r\rb\r\"c"}) {
            const Records whole = lexInPieces(text, 1000);
            QVERIFY(!whole.trouble.isEmpty());
            for (std::size_t size = 1; size < text.size(); ++size) {
                const Records records = lexInPieces(text, size);
                QCOMPARE(records.trouble, whole.trouble);
                QVERIFY(records.rows == whole.rows);
            }
        }
    }

    void sizes()
    {
        // A cell of 1 MB is taken, one byte more is not; the same for the count of cells.
        const QByteArray longest(qsizetype(kLongestCell), 'x');
        QCOMPARE(readRecords("a,\"" + longest + "\"\n").trouble, QString());
        QVERIFY(readRecords("a\nb," + longest + "x\n").trouble.startsWith(QStringLiteral("F:2: ")));
        QVERIFY(readRecords("a\nb,\"" + longest + "x\"\n").trouble.contains(QStringLiteral("1 MB")));
        QCOMPARE(readRecords(QByteArray(qsizetype(kMostCells) - 1, ',')).trouble, QString());
        QVERIFY(readRecords("a\n" + QByteArray(qsizetype(kMostCells), ','))
                    .trouble.startsWith(QStringLiteral("F:2: the row has more than 1000 cells")));
        QByteArray longRow = longest;
        for (int i = 0; i < 8; ++i)
            longRow += ',' + longest;
        QVERIFY(readRecords(longRow).trouble.contains(QStringLiteral("a row at most 8 MB")));
    }

    // A quotation mark that is never closed must not swallow the rest of a large file before it is noticed.
    void openQuoteInALargeFileIsNoticedSoon()
    {
        QByteArray bytes = "a,b\nc,\"d\n";
        for (int i = 0; i < 400'000; ++i)
            bytes += "some,other\n";
        const QString trouble = readRecords(bytes).trouble;
        QVERIFY2(trouble.startsWith(QStringLiteral("F:2: cell 2 is longer than 1 MB")), qPrintable(trouble));
    }

    void stopsWhenAsked()
    {
        QBuffer buffer;
        buffer.setData("a\nb\nc\n");
        buffer.open(QIODevice::ReadOnly);
        int seen = 0;
        const CsvEnd end = readCsv(buffer, QStringLiteral("F"), [&seen](qint64, std::span<const std::string_view>) { return ++seen < 2; });
        QCOMPARE(seen, 2);
        QCOMPARE(end.trouble, QString());
    }

private:
    static void compareRows()
    {
        QFETCH(QByteArray, bytes);
        QFETCH(Rows, expected);
        const Records records = readRecords(bytes);
        QCOMPARE(records.trouble, QString());
        QVERIFY(records.rows == expected);
        for (const std::size_t size : {1U, 2U, 5U})
            QVERIFY(lexInPieces(std::string_view(bytes.constData(), static_cast<std::size_t>(bytes.size())), size).rows == expected);
    }
};

QTEST_GUILESS_MAIN(TestCsvRecords)
#include "test_csv_records.moc"
