// SPDX-License-Identifier: GPL-3.0-or-later
// Exit statuses and messages: what the command line takes, what it refuses, and with what words.
#include "program.h"

#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

class TestHeadlessUsage : public QObject
{
    Q_OBJECT

private slots:
    void helpAndVersion();
    void wrongUsage_data();
    void wrongUsage();
    void refusedInput_data();
    void refusedInput();
    void everyRefusedRowIsListed();
    void goesOnWithoutBadRows();
    void tellsKindsOfFileApartByContent();
    void unicodeArguments();
    void namesCannotSteerTheTerminal();
    void deskNeedsADisplay();

private:
    QTemporaryDir m_dir;
    QString path(const QString& name) const { return m_dir.filePath(name); }
};

void TestHeadlessUsage::helpAndVersion()
{
    for (const char* ask : {"--help", "-h"}) {
        const Ran help = run({QString::fromLatin1(ask)});
        QCOMPARE(help.status, 0);
        for (const char* word : {"measure", "scan", "sheet", "picture", "reshape"})
            QVERIFY2(help.out.contains(word), word);
        QVERIFY(help.message.isEmpty());
    }
    for (const char* command : {"measure", "scan", "sheet", "picture", "reshape"}) {
        // Help comes though FILE and everything else is missing.
        const Ran help = run({QString::fromLatin1(command), QStringLiteral("--help")});
        QCOMPARE(help.status, 0);
        QVERIFY(help.out.contains("--currency"));
        QVERIFY(help.message.isEmpty());
    }
    for (const char* ask : {"--version", "-v"}) {
        const Ran version = run({QString::fromLatin1(ask)});
        QCOMPARE(version.status, 0);
        QCOMPARE(version.out, QByteArray("rungwright " RUNGWRIGHT_VERSION "\n"));
    }
}

void TestHeadlessUsage::wrongUsage_data()
{
    QTest::addColumn<QStringList>("arguments");
    QTest::addColumn<QByteArray>("word");
    const QString file = sample("quillmere-storage.rungs.json");
    const QStringList ladder{QStringLiteral("--site"), QStringLiteral("Quillmere Quay"), QStringLiteral("--tier"),
                             QStringLiteral("Room 4 m²")};
    const auto row = [](const char* name, const QStringList& arguments, const char* word) {
        QTest::newRow(name) << arguments << QByteArray(word);
    };
    row("no file", {"measure"}, "FILE is missing");
    row("empty file name", {"measure", ""}, "FILE");
    row("two files", {"measure", file, file}, "one FILE");
    row("unknown option", {"measure", file, "--colour"}, "colour");
    row("unknown short option", {"measure", file, "-q"}, "q");
    row("option of another command", {"scan", file, "--json"}, "json");
    row("value for a flag", {"measure", file, "--json=yes"}, "json");
    row("missing value", {"measure", file, "--site"}, "site");
    row("option twice", {"measure", file, "--model", "unit", "--model", "fitted"}, "more than once");
    row("unknown model", {"measure", file, "--model", "guess"}, "perceived, fitted, remainder, unit, turnover, on-hand");
    row("left 0", {"measure", file, "--left", "0"}, "--left");
    row("left a word", {"measure", file, "--left", "six"}, "'six'");
    row("left not whole", {"measure", file, "--left", "1.5"}, "--left");
    row("left too large", {"measure", file, "--left", "99999999999"}, "--left");
    row("load 0", {"measure", file, "--load", "0"}, "--load");
    row("load not a number", {"measure", file, "--load", "nan"}, "--load");
    row("load endless", {"measure", file, "--load", "inf"}, "--load");
    row("load with a comma", {"measure", file, "--load", "1,5"}, "decimal point");
    row("left for turnover", {"measure", file, "--model", "turnover", "--left", "3"}, "--left has no meaning");
    row("load for perceived", {"measure", file, "--model", "perceived", "--load", "3"}, "--load has no meaning");
    row("unknown currency", {"measure", file, "--currency", "EURO"}, "ISO 4217");
    row("gold is no currency of rents", {"measure", file, "--currency", "XAU"}, "XAU");
    row("no such site", {"measure", file, "--site", "Nowhere"}, "'Quillmere Quay' / 'Room 4 m");
    row("no such tier", {"measure", file, "--tier", "Nothing"}, "'Quillmere Mill' / 'Room 3 m");
    row("site and tier that do not meet", {"measure", file, "--site", "Quillmere Mill", "--tier", "Room 4 m²"}, "holds nothing");
    row("candidate that one tier lacks", {"measure", file, "--candidate", "Even steps"}, "has no candidate 'Even steps'; it has: current");
    row("scan takes one FILE", {"scan", file, file}, "one FILE");
    row("scan over its FILE", {"scan", file, "--out", file}, "overwrite");
    row("sheet without site", {"sheet", file, "--out", path("x.csv")}, "--site is missing");
    row("sheet without candidate", QStringList{"sheet", file, "--out", path("x.csv")} + ladder, "--candidate is missing");
    row("sheet without out", QStringList{"sheet", file, "--candidate", "current"} + ladder, "--out is missing");
    row("sheet over its FILE", QStringList{"sheet", file, "--candidate", "current", "--out", file} + ladder, "overwrite");
    row("picture without out", QStringList{"picture", file} + ladder, "--out is missing");
    row("picture of unknown kind", QStringList{"picture", file, "--out", path("x.gif")} + ladder, ".png, .svg or .pdf");
    row("two files for the desk", {file, file}, "one FILE");
    row("unknown option of the desk", {"--colour"}, "--colour");
}

