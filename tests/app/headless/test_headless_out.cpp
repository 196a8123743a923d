// SPDX-License-Identifier: GPL-3.0-or-later
// What the commands write: price sheets, worklists, pictures; whole or not at all, and what happens when it cannot be written.
#include "program.h"

#include "price_sheet.h"
#include "scenario_json.h"

#include <QDir>
#include <QImage>
#include <QSvgRenderer>
#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

namespace
{

const QString kSite = QStringLiteral("Quillmere Quay");
const QString kTier = QStringLiteral("Room 4 m²");

QStringList ladder(const char* command, const QString& out)
{
    return {QString::fromLatin1(command), sample("quillmere-storage.rungs.json"),
            QStringLiteral("--site"),     kSite,
            QStringLiteral("--tier"),     kTier,
            QStringLiteral("--out"),      out};
}

QStringList sheetOf(const QString& candidate, const QString& out)
{
    return ladder("sheet", out) + QStringList{QStringLiteral("--candidate"), candidate};
}

} // namespace

class TestHeadlessOut : public QObject
{
    Q_OBJECT

private slots:
    void everySheetReadsBack_data();
    void everySheetReadsBack();
    void sheetSaysTheCaution();
    void worklistFileIsWhatIsPrinted();
    void pictures_data();
    void pictures();
    void nothingIsLeftWhereItCannotWrite();
    void devicesAreNotReplaced();
    void fullOrClosedStandardOutput();
    void fullDisk();

private:
    QTemporaryDir m_dir;
    QString path(const QString& name) const { return m_dir.filePath(name); }
};

void TestHeadlessOut::everySheetReadsBack_data()
{
    QTest::addColumn<QString>("file");
    const QStringList samples =
        QDir(QStringLiteral(RUNGWRIGHT_SAMPLES)).entryList({QStringLiteral("*.rungs.json")}, QDir::Files, QDir::Name);
    QVERIFY(!samples.isEmpty());
    for (const QString& name : samples)
        QTest::newRow(qPrintable(name)) << QStringLiteral(RUNGWRIGHT_SAMPLES "/") + name;
}

void TestHeadlessOut::everySheetReadsBack()
{
    QFETCH(QString, file);
    const auto scenario = loadScenario(file);
    QVERIFY(scenario.ok());
    const QString out = path(QStringLiteral("sheet.csv"));
    for (const TierCase& tierCase : scenario.value().tiers) {
        for (int candidate = -1; candidate < int(tierCase.candidates.size()); ++candidate) {
            const QString name =
                candidate < 0 ? QStringLiteral("current") : QString::fromStdString(tierCase.candidates[std::size_t(candidate)].name);
            const Ran ran = run({QStringLiteral("sheet"), file, QStringLiteral("--site"), QString::fromStdString(tierCase.tier.site),
                                 QStringLiteral("--tier"), QString::fromStdString(tierCase.tier.name), QStringLiteral("--candidate"), name,
                                 QStringLiteral("--out"), out});
            QVERIFY2(ran.status == 0, ran.message);
            const auto rows = sheetFromCsv(contents(out), out);
            QVERIFY2(rows.ok(), rows.ok() ? "" : rows.trouble().c_str());
            QVERIFY(rows.value() == sheetRows(scenario.value(), tierCase, candidate));
            QCOMPARE(rows.value().size(), tierCase.tier.units.size());
        }
    }
}

void TestHeadlessOut::sheetSaysTheCaution()
{
    const Ran ran = run(sheetOf(QStringLiteral("Even steps"), path(QStringLiteral("caution.csv"))));
    QCOMPARE(ran.status, 0);
    QVERIFY(ran.out.isEmpty());
    for (const char* word : {"regulated", "counsel", "own data"})
        QVERIFY2(ran.message.contains(word), ran.message);
    const QByteArray once = contents(path(QStringLiteral("caution.csv")));
    QVERIFY(once.startsWith("site,tier,unit,status,current_price,new_price,change,change_percent,currency,candidate\r\n"));
    // Again over what is there: the same bytes.
    QCOMPARE(run(sheetOf(QStringLiteral("Even steps"), path(QStringLiteral("caution.csv")))).status, 0);
    QCOMPARE(contents(path(QStringLiteral("caution.csv"))), once);
}

void TestHeadlessOut::worklistFileIsWhatIsPrinted()
{
    const Ran printed = run({QStringLiteral("scan"), sample("edge-cases.rungs.json")});
    QCOMPARE(printed.status, 0);
    const Ran filed =
        run({QStringLiteral("scan"), sample("edge-cases.rungs.json"), QStringLiteral("--out"), path(QStringLiteral("worklist.csv"))});
    QCOMPARE(filed.status, 0);
    QVERIFY(filed.out.isEmpty());
    QCOMPARE(contents(path(QStringLiteral("worklist.csv"))), printed.out);
}

void TestHeadlessOut::pictures_data()
{
    QTest::addColumn<QString>("ending");
    for (const char* ending : {"png", "svg", "pdf", "PNG"})
        QTest::newRow(ending) << QString::fromLatin1(ending);
}

