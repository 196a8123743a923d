// SPDX-License-Identifier: GPL-3.0-or-later
// The report, read back by poppler: pages, paper, text that can be found, fonts that travel with it.
#include "caution.h"
#include "compared_tier.h"
#include "report_pdf.h"

#include <QFile>
#include <QProcess>
#include <QRegularExpression>
#include <QStandardPaths>
#include <QTemporaryDir>
#include <QtTest>

using namespace rungwright;

namespace
{

SignOffCase caseOf(const Scenario& scenario, int candidate)
{
    Document document;
    document.begin(scenario, QString(), true);
    return signOffCase(document, 0, candidate, scenario.tiers[0].model, {});
}

ReportFrame frameOf(QPageSize::PageSizeId paper)
{
    ReportFrame frame;
    frame.who = QStringLiteral("Ines Okafor");
    frame.note = QStringLiteral("Winter list");
    frame.when = QStringLiteral("01/12/2026 09:30 (UTC 2026-12-01 09:30)");
    frame.places = QStringList{"us", "us-ca", "eu", "uk", "au", "ca"};
    frame.paper = paper;
    return frame;
}

/// `count` changed units with long names, invented.
Scenario largeScenario(int count)
{
    Scenario scenario = comparedScenario();
    TierCase tierCase = scenario.tiers[0];
    tierCase.tier.site = "Old harbour warehouse at the far end of the northern quay, second building behind the lifting bridge (invented)";
    tierCase.tier.units.clear();
    tierCase.candidates.resize(1);
    tierCase.candidates[0].name = "A candidate whose name says at length what it does to the low end of the ladder and why";
    tierCase.candidates[0].prices.clear();
    for (int i = 0; i < count; ++i) {
        Unit unit;
        unit.name =
            "Room " + std::to_string(i) + (i % 10 == 9 ? " on the second floor of the north wing, behind the goods" : "") + " hoist";
        unit.asking = Price{7000 + 10 * i};
        unit.status = i % 3 == 0 ? Status::vacant : Status::occupied;
        tierCase.tier.units.push_back(unit);
        tierCase.candidates[0].prices.push_back(Price{7000 + 10 * i + 100 + i});
    }
    scenario.tiers = {tierCase};
    return scenario;
}

} // namespace

class ReportPdfTest : public QObject
{
    Q_OBJECT
private slots:
    void initTestCase()
    {
        QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom));
        if (QStandardPaths::findExecutable(QStringLiteral("pdftotext")).isEmpty())
            QSKIP("poppler-utils is not installed: nothing reads the report back");
    }

    void textCanBeFound()
    {
        const Read read = written(caseOf(comparedScenario(), 0), frameOf(QPageSize::A4));
        // By hand, see compared_tier.h: the gap narrows from 12.50 to 5.00, the expected cheapest from 82.50 to 75.00.
        for (const char* wanted :
             {"The gap narrows from 12.50 to 5.00.", "82.50", "75.00", "Tern Wharf (invented)", "Box 4", "Lower end", "Ines Okafor",
              "Winter list", "A-1", "80.00", "70.00", "238.3", "From memory", "not a verdict", "holds", "not checked"})
            QVERIFY2(read.flat.contains(QString::fromUtf8(wanted)), wanted);
        QVERIFY(read.pages >= 2 && read.pages <= 4);
        // A report may be made before anything is signed off, and does not say that it was.
        QVERIFY(read.flat.contains(QStringLiteral("Prepared by Ines Okafor")));
        QVERIFY(read.flat.contains(QStringLiteral("Today New Change")));
        QVERIFY(!read.flat.contains(QStringLiteral("Signed")) && !read.flat.contains(QStringLiteral("as signed")));
    }

    void nobodyNamedAndALongNote()
    {
        ReportFrame frame = frameOf(QPageSize::A4);
        frame.who.clear();
        frame.note = QStringLiteral("harbour ").repeated(90);
        const Read read = written(caseOf(comparedScenario(), -1), frame);
        QVERIFY(read.flat.contains(QStringLiteral("Nobody named")));
        QVERIFY(read.flat.contains(QStringLiteral("(The note is cut here.)")));
        QVERIFY(!read.flat.contains(QStringLiteral("ledger")));
        QVERIFY(!read.flat.contains(QStringLiteral("as signed")));
    }

    void cautionAndNumberOnEveryPage()
    {
        const Read read = written(caseOf(largeScenario(1000), 0), frameOf(QPageSize::A4));
        QCOMPARE(read.pages, 4);
        for (int page = 0; page < read.pages; ++page) {
            const QString flat = read.perPage[page].simplified();
            QVERIFY2(flat.contains(cautionText().simplified()), qPrintable(flat));
            QVERIFY2(flat.contains(QStringLiteral("page %1 of 4").arg(page + 1)), qPrintable(flat));
        }
    }

    void aThousandChangesFitAndAreCounted()
    {
        const Read read = written(caseOf(largeScenario(1000), 0), frameOf(QPageSize::Letter));
        QCOMPARE(read.pages, 4);
        const auto found =
            QRegularExpression(QStringLiteral("The ([0-9,]+) greatest of 1,000 changes; all are in the price sheet")).match(read.flat);
        QVERIFY2(found.hasMatch(), qPrintable(read.flat.right(2000)));
        const int shown = found.captured(1).remove(QLatin1Char(',')).toInt();
        // So many rows are there indeed, and they are the greatest: unit i changes by 1.00 + i minor units. Long names are cut in the
        // middle.
        QCOMPARE(read.flat.count(QStringLiteral("hoist")), shown);
        QVERIFY(shown > 40);
        QVERIFY(read.flat.contains(changeOf(999)));
        QVERIFY(read.flat.contains(changeOf(1000 - shown)));
        QVERIFY(!read.flat.contains(changeOf(1000 - shown - 1)));
    }

    void fewChangesAreAllThere()
    {
        const Read read = written(caseOf(largeScenario(12), 0), frameOf(QPageSize::A4));
        QVERIFY(!read.flat.contains(QStringLiteral("greatest of")));
        QCOMPARE(read.flat.count(QStringLiteral("hoist")), 12);
    }

    void paperIsAsAsked()
    {
        // ISO 216 A4 is 210 x 297 mm = 595.28 x 841.89 points; Letter 8.5 x 11 in = 612 x 792. Qt rounds A4 to whole points.
        QVERIFY(info(caseOf(comparedScenario(), 0), QPageSize::A4).contains(QStringLiteral("595 x 842")));
        QVERIFY(info(caseOf(comparedScenario(), 0), QPageSize::Letter).contains(QStringLiteral("612 x 792")));
        QCOMPARE(paperOf(QLocale(QLocale::English, QLocale::UnitedStates)), QPageSize::Letter);
        QCOMPARE(paperOf(QLocale(QLocale::German, QLocale::Germany)), QPageSize::A4);
    }

    void fontsAreEmbedded()
    {
        const QString path = file(caseOf(comparedScenario(), 0), frameOf(QPageSize::A4));
        const QStringList lines = run(QStringLiteral("pdffonts"), {path}).trimmed().split(QLatin1Char('\n'));
        QVERIFY(lines.size() > 2); // two lines of headings
        for (const QString& line : lines.mid(2))
            QVERIFY2(line.contains(QRegularExpression(QStringLiteral("\\byes +(yes|no) +yes\\b"))), qPrintable(line)); // emb sub uni
    }

    void namesThatReadFromTheRight()
    {
        Scenario scenario = comparedScenario();
        TierCase tierCase = scenario.tiers[0];
        tierCase.tier.site = "رصيف الميناء الشمالي";
        tierCase.tier.units[0].name = "غرفة ١٢ب";
        scenario.tiers = {tierCase};
        const Read read = written(caseOf(scenario, 0), frameOf(QPageSize::A4));
        QVERIFY(read.flat.contains(QStringLiteral("The gap narrows from 12.50 to 5.00.")));
        QVERIFY(read.flat.contains(QStringLiteral("80.00")));
    }

    void nothingChanges()
    {
        const Read read = written(caseOf(comparedScenario(), -1), frameOf(QPageSize::A4));
        QVERIFY(read.flat.contains(QStringLiteral("No price changes.")));
        QVERIFY(read.pages >= 2);
    }

    void nothingOnOffer()
    {
        Scenario scenario = comparedScenario();
        TierCase tierCase = scenario.tiers[0];
        for (Unit& unit : tierCase.tier.units)
            unit.status = Status::occupied;
        scenario.tiers = {tierCase};
        const Read read = written(caseOf(scenario, 0), frameOf(QPageSize::A4));
        QVERIFY(read.flat.contains(QStringLiteral("look at this")));
        QVERIFY(read.flat.contains(QStringLiteral("is not on sale")));
    }

    void wholeOrNotAtAll()
    {
        const QString path = m_folder.filePath(QStringLiteral("no/such/report.pdf"));
        QVERIFY(!writeReport(caseOf(comparedScenario(), 0), frameOf(QPageSize::A4), path).ok());
        QVERIFY(!QFile::exists(path));
    }