void TestHeadlessUsage::wrongUsage()
{
    QFETCH(QStringList, arguments);
    QFETCH(QByteArray, word);
    const QByteArray before = contents(sample("quillmere-storage.rungs.json"));
    const Ran ran = run(arguments);
    QVERIFY2(ran.message.contains(word), ran.message);
    QCOMPARE(ran.status, 2);
    QVERIFY(ran.out.isEmpty());
    QCOMPARE(contents(sample("quillmere-storage.rungs.json")), before);
}

void TestHeadlessUsage::refusedInput_data()
{
    QTest::addColumn<QByteArray>("bytes");
    QTest::addColumn<QByteArray>("place"); ///< What stands behind the file's name.
    const QByteArray header = "site,tier,unit,asking_price,status,advertised_floor\n";
    QTest::newRow("empty") << QByteArray() << QByteArray(": ");
    QTest::newRow("header alone") << header << QByteArray(": ");
    QTest::newRow("no such column") << QByteArray("site,tier,unit,price\nA,B,1,2\n") << QByteArray(":1: ");
    QTest::newRow("bad price") << header + "A,B,1,9x,vacant,50\n" << QByteArray(":2: column 'asking_price': ");
    QTest::newRow("bad status on line 3") << header + "A,B,1,90,vacant,50\nA,B,2,90,free,50\n" << QByteArray(":3: column 'status': ");
    QTest::newRow("duplicate unit") << header + "A,B,1,90,vacant,50\nA,B,1,91,vacant,50\n" << QByteArray(":3: column 'unit': ");
    QTest::newRow("two floors") << header + "A,B,1,90,vacant,50\nA,B,2,91,vacant,51\n" << QByteArray(":3: column 'advertised_floor': ");
    QTest::newRow("open quote") << header + "A,B,\"1,90,vacant,50\n" << QByteArray(":2: ");
    QTest::newRow("NUL byte") << header + QByteArray("A,B,1\0,90,vacant,50\n", 20) << QByteArray(":2: ");
    QTest::newRow("Latin-1") << header + "A,B\xE9,1,90,vacant,50\n" << QByteArray(":2: ");
    QTest::newRow("broken JSON") << QByteArray("{\n  \"format\": \"rungwright-scenario\",\n  oops\n}\n") << QByteArray(":3: ");
    QTest::newRow("other JSON") << QByteArray("{\"format\": \"something else\", \"version\": 1}\n") << QByteArray(": ");
    QTest::newRow("a version to come") << QByteArray("{\"format\": \"rungwright-scenario\", \"version\": 999}\n") << QByteArray(": ");
    QTest::newRow("JSON list") << QByteArray("[1, 2]\n") << QByteArray(": ");
}

void TestHeadlessUsage::refusedInput()
{
    QFETCH(QByteArray, bytes);
    QFETCH(QByteArray, place);
    const QString file = written(path(QStringLiteral("input")), bytes);
    for (const char* command : {"measure", "scan"}) {
        const Ran ran = run({QString::fromLatin1(command), file});
        QVERIFY2(ran.message.startsWith(file.toUtf8() + place), ran.message);
        QCOMPARE(ran.status, 3);
        QVERIFY(ran.out.isEmpty());
    }
}

void TestHeadlessUsage::everyRefusedRowIsListed()
{
    const QString file = sample("with-refused-rows.csv");
    const Ran ran = run({QStringLiteral("measure"), file});
    QCOMPARE(ran.status, 3);
    QVERIFY(ran.out.isEmpty());
    // The sample's own page says eight rows; each message names its line.
    for (const int line : {3, 5, 6, 7, 8, 9, 10, 11})
        QVERIFY2(ran.message.contains((file + QStringLiteral(":%1: ").arg(line)).toUtf8()), ran.message);
    QVERIFY2(ran.message.contains("8 rows refused"), ran.message);
    QVERIFY2(ran.message.contains("--without-bad-rows"), ran.message);

    for (const char* gone : {"no-such-file.csv", "/"}) {
        const Ran missing = run({QStringLiteral("measure"), QString::fromLatin1(gone)});
        QCOMPARE(missing.status, 3);
        QVERIFY2(missing.message.startsWith(gone), missing.message);
    }
    const Ran currency =
        run({QStringLiteral("measure"), sample("quillmere-storage.rungs.json"), QStringLiteral("--currency"), QStringLiteral("USD")});
    QCOMPARE(currency.status, 3);
    QVERIFY2(currency.message.contains("EUR"), currency.message);
}

