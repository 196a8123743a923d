// SPDX-License-Identifier: GPL-3.0-or-later
// Others' lists, from the drop to the worklist, by mouse and keyboard.
#include "../files/mapped_exports.h"
#include "desk_fixture.h"
#include "import_dialog.h"
#include "scenario_json.h"

#include <QComboBox>
#include <QDropEvent>
#include <QLineEdit>
#include <QListWidget>
#include <QMimeData>
#include <QPushButton>
#include <QSpinBox>
#include <QTabWidget>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

/// Windows-1252, semicolons, decimal commas; a status word and a floor column that no trade word tells.
const QByteArray kForeign("Standort;Kategorie;Einheit;Miete;Belegung;Kampagne\n"
                          "M\xfchlhof;Box 2 m\xb2;A1;54,50 \x80;frei;49,00\n"
                          "M\xfchlhof;Box 2 m\xb2;A2;1.064,00 \x80;vermietet;49,00\n"
                          "M\xfchlhof;Box 2 m\xb2;A3;61,00 \x80;blauer Punkt;49,00\n"
                          "M\xfchlhof;Box 4 m\xb2;B1;84,50 \x80;frei;79,00\n"
                          "M\xfchlhof;Box 4 m\xb2;B2;99,90 \x80;blauer Punkt;79,00\n");

} // namespace

class ImportGuiTest : public QObject
{
    Q_OBJECT
private slots:
    // A list that just came up takes no click for as long as a double click may last.
    void initTestCase() { QApplication::setDoubleClickInterval(1); }
    void init() { m_desk = std::make_unique<DeskFixture>(); }
    void cleanup() { m_desk.reset(); }

    void aForeignListIsMappedFromDropToWorklist();
    void cancelAtEveryStageLeavesAllAsItWas();
    void refusedRowsLeadBackToTheColumns();
    void eachExportIsImportedThroughItsSavedMapping_data();
    void eachExportIsImportedThroughItsSavedMapping();
    void theDelimiterAndTheHeaderRowCanBeSaid();
    void whatIsMissingIsSaid();
    void aRefreshIsUndone();
    void everyWidgetOfTheFormHasAName();

private:
    DeskFixture& desk() { return *m_desk; }
    template <class T = QDialog>
    T* dialog(const char* name)
    {
        for (QWidget* widget : QApplication::topLevelWidgets()) {
            if (widget->isVisible() && widget->objectName() == QLatin1String(name))
                return qobject_cast<T*>(widget);
        }
        return nullptr;
    }
    ImportDialog* form() { return dialog<ImportDialog>("ImportDialog"); }
    template <class T>
    static T& in(QWidget* parent, const char* name)
    {
        T* found = parent->findChild<T*>(QString::fromLatin1(name));
        if (!found)
            qFatal("no child of that name: %s", name);
        return *found;
    }
    QString write(const char* name, const QByteArray& bytes)
    {
        const QString path = desk().folder.filePath(QString::fromLatin1(name));
        QFile file(path);
        if (!file.open(QIODevice::WriteOnly) || file.write(bytes) != bytes.size())
            qFatal("cannot write a test file");
        return path;
    }
    void drop(const QString& path)
    {
        QMimeData data;
        data.setUrls({QUrl::fromLocalFile(path)});
        const QPoint at(400, 400);
        QDragEnterEvent enter(at, Qt::CopyAction, &data, Qt::LeftButton, Qt::NoModifier);
        QApplication::sendEvent(desk().window.get(), &enter);
        QDropEvent drop(at, Qt::CopyAction, &data, Qt::LeftButton, Qt::NoModifier);
        QApplication::sendEvent(desk().window.get(), &drop);
    }
    /// Opens the combo by a click and clicks the entry that begins so.
    static void pickByMouse(QComboBox& combo, const QString& beginning)
    {
        QTest::mouseClick(&combo, Qt::LeftButton);
        QAbstractItemView* view = combo.view();
        QTRY_VERIFY(view->isVisible());
        for (int row = 0; row < combo.count(); ++row) {
            if (!combo.itemText(row).startsWith(beginning))
                continue;
            const QModelIndex at = view->model()->index(row, 0);
            view->scrollTo(at);
            const QPoint place = view->visualRect(at).center();
            QTest::mouseMove(view->viewport(), place);
            QTRY_COMPARE(view->currentIndex(), at); // follows the mouse
            QTest::mouseClick(view->viewport(), Qt::LeftButton, {}, place);
            break;
        }
        QTRY_VERIFY(!view->isVisible());
        QVERIFY2(combo.currentText().startsWith(beginning), qPrintable(combo.currentText()));
    }
    /// Goes there by the Tab key.
    static bool tabTo(QWidget& wanted)
    {
        wanted.window()->activateWindow(); // where no window manager does it
        if (!QTest::qWaitForWindowActive(wanted.window()) || !QTest::qWaitFor([] { return QApplication::focusWidget() != nullptr; }))
            return false;
        for (int i = 0; i < 100 && QApplication::focusWidget() != &wanted; ++i)
            QTest::keyClick(QApplication::focusWidget() ? QApplication::focusWidget() : wanted.window(), Qt::Key_Tab);
        return QApplication::focusWidget() == &wanted;
    }
    QByteArray json() { return scenarioToJson(desk().window->document().scenario()); }

