// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist as a person uses it, at a handful and at hundreds of tiers.
#include "read_table.h"
#include "worklist_fixture.h"

#include <QAbstractItemModelTester>
#include <QClipboard>
#include <QDialog>
#include <QHeaderView>
#include <QLineEdit>
#include <QMenu>
#include <QPushButton>
#include <QScrollBar>
#include <QSpinBox>
#include <QToolButton>

using namespace rungwright;

class WorklistGuiTest : public WorklistFixture
{
    Q_OBJECT
private slots:
    void init() { start(); }
    void cleanup() { end(); }

    void modelIsSoundThroughEverything();
    void largeListsShowAtOnceAndFillIn();
    void headerClicksSort();
    void filterByWordsAndFlags();
    void groupsFoldByMouseAndKeys();
    void seenByKeyForSeveralAndNextUnseen();
    void steppingFollowsTheShownOrder();
    void notesShowAndAreFound();
    void thresholdsAreAStep();
    void chosenColumnsAreRemembered();
    void exportIsWhatIsShown();
    void copiesCarryTheCaution();
};

void WorklistGuiTest::modelIsSoundThroughEverything()
{
    begin(90);
    QAbstractItemModelTester tester(&model(), QAbstractItemModelTester::FailureReportingMode::QtTest);
    for (int column = 0; column < WorklistModel::columnCount_; ++column) {
        table().sortByColumn(column, Qt::AscendingOrder);
        table().sortByColumn(column, Qt::DescendingOrder);
    }
    panel().setGrouped(true);
    panel().foldAll(true);
    panel().foldAll(false);
    document().setSeen(std::vector{1, 2, 3}, true);
    document().setFloor(4, Price{1});
    document().setFlagThresholds({0, 9, 0});
    document().undoStack().undo();
    document().undoStack().undo();
    document().undoStack().undo();
    WorklistWish wish = model().wish();
    wish.setWords(QStringLiteral("site 2"));
    model().setWish(wish);
    document().begin(inventedPortfolio(500, 6), {}, true);
    QTRY_VERIFY(!model().list().measuring());
    document().begin(Scenario{}, {}, true);
    QCOMPARE(model().rowCount(), 0);
}

void WorklistGuiTest::largeListsShowAtOnceAndFillIn()
{
    begin(24);
    QSignalSpy done(&model().list(), &Worklist::measured);
    document().begin(inventedPortfolio(1500, 20), {}, true);
    QCOMPARE(model().rowCount(), 1500);
    QCOMPARE(model().index(0, WorklistModel::tierColumn).data().toString(), QStringLiteral("Room 1 m²"));
    QCOMPARE(model().index(0, WorklistModel::gapColumn).data().toString(), QStringLiteral("…"));
    QVERIFY(desk().child<QLabel>("worklistCount").text().contains(QStringLiteral("measuring")));
    QTRY_COMPARE(done.count(), 1);
    QCOMPARE(model().tierAt(0), model().list().worstTier());
    QVERIFY(!desk().child<QLabel>("worklistCount").text().contains(QStringLiteral("measuring")));
}

void WorklistGuiTest::headerClicksSort()
{
    begin(60);
    QHeaderView* header = table().horizontalHeader();
    const int first = desk().bench().tier();
    for (const int column :
         {WorklistModel::tierColumn, WorklistModel::onOfferColumn, WorklistModel::floorColumn, WorklistModel::gapColumn}) {
        for (int click = 0; click < 2; ++click) {
            QTest::mouseClick(header->viewport(), Qt::LeftButton, {},
                              QPoint(header->sectionViewportPosition(column) + header->sectionSize(column) / 2, header->height() / 2));
            QCOMPARE(header->sortIndicatorSection(), column);
            const bool down = header->sortIndicatorOrder() == Qt::DescendingOrder;
            QCOMPARE(model().wish().descending, down);
            for (int row = 1; row < model().rowCount(); ++row) {
                const auto a = sortNumber(model().list(), model().tierAt(row - 1), model().wish().key);
                const auto b = sortNumber(model().list(), model().tierAt(row), model().wish().key);
                QVERIFY(!b || (a && (down ? *a >= *b : *a <= *b)));
            }
            // The tier stays on the bench and selected wherever its row has gone; the list is read from the top.
            QCOMPARE(desk().bench().tier(), first);
            QCOMPARE(model().tierAt(table().currentIndex().row()), first);
            QVERIFY(table().selectionModel()->isRowSelected(table().currentIndex().row()));
            QCOMPARE(table().verticalScrollBar()->value(), 0);
        }
    }
}