void TestHeadlessOut::pictures()
{
    QFETCH(QString, ending);
    const QString file = path(QStringLiteral("bench.") + ending);
    const QStringList arguments = ladder("picture", file) + QStringList{QStringLiteral("--candidate"), QStringLiteral("Even steps")};
    const Ran ran = run(arguments);
    QVERIFY2(ran.status == 0, ran.message);
    const QByteArray bytes = contents(file);
    if (ending.toLower() == QLatin1String("png")) {
        const QImage image = QImage::fromData(bytes, "PNG");
        QVERIFY(image.width() >= 800 && image.height() >= 500);
        // Something is drawn: paper, ink, the gap, the floor, at the least.
        QSet<QRgb> colours;
        for (int y = 0; y < image.height(); y += 3)
            for (int x = 0; x < image.width(); x += 3)
                colours += image.pixel(x, y);
        QVERIFY2(colours.size() >= 8, qPrintable(QString::number(colours.size())));
    } else if (ending == QLatin1String("svg")) {
        QSvgRenderer drawing(bytes);
        QVERIFY(drawing.isValid());
        QVERIFY(drawing.defaultSize().width() >= 400);
    } else {
        QVERIFY(bytes.startsWith("%PDF-"));
        QVERIFY(bytes.trimmed().endsWith("%%EOF"));
    }
    const Ran again = run(arguments);
    QCOMPARE(again.status, 0);
    QVERIFY2(contents(file) == bytes, "two runs gave different bytes");
}

void TestHeadlessOut::nothingIsLeftWhereItCannotWrite()
{
    const QString nowhere = path(QStringLiteral("no-such-folder/"));
    const QList<QStringList> lines{
        {QStringLiteral("scan"), sample("quillmere-storage.csv"), QStringLiteral("--out"), nowhere + QStringLiteral("worklist.csv")},
        sheetOf(QStringLiteral("current"), nowhere + QStringLiteral("sheet.csv")),
        ladder("picture", nowhere + QStringLiteral("bench.png")),
        {QStringLiteral("scan"), sample("quillmere-storage.csv"), QStringLiteral("--out"), m_dir.path()},
    };
    for (const QStringList& line : lines) {
        const Ran ran = run(line);
        QVERIFY2(ran.status == 4, ran.message);
        QVERIFY2(ran.message.contains(m_dir.path().toUtf8()) && ran.message.contains("cannot be written"), ran.message);
        QVERIFY(!QDir(nowhere).exists());
    }
}

void TestHeadlessOut::devicesAreNotReplaced()
{
    const Ran scan = run({QStringLiteral("scan"), sample("quillmere-storage.csv"), QStringLiteral("--out"), QStringLiteral("/dev/full")});
    QVERIFY2(scan.status == 4, scan.message);
    const Ran sheet = run(sheetOf(QStringLiteral("current"), QStringLiteral("/dev/full")));
    QVERIFY2(sheet.status == 4, sheet.message);
    QVERIFY(!QFileInfo(QStringLiteral("/dev/full")).isFile());
    // A device that takes it is written to.
    const Ran through = runInShell(QStringLiteral("\"$0\" scan \"$1\" --out /dev/stdout"), {sample("quillmere-storage.csv")});
    QVERIFY2(through.status == 0, through.message);
    QCOMPARE(through.out, run({QStringLiteral("scan"), sample("quillmere-storage.csv")}).out);
}

void TestHeadlessOut::fullOrClosedStandardOutput()
{
    const QString file = sample("quillmere-storage.csv");
    for (const QStringList& line :
         {QStringList{QStringLiteral("measure"), file, QStringLiteral("--json")}, QStringList{QStringLiteral("measure"), file},
          QStringList{QStringLiteral("scan"), file}, QStringList{QStringLiteral("--help")}, QStringList{QStringLiteral("--version")},
          QStringList{QStringLiteral("measure"), QStringLiteral("--help")}}) {
        const Ran full = run(line, QStringLiteral("/dev/full"));
        QVERIFY2(full.status == 4, full.message);
        QVERIFY2(full.message.contains("standard output"), full.message);
        const Ran closed = runInShell(QStringLiteral("\"$0\" \"$@\" >&-"), line);
        QVERIFY2(closed.status == 4, closed.message);
        QVERIFY2(closed.message.contains("standard output"), closed.message);
        // With nowhere to tell it the status still does.
        QCOMPARE(runInShell(QStringLiteral("\"$0\" \"$@\" >&- 2>&- <&-"), line).status, 4);
    }
}

void TestHeadlessOut::fullDisk()
{
    // A file size limit stands for a full disk: the write fails part way. 8 blocks of 1024 bytes are less than the worklist's size.
    const QString old = written(path(QStringLiteral("old.csv")), "what was there\n");
    const Ran ran =
        runInShell(QStringLiteral("trap '' XFSZ; ulimit -f 8; \"$0\" scan \"$1\" --out \"$2\""), {sample("import-2400-units.csv"), old});
    QVERIFY2(ran.status == 4, ran.message);
    QCOMPARE(contents(old), QByteArray("what was there\n"));
    const QStringList there = QDir(m_dir.path()).entryList({QStringLiteral("old.csv*")}, QDir::Files);
    QCOMPARE(there, QStringList{QStringLiteral("old.csv")});
}

QTEST_GUILESS_MAIN(TestHeadlessOut)
#include "test_headless_out.moc"
