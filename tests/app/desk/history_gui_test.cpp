// SPDX-License-Identifier: GPL-3.0-or-later
// The history page, used as a person would: what stands in the ledger is in its table and its plots.
#include "desk_fixture.h"
#include "history_page.h"
#include "history_plot.h"
#include "ledger.h"

#include <QAbstractItemModelTester>
#include <QAction>
#include <QComboBox>
#include <QContextMenuEvent>
#include <QMenu>
#include <QPushButton>
#include <QSpinBox>
#include <QStackedWidget>
#include <QTabWidget>

using namespace rungwright;

namespace
{

constexpr std::int64_t kDay = 86'400'000;

/// A sign-off of the tier on the bench, `daysAgo` days ago, that raises the first `raised` units by `by`.
SignOff entryFor(const Workbench& bench, double daysAgo, int raised, Price by, const char* who)
{
    const Tier& tier = bench.tierCase()->tier;
    SignOff entry;
    entry.whenUtc = utcText(QDateTime::currentMSecsSinceEpoch() - static_cast<std::int64_t>(daysAgo * static_cast<double>(kDay)));
    entry.who = who;
    entry.note = "=1+1, a note";
    entry.site = tier.site;
    entry.tier = tier.name;
    entry.candidate = "Lower the low end";
    entry.currency = bench.currency();
    entry.advertisedFloor = tier.advertisedFloor;
    int i = 0;
    for (const Unit& unit : tier.units)
        entry.units.push_back({unit.name, unit.status, unit.asking, i++ < raised ? unit.asking + by : unit.asking});
    entry.modelWords = "Perceived range";
    entry.modelStored = "{}";
    entry.figures = {{kLedgerCheapest, 9'800.0, 9'000.0 - 100 * daysAgo}, {kLedgerGap, 2'900.0, 2'100.0 - 100 * daysAgo}};
    entry.checks = {{"The floor is on sale", CheckOutcome::holds, "2 units on offer at or below it."},
                    {"Changes within the rule", CheckOutcome::lookAtThis, "One changes by 12 %."}};
    entry.sheetSha256 = std::string(64, 'b');
    return entry;
}

bool recordAll(const QString& path, const std::vector<SignOff>& entries)
{
    auto opened = Ledger::open(path, Ledger::For::writing);
    if (!opened.ok())
        return false;
    Ledger ledger = std::move(opened).value();
    return std::all_of(entries.begin(), entries.end(), [&](const SignOff& entry) { return ledger.record(entry).ok(); });
}

QString cellOf(const QTableView& table, int row, int column) { return table.model()->index(row, column).data().toString(); }

} // namespace

