// SPDX-License-Identifier: GPL-3.0-or-later
// Signing off by mouse and keys: what is shown, what leaves, and what stands in the ledger afterwards.
#include "caution.h"
#include "compared_tier.h"
#include "desk_fixture.h"
#include "ledger.h"
#include "price_sheet.h"
#include "scenario_json.h"
#include "signoff_page.h"
#include "table_text.h"

#include <QAbstractItemModelTester>
#include <QAccessible>
#include <QAction>
#include <QCheckBox>
#include <QClipboard>
#include <QComboBox>
#include <QCryptographicHash>
#include <QGuiApplication>
#include <QHeaderView>
#include <QLineEdit>
#include <QPushButton>
#include <QSpinBox>
#include <QSqlDatabase>
#include <QSqlQuery>

using namespace rungwright;

namespace
{

/// While a file is asked for, something else happens.
class MeddledQuestions : public PresetQuestions
{
public:
    std::function<void()> meanwhile;
    QString savePath(QWidget* parent, const QString& title, const QString& suggestion, const QString& filter) override
    {
        if (meanwhile)
            std::exchange(meanwhile, nullptr)();
        return PresetQuestions::savePath(parent, title, suggestion, filter);
    }
};

} // namespace

class SignOffGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void initTestCase() { QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom)); }
    void init()
    {
        m_desk = std::make_unique<DeskFixture>();
        Scenario scenario = comparedScenario();
        scenario.rules.points.step = Price{100};
        scenario.rules.greatestChange = Price{500};
        m_file = m_desk->folder.filePath(QStringLiteral("tern.rungs.json"));
        QVERIFY(saveScenario(scenario, m_file).ok());
        QVERIFY(m_desk->open(m_file));
    }
    void cleanup() { m_desk.reset(); }

    void theKeyLeadsThereAndFiguresMakeRoom();
    void theChosenLadderIsShown();
    void checksSayWhatTheyAre();
    void theTableSortsAndCopies();
    void remindersFollowTheBoxes();
    void nobodySignsWithoutAName();
    void signedOffAndFoundInTheLedger();
    void aSheetAloneIsNotEntered();
    void aSampleIsSavedFirst();
    void aLedgerThatCannotBeWrittenLosesNothing();
    void anEntryThatIsRefusedIsSaid();
    void aTrialOnTheBenchIsNotSigned();
    void aLadderThatChangesMeanwhileIsNotWritten();
    void theReportIsWritten();

private:
    void goThere()
    {
        QTest::keyClick(m_desk->window.get(), Qt::Key_5, Qt::ControlModifier);
        QTRY_VERIFY(page().isVisible());
    }
    SignOffPage& page() { return m_desk->child<SignOffPage>("signOffPage"); }
    QString check(int row) { return m_desk->child<QLabel>(qPrintable(QStringLiteral("check%1").arg(row))).accessibleName(); }
    QString said() { return m_desk->child<QLabel>("signOffResult").text(); }
    QTableView& table() { return m_desk->child<QTableView>("changesTable"); }
    void click(const char* name) { QTest::mouseClick(&m_desk->child<QPushButton>(name), Qt::LeftButton); }
    void typeName(const QString& name)
    {
        auto& who = m_desk->child<QLineEdit>("whoEdit");
        who.setFocus();
        QTest::keyClicks(&who, name);
    }
    /// "Lower end", as the drop-down offers it, by keys.
    void pickLowerEnd()
    {
        auto& box = m_desk->child<QComboBox>("ladderBox");
        box.setFocus();
        QTest::keyClick(&box, Qt::Key_Home);
        QTest::keyClick(&box, Qt::Key_Down);
        QCOMPARE(page().shown()->ladder, QStringLiteral("Lower end"));
    }

    std::unique_ptr<DeskFixture> m_desk;
    QString m_file;
};

void SignOffGuiTest::theKeyLeadsThereAndFiguresMakeRoom()
{
    QVERIFY(m_desk->window->figuresDock().isVisible());
    goThere();
    QVERIFY(!m_desk->window->figuresDock().isVisible());
    m_desk->window->resetLayout();
    QVERIFY(!m_desk->window->figuresDock().isVisible() && !m_desk->window->reshapeDock().isVisible());
    QVERIFY(m_desk->window->worklistDock().isVisible());
    QCOMPARE(m_desk->child<QLabel>("signOffCaution").text(), cautionText());
    QTest::keyClick(m_desk->window.get(), Qt::Key_1, Qt::ControlModifier);
    QTRY_VERIFY(m_desk->window->figuresDock().isVisible());
}