void WorklistGuiTest::filterByWordsAndFlags()
{
    begin(120);
    key(Qt::Key_F, Qt::ControlModifier);
    QTest::keyClicks(&desk().child<QLineEdit>("worklistFilter"), QStringLiteral("SITE 12 room"));
    QCOMPARE(model().rowCount(), 8);
    QVERIFY(desk().child<QLabel>("worklistCount").text().startsWith(QStringLiteral("8 of 120")));
    QTest::keyClick(&desk().child<QLineEdit>("worklistFilter"), Qt::Key_Return);
    QCOMPARE(desk().bench().tier(), model().tierAt(0));
    desk().child<QLineEdit>("worklistFilter").clear();
    QCOMPARE(model().rowCount(), 120);

    auto* menu = desk().child<QToolButton>("showButton").menu();
    menu->popup(QPoint(0, 0));
    auto* flag = window().findChild<QAction*>(QStringLiteral("showFlag%1").arg(int(Flag::noFloor)));
    QVERIFY(flag && flag->text().contains(QStringLiteral("(3)"))); // tiers 30, 61, 92
    QTest::mouseClick(menu, Qt::LeftButton, {}, menu->actionGeometry(flag).center());
    QCOMPARE(model().rowCount(), 3);
    QVERIFY(menu->isVisible()); // more can be ticked
    QVERIFY(desk().child<QToolButton>("showButton").text().contains(QStringLiteral("no floor")));
    menu->close();
    window().findChild<QAction*>(QStringLiteral("showEverything"))->trigger();
    QCOMPARE(model().rowCount(), 120);
}

void WorklistGuiTest::groupsFoldByMouseAndKeys()
{
    begin(40);
    const int onBench = desk().bench().tier();
    key(Qt::Key_G, Qt::ControlModifier);
    QCOMPARE(model().rowCount(), 45);
    QVERIFY(model().shown(0).isSite());
    QCOMPARE(model().tierAt(1), onBench); // the worst tier of the worst site
    QVERIFY(model().index(0, 0).data(WorklistModel::secondLineRole).toString().startsWith(QStringLiteral("8 tiers")));
    QVERIFY(model().index(0, 0).data(Qt::AccessibleDescriptionRole).toString().contains(QStringLiteral("unfolded")));
    // By the triangle.
    const QRect at = table().visualRect(model().index(0, 0));
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, at.topLeft() + QPoint(10, 10));
    QCOMPARE(model().rowCount(), 37);
    QCOMPARE(desk().bench().tier(), onBench);
    QVERIFY(model().index(0, 0).data(Qt::AccessibleDescriptionRole).toString().endsWith(QStringLiteral("; folded")));
    // Folded stays folded through a sort and another filter.
    const QString site = model().index(0, WorklistModel::siteColumn).data().toString();
    table().sortByColumn(WorklistModel::siteColumn, Qt::AscendingOrder);
    QCOMPARE(model().rowCount(), 37);
    QVERIFY(model().wish().folded.contains(site));
    table().sortByColumn(WorklistModel::gapColumn, Qt::DescendingOrder);
    // By keys.
    table().setFocus();
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::onOfferColumn));
    QVERIFY(model().shown(table().currentIndex().row()).isSite());
    QTest::keyClick(&table(), Qt::Key_Right);
    QCOMPARE(model().rowCount(), 45);
    QCOMPARE(table().currentIndex().row(), 0);
    QTest::keyClick(&table(), Qt::Key_Down);
    QCOMPARE(desk().bench().tier(), model().tierAt(1));
    QTest::keyClick(&table(), Qt::Key_Left); // to the site
    QCOMPARE(table().currentIndex().row(), 0);
    QTest::keyClick(&table(), Qt::Key_Left);
    QCOMPARE(model().rowCount(), 37);
    key(Qt::Key_G, Qt::ControlModifier);
    QCOMPARE(model().rowCount(), 40);
}

