// SPDX-License-Identifier: GPL-3.0-or-later
// The page of ladders side by side: what is picked, their order, the choice, and the ways out.
#include "caution.h"
#include "compared_tier.h"
#include "read_table.h"
#include "refresh.h"
#include "side_by_side_page.h"
#include "side_by_side_plot.h"
#include "table_text.h"

#include <QCheckBox>
#include <QClipboard>
#include <QComboBox>
#include <QGuiApplication>
#include <QHeaderView>
#include <QImage>
#include <QLabel>
#include <QMap>
#include <QMenu>
#include <QPushButton>
#include <QRadioButton>
#include <QSignalSpy>
#include <QSpinBox>
#include <QStackedWidget>
#include <QTableView>
#include <QTemporaryDir>
#include <QTest>
#include <QTimer>

#include <functional>

using namespace rungwright;

namespace
{

using Ladders = std::vector<int>;

} // namespace

class SideBySideTest : public QObject
{
    Q_OBJECT

private slots:
    void initTestCase() { QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom)); }
    void init()
    {
        m_document = std::make_unique<Document>();
        m_bench = std::make_unique<Workbench>(*m_document);
        m_answers = PathAnswers();
        m_page = std::make_unique<SideBySidePage>(*m_bench, m_answers);
        m_page->resize(900, 640);
        m_page->show();
        QVERIFY(QTest::qWaitForWindowExposed(m_page.get()));
        m_page->activateWindow(); // where no window manager does it
        QVERIFY(QTest::qWaitForWindowActive(m_page.get()));
    }
    void cleanup()
    {
        m_page.reset();
        m_bench.reset();
        m_document.reset();
    }

    void withNothingToCompareThePageSaysWhatToDo()
    {
        QCOMPARE(child<QStackedWidget>("stack").currentWidget()->objectName(), QStringLiteral("emptyPage"));
        QVERIFY(child<QLabel>("emptyLabel").text().contains(QStringLiteral("import a unit list")));
        Scenario scenario = comparedScenario();
        scenario.tiers.front().candidates.clear();
        m_document->begin(scenario, {}, true);
        QVERIFY(child<QLabel>("emptyLabel").text().contains(QStringLiteral("Drag a rung on the bench to make a candidate")));
        m_bench->select({0});
        m_bench->nudge(-1); // the first edit of the current ladder makes a candidate
        QCOMPARE(child<QStackedWidget>("stack").currentWidget()->objectName(), QStringLiteral("comparePage"));
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 0}));
        QCOMPARE(m_page->selectedCandidate(), 0);
        m_document->undoStack().undo();
        QCOMPARE(child<QStackedWidget>("stack").currentWidget()->objectName(), QStringLiteral("emptyPage"));
    }

    void whatHappensWhileThePageIsHiddenShowsLater()
    {
        m_document->begin(comparedScenario(), {}, true);
        m_page->hide();
        m_document->discardCandidate(0, 1);
        m_page->show();
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 0, 1}));
        QCOMPARE(heading(2), QStringLiteral("Same bottom"));
    }

    void columnsAreDraggedByTheirHeading()
    {
        m_document->begin(comparedScenario(), {}, true);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 0, 1, 2}));
        QHeaderView& header = *table().horizontalHeader();
        const auto middle = [&](int column) {
            return QPoint(header.sectionViewportPosition(column) + header.sectionSize(column) / 2, header.height() / 2);
        };
        const QPoint from = middle(0);
        const QPoint to = middle(2) + QPoint(10, 0);
        QTest::mousePress(header.viewport(), Qt::LeftButton, {}, from);
        for (int i = 1; i <= 10; ++i)
            QTest::mouseMove(header.viewport(), from + (to - from) * i / 10);
        QTest::mouseRelease(header.viewport(), Qt::LeftButton, {}, to);
        QTRY_COMPARE(m_page->shownCandidates(), (Ladders{0, 1, -1, 2}));
        QCOMPARE(header.visualIndex(0), 0); // the model has the order, and the header adds none of its own
        QCOMPARE(heading(2), QStringLiteral("current"));
        QCOMPARE(plotOrder(), (QStringList{QStringLiteral("Lower end"), QStringLiteral("Steeper"), QStringLiteral("current"),
                                           QStringLiteral("Same bottom")}));
        // The order lasts.
        m_bench->workOn(1);
        QCOMPARE(m_page->shownCandidates(), (Ladders{0, 1, -1, 2}));
    }

    void thePickOutlivesARefresh()
    {
        Scenario scenario = comparedScenario();
        TierCase other = scenario.tiers[0];
        other.tier.name = "Box 9";
        const TierCase compared = scenario.tiers[0];
        scenario.tiers = {other, compared};
        m_document->begin(scenario, {}, true);
        m_bench->showTier(1);
        table().setFocus();
        table().setCurrentIndex(table().model()->index(0, 1));
        QTest::keyClick(&table(), Qt::Key_Right, Qt::AltModifier);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 1, 0, 2}));
        RefreshPlan plan;
        plan.currency = m_document->scenario().currency;
        plan.before = m_document->scenario().tiers;
        plan.after.push_back(plan.before[1]);
        QVERIFY(m_document->refresh(plan, QStringLiteral("a.csv")));
        QCOMPARE(m_bench->tier(), 0);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 1, 0, 2}));
        QCOMPARE(m_page->selectedCandidate(), 0);
        m_document->undoStack().undo();
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 1, 0, 2}));
        m_bench->showTier(0);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 0, 1, 2}));
        m_document->begin(scenario, {}, true); // another scenario, though of the same names
        m_bench->showTier(1);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 0, 1, 2}));
    }

    void columnsMoveByKeysAndTakeTheSelectionAlong()
    {
        m_document->begin(comparedScenario(), {}, true);
        table().setFocus();
        table().setCurrentIndex(table().model()->index(3, 1));
        QCOMPARE(m_page->selectedCandidate(), 0);
        QTest::keyClick(&table(), Qt::Key_Right, Qt::AltModifier);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 1, 0, 2}));
        QCOMPARE(m_page->selectedCandidate(), 0);
        QCOMPARE(table().currentIndex(), table().model()->index(3, 2));
        for (int i = 0; i < 4; ++i) // two steps, then the edge
            QTest::keyClick(&table(), Qt::Key_Left, Qt::AltModifier);
        QCOMPARE(m_page->shownCandidates(), (Ladders{0, -1, 1, 2}));
        QCOMPARE(plotOrder().first(), QStringLiteral("Lower end"));
    }

    void laddersArePickedFromTheKeyboard()
    {
        Scenario scenario = comparedScenario();
        for (int i = 0; i < 5; ++i) {
            Candidate more = scenario.tiers.front().candidates[0];
            more.name = "More " + std::to_string(i);
            scenario.tiers.front().candidates.push_back(more);
        }
        m_document->begin(scenario, {}, true);
        auto& button = child<QPushButton>("compareButton");
        QCOMPARE(button.text().remove(QLatin1Char('&')), QStringLiteral("Compare 4 of 9"));
        QMenu& menu = *button.menu();
        // The menu runs its own event loop until it is closed: the keys are pressed from inside it.
        const auto withMenu = [&](const std::function<void()>& press) {
            QTimer::singleShot(0, this, [&] {
                press();
                QVERIFY(menu.isVisible()); // ticking leaves it open
                QTest::keyClick(&menu, Qt::Key_Escape);
            });
            button.setFocus();
            QTest::keyClick(&button, Qt::Key_Space);
            QVERIFY(!menu.isVisible());
        };
        const auto goTo = [&](int place) {
            menu.setActiveAction(menu.actions().constFirst());
            for (int i = 0; i < place; ++i)
                QTest::keyClick(&menu, Qt::Key_Down);
        };
        withMenu([&] {
            goTo(0);
            QTest::keyClick(&menu, Qt::Key_Space); // the current ladder goes
            goTo(1);
            QTest::keyClick(&menu, Qt::Key_Return); // and Lower end
        });
        QCOMPARE(m_page->shownCandidates(), (Ladders{1, 2}));
        // Two are the least: what is ticked stays ticked.
        QVERIFY(!menu.actions().at(2)->isEnabled() && !menu.actions().at(3)->isEnabled());
        withMenu([&] {
            for (const int place : {4, 5, 6, 7, 8}) {
                const QRect entry = menu.actionGeometry(menu.actions().at(place));
                QTest::mouseClick(&menu, Qt::LeftButton, {}, entry.center());
            }
        });
        QCOMPARE(m_page->shownCandidates(), (Ladders{1, 2, 3, 4, 5, 6})); // six are the most
        QVERIFY(!menu.actions().at(8)->isEnabled());
        QCOMPARE(button.text().remove(QLatin1Char('&')), QStringLiteral("Compare 6 of 9"));
    }

    void laddersAreLaidOverEachOther()
    {
        m_document->begin(comparedScenario(), {}, true);
        auto& plot = child<SideBySidePlot>("sideBySidePlot");
        QTest::keyClick(m_page.get(), Qt::Key_L, Qt::AltModifier);  // the button's mnemonic
        QTRY_VERIFY(child<QRadioButton>("overButton").isChecked()); // a mnemonic presses the button for a moment
        QCOMPARE(plot.arrangement(), SideBySidePlot::Arrangement::overlay);
        QTest::mouseClick(&child<QRadioButton>("columnsButton"), Qt::LeftButton, {}, QPoint(8, 8));
        QCOMPARE(plot.arrangement(), SideBySidePlot::Arrangement::columns);
        // Each picture stands over its column.
        QTest::qWait(50);
        for (int column = 0; column < 4; ++column) {
            const int left = table().viewport()->mapTo(m_page.get(), QPoint(table().columnViewportPosition(column), 0)).x();
            const int picture = plot.mapTo(m_page.get(), plot.column(std::size_t(column)).topLeft().toPoint()).x();
            QVERIFY2(std::abs(left - picture) <= 3, qPrintable(QStringLiteral("%1 %2").arg(left).arg(picture))); // whole pixels, shared out
        }
    }

    void aCandidateIsChosen()
    {
        m_document->begin(comparedScenario(), {}, true);
        auto& choose = child<QPushButton>("chooseButton");
        QCOMPARE(m_page->selectedCandidate(), 0); // at first: a candidate, as the current ladder cannot be chosen
        table().setCurrentIndex(table().model()->index(0, 0));
        QVERIFY(!choose.isEnabled()); // the current ladder is asked already
        table().setCurrentIndex(table().model()->index(0, 2));
        QCOMPARE(choose.text(), QStringLiteral("&Choose “Steeper”"));
        QSignalSpy chosen(m_page.get(), &SideBySidePage::chosen);
        QTest::mouseClick(&choose, Qt::LeftButton);
        QCOMPARE(chosen.count(), 1);
        QCOMPARE(chosen.at(0).at(0).toInt(), 1);
        QCOMPARE(m_document->tier(0)->chosen, std::optional<int>(1));
        QCOMPARE(heading(2), QStringLiteral("✓ Steeper"));
        QCOMPARE(m_page->selectedCandidate(), 1);
        m_document->undoStack().undo();
        QCOMPARE(heading(2), QStringLiteral("Steeper"));
    }

    void theTableAndThePictureLeaveWithTheCaution()
    {
        m_document->begin(comparedScenario(), {}, true);
        QVERIFY(child<QLabel>("sideBySideCaution").isVisible());
        QCOMPARE(child<QLabel>("sideBySideCaution").text(), cautionText());
        const QTemporaryDir folder;
        QSignalSpy told(m_page.get(), &SideBySidePage::told);

        trigger("saveTableAction"); // given up
        QCOMPARE(m_answers.suggested.takeLast(), QStringLiteral("Tern Wharf (invented) Box 4 side by side.csv"));
        QCOMPARE(told.count(), 0);
        m_answers.path = folder.filePath(QStringLiteral("table"));
        trigger("saveTableAction");
        QCOMPARE(told.count(), 1);
        const auto lines = readTable(content(folder.filePath(QStringLiteral("table.csv"))));
        QCOMPARE(lines[0].mid(3), (QStringList{QStringLiteral("current"), QStringLiteral("Lower end"), QStringLiteral("Steeper"),
                                               QStringLiteral("Same bottom"), QStringLiteral("best")}));
        QCOMPARE(lines[1], (QStringList{QStringLiteral("gap"), QStringLiteral("Gap"), QStringLiteral("EUR"), QStringLiteral("12.50"),
                                        QStringLiteral("5.00"), QStringLiteral("12.75"), QStringLiteral("5.00"),
                                        QStringLiteral("Lower end; Same bottom")}));

        for (const char* suffix : {"png", "svg", "pdf"}) {
            m_answers.path = folder.filePath(QStringLiteral("picture.") + QLatin1String(suffix));
            const QString path = m_answers.path;
            trigger("savePictureAction");
            const QByteArray bytes = content(path);
            const bool good = qstrcmp(suffix, "png") == 0   ? !QImage(path).isNull()
                              : qstrcmp(suffix, "svg") == 0 ? bytes.contains("<svg")
                                                            : bytes.startsWith("%PDF-");
            QVERIFY2(good, suffix);
        }
        m_answers.path = folder.filePath(QStringLiteral("no such folder/table.csv"));
        trigger("saveTableAction");
        QCOMPARE(m_answers.told.size(), 1);
        QVERIFY(m_answers.told[0].startsWith(QStringLiteral("The table was not saved.")));
        QVERIFY(!QFile::exists(folder.filePath(QStringLiteral("no such folder"))));
    }

    void theTableIsCopied()
    {
        m_document->begin(comparedScenario(), {}, true);
        table().setFocus();
        table().setCurrentIndex(table().model()->index(0, 1));
        QTest::keySequence(&table(), QKeySequence::Copy);
        QCOMPARE(QGuiApplication::clipboard()->text(), QStringLiteral("5.00")); // the figure without its mark
        trigger("copyTableAction");
        const QStringList lines = QGuiApplication::clipboard()->text().split(QLatin1Char('\n'));
        QCOMPARE(lines[0], QStringLiteral("\tcurrent\tLower end\tSteeper\tSame bottom"));
        QCOMPARE(lines[1], QStringLiteral("Gap\t12.50\t5.00\t12.75\t5.00"));
        QCOMPARE(lines.size(), table().model()->rowCount() + 1);
        trigger("copyPictureAction");
        QVERIFY(!QGuiApplication::clipboard()->image().isNull());
    }

    void fourAreComparedAgainstOneByKeys()
    {
        m_document->begin(comparedScenario(), {}, true);
        QCOMPARE(m_page->shownCandidates(), (Ladders{-1, 0, 1, 2}));
        auto& against = child<QComboBox>("againstBox");
        QCOMPARE(against.count(), 5);
        against.setFocus();
        QTest::keyClick(&against, Qt::Key_Down); // against the current ladder
        QCOMPARE(cell("gap", 1), QStringLiteral("−7.50"));
        QTest::keyClick(&child<QComboBox>("againstBox"), Qt::Key_Down); // against Lower end
        QCOMPARE(cell("gap", 0), QStringLiteral("+7.50"));
        QCOMPARE(cell("gap", 1), QStringLiteral("5.00"));
        // It goes with its ladder, wherever that moves, and ends when the ladder goes.
        table().setFocus();
        table().setCurrentIndex(table().model()->index(0, 1));
        QTest::keyClick(&table(), Qt::Key_Right, Qt::AltModifier);
        QCOMPARE(cell("gap", 2), QStringLiteral("5.00"));
        QCOMPARE(cell("gap", 0), QStringLiteral("+7.50"));
        m_document->discardCandidate(0, 0);
        QCOMPARE(against.currentIndex(), 0);
        QCOMPARE(cell("gap", 0), QStringLiteral("12.50"));
    }

    void weightsAreSetByKeysAndRank()
    {
        m_document->begin(comparedScenario(), {}, true);
        QCOMPARE(child<QLabel>("rankingLabel").text(), QStringLiteral("Set weights to rank the ladders."));
        auto& gap = child<QSpinBox>("weightGapBox");
        gap.setFocus();
        QTest::keyClick(&gap, Qt::Key_Up);
        QVERIFY2(child<QLabel>("rankingLabel").text().startsWith(QStringLiteral("1. Lower end (100), 1. Same bottom (100), 3. current")),
                 qPrintable(child<QLabel>("rankingLabel").text()));
        QVERIFY(gap.hasFocus());
        QCOMPARE(cell("ranking", 1), QStringLiteral("1. with 100"));
        QTest::keyClick(&gap, Qt::Key_Down);
        QCOMPARE(child<QLabel>("rankingLabel").text(), QStringLiteral("Set weights to rank the ladders."));
    }

    void pricesByUnitAreShownAndLeaveWithTheCaution()
    {
        m_document->begin(comparedScenario(), {}, true);
        auto& units = child<QTableView>("unitPricesTable");
        QVERIFY(!units.isVisible());
        QTest::mouseClick(&child<QCheckBox>("unitPricesBox"), Qt::LeftButton, {}, QPoint(8, 8));
        QTRY_VERIFY(units.isVisible());
        QVERIFY(!table().isVisible());
        QCOMPARE(units.model()->index(0, 3).data().toString(), QStringLiteral("70.00 ▼")); // A-1 on Lower end
        QSignalSpy told(m_page.get(), &SideBySidePage::told);
        const QTemporaryDir folder;
        m_answers.path = folder.filePath(QStringLiteral("prices"));
        trigger("saveUnitPricesAction");
        QCOMPARE(told.count(), 1);
        QVERIFY(told.at(0).at(0).toString().contains(cautionText()));
        const auto lines = readTable(content(folder.filePath(QStringLiteral("prices.csv"))));
        QCOMPARE(lines.size(), std::size_t(5));
        trigger("copyUnitPricesAction");
        QVERIFY(QGuiApplication::clipboard()->text().contains(QStringLiteral("'=B-4")));
        QVERIFY(told.at(1).at(0).toString().contains(cautionText()));
    }