void SignOffGuiTest::theChosenLadderIsShown()
{
    goThere();
    QCOMPARE(page().shown()->candidate, -1); // nothing chosen, nothing worked on
    QVERIFY(m_desk->child<QLabel>("keySentence").text().contains(QStringLiteral("No price changes")));
    pickLowerEnd();
    // By hand, see compared_tier.h: 12.50 to 5.00; A-1 from 80.00 to 70.00 is the one change.
    QCOMPARE(
        m_desk->child<QLabel>("keySentence").text(),
        QStringLiteral("The gap narrows from 12.50 to 5.00. New prices for 1 of 4 units; the asking total on offer changes by −10.00."));
    m_desk->window->document().chooseCandidate(0, 1);
    QTRY_COMPARE(page().shown()->ladder, QStringLiteral("Steeper"));
}

void SignOffGuiTest::checksSayWhatTheyAre()
{
    goThere();
    pickLowerEnd();
    QVERIFY2(check(0).contains(QStringLiteral("holds")) && check(0).contains(QStringLiteral("70.00")), qPrintable(check(0)));
    QVERIFY2(check(1).contains(QStringLiteral("not checked")), qPrintable(check(1))); // no least share is set
    QVERIFY2(check(1).contains(QStringLiteral("50")), qPrintable(check(1)));          // 1 of 2
    QVERIFY2(check(3).contains(QStringLiteral("holds")), qPrintable(check(3)));
    QVERIFY2(check(4).contains(QStringLiteral("look at this")), qPrintable(check(4))); // 10.00 where 5.00 is allowed
    QVERIFY2(check(6).contains(QStringLiteral("holds")), qPrintable(check(6)));
    // One of three rentable units is taken, so the load is known: how long the floor stays is judged once a least time is set.
    QVERIFY2(check(2).contains(QStringLiteral("not checked")), qPrintable(check(2)));
    auto& least = m_desk->child<QSpinBox>("leastTimeBox");
    least.setFocus();
    least.selectAll();
    QTest::keyClicks(&least, QStringLiteral("1"));
    QTest::keyClick(&least, Qt::Key_Tab);
    QVERIFY2(check(2).contains(QStringLiteral("holds")), qPrintable(check(2)));
    least.setValue(100);
    QVERIFY2(check(2).contains(QStringLiteral("look at this")), qPrintable(check(2)));
    least.setValue(0);
}

void SignOffGuiTest::theTableSortsAndCopies()
{
    goThere();
    pickLowerEnd();
    QAbstractItemModelTester tester(table().model());
    QCOMPARE(table().model()->rowCount(), 1);
    QVERIFY(!table().isColumnHidden(SheetModel::ruleColumn));
    QCOMPARE(table().model()->index(0, SheetModel::ruleColumn).data().toString(), QStringLiteral("greatest change, money"));
    QTest::mouseClick(&m_desk->child<QCheckBox>("onlyChangedBox"), Qt::LeftButton, {}, QPoint(8, 8));
    QCOMPARE(table().model()->rowCount(), 4);
    const QHeaderView* header = table().horizontalHeader();
    const QPoint to(header->sectionViewportPosition(SheetModel::toColumn) + 8, header->height() / 2);
    QTest::mouseClick(header->viewport(), Qt::LeftButton, {}, to);
    QTest::mouseClick(header->viewport(), Qt::LeftButton, {}, to);
    QCOMPARE(table().model()->index(0, SheetModel::unitColumn).data().toString(), QStringLiteral("=B-4")); // 110.00, greatest first
    click("copyChangesButton");
    const QString copied = QGuiApplication::clipboard()->text();
    QVERIFY2(copied.contains(QStringLiteral("'=B-4")), qPrintable(copied));
    auto& last = m_desk->child<QLabel>("lastAction");
    QVERIFY(last.text().contains(cautionText()));
    // Who listens hears the sentence, not what the label is called.
    QCOMPARE(QAccessible::queryAccessibleInterface(&last)->text(QAccessible::Name), last.text());
}

