// SPDX-License-Identifier: GPL-3.0-or-later
// Bringing a list in, handing prices over, saving, leaving, recovering.
#include "caution.h"
#include "desk_fixture.h"
#include "price_sheet.h"
#include "scenario_json.h"

#include <QDialog>
#include <QDropEvent>
#include <QMimeData>
#include <QPushButton>
#include <QTextEdit>

using namespace rungwright;

class FilesGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void init() { m_desk = std::make_unique<DeskFixture>(); }
    void cleanup() { m_desk.reset(); }

    void aCleanListIsImported();
    void aDroppedListWithRefusedRowsIsTakenWithoutThem();
    void givingUpOnRefusedRowsLosesNothing();
    void theSheetIsWrittenReadBackAndEqual();
    void anUnwritablePlaceIsSaidAndNothingIsLost();
    void leavingAsksAboutUnsavedWork();
    void workLeftBehindIsRecovered();
    void worksLeftBehindAreOfferedOneAfterTheOther();
    void editsWhileSavingKeepItModified();
    void closingWaitsForTheSave();
    void savingOverAFileOpenElsewhereAsks();
    void brokenFilesAreExplained_data();
    void brokenFilesAreExplained();
    void whatIsNotPlainlyOursGoesToTheForm_data();
    void whatIsNotPlainlyOursGoesToTheForm();
    void closingWhileReadingIsSafe();

private:
    DeskFixture& desk() { return *m_desk; }
    QDialog* dialog(const char* name)
    {
        for (QWidget* widget : QApplication::topLevelWidgets()) {
            if (widget->isVisible() && widget->objectName() == QLatin1String(name))
                return qobject_cast<QDialog*>(widget);
        }
        return nullptr;
    }
    QString write(const char* name, const QByteArray& bytes)
    {
        const QString path = desk().folder.filePath(QString::fromLatin1(name));
        QFile file(path);
        if (!file.open(QIODevice::WriteOnly) || file.write(bytes) != bytes.size())
            qFatal("cannot write a test file");
        return path;
    }

    std::unique_ptr<DeskFixture> m_desk;
};

void FilesGuiTest::aCleanListIsImported()
{
    QVERIFY(desk().open(desk().sample("import-2400-units.csv")));
    QTRY_VERIFY(!desk().window->document().empty());
    qsizetype units = 0;
    for (const TierCase& tier : desk().window->document().scenario().tiers)
        units += static_cast<qsizetype>(tier.tier.units.size());
    QCOMPARE(units, 2400);
    QVERIFY(desk().window->document().modified());
    QVERIFY(desk().window->document().path().isEmpty());
}

void FilesGuiTest::aDroppedListWithRefusedRowsIsTakenWithoutThem()
{
    QMimeData data;
    data.setUrls({QUrl::fromLocalFile(desk().sample("with-refused-rows.csv"))});
    const QPoint at(400, 400);
    QDragEnterEvent enter(at, Qt::CopyAction, &data, Qt::LeftButton, Qt::NoModifier);
    QApplication::sendEvent(desk().window.get(), &enter);
    QVERIFY(enter.isAccepted());
    QDropEvent drop(at, Qt::CopyAction, &data, Qt::LeftButton, Qt::NoModifier);
    QApplication::sendEvent(desk().window.get(), &drop);
    QTRY_VERIFY(dialog("RefusedRowsDialog"));
    QVERIFY(desk().window->document().empty()); // nothing is taken before the user says so
    QDialog* refused = dialog("RefusedRowsDialog");
    auto* table = refused->findChild<QTableView*>();
    QVERIFY(table && table->model()->rowCount() >= 8);
    auto* goOn = refused->findChild<QPushButton*>(QStringLiteral("goOnButton"));
    QVERIFY(goOn && goOn->isEnabled());
    QTest::mouseClick(goOn, Qt::LeftButton);
    QTRY_VERIFY(!desk().window->document().empty());
}

void FilesGuiTest::givingUpOnRefusedRowsLosesNothing()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    const QByteArray before = scenarioToJson(desk().window->document().scenario());
    desk().questions.answers = {1}; // as a new one
    QVERIFY(desk().open(desk().sample("with-refused-rows.csv")));
    QTRY_VERIFY(dialog("RefusedRowsDialog"));
    QTest::keyClick(dialog("RefusedRowsDialog"), Qt::Key_Escape);
    QTRY_VERIFY(!dialog("RefusedRowsDialog"));
    QCOMPARE(scenarioToJson(desk().window->document().scenario()), before);
}