    std::unique_ptr<DeskFixture> m_desk;
};

void ImportGuiTest::aForeignListIsMappedFromDropToWorklist()
{
    drop(write("liste.csv", kForeign));
    QTRY_VERIFY(form());
    QVERIFY(desk().window->document().empty());
    // What can be told is proposed.
    QVERIFY(in<QComboBox>(form(), "siteSource").currentText().startsWith(QStringLiteral("Standort")));
    QVERIFY(in<QComboBox>(form(), "asking_priceSource").currentText().startsWith(QStringLiteral("Miete")));
    QCOMPARE(in<QComboBox>(form(), "encodingCombo").currentText(), QStringLiteral("Windows-1252"));
    auto& import = in<QPushButton>(form(), "importButton");
    // By keyboard: the floor's column.
    auto& floor = in<QComboBox>(form(), "advertised_floorSource");
    QVERIFY(tabTo(floor));
    QTest::keyClick(&floor, Qt::Key_End);
    QVERIFY2(floor.currentText().startsWith(QStringLiteral("Kampagne")), qPrintable(floor.currentText()));
    // By mouse: the word that nobody knows.
    auto& tabs = in<QTabWidget>(form(), "tabs");
    QTest::mouseClick(tabs.tabBar(), Qt::LeftButton, {}, tabs.tabBar()->tabRect(1).center());
    QTRY_COMPARE(tabs.currentIndex(), 1);
    QVERIFY2(tabs.tabText(1).contains(QLatin1Char('1')), qPrintable(tabs.tabText(1)));
    QComboBox* unsaid = nullptr;
    for (QComboBox* combo : tabs.currentWidget()->findChildren<QComboBox*>()) {
        if (combo->isVisible() && combo->accessibleName().startsWith(QStringLiteral("blauer Punkt")))
            unsaid = combo;
    }
    QVERIFY(unsaid);
    pickByMouse(*unsaid, QStringLiteral("reserved"));
    QTRY_VERIFY2(in<QLabel>(form(), "statusLabel").text().startsWith(QStringLiteral("All 5 rows understood")),
                 qPrintable(in<QLabel>(form(), "statusLabel").text()));
    QVERIFY(import.isEnabled());
    // Kept for the next time.
    desk().questions.texts = {QStringLiteral("Monday list")};
    QTest::mouseClick(&in<QPushButton>(form(), "saveProfileButton"), Qt::LeftButton);
    QCOMPARE(in<QComboBox>(form(), "profileCombo").currentText(), QStringLiteral("Monday list"));
    QTest::mouseClick(&import, Qt::LeftButton);
    QTRY_VERIFY(!desk().window->document().empty());
    QVERIFY(!form());
    const Scenario& scenario = desk().window->document().scenario();
    QCOMPARE(scenario.currency.code, std::string("EUR"));
    QCOMPARE(scenario.tiers.size(), std::size_t(2));
    QCOMPARE(QString::fromStdString(scenario.tiers[0].tier.site), QStringLiteral("Mühlhof"));
    QCOMPARE(scenario.tiers[0].tier.units[1].asking, Price{106400});
    QCOMPARE(scenario.tiers[0].tier.units[2].status, Status::reserved);
    QCOMPARE(scenario.tiers[1].tier.advertisedFloor, Price{7900});
    QTRY_COMPARE(desk().child<QTableView>("worklistTable").model()->rowCount(), 2);

    // The same layout a week later: the saved mapping is proposed, and nothing has to be said.
    QByteArray later = kForeign;
    later.replace("54,50", "57,50");
    desk().questions.answers = {1, 1}; // a new one; go on without saving
    drop(write("liste-2.csv", later));
    QTRY_VERIFY(form());
    QCOMPARE(in<QComboBox>(form(), "profileCombo").currentText(), QStringLiteral("Monday list"));
    QVERIFY(in<QPushButton>(form(), "importButton").isEnabled());
    QTest::keyClick(form(), Qt::Key_Return);
    QTRY_COMPARE(desk().window->document().scenario().tiers[0].tier.units[0].asking, Price{5750});
}