void SignOffGuiTest::remindersFollowTheBoxes()
{
    goThere();
    const auto text = [this] { return m_desk->child<QLabel>("remindersLabel").text(); };
    QVERIFY(!text().contains(QStringLiteral("238.3")));
    QVERIFY(text().contains(QStringLiteral("not a verdict")));
    auto& us = m_desk->child<QCheckBox>("place-us");
    us.setFocus();
    QTest::keyClick(&us, Qt::Key_Space);
    QVERIFY(text().contains(QStringLiteral("238.3")));
    QVERIFY(text().contains(QStringLiteral("(From memory.)")));
    QVERIFY(!text().contains(QStringLiteral("2005/29")));
    QCOMPARE(m_desk->settings.value(QStringLiteral("signoff/jurisdictions")).toStringList(), QStringList{QStringLiteral("us")});
}

void SignOffGuiTest::nobodySignsWithoutAName()
{
    goThere();
    pickLowerEnd();
    click("signButton");
    QVERIFY(said().contains(QStringLiteral("say who signs")));
    QVERIFY(!m_desk->window->document().tier(0)->signedOff);
    QVERIFY(!QFile::exists(ledgerPathFor(m_file)));
}

void SignOffGuiTest::signedOffAndFoundInTheLedger()
{
    goThere();
    pickLowerEnd();
    typeName(QStringLiteral("Ines Okafor"));
    auto& note = m_desk->child<QLineEdit>("noteEdit");
    QTest::keyClick(&m_desk->child<QLineEdit>("whoEdit"), Qt::Key_Tab);
    QVERIFY(note.hasFocus());
    QTest::keyClicks(&note, QStringLiteral("winter"));
    const QString sheet = m_desk->folder.filePath(QStringLiteral("sheet.csv"));
    m_desk->questions.nextPath = sheet;
    click("signButton");
    QVERIFY2(said().contains(QStringLiteral("Signed off")), qPrintable(said()));
    QVERIFY(m_desk->window->document().tier(0)->signedOff);

    const auto ledger = Ledger::open(ledgerPathFor(m_file), Ledger::For::reading);
    QVERIFY(ledger.ok());
    const auto last = ledger.value().lastOf("Tern Wharf (invented)", "Box 4");
    QVERIFY(last.ok() && last.value());
    const SignOff& entry = *last.value();
    QCOMPARE(entry.who, std::string("Ines Okafor"));
    QCOMPARE(entry.note, std::string("winter"));
    QCOMPARE(entry.candidate, std::string("Lower end"));
    QCOMPARE(entry.units.size(), std::size_t(4));
    QVERIFY(entry.units[0].before == Price{8000} && entry.units[0].after == Price{7000});
    QCOMPARE(entry.whenUtc, m_desk->window->document().tier(0)->signedOff->whenUtc);
    QCOMPARE(entry.checks.size(), std::size_t(7));
    QVERIFY(entry.checks[4].outcome == CheckOutcome::lookAtThis);
    const auto gap = std::ranges::find(entry.figures, std::string(kLedgerGap), &LedgerFigure::key);
    QVERIFY(gap != entry.figures.end());
    QCOMPARE(*gap->before, 1250.0); // by hand, see compared_tier.h
    QCOMPARE(*gap->after, 500.0);
    // The hash is that of the file, whoever computes it.
    QFile file(sheet);
    QVERIFY(file.open(QIODevice::ReadOnly));
    QCOMPARE(entry.sheetSha256, QCryptographicHash::hash(file.readAll(), QCryptographicHash::Sha256).toHex().toStdString());
    QCOMPARE(m_desk->settings.value(QStringLiteral("signoff/who")).toString(), QStringLiteral("Ines Okafor"));

    QCOMPARE(note.text(), QStringLiteral("winter")); // a report made now has it, too
    QTest::keyClick(m_desk->window.get(), Qt::Key_6, Qt::ControlModifier);
    QTRY_COMPARE(m_desk->child<QTableView>("signOffTable").model()->rowCount(), 1);
    QTRY_VERIFY(m_desk->child<QLabel>("entrySentence").text().contains(QStringLiteral("Ines Okafor")));
    QVERIFY(m_desk->child<QLabel>("entrySentence").text().contains(QStringLiteral("winter")));
    QCOMPARE(m_desk->child<QTableView>("historyChangesTable").model()->rowCount(), 1);
}