private:
    struct Read {
        QString flat; ///< All text, white space folded.
        QStringList perPage;
        int pages = 0;
    };
    /// The change of that unit of largeScenario(), as an amount and not as a percentage.
    static QRegularExpression changeOf(int unit)
    {
        const int minor = 100 + unit;
        return QRegularExpression(QStringLiteral("\\+%1\\.%2 (?!%)").arg(minor / 100).arg(minor % 100, 2, 10, QLatin1Char('0')));
    }
    static QString run(const QString& program, const QStringList& arguments)
    {
        QProcess process;
        process.start(program, arguments);
        if (!process.waitForFinished(60'000) || process.exitCode() != 0)
            qFatal("%s failed: %s", qPrintable(program), process.readAllStandardError().constData());
        return QString::fromUtf8(process.readAllStandardOutput());
    }
    QString file(const SignOffCase& c, const ReportFrame& frame)
    {
        const QString path = m_folder.filePath(QStringLiteral("%1.pdf").arg(++m_count));
        const Outcome<bool> done = writeReport(c, frame, path);
        if (!done.ok())
            qFatal("%s", done.trouble().c_str());
        // Kept where somebody wants to look at them.
        const QString keep = qEnvironmentVariable("RUNGWRIGHT_KEEP_REPORTS");
        if (!keep.isEmpty())
            QFile::copy(path, keep + QLatin1Char('/') + QLatin1String(QTest::currentTestFunction()) + QString::number(m_count) + ".pdf");
        return path;
    }
    Read written(const SignOffCase& c, const ReportFrame& frame)
    {
        const QString text = run(QStringLiteral("pdftotext"), {QStringLiteral("-layout"), file(c, frame), QStringLiteral("-")});
        Read read;
        read.perPage = text.split(QLatin1Char('\f'));
        read.perPage.removeLast(); // a form feed ends every page
        read.pages = static_cast<int>(read.perPage.size());
        read.flat = text.simplified();
        return read;
    }
    QString info(const SignOffCase& c, QPageSize::PageSizeId paper) { return run(QStringLiteral("pdfinfo"), {file(c, frameOf(paper))}); }

    QTemporaryDir m_folder;
    int m_count = 0;
};

QTEST_MAIN(ReportPdfTest)
#include "report_pdf_test.moc"