class TestHistoryGui : public QObject
{
    Q_OBJECT

private slots:
    void showsWhatWasSigned()
    {
        DeskFixture desk;
        QVERIFY(desk.open(desk.sample("quillmere-storage.rungs.json")));
        const QString path = ledgerPathFor(desk.window->document().path());
        QTest::keyClick(desk.window.get(), Qt::Key_6, Qt::ControlModifier);
        auto& page = desk.child<HistoryPage>("historyPage");
        QVERIFY(page.isVisible());
        auto& stack = desk.child<QStackedWidget>("historyStack");
        QTRY_VERIFY(desk.child<QLabel>("historyEmptyLabel").text().contains(QStringLiteral("No price sheet of this tier")));
        QCOMPARE(stack.currentWidget()->objectName(), QStringLiteral("historyEmpty"));
        QVERIFY(!QFileInfo::exists(path)); // Looking makes no ledger.

        const SignOff old = entryFor(desk.bench(), 50, 2, Price{500}, "Ada Quill");
        const SignOff middle = entryFor(desk.bench(), 20, 3, Price{-400}, "Bo Field");
        const SignOff last = entryFor(desk.bench(), 1, 4, Price{100}, "Cy Moor");
        QVERIFY(recordAll(path, {old, last, middle}));
        QTest::keyClick(&desk.child<QPushButton>("emptyRereadButton"), Qt::Key_Space);
        auto& table = desk.child<QTableView>("signOffTable");
        QTRY_COMPARE(table.model()->rowCount(), 3);
        const QAbstractItemModelTester tester(table.model(), QAbstractItemModelTester::FailureReportingMode::QtTest);
        QCOMPARE(cellOf(table, 0, SignOffModel::whoColumn), QStringLiteral("Cy Moor")); // The latest first.
        QCOMPARE(cellOf(table, 1, SignOffModel::whoColumn), QStringLiteral("Bo Field"));
        QCOMPARE(cellOf(table, 2, SignOffModel::whoColumn), QStringLiteral("Ada Quill"));
        QVERIFY(cellOf(table, 0, SignOffModel::changedColumn).startsWith(QStringLiteral("4 of ")));
        QCOMPARE(cellOf(table, 0, SignOffModel::gapBeforeColumn), moneyText(Price{2'900}, desk.bench().currency()));
        QCOMPARE(cellOf(table, 0, SignOffModel::gapAfterColumn), moneyText(Price{2'000}, desk.bench().currency()));
        const qint64 when = instantFromUtcText(last.whenUtc).value();
        QCOMPARE(cellOf(table, 0, SignOffModel::whenColumn),
                 QLocale().toString(QDateTime::fromMSecsSinceEpoch(when).toLocalTime(), QLocale::ShortFormat));

        auto& prices = desk.child<HistoryPlot>("pricesPlot");
        auto& gap = desk.child<HistoryPlot>("gapPlot");
        QCOMPARE(prices.picture().marks.size(), std::size_t{3});
        QCOMPARE(prices.picture().series.size(), std::size_t{2});
        QCOMPARE(prices.picture().series[1].points[2].value, 8'900.0);
        QCOMPARE(gap.picture().series[0].points[0].value, 2'100.0 - 5'000.0);
        QVERIFY(prices.accessibleDescription().contains(QStringLiteral("3 sign-offs")));

        // The latest is chosen, with its changes and checks.
        auto& changes = desk.child<QTableView>("historyChangesTable");
        QTRY_COMPARE(changes.model()->rowCount(), 4);
        QCOMPARE(cellOf(changes, 0, 0), QString::fromStdString(last.units[0].unit));
        QVERIFY(desk.child<QLabel>("entrySentence").text().contains(QStringLiteral("Cy Moor")));
        auto& checks = desk.child<QTableView>("historyChecksTable");
        QCOMPARE(checks.model()->rowCount(), 2);
        QCOMPARE(cellOf(checks, 1, 0), QStringLiteral("⚠ look at this")); // the sign-off's own sign
        QVERIFY(!desk.window->figuresDock().isVisible());
        desk.window->resetLayout();
        QVERIFY(!desk.window->figuresDock().isVisible());

        // A click on the oldest in the plot chooses it in the table.
        const int x = static_cast<int>(std::lround(prices.xOf(prices.picture().marks[0].instant)));
        QTest::mouseClick(&prices, Qt::LeftButton, {}, QPoint(x + 2, prices.height() / 2));
        QCOMPARE(table.currentIndex().row(), 2);
        QTRY_COMPARE(changes.model()->rowCount(), 2);
        QVERIFY(gap.chosen() == prices.chosen());
        // And by key from the table.
        table.setFocus();
        QTest::keyClick(&table, Qt::Key_Up);
        QTRY_COMPARE(changes.model()->rowCount(), 3);
        QVERIFY(desk.child<QLabel>("entrySentence").text().contains(QStringLiteral("Bo Field")));

        // A unit's own prices.
        auto& chooser = desk.child<QComboBox>("unitChooser");
        QCOMPARE(chooser.count(), static_cast<int>(last.units.size()) + 1);
        chooser.setFocus();
        QTest::keyClick(&chooser, Qt::Key_Down);
        QTRY_COMPARE(prices.picture().series.size(), std::size_t{3});
        QCOMPARE(prices.picture().series[2].points.size(), std::size_t{3});
        QCOMPARE(chooser.currentIndex(), 1);
        QCOMPARE(table.currentIndex().row(), 1); // What was chosen stays so.

        // An older one that was chosen stays also when another is signed; the newest is followed.
        QVERIFY(recordAll(path, {entryFor(desk.bench(), 0.5, 1, Price{200}, "Di Ash")}));
        QTest::keyClick(&desk.child<QPushButton>("rereadButton"), Qt::Key_Space);
        QTRY_COMPARE(table.model()->rowCount(), 4);
        QCOMPARE(cellOf(table, table.currentIndex().row(), SignOffModel::whoColumn), QStringLiteral("Bo Field"));
        table.setFocus();
        QTest::keyClick(&table, Qt::Key_Home, Qt::ControlModifier);
        QCOMPARE(table.currentIndex().row(), 0);
        QVERIFY(recordAll(path, {entryFor(desk.bench(), 0.25, 1, Price{300}, "Em Rye")}));
        QTest::keyClick(&desk.child<QPushButton>("rereadButton"), Qt::Key_Space);
        QTRY_COMPARE(table.model()->rowCount(), 5);
        QCOMPARE(cellOf(table, table.currentIndex().row(), SignOffModel::whoColumn), QStringLiteral("Em Rye"));
        QTRY_VERIFY(desk.child<QLabel>("entrySentence").text().contains(QStringLiteral("Em Rye")));
    }

    void lowestPricesAndToday()
    {
        DeskFixture desk;
        QVERIFY(desk.open(desk.sample("quillmere-storage.rungs.json")));
        const QString path = ledgerPathFor(desk.window->document().path());
        const Tier tier = desk.bench().tierCase()->tier;
        QVERIFY(
            recordAll(path, {entryFor(desk.bench(), 50, 1, Price{-700}, "Ada Quill"), entryFor(desk.bench(), 10, 1, Price{100}, "Bo")}));
        QTest::keyClick(desk.window.get(), Qt::Key_6, Qt::ControlModifier);
        auto& tabs = desk.child<QTabWidget>("historyTabs");
        tabs.setCurrentIndex(2);
        auto& lowest = desk.child<QTableView>("lowestTable");
        QTRY_COMPARE(lowest.model()->rowCount(), static_cast<int>(tier.units.size()));
        const auto lowestOfFirst = [&] {
            for (int row = 0; row < lowest.model()->rowCount(); ++row) {
                if (cellOf(lowest, row, 0) == QString::fromStdString(tier.units[0].name))
                    return cellOf(lowest, row, 1);
            }
            return QString();
        };
        const Currency& currency = desk.bench().currency();
        // Thirty days back the price of fifty days ago was in force.
        QCOMPARE(lowestOfFirst(), moneyText(tier.units[0].asking + Price{-700}, currency));
        auto& days = desk.child<QSpinBox>("daysSpin");
        days.setFocus();
        days.selectAll();
        QTest::keyClicks(&days, QStringLiteral("5"));
        QTest::keyClick(&days, Qt::Key_Return);
        QTRY_COMPARE(lowestOfFirst(), moneyText(tier.units[0].asking + Price{100}, currency));
        QVERIFY(desk.child<QLabel>("lowestSentence").text().contains(QStringLiteral("24 hours")));

        // The list still asks the old price: the last sheet was not applied.
        auto& today = desk.child<QLabel>("todaySentence");
        QVERIFY2(today.text().contains(QStringLiteral("not applied")), qPrintable(today.text()));
        QCOMPARE(desk.child<QTableView>("todayTable").model()->rowCount(), 1);
    }

    void saysWhyThereIsNothing()
    {
        DeskFixture desk;
        QVERIFY(desk.open(desk.sample("quillmere-storage.rungs.json")));
        const QString path = ledgerPathFor(desk.window->document().path());
        QFile file(path);
        QVERIFY(file.open(QIODevice::WriteOnly) && file.write(QByteArray("no ledger at all ").repeated(400)) > 0);
        file.close();
        QTest::keyClick(desk.window.get(), Qt::Key_6, Qt::ControlModifier);
        auto& label = desk.child<QLabel>("historyEmptyLabel");
        QTRY_VERIFY(label.text().contains(QStringLiteral("is not a price ledger")));
        QVERIFY(label.text().contains(path));
        QVERIFY(file.remove());
        QTest::keyClick(&desk.child<QPushButton>("emptyRereadButton"), Qt::Key_Space);
        QTRY_VERIFY(label.text().contains(QStringLiteral("No price sheet of this tier")));
        // A sample from inside the program has no file beside which a ledger could stand.
        desk.window->files().openSample(QStringLiteral(":/samples/quillmere-storage.rungs.json"));
        QTRY_VERIFY(desk.window->document().path().isEmpty());
        QTest::keyClick(desk.window.get(), Qt::Key_6, Qt::ControlModifier);
        QTRY_VERIFY(label.text().contains(QStringLiteral("Save the scenario")));
    }

    void leavesAsTableAndPicture()
    {
        DeskFixture desk;
        QVERIFY(desk.open(desk.sample("quillmere-storage.rungs.json")));
        QVERIFY(recordAll(ledgerPathFor(desk.window->document().path()), {entryFor(desk.bench(), 3, 2, Price{500}, "Ada, \"Q\"")}));
        QTest::keyClick(desk.window.get(), Qt::Key_6, Qt::ControlModifier);
        QTRY_COMPARE(desk.child<QTableView>("signOffTable").model()->rowCount(), 1);
        QTRY_COMPARE(desk.child<QTableView>("historyChangesTable").model()->rowCount(), 2);
        QVERIFY(desk.child<QLabel>("historyCaution").isVisible());
        QVERIFY(!desk.child<QLabel>("historyCaution").text().isEmpty());
        desk.questions.nextPath = desk.folder.filePath(QStringLiteral("list"));
        desk.child<QAction>("saveSignOffs").trigger();
        QFile list(desk.folder.filePath(QStringLiteral("list.csv")));
        QVERIFY(list.open(QIODevice::ReadOnly));
        const QByteArray text = list.readAll();
        QVERIFY2(text.startsWith("\"Signed, UTC\",By,Ladder,Units changed,Floor,Gap before,Gap after,Note\r\n"), text);
        QVERIFY2(text.contains("\"Ada, \"\"Q\"\"\""), text);
        QVERIFY2(text.contains("\"'=1+1, a note\""), text); // No formula for a spreadsheet.
        QVERIFY2(text.contains("29.00,18.00"), text);
        desk.questions.nextPath = desk.folder.filePath(QStringLiteral("prices.png"));
        desk.child<QAction>("savePricesPicture").trigger();
        QVERIFY(!QImage(desk.folder.filePath(QStringLiteral("prices.png"))).isNull());
        // The plot's own menu gives the ending, too.
        auto& plot = desk.child<HistoryPlot>("gapPlot");
        QContextMenuEvent asked(QContextMenuEvent::Mouse, QPoint(20, 20), plot.mapToGlobal(QPoint(20, 20)));
        QCoreApplication::sendEvent(&plot, &asked);
        auto* save = plot.findChild<QAction*>(QStringLiteral("savePicture"));
        QVERIFY(save);
        desk.questions.nextPath = desk.folder.filePath(QStringLiteral("gap"));
        save->trigger();
        plot.findChild<QMenu*>(QStringLiteral("pictureMenu"))->close();
        QVERIFY(!QImage(desk.folder.filePath(QStringLiteral("gap.png"))).isNull());
        desk.questions.nextPath = desk.folder.filePath(QStringLiteral("no/such/folder.png"));
        desk.child<QAction>("saveGapPicture").trigger();
        QCOMPARE(desk.questions.told.size(), 1);
    }

    // Every widget of the page can be told by name, and reached by the Tab key.
    void canBeReadAndReached()
    {
        DeskFixture desk;
        QVERIFY(desk.open(desk.sample("quillmere-storage.rungs.json")));
        QVERIFY(recordAll(ledgerPathFor(desk.window->document().path()), {entryFor(desk.bench(), 3, 2, Price{500}, "Ada")}));
        QTest::keyClick(desk.window.get(), Qt::Key_6, Qt::ControlModifier);
        QTRY_COMPARE(desk.child<QTableView>("signOffTable").model()->rowCount(), 1);
        for (const char* name : {"pricesPlot", "gapPlot", "signOffTable", "historyChangesTable", "historyChecksTable", "lowestTable",
                                 "todayTable", "unitChooser", "daysSpin"})
            QVERIFY2(!desk.child<QWidget>(name).accessibleName().isEmpty(), name);
        QStringList reached;
        desk.child<QWidget>("unitChooser").setFocus();
        for (int i = 0; i < 12; ++i) {
            QTest::keyClick(desk.window->focusWidget(), Qt::Key_Tab);
            reached << desk.window->focusWidget()->objectName();
        }
        for (const char* name : {"rereadButton", "historyExportButton", "pricesPlot", "gapPlot", "signOffTable", "historyChangesTable"})
            QVERIFY2(reached.contains(QLatin1String(name)), qPrintable(QLatin1String(name) + QStringLiteral(": ") + reached.join(u' ')));
    }
};

QTEST_MAIN(TestHistoryGui)
#include "history_gui_test.moc"