void FilesGuiTest::theSheetIsWrittenReadBackAndEqual()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    desk().bench().workOn(-1);
    const auto unit = desk().unitOnOffer(0);
    DeskFixture::drag(desk().ladder(), desk().rung(unit), desk().rung(unit) + QPoint(0, 40));
    QTest::keyClick(desk().window.get(), Qt::Key_E, Qt::ControlModifier);
    QTRY_VERIFY(dialog("SheetDialog"));
    // The caution stands in full view.
    bool cautioned = false;
    for (const QLabel* label : dialog("SheetDialog")->findChildren<QLabel*>())
        cautioned |= label->isVisible() && label->text().contains(cautionText().left(40));
    QVERIFY(cautioned);
    const QString path = desk().folder.filePath(QStringLiteral("sheet.csv"));
    desk().questions.nextPath = path;
    auto* save = dialog("SheetDialog")->findChild<QPushButton*>(QStringLiteral("saveButton"));
    QVERIFY(save);
    QTest::mouseClick(save, Qt::LeftButton);
    QFile file(path);
    QVERIFY(file.open(QIODevice::ReadOnly));
    const auto rows = sheetFromCsv(file.readAll(), path);
    QVERIFY2(rows.ok(), rows.ok() ? "" : rows.trouble().c_str());
    const Document& document = desk().window->document();
    QCOMPARE(rows.value(), sheetRows(document.scenario(), *desk().bench().tierCase(), desk().bench().candidate()));
    qsizetype changed = 0;
    for (const SheetRow& row : rows.value())
        changed += row.newPrice != row.currentPrice;
    QCOMPARE(changed, 1);
    // Handing it over has chosen it.
    QCOMPARE(desk().bench().tierCase()->chosen, std::optional<int>(desk().bench().candidate()));
    QTest::keyClick(dialog("SheetDialog"), Qt::Key_Escape);
}

void FilesGuiTest::anUnwritablePlaceIsSaidAndNothingIsLost()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    desk().window->document().copyCandidate(desk().bench().tier(), -1);
    desk().questions.nextPath = desk().folder.filePath(QStringLiteral("no/such/folder/a.rungs.json"));
    QVERIFY(desk().window->files().saveAs()); // is begun
    QVERIFY(!desk().window->files().saving().finishWriting());
    QCOMPARE(desk().questions.told.size(), 1);
    QVERIFY(desk().window->document().modified());
}

void FilesGuiTest::leavingAsksAboutUnsavedWork()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    desk().window->document().copyCandidate(desk().bench().tier(), -1);
    desk().questions.answers = {2}; // Cancel
    QVERIFY(!desk().window->close());
    const QString path = desk().folder.filePath(QStringLiteral("kept.rungs.json"));
    desk().questions.nextPath = path;
    QVERIFY(desk().window->files().saveAs() && desk().window->files().saving().finishWriting());
    const Scenario kept = desk().window->document().scenario();
    QVERIFY(desk().window->close()); // nothing unsaved, nothing asked
    QCOMPARE(desk().questions.answers.size(), 0);
    QCOMPARE(loadScenario(path).value(), kept);
}

void FilesGuiTest::workLeftBehindIsRecovered()
{
    const QString path = desk().folder.filePath(QStringLiteral("a.rungs.json"));
    auto scenario = loadScenario(desk().sample("quillmere-storage.rungs.json"));
    QVERIFY(scenario.ok() && saveScenario(scenario.value(), path).ok());
    // What a crash leaves: the copy beside the file.
    Scenario unsaved = scenario.value();
    unsaved.note = "typed before the crash";
    QVERIFY(saveScenario(unsaved, desk().folder.filePath(QStringLiteral(".a.rungs.json.unsaved"))).ok());
    desk().questions.answers = {0};
    QVERIFY(desk().open(path));
    QCOMPARE(desk().window->document().scenario().note, unsaved.note);
    QCOMPARE(desk().window->document().path(), path);
    QVERIFY(desk().window->document().modified());
    QCOMPARE(loadScenario(path).value(), scenario.value()); // the file stands until the user saves
    QVERIFY(desk().window->files().save() && desk().window->files().saving().finishWriting());
    QCOMPARE(loadScenario(path).value(), unsaved);
}

void FilesGuiTest::worksLeftBehindAreOfferedOneAfterTheOther()
{
    Scenario scenario = loadScenario(desk().sample("quillmere-storage.rungs.json")).value();
    for (const char* note : {"first", "second"}) {
        scenario.note = note;
        const QString copy = desk().folder.filePath(QStringLiteral("state/unsaved-%1.rungs.json").arg(QLatin1String(note)));
        QVERIFY(saveScenario(scenario, copy).ok());
        QFile file(copy);
        QVERIFY(
            file.open(QIODevice::ReadWrite) &&
            file.setFileTime(QDateTime::currentDateTime().addSecs(qstrcmp(note, "first") == 0 ? -60 : -30), QFile::FileModificationTime));
    }
    desk().questions.answers = {1, 0}; // the newest may go, the other is wanted
    QSignalSpy done(&desk().window->files(), &FileFlow::done);
    QVERIFY(desk().window->files().offerLeftBehind());
    QVERIFY(done.count() > 0 || done.wait(20000));
    QCOMPARE(desk().window->document().scenario().note, std::string("first"));
    QVERIFY(desk().window->document().modified());
    QVERIFY(!QFile::exists(desk().folder.filePath(QStringLiteral("state/unsaved-second.rungs.json"))));
}