void WorklistGuiTest::seenByKeyForSeveralAndNextUnseen()
{
    begin(30);
    table().setFocus();
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::gapColumn));
    QTest::mouseClick(table().viewport(), Qt::LeftButton, Qt::ShiftModifier, cell(3, WorklistModel::gapColumn));
    QTest::mouseClick(table().viewport(), Qt::LeftButton, Qt::ControlModifier, cell(5, WorklistModel::gapColumn));
    const std::vector<int> wanted{model().tierAt(0), model().tierAt(1), model().tierAt(2), model().tierAt(3), model().tierAt(5)};
    QCOMPARE(panel().selectedTiers(), wanted);
    const int steps = document().undoStack().count();
    key(Qt::Key_M, Qt::ControlModifier);
    QCOMPARE(document().undoStack().count(), steps + 1);
    for (const int tier : wanted)
        QVERIFY(document().tier(tier)->seen);
    QVERIFY(model().index(0, 0).data(Qt::AccessibleTextRole).toString().contains(QStringLiteral("seen")));
    QCOMPARE(panel().selectedTiers(), wanted); // still selected
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::gapColumn));
    key(Qt::Key_Down, Qt::AltModifier | Qt::ShiftModifier);
    QCOMPARE(desk().bench().tier(), model().tierAt(4));
    key(Qt::Key_Down, Qt::AltModifier | Qt::ShiftModifier);
    QCOMPARE(desk().bench().tier(), model().tierAt(6));
    QCOMPARE(panel().selectedTiers().size(), std::size_t(1)); // the Shift of the shortcut selects nothing more
    // With only the unseen shown, marking one lets the next move up, and the next step goes to it.
    WorklistWish wish = model().wish();
    wish.unseenOnly = true;
    model().setWish(wish);
    QCOMPARE(model().rowCount(), 25);
    const int at = table().currentIndex().row();
    const int next = model().tierAt(at + 1);
    key(Qt::Key_M, Qt::ControlModifier);
    QCOMPARE(model().rowCount(), 24);
    QCOMPARE(model().tierAt(at), next);
    key(Qt::Key_Down, Qt::AltModifier);
    QCOMPARE(desk().bench().tier(), next);
    key(Qt::Key_Z, Qt::ControlModifier);
    key(Qt::Key_Z, Qt::ControlModifier);
    for (const int tier : wanted)
        QVERIFY(!document().tier(tier)->seen);
}

void WorklistGuiTest::steppingFollowsTheShownOrder()
{
    begin(32);
    panel().setGrouped(true);
    std::vector<int> order;
    for (int row = 0; row < model().rowCount(); ++row) {
        if (model().tierAt(row) >= 0)
            order.push_back(model().tierAt(row));
    }
    QCOMPARE(order.size(), std::size_t(32));
    QCOMPARE(desk().bench().tier(), order.front());
    for (std::size_t i = 1; i < order.size(); ++i) {
        key(Qt::Key_Down, Qt::AltModifier);
        QCOMPARE(desk().bench().tier(), order[i]);
    }
    key(Qt::Key_Down, Qt::AltModifier); // the last stays
    QCOMPARE(desk().bench().tier(), order.back());
    key(Qt::Key_Up, Qt::AltModifier);
    QCOMPARE(desk().bench().tier(), order[order.size() - 2]);
}

void WorklistGuiTest::notesShowAndAreFound()
{
    begin(20);
    desk().questions.texts = {QStringLiteral("Ring Invented Ltd")};
    key(Qt::Key_N, Qt::ControlModifier | Qt::ShiftModifier);
    const int row = table().currentIndex().row();
    QVERIFY(model().index(row, 0).data(WorklistModel::notedRole).toBool());
    QVERIFY(model().index(row, 0).data(Qt::ToolTipRole).toString().contains(QStringLiteral("Ring Invented Ltd")));
    QTest::keyClicks(&desk().child<QLineEdit>("worklistFilter"), QStringLiteral("ltd ring"));
    QCOMPARE(model().rowCount(), 1);
}

void WorklistGuiTest::thresholdsAreAStep()
{
    begin(80);
    window().findChild<QAction*>(QStringLiteral("thresholdsAction"))->trigger();
    auto* dialog = window().findChild<QDialog*>(QStringLiteral("FlagsDialog"));
    QVERIFY(dialog);
    auto* last = dialog->findChild<QSpinBox*>(QStringLiteral("lastUnitsBox"));
    QCOMPARE(last->value(), 3);
    last->setFocus();
    last->selectAll();
    QTest::keyClicks(last, QStringLiteral("7"));
    int wanted = 0;
    for (int i = 0; i < 80; ++i) {
        const auto n = model().list().row(i).onOffer;
        wanted += n > 0 && n <= 7;
    }
    QVERIFY(dialog->findChild<QLabel*>(QStringLiteral("lastUnitsCount"))->text().startsWith(QString::number(wanted)));
    QTest::keyClick(dialog, Qt::Key_Return);
    QCOMPARE(document().scenario().flags.lastUnits, 7);
    QCOMPARE(document().scenario().flags.leansLeft, -0.5); // what was not touched is as it was
    QCOMPARE(document().scenario().flags.gapShare, 0.10);
    int flagged = 0;
    for (int i = 0; i < 80; ++i)
        flagged += model().list().flags(i).has(Flag::lastUnits);
    QCOMPARE(flagged, wanted);
    key(Qt::Key_Z, Qt::ControlModifier);
    QCOMPARE(document().scenario().flags.lastUnits, 3);
}