void SignOffGuiTest::aSheetAloneIsNotEntered()
{
    goThere();
    pickLowerEnd();
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("sheet"));
    click("sheetButton");
    QVERIFY2(said().contains(QStringLiteral("Not signed off")), qPrintable(said()));
    QVERIFY(QFile::exists(m_desk->folder.filePath(QStringLiteral("sheet.csv"))));
    QVERIFY(m_desk->window->document().tier(0)->signedOff); // what left is remembered
    QVERIFY(!QFile::exists(ledgerPathFor(m_file)));
    QTest::keyClick(m_desk->window.get(), Qt::Key_Z, Qt::ControlModifier);
    QVERIFY(!m_desk->window->document().tier(0)->signedOff);
}

void SignOffGuiTest::aSampleIsSavedFirst()
{
    m_desk->window->document().begin(comparedScenario(), QString(), false);
    goThere();
    typeName(QStringLiteral("Ines Okafor"));
    click("signButton"); // the question is answered with "not now"
    QVERIFY2(said().contains(QStringLiteral("has none yet")), qPrintable(said()));
    QVERIFY(m_desk->questions.asked.last().contains(QStringLiteral("Save the scenario")));
    m_desk->questions.answers = {0};
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("fresh.rungs.json"));
    click("signButton"); // saved, but the sheet's name is not given
    QTRY_VERIFY(QFile::exists(m_desk->folder.filePath(QStringLiteral("fresh.rungs.json"))));
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("fresh.csv"));
    click("signButton");
    QVERIFY2(said().contains(QStringLiteral("Signed off")), qPrintable(said()));
    QVERIFY(QFile::exists(m_desk->folder.filePath(QStringLiteral("fresh.ledger.sqlite"))));
}

void SignOffGuiTest::aLedgerThatCannotBeWrittenLosesNothing()
{
    QFile broken(ledgerPathFor(m_file));
    QVERIFY(broken.open(QIODevice::WriteOnly));
    const QByteArray text("this is no database, and long enough to be looked at as one; it must stay as it is\n");
    broken.write(text.repeated(20));
    broken.close();
    goThere();
    pickLowerEnd();
    typeName(QStringLiteral("Ines Okafor"));
    auto& note = m_desk->child<QLineEdit>("noteEdit");
    note.setText(QStringLiteral("keep me"));
    const QString sheet = m_desk->folder.filePath(QStringLiteral("sheet.csv"));
    m_desk->questions.nextPath = sheet;
    click("signButton");
    QVERIFY2(said().contains(QStringLiteral("no price sheet written")), qPrintable(said()));
    QVERIFY2(said().contains(QStringLiteral("is not a price ledger")), qPrintable(said()));
    QVERIFY(said().startsWith(QStringLiteral("⚠")));
    QVERIFY(!QFile::exists(sheet)); // no price has left
    QVERIFY(!m_desk->window->document().tier(0)->signedOff);
    QCOMPARE(note.text(), QStringLiteral("keep me"));
    QVERIFY(broken.open(QIODevice::ReadOnly));
    QCOMPARE(broken.readAll(), text.repeated(20));
}

void SignOffGuiTest::anEntryThatIsRefusedIsSaid()
{
    QVERIFY(Ledger::open(ledgerPathFor(m_file), Ledger::For::writing).ok());
    {
        auto database = QSqlDatabase::addDatabase(QStringLiteral("QSQLITE"), QStringLiteral("refusing"));
        database.setDatabaseName(ledgerPathFor(m_file));
        QVERIFY(database.open());
        QSqlQuery query(database);
        QVERIFY(query.exec(QStringLiteral("CREATE TRIGGER refuse BEFORE INSERT ON sign_off BEGIN SELECT RAISE(ABORT, 'not today'); END")));
    }
    QSqlDatabase::removeDatabase(QStringLiteral("refusing"));
    goThere();
    pickLowerEnd();
    typeName(QStringLiteral("Ines Okafor"));
    const QString sheet = m_desk->folder.filePath(QStringLiteral("sheet.csv"));
    m_desk->questions.nextPath = sheet;
    click("signButton");
    QVERIFY2(said().contains(QStringLiteral("no entry of it")) && said().contains(QStringLiteral("not today")), qPrintable(said()));
    QVERIFY(said().startsWith(QStringLiteral("⚠")));
    QVERIFY(QFile::exists(sheet));
    QVERIFY(m_desk->window->document().tier(0)->signedOff); // what left is remembered
}