void FilesGuiTest::editsWhileSavingKeepItModified()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    Document& document = desk().window->document();
    SaveFlow& saving = desk().window->files().saving();
    document.setScenarioNote(QStringLiteral("one"));
    const Scenario one = document.scenario();
    QTest::keyClick(desk().window.get(), Qt::Key_S, Qt::ControlModifier);
    QVERIFY(saving.writing()); // and the keyboard is free again
    QCOMPARE(desk().child<QLabel>("saveState").text(), QStringLiteral("saving …"));
    QVERIFY(document.modified());
    document.setScenarioNote(QStringLiteral("two"));
    QVERIFY(saving.finishWriting());
    QCOMPARE(loadScenario(document.path()).value(), one);
    QVERIFY(document.modified());
    document.undoStack().undo(); // to what was written, but nobody keeps track of that: better once too often than once too few
    QVERIFY(document.modified());
    // A second save while the first goes on waits for it.
    document.setScenarioNote(QStringLiteral("three"));
    QVERIFY(saving.save() && saving.save());
    QVERIFY(saving.finishWriting());
    QVERIFY(!document.modified());
    QCOMPARE(loadScenario(document.path()).value(), document.scenario());
}

void FilesGuiTest::closingWaitsForTheSave()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    Document& document = desk().window->document();
    document.setScenarioNote(QStringLiteral("at the last moment"));
    desk().window->files().save();
    QVERIFY(desk().window->close());
    QCOMPARE(desk().questions.asked.size(), 0);
    QCOMPARE(loadScenario(document.path()).value(), document.scenario());
}

void FilesGuiTest::savingOverAFileOpenElsewhereAsks()
{
    const QString taken = desk().sample("rimalin-studios.rungs.json");
    const QByteArray before = scenarioToJson(loadScenario(taken).value());
    Document otherDocument;
    Autosave other(otherDocument, desk().folder.filePath(QStringLiteral("state")));
    otherDocument.begin(loadScenario(taken).value(), taken, true);
    other.follow();
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    desk().questions.nextPath = taken;
    QVERIFY(!desk().window->files().saveAs()); // nobody says "all the same"
    QVERIFY(desk().questions.asked.last().contains(QStringLiteral("open in another window")));
    QCOMPARE(scenarioToJson(loadScenario(taken).value()), before);
}

void FilesGuiTest::brokenFilesAreExplained_data()
{
    QTest::addColumn<QByteArray>("bytes");
    QTest::addColumn<QString>("says");
    QTest::newRow("empty") << QByteArray() << "broken.csv";
    QTest::newRow("binary") << QByteArray("\x00\x01\x02\x00PNG", 7) << "broken.csv";
    QTest::newRow("ends inside a quote") << QByteArray("site,tier,unit,asking_price,status,advertised_floor\na,b,\"c,1,vacant,1\n")
                                         << "quote";
    QTest::newRow("half a scenario") << QByteArray("{\"format\": \"rungwright-scenario\", \"version\": 1,") << "broken.csv";
    QTest::newRow("newer version") << QByteArray("{\"format\": \"rungwright-scenario\", \"version\": 99}") << "newer";
}

void FilesGuiTest::brokenFilesAreExplained()
{
    QFETCH(QByteArray, bytes);
    QFETCH(QString, says);
    QVERIFY(desk().open(write("broken.csv", bytes)));
    // What may be a matter of columns is asked about, the rest is told.
    const QStringList said = desk().questions.told + desk().questions.asked;
    QCOMPARE(said.size(), 1);
    QVERIFY2(said.first().contains(says, Qt::CaseInsensitive), qPrintable(said.first()));
    QVERIFY(desk().window->document().empty());
}

void FilesGuiTest::whatIsNotPlainlyOursGoesToTheForm_data()
{
    QTest::addColumn<QByteArray>("bytes");
    QTest::newRow("latin-1") << QByteArray("site,tier,unit,asking_price,status,advertised_floor\nCaf\xe9,a,b,1,vacant,1\n");
    QTest::newRow("no header") << QByteArray("1,2,3\n4,5,6\n");
}

void FilesGuiTest::whatIsNotPlainlyOursGoesToTheForm()
{
    QFETCH(QByteArray, bytes);
    QVERIFY(desk().open(write("other.csv", bytes)));
    QTRY_VERIFY(dialog("ImportDialog"));
    QVERIFY(desk().window->document().empty());
    QVERIFY(desk().window->close()); // takes the form with it
    QVERIFY(!dialog("ImportDialog"));
}

void FilesGuiTest::closingWhileReadingIsSafe()
{
    QByteArray bytes("site,tier,unit,asking_price,status,advertised_floor\n");
    for (int i = 0; i < 200000; ++i)
        bytes += "a,b," + QByteArray::number(i) + ",80.00,vacant,70.00\n";
    const QString path = write("long.csv", bytes);
    desk().window->openFile(path);
    QVERIFY(desk().window->files().busy());
    QVERIFY(desk().window->close());
    m_desk.reset(); // waits for the reader, which was told to stop
}

QTEST_MAIN(FilesGuiTest)
#include "files_gui_test.moc"