void ImportGuiTest::cancelAtEveryStageLeavesAllAsItWas()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    const QByteArray before = json();
    const QString foreign = write("liste.csv", kForeign);
    // What is it for? Cancel.
    desk().questions.answers = {2};
    QVERIFY(desk().open(foreign));
    QVERIFY(!form());
    // The form.
    desk().questions.answers = {1};
    QVERIFY(desk().open(foreign));
    QTRY_VERIFY(form());
    QTest::keyClick(form(), Qt::Key_Escape);
    QTRY_VERIFY(!form());
    // Refused rows, of our own format.
    desk().questions.answers = {1};
    QVERIFY(desk().open(desk().sample("with-refused-rows.csv")));
    QTRY_VERIFY(dialog("RefusedRowsDialog"));
    QTest::keyClick(dialog("RefusedRowsDialog"), Qt::Key_Escape);
    QTRY_VERIFY(!dialog("RefusedRowsDialog"));
    // The refresh.
    desk().questions.answers = {0};
    QVERIFY(desk().open(desk().sample("quillmere-storage.csv")));
    QTRY_VERIFY(dialog("RefreshDialog"));
    QTest::keyClick(dialog("RefreshDialog"), Qt::Key_Escape);
    QTRY_VERIFY(!dialog("RefreshDialog"));
    QCOMPARE(json(), before);
    QVERIFY(!desk().window->document().modified());
    QVERIFY(!desk().window->document().undoStack().canUndo());
}

void ImportGuiTest::refusedRowsLeadBackToTheColumns()
{
    QByteArray bytes = kForeign;
    bytes.replace("blauer Punkt", "frei");
    bytes.replace("84,50 \x80", "teuer");
    desk().window->openFile(write("liste.csv", bytes));
    QTRY_VERIFY(form());
    pickByMouse(in<QComboBox>(form(), "advertised_floorSource"), QStringLiteral("Kampagne"));
    QTRY_VERIFY2(in<QLabel>(form(), "statusLabel").text().startsWith(QStringLiteral("4 of 5 rows understood, 1 would be refused")),
                 qPrintable(in<QLabel>(form(), "statusLabel").text()));
    QVERIFY(in<QLabel>(form(), "statusLabel").text().contains(QStringLiteral("teuer")));
    QTest::mouseClick(&in<QPushButton>(form(), "importButton"), Qt::LeftButton);
    QTRY_VERIFY(dialog("RefusedRowsDialog"));
    QVERIFY(desk().window->document().empty());
    QTest::mouseClick(&in<QPushButton>(dialog("RefusedRowsDialog"), "mapButton"), Qt::LeftButton);
    QTRY_VERIFY(form()); // with what was said
    QVERIFY(in<QComboBox>(form(), "advertised_floorSource").currentText().startsWith(QStringLiteral("Kampagne")));
    QTest::mouseClick(&in<QPushButton>(form(), "importButton"), Qt::LeftButton);
    QTRY_VERIFY(dialog("RefusedRowsDialog"));
    QTest::mouseClick(&in<QPushButton>(dialog("RefusedRowsDialog"), "goOnButton"), Qt::LeftButton);
    QTRY_VERIFY(!desk().window->document().empty());
    std::size_t units = 0;
    for (const TierCase& tier : desk().window->document().scenario().tiers)
        units += tier.tier.units.size();
    QCOMPARE(units, std::size_t(4));
}