void SignOffGuiTest::aTrialOnTheBenchIsNotSigned()
{
    QVERIFY(m_desk->bench().beginTrial(QStringLiteral("Tried")));
    goThere();
    typeName(QStringLiteral("Ines Okafor"));
    for (const char* name : {"signButton", "sheetButton", "reportButton"}) {
        m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("tried"));
        click(name);
        QVERIFY2(said().contains(QStringLiteral("a ladder is being tried on the bench")), qPrintable(said()));
        QVERIFY(m_desk->bench().gesture() == Workbench::Gesture::trial);
    }
    QVERIFY(m_desk->questions.asked.isEmpty());
    QVERIFY(!m_desk->window->document().tier(0)->signedOff);
    m_desk->bench().giveUpGesture();
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("after"));
    click("sheetButton");
    QVERIFY(QFile::exists(m_desk->folder.filePath(QStringLiteral("after.csv"))));
}

void SignOffGuiTest::aLadderThatChangesMeanwhileIsNotWritten()
{
    Document& document = m_desk->window->document();
    MeddledQuestions questions;
    std::function<bool()> saveFirst = [] { return false; };
    SignOffPage other(m_desk->bench(), questions, m_desk->settings, [&saveFirst] { return saveFirst(); });
    other.resize(1200, 700);
    other.show();
    QVERIFY(QTest::qWaitForWindowExposed(&other));
    const auto press = [&other](const char* name) {
        QTest::mouseClick(other.findChild<QPushButton*>(QLatin1String(name)), Qt::LeftButton);
        return other.findChild<QLabel*>(QStringLiteral("signOffResult"))->text();
    };
    other.findChild<QLineEdit*>(QStringLiteral("whoEdit"))->setText(QStringLiteral("Ines Okafor"));
    const QString target = m_desk->folder.filePath(QStringLiteral("meddled.out"));
    int candidate = 0;
    for (const char* name : {"signButton", "sheetButton", "reportButton"}) {
        questions.nextPath = target;
        questions.meanwhile = [&document, &candidate] { document.chooseCandidate(0, candidate++); };
        const QString said = press(name);
        QVERIFY2(said.contains(QStringLiteral("the ladder changed meanwhile")), qPrintable(said));
        QVERIFY(!QFile::exists(target));
    }
    QCOMPARE(candidate, 3);
    QVERIFY(!QFile::exists(ledgerPathFor(m_file)));

    // And while the scenario is saved first.
    document.begin(comparedScenario(), QString(), false);
    const QString fresh = m_desk->folder.filePath(QStringLiteral("meddled.rungs.json"));
    saveFirst = [&] {
        document.chooseCandidate(0, 0);
        m_desk->questions.nextPath = fresh;
        return m_desk->window->files().save() && m_desk->window->files().saving().finishWriting();
    };
    questions.answers = {0};
    questions.nextPath = target;
    const QString said = press("signButton");
    QVERIFY2(said.contains(QStringLiteral("the ladder changed meanwhile")), qPrintable(said));
    QVERIFY(QFile::exists(fresh) && !QFile::exists(target) && !QFile::exists(ledgerPathFor(fresh)));
}

void SignOffGuiTest::theReportIsWritten()
{
    goThere();
    pickLowerEnd();
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("report"));
    click("reportButton");
    QVERIFY2(said().contains(QStringLiteral("Report written")), qPrintable(said()));
    QFile file(m_desk->folder.filePath(QStringLiteral("report.pdf")));
    QVERIFY(file.open(QIODevice::ReadOnly));
    QVERIFY(file.readAll().startsWith("%PDF-"));
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("no/such/folder/report.pdf"));
    click("reportButton");
    QVERIFY2(said().startsWith(QStringLiteral("⚠")), qPrintable(said()));
}

QTEST_MAIN(SignOffGuiTest)
#include "signoff_gui_test.moc"
