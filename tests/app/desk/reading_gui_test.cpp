// SPDX-License-Identifier: GPL-3.0-or-later
// What shows while a long list is still being read.
#include "app/session/invented_portfolio.h"
#include "desk_fixture.h"
#include "list_so_far.h"
#include "worklist_panel.h"

#include <QAbstractItemModelTester>
#include <QDockWidget>

using namespace rungwright;

class ReadingGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void init() { m_desk = std::make_unique<DeskFixture>(); }
    void cleanup() { m_desk.reset(); }

    void firstRowsShowAndGoAgain();
    void anotherListBeginsAnew();
    void whatIsOnTheDeskStaysAsItIs();
    void aListOnTheDeskTakesTheirPlace();
    void aClosedWorklistStaysClosed();

private:
    static ListSoFar list(int tiers, std::uint32_t units)
    {
        ListSoFar so;
        so.currency = *findCurrency("EUR");
        so.units = 1234567;
        so.tiers = 9876;
        for (int i = 0; i < tiers; ++i)
            so.first.push_back(
                {"Invented site " + std::to_string(i / 10 + 1), "Room " + std::to_string(i % 10 + 1), {i == 1 ? 0U : 6900U}, units});
        return so;
    }
    void tell(const ListSoFar& so) { emit m_desk->window->files().readingRows(QStringLiteral("long.csv"), so); }
    QWidget& rows() { return m_desk->child<QWidget>("readingRows"); }
    QTableView& table() { return m_desk->child<QTableView>("readingTable"); }
    QString cell(int row, int column) { return table().model()->index(row, column).data().toString(); }
    std::unique_ptr<DeskFixture> m_desk;
};

void ReadingGuiTest::firstRowsShowAndGoAgain()
{
    QAbstractItemModelTester tester(table().model(), QAbstractItemModelTester::FailureReportingMode::QtTest);
    QVERIFY(!rows().isVisible());
    tell(list(3, 7));
    QVERIFY(table().isVisible());
    QCOMPARE(table().model()->rowCount(), 3);
    QCOMPARE(cell(0, 0), QStringLiteral("Room 1"));
    QCOMPARE(cell(0, 1), QStringLiteral("7"));
    QCOMPARE(cell(0, 2), QStringLiteral("69.00"));
    QCOMPARE(cell(1, 2), undefinedText()); // no floor on the rows so far
    const QString said = m_desk->child<QLabel>("readingSaid").text();
    // How many there are, that it goes on, and of which list.
    QVERIFY(said.contains(QLocale().toString(1234567)) && said.contains(QLocale().toString(9876)));
    QVERIFY(said.contains(QStringLiteral("so far")) && said.contains(QStringLiteral("long.csv")));
    QCOMPARE(rows().size(), m_desk->window->worklist().size());
    // More of the same: rows are added below, and counts go on.
    tell(list(30, 8));
    QCOMPARE(table().model()->rowCount(), 30);
    QCOMPARE(cell(0, 1), QStringLiteral("8"));
    // A wider dock takes them along.
    m_desk->window->resize(1280, 720);
    QCoreApplication::processEvents();
    QCOMPARE(rows().size(), m_desk->window->worklist().size());
    emit m_desk->window->files().readingOver();
    QVERIFY(!rows().isVisible());
    QVERIFY(!m_desk->window->worklistDock().isVisible()); // the start page is alone again
    QCOMPARE(table().model()->rowCount(), 0);
}

void ReadingGuiTest::anotherListBeginsAnew()
{
    QAbstractItemModelTester tester(table().model(), QAbstractItemModelTester::FailureReportingMode::QtTest);
    tell(list(30, 8));
    tell(list(2, 5));
    QCOMPARE(table().model()->rowCount(), 2);
    QCOMPARE(cell(1, 1), QStringLiteral("5"));
}

void ReadingGuiTest::whatIsOnTheDeskStaysAsItIs()
{
    m_desk->window->document().begin(inventedPortfolio(24), {}, true);
    emit m_desk->window->files().opened();
    const int tier = m_desk->bench().tier();
    tell(list(3, 7));
    QVERIFY(table().isVisible());
    emit m_desk->window->files().readingOver();
    QVERIFY(!rows().isVisible());
    QVERIFY(m_desk->window->worklist().isVisible());
    QCOMPARE(m_desk->window->worklist().model().rowCount(), 24);
    QCOMPARE(m_desk->bench().tier(), tier);
}

void ReadingGuiTest::aListOnTheDeskTakesTheirPlace()
{
    tell(list(3, 7));
    const QString path = m_desk->folder.filePath(QStringLiteral("short.csv"));
    QFile file(path);
    QVERIFY(file.open(QIODevice::WriteOnly));
    file.write("site,tier,unit,asking_price,status,advertised_floor,currency\nA,Small,1,70,vacant,69,EUR\nA,Small,2,75,occupied,69,EUR\n");
    file.close();
    QVERIFY(m_desk->open(path));
    QVERIFY(!rows().isVisible());
    QVERIFY(m_desk->window->worklist().table().isVisible());
    QCOMPARE(m_desk->window->worklist().model().rowCount(), 1);
    // A list that is refused leaves nothing behind either.
    tell(list(3, 7));
    QVERIFY(file.open(QIODevice::WriteOnly));
    file.write("site,tier,unit,asking_price,status,advertised_floor,currency\nA,Small,1,dear,vacant,69,EUR\n");
    file.close();
    m_desk->questions.answers = {1, 1}; // as a new one; without saving
    QVERIFY(m_desk->open(path));
    QVERIFY(!rows().isVisible());
    m_desk->window->files().cancelLoading();
    QCOMPARE(m_desk->window->worklist().model().rowCount(), 1);
}

void ReadingGuiTest::aClosedWorklistStaysClosed()
{
    m_desk->window->worklistDock().toggleViewAction()->trigger(); // it is hidden by the start page, so that this shows it
    m_desk->window->worklistDock().toggleViewAction()->trigger();
    tell(list(3, 7));
    QVERIFY(!m_desk->window->worklistDock().isVisible());
}

QTEST_MAIN(ReadingGuiTest)
#include "reading_gui_test.moc"