private:
    /// What a cell is copied as: without the mark of the best.
    QString cell(const char* key, int column)
    {
        const auto& model = dynamic_cast<const SideBySideModel&>(*table().model());
        return model.index(model.rowOf(key), column).data(kCopyRole).toString();
    }
    template <class T>
    T& child(const char* name)
    {
        T* found = m_page->findChild<T*>(QString::fromLatin1(name));
        if (!found)
            qFatal("no child of that name: %s", name);
        return *found;
    }
    QTableView& table() { return child<QTableView>("sideBySideTable"); }
    QString heading(int column) { return table().model()->headerData(column, Qt::Horizontal).toString(); }
    void trigger(const char* action) { child<QAction>(action).trigger(); }
    /// The ladders as the picture describes them, one after the other.
    QStringList plotOrder()
    {
        const QString said = child<SideBySidePlot>("sideBySidePlot").accessibleDescription();
        QMap<qsizetype, QString> places;
        for (const char* name : {"current", "Lower end", "Steeper", "Same bottom"})
            places.insert(said.indexOf(QLatin1String(name) + QStringLiteral(": ")), QLatin1String(name));
        return places.values();
    }
    static QByteArray content(const QString& path)
    {
        QFile file(path);
        return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray();
    }

    std::unique_ptr<Document> m_document;
    std::unique_ptr<Workbench> m_bench;
    PathAnswers m_answers;
    std::unique_ptr<SideBySidePage> m_page;
};

QTEST_MAIN(SideBySideTest)
#include "side_by_side_test.moc"