void ImportGuiTest::eachExportIsImportedThroughItsSavedMapping_data()
{
    QTest::addColumn<QString>("name");
    for (const char* name : kExports)
        QTest::newRow(name) << QString::fromLatin1(name);
}

void ImportGuiTest::eachExportIsImportedThroughItsSavedMapping()
{
    QFETCH(QString, name);
    const QString shelf = desk().folder.filePath(QStringLiteral("state/mappings"));
    QVERIFY(QDir().mkpath(shelf));
    for (const char* other : kExports) // all of them lie there: the right one is to be found
        QVERIFY(QFile::copy(profilePath(QString::fromLatin1(other)), shelf + QStringLiteral("/%1.mapping.json").arg(QLatin1String(other))));
    drop(exportPath(name));
    QTRY_VERIFY(form());
    QCOMPARE(in<QComboBox>(form(), "profileCombo").currentText(), loadMapping(profilePath(name)).value().name);
    if (form()->mapping().floorsFromFile) {
        QVERIFY(!in<QPushButton>(form(), "importButton").isEnabled());
        desk().questions.nextPath = floorsPath(name);
        QTest::mouseClick(&in<QPushButton>(form(), "floorsBrowse"), Qt::LeftButton);
    }
    QTRY_VERIFY2(in<QPushButton>(form(), "importButton").isEnabled(), qPrintable(in<QLabel>(form(), "reasonLabel").text()));
    QTest::keyClick(form(), Qt::Key_Return);
    QTRY_VERIFY(!desk().window->document().empty());
    const UnitListResult own = loadUnitList(ownPath(name), {});
    QVERIFY2(own.clean(), qPrintable(own.fileTrouble));
    QCOMPARE(desk().window->document().scenario().currency, own.currency);
    QVERIFY(desk().window->document().scenario().tiers == TierList(own.tiers));
}

void ImportGuiTest::theDelimiterAndTheHeaderRowCanBeSaid()
{
    drop(write("liste.csv", "Stand 1.12.\n" + kForeign));
    QTRY_VERIFY(form());
    auto& row = in<QSpinBox>(form(), "headerRowSpin");
    QCOMPARE(row.value(), 2);
    in<QTabWidget>(form(), "tabs").setCurrentIndex(3);
    // Enter on a line makes it the header, and imports nothing.
    auto& lines = in<QListWidget>(form(), "topLines");
    QVERIFY(tabTo(lines));
    QTest::keyClick(&lines, Qt::Key_Home);
    QTest::keyClick(&lines, Qt::Key_Return);
    QCOMPARE(row.value(), 1);
    QVERIFY(form());
    QTest::keyClick(&lines, Qt::Key_Down);
    QTest::keyClick(&lines, Qt::Key_Return);
    QCOMPARE(row.value(), 2);
    QVERIFY(in<QComboBox>(form(), "siteSource").currentText().startsWith(QStringLiteral("Standort")));
    pickByMouse(in<QComboBox>(form(), "delimiterCombo"), QStringLiteral("bars"));
    QVERIFY(!in<QPushButton>(form(), "importButton").isEnabled());
    pickByMouse(in<QComboBox>(form(), "delimiterCombo"), QStringLiteral("semicolons"));
    QVERIFY(in<QComboBox>(form(), "siteSource").currentText().startsWith(QStringLiteral("Standort")));
    QTest::keyClick(form(), Qt::Key_Escape);
}