void TestHeadlessUsage::goesOnWithoutBadRows()
{
    const Ran ran = run({QStringLiteral("scan"), sample("with-refused-rows.csv"), QStringLiteral("--without-bad-rows")});
    QCOMPARE(ran.status, 0);
    QVERIFY(ran.message.contains(":3: column 'asking_price'"));
    QCOMPARE(ran.out.count("\r\n"), 1 + 2); // The header and the two tiers of that file.
}

void TestHeadlessUsage::tellsKindsOfFileApartByContent()
{
    const QString csvNamedJson = written(path(QStringLiteral("units.rungs.json")), contents(sample("rimalin-studios.csv")));
    const QString jsonNamedCsv = written(path(QStringLiteral("scenario.csv")), contents(sample("rimalin-studios.rungs.json")));
    const QString jsonWithMark = written(path(QStringLiteral("marked")), "\xEF\xBB\xBF" + contents(sample("rimalin-studios.rungs.json")));
    const Ran plain = run({QStringLiteral("measure"), sample("rimalin-studios.csv"), QStringLiteral("--json")});
    QCOMPARE(plain.status, 0);
    QCOMPARE(run({QStringLiteral("measure"), csvNamedJson, QStringLiteral("--json")}).out, plain.out);

    const Ran scenario = run({QStringLiteral("measure"), sample("rimalin-studios.rungs.json"), QStringLiteral("--json")});
    QCOMPARE(scenario.status, 0);
    QCOMPARE(run({QStringLiteral("measure"), jsonNamedCsv, QStringLiteral("--json")}).out, scenario.out);
    QCOMPARE(run({QStringLiteral("measure"), jsonWithMark, QStringLiteral("--json")}).out, scenario.out);

    // A scenario that is cut off at its beginning is told in a scenario's words.
    const Ran damaged = run({QStringLiteral("measure"), written(path(QStringLiteral("torn.rungs.json")), "format\": 1}\n")});
    QCOMPARE(damaged.status, 3);
    QVERIFY2(damaged.message.contains("JSON"), damaged.message);
}

void TestHeadlessUsage::unicodeArguments()
{
    const QString site = QStringLiteral("縁ノ浜 🏖");
    const QString tier = QStringLiteral("مخزن صغير");
    const QString file = written(path(QStringLiteral("単位 ü.csv")), QStringLiteral("site,tier,unit,asking_price,status,advertised_floor\n"
                                                                                    "%1,%2,Ä-1,90,vacant,50\n%1,other,Ä-1,90,vacant,50\n")
                                                                         .arg(site, tier)
                                                                         .toUtf8());
    const Ran ran =
        run({QStringLiteral("measure"), file, QStringLiteral("--site"), site, QStringLiteral("--tier"), tier, QStringLiteral("--json")});
    QCOMPARE(ran.status, 0);
    // Nothing is said of the locale, though none was set.
    QCOMPARE(ran.message, caution());
    QVERIFY(ran.out.contains(QStringLiteral("\"site\": \"%1\", \"tier\": \"%2\"").arg(site, tier).toUtf8()));
    QVERIFY(!ran.out.contains("other"));
    const Ran dash = run({QStringLiteral("measure"), file, QStringLiteral("--site"), QStringLiteral("-h")});
    QVERIFY2(dash.message.contains("holds nothing of site '-h'"), dash.message);
}

void TestHeadlessUsage::namesCannotSteerTheTerminal()
{
    const QString file = written(path(QStringLiteral("escape.csv")), "site,tier,unit,asking_price,status,advertised_floor\n"
                                                                     "\"A\x1b[2J\",B,1,90,vacant,50\n");
    const Ran table = run({QStringLiteral("measure"), file});
    const Ran refused = run({QStringLiteral("measure"), file, QStringLiteral("--site"), QStringLiteral("C")});
    for (const QByteArray& text : {table.out, table.message, refused.message})
        QVERIFY2(!text.contains('\x1b'), text.toPercentEncoding());
    QCOMPARE(refused.status, 2);
}

void TestHeadlessUsage::deskNeedsADisplay()
{
    const Ran ran = run({sample("quillmere-storage.rungs.json")});
    QCOMPARE(ran.status, 2);
    QVERIFY2(ran.message.contains("no display") && ran.message.contains("measure"), ran.message);
}

QTEST_GUILESS_MAIN(TestHeadlessUsage)
#include "test_headless_usage.moc"