void WorklistGuiTest::chosenColumnsAreRemembered()
{
    begin(20);
    QHeaderView* header = table().horizontalHeader();
    QVERIFY(header->isSectionHidden(WorklistModel::seenColumn));
    QMetaObject::invokeMethod(header, "customContextMenuRequested", Q_ARG(QPoint, QPoint(5, 5)));
    auto* menu = panel().findChild<QMenu*>(QStringLiteral("worklistColumnsMenu"));
    QVERIFY(menu);
    for (const char* name : {"Seen", "Floor"}) {
        for (QAction* action : menu->actions()) {
            if (action->text() == QLatin1String(name))
                action->trigger();
        }
    }
    menu->close();
    QVERIFY(!header->isSectionHidden(WorklistModel::seenColumn));
    QVERIFY(header->isSectionHidden(WorklistModel::floorColumn));
    panel().setGrouped(true);
    QVERIFY(window().close());
    MainWindow again(desk().questions, desk().settings, desk().folder.filePath(QStringLiteral("state")));
    again.show();
    again.resize(900, 700); // narrow: a choice made is not overruled
    QCoreApplication::processEvents();
    QVERIFY(!again.worklist().table().isColumnHidden(WorklistModel::seenColumn));
    QVERIFY(again.worklist().table().isColumnHidden(WorklistModel::floorColumn));
    QVERIFY(again.worklist().model().wish().grouped);
    QVERIFY(again.findChild<QAction*>(QStringLiteral("groupAction"))->isChecked());
    QCOMPARE(again.worklist().model().wish().key, WorklistKey::gap);
}

void WorklistGuiTest::exportIsWhatIsShown()
{
    begin(50);
    table().sortByColumn(WorklistModel::leanColumn, Qt::AscendingOrder);
    QTest::keyClicks(&desk().child<QLineEdit>("worklistFilter"), QStringLiteral("floor"));
    QVERIFY(model().rowCount() > 3 && model().rowCount() < 50);
    window().findChild<QAction*>(QStringLiteral("exportWorklistAction"))->trigger();
    auto* dialog = window().findChild<QDialog*>(QStringLiteral("WorklistExportDialog"));
    QVERIFY(dialog);
    QVERIFY(dialog->findChild<QLabel*>(QStringLiteral("exportCaution"))->text().contains(QStringLiteral("regulated")));
    const QString path = desk().folder.filePath(QStringLiteral("worst"));
    desk().questions.nextPath = path;
    QTest::mouseClick(dialog->findChild<QPushButton*>(QStringLiteral("exportSaveButton")), Qt::LeftButton);
    QFile file(path + QStringLiteral(".csv"));
    QVERIFY(file.open(QIODevice::ReadOnly));
    const auto lines = readTable(file.readAll());
    QCOMPARE(static_cast<int>(lines.size()), model().rowCount() + 1);
    for (int row = 0; row < model().rowCount(); ++row) {
        const TierCase& tc = *document().tier(model().tierAt(row));
        QCOMPARE(lines[static_cast<std::size_t>(row) + 1][0], QString::fromStdString(tc.tier.site));
        QCOMPARE(lines[static_cast<std::size_t>(row) + 1][1], QString::fromStdString(tc.tier.name));
    }
    // A folder that is not there: said so, and nothing written.
    desk().questions.nextPath = desk().folder.filePath(QStringLiteral("nowhere/worst.csv"));
    QTest::mouseClick(dialog->findChild<QPushButton*>(QStringLiteral("exportSaveButton")), Qt::LeftButton);
    QVERIFY(dialog->findChild<QLabel*>(QStringLiteral("exportResult"))->text().contains(QStringLiteral("Not saved")));
    dialog->close();
}

void WorklistGuiTest::copiesCarryTheCaution()
{
    begin(20);
    table().setFocus();
    QTest::mouseClick(table().viewport(), Qt::LeftButton, {}, cell(0, WorklistModel::gapColumn));
    QTest::mouseClick(table().viewport(), Qt::LeftButton, Qt::ShiftModifier, cell(1, WorklistModel::gapColumn));
    QTest::keyClick(&table(), Qt::Key_C, Qt::ControlModifier);
    const QStringList lines = QGuiApplication::clipboard()->text().split(QLatin1Char('\n'));
    QCOMPARE(lines.size(), 5); // headings, two rows, an empty line, the caution
    QVERIFY(lines[1].startsWith(model().index(0, 0).data().toString() + QLatin1Char('\t')));
    QVERIFY(lines[3].isEmpty());
    QVERIFY(lines[4].contains(QStringLiteral("regulated")) && !lines[4].contains(QLatin1Char('\t')));
}

QTEST_MAIN(WorklistGuiTest)
#include "worklist_gui_test.moc"