void ImportGuiTest::whatIsMissingIsSaid()
{
    drop(write("liste.csv", kForeign));
    QTRY_VERIFY(form());
    auto& import = in<QPushButton>(form(), "importButton");
    auto& reason = in<QLabel>(form(), "reasonLabel");
    pickByMouse(in<QComboBox>(form(), "tierSource"), QStringLiteral("choose"));
    QVERIFY(!import.isEnabled());
    QVERIFY2(reason.text().contains(QStringLiteral("“Tier”")), qPrintable(reason.text()));
    // One value for all rows, typed.
    pickByMouse(in<QComboBox>(form(), "tierSource"), QStringLiteral("one value"));
    auto& constant = in<QLineEdit>(form(), "tierConstant");
    QTRY_COMPARE(QApplication::focusWidget(), &constant);
    QTest::keyClicks(&constant, QStringLiteral("Box"));
    // What was said stays when the encoding is corrected.
    in<QTabWidget>(form(), "tabs").setCurrentIndex(3);
    pickByMouse(in<QComboBox>(form(), "encodingCombo"), QStringLiteral("ISO-8859-15"));
    in<QTabWidget>(form(), "tabs").setCurrentIndex(0);
    QCOMPARE(form()->mapping().encoding, TextEncoding::iso8859_15);
    QCOMPARE(form()->mapping().from(Column::tier), ColumnSource::always(QStringLiteral("Box")));
    QCOMPARE(constant.text(), QStringLiteral("Box"));
    pickByMouse(in<QComboBox>(form(), "advertised_floorSource"), QStringLiteral("none"));
    QTRY_VERIFY2(import.isEnabled(), qPrintable(reason.text()));
    // The file of floors has to be there.
    pickByMouse(in<QComboBox>(form(), "advertised_floorSource"), QStringLiteral("a second file"));
    QVERIFY(!import.isEnabled());
    QTest::keyClick(form(), Qt::Key_Escape);
}

void ImportGuiTest::aRefreshIsUndone()
{
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    const QByteArray before = json();
    QFile list(desk().sample("quillmere-storage.csv"));
    QVERIFY(list.open(QIODevice::ReadOnly));
    QList<QByteArray> lines = list.readAll().split('\n');
    lines.removeAt(1); // one unit is gone
    desk().questions.nextPath = write("next-week.csv", lines.join('\n'));
    QTest::keyClick(desk().window.get(), Qt::Key_R, Qt::ControlModifier);
    QTRY_VERIFY(dialog("RefreshDialog"));
    QCOMPARE(json(), before);
    QPushButton* accept = nullptr;
    for (QPushButton* button : dialog("RefreshDialog")->findChildren<QPushButton*>()) {
        if (button->isVisible() && button->isEnabled() && button->text().remove(QLatin1Char('&')).startsWith(QStringLiteral("Refresh")))
            accept = button;
    }
    QVERIFY(accept);
    QTest::mouseClick(accept, Qt::LeftButton);
    QTRY_VERIFY(!dialog("RefreshDialog"));
    QVERIFY(json() != before);
    QVERIFY(desk().window->document().modified());
    desk().window->activateWindow();
    QVERIFY(QTest::qWaitForWindowActive(desk().window.get()));
    QTest::keyClick(desk().window.get(), Qt::Key_Z, Qt::ControlModifier);
    QCOMPARE(json(), before);
}

void ImportGuiTest::everyWidgetOfTheFormHasAName()
{
    drop(write("liste.csv", "Stand 1.12.\n" + kForeign + "Summe;;;365,10;;\n"));
    QTRY_VERIFY(form());
    for (const QWidget* widget : form()->findChildren<QWidget*>()) {
        const auto* combo = qobject_cast<const QComboBox*>(widget);
        const auto* edit = qobject_cast<const QLineEdit*>(widget);
        const auto* view = qobject_cast<const QAbstractItemView*>(widget);
        const bool inside =
            widget->parentWidget() &&
            (qobject_cast<const QComboBox*>(widget->parentWidget()) || qobject_cast<const QAbstractSpinBox*>(widget->parentWidget()) ||
             widget->parentWidget()->inherits("QComboBoxPrivateContainer") || qobject_cast<const QHeaderView*>(widget));
        if ((combo || edit || view) && !inside && !qobject_cast<const QHeaderView*>(widget))
            QVERIFY2(!widget->accessibleName().isEmpty(), qPrintable(widget->objectName()));
    }
    // It fits the smallest window.
    form()->resize(960, 560);
    QVERIFY(form()->minimumSizeHint().width() <= 1280 && form()->minimumSizeHint().height() <= 680);
    QTest::keyClick(form(), Qt::Key_Escape);
}

QTEST_MAIN(ImportGuiTest)
#include "import_gui_test.moc"
