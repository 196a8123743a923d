// SPDX-License-Identifier: GPL-3.0-or-later
// Lists of other systems on the command line: --mapping and --floors give what the same data in our own format gives.
#include "program.h"

#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

namespace
{

const QString kFolder = QStringLiteral(RUNGWRIGHT_TEST_DATA "/app/files/mapped/");

QStringList mapped(const QString& name)
{
    QStringList arguments{kFolder + name + QStringLiteral(".csv"), QStringLiteral("--mapping"),
                          kFolder + name + QStringLiteral(".mapping.json")};
    if (name == QLatin1String("7-total"))
        arguments << QStringLiteral("--floors") << kFolder + name + QStringLiteral(".floors.csv");
    return arguments;
}

} // namespace

class TestHeadlessMapping : public QObject
{
    Q_OBJECT

private slots:
    void sameBytesAsOwnFormat_data()
    {
        QTest::addColumn<QString>("name");
        for (const char* name : {"1-german", "2-tab", "3-grouped", "4-french", "5-two-lines", "6-odd-order", "7-total", "8-quotes"})
            QTest::newRow(name) << QString::fromLatin1(name);
    }
    void sameBytesAsOwnFormat()
    {
        QFETCH(QString, name);
        for (const QStringList& command : {QStringList{"scan"}, QStringList{"measure", "--json"}}) {
            const Ran theirs = run(command.mid(0, 1) + mapped(name) + command.mid(1));
            QVERIFY2(theirs.status == 0, theirs.message);
            const Ran own = run(command.mid(0, 1) + QStringList{kFolder + name + ".own.csv"} + command.mid(1));
            QVERIFY2(own.status == 0, own.message);
            QVERIFY(!theirs.out.isEmpty());
            QCOMPARE(theirs.out, own.out);
        }
    }

    void sheetAndPictureTakeItToo()
    {
        const QStringList ladder{"--site", "Kleidervaart", "--tier", "Box S"};
        const QString sheet = m_dir.filePath("sheet.csv");
        const Ran wrote = run(QStringList{"sheet"} + mapped("7-total") + ladder + QStringList{"--candidate", "current", "--out", sheet});
        QVERIFY2(wrote.status == 0, wrote.message);
        QVERIFY(contents(sheet).startsWith("site,tier,unit,"));
        QVERIFY2(wrote.message.contains("7-total.csv: rows passed over because 'Nummer' begins with 'Totaal': 1, the first on line 16"),
                 wrote.message);
        const QString picture = m_dir.filePath("bench.svg");
        const Ran drew = run(QStringList{"picture"} + mapped("7-total") + ladder + QStringList{"--out", picture});
        QVERIFY2(drew.status == 0, drew.message);
        QVERIFY(contents(picture).contains("<svg"));
    }

    void refusals()
    {
        const auto status = [](const QStringList& arguments, int want, const QByteArray& words) {
            const Ran ran = run(arguments);
            QVERIFY2(ran.message.contains(words), ran.message);
            QCOMPARE(ran.status, want);
            QVERIFY(ran.out.isEmpty());
        };
        const QString list = kFolder + "7-total.csv";
        const QString profile = kFolder + "7-total.mapping.json";
        status({"scan", list, "--floors", "x.csv"}, 2, "--floors is for a mapped list: --mapping is missing");
        status({"scan", list, "--mapping", ""}, 2, "--mapping names no file");
        status({"scan", list, "--mapping", "no-such.mapping.json"}, 3, "no-such.mapping.json");
        status({"scan", list, "--mapping", list}, 3, "7-total.csv:1: character 1: not valid JSON");
        status({"scan", list, "--mapping", profile}, 3, "the mapping takes the floors from a second file, and none was given");
        status({"scan", list, "--mapping", profile, "--floors", "no-such.csv"}, 3, "no-such.csv");
        status({"scan", kFolder + "1-german.csv", "--mapping", kFolder + "2-tab.mapping.json"}, 3, "1-german.csv:");
        status({"measure", sample("quillmere-storage.rungs.json"), "--mapping", profile}, 3, "is a scenario, which is read as it is");
        status({"scan", list}, 3, "7-total.csv:1: the header row lacks");
    }

private:
    QTemporaryDir m_dir;
};

QTEST_GUILESS_MAIN(TestHeadlessMapping)
#include "test_headless_mapping.moc"
