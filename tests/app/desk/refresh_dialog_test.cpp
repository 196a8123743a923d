// SPDX-License-Identifier: GPL-3.0-or-later
// What a person reads, chooses, copies and saves before a refresh, by mouse and by keyboard.
#include "refresh_dialog.h"

#include "caution.h"
#include "desk_fixture.h"
#include "plot_words.h"

#include <QAbstractItemModelTester>
#include <QClipboard>
#include <QElapsedTimer>
#include <QGuiApplication>
#include <QListWidget>
#include <QPushButton>

using namespace rungwright;

namespace
{

/// "Mill Quay": one tier with a candidate and a sheet handed over, one that leaves with its candidate, one marked as seen.
Scenario before()
{
    Scenario scenario;
    scenario.currency = Currency{"EUR", 2};
    for (const char* name : {"Room 8-10", "Room 3-5", "Room 1-2"}) {
        TierCase tierCase;
        tierCase.tier = {"Mill Quay", name, Price{5500}, {}};
        for (int u = 0; u < 6; ++u)
            tierCase.tier.units.push_back({std::string(name).substr(5) + "/" + std::to_string(u),
                                           Price{600000 + 5000 * u},
                                           u % 2 == 0 ? Status::vacant : Status::occupied,
                                           false,
                                           {},
                                           {},
                                           {}});
        scenario.tiers.push_back(tierCase);
    }
    TierCase& first = scenario.tiers[0];
    first.candidates = {{"Lower", "", askingPrices(first.tier.units)}};
    for (std::size_t u = 0; u < 4; ++u)
        first.candidates[0].prices[u] -= Price{10000};
    first.signedOff =
        SignedSheet{"Lower", "2026-11-24T09:30:00Z", {{"8-10/0", Price{600000}, Price{590000}}, {"8-10/1", Price{605000}, Price{595000}}}};
    scenario.tiers[1].candidates = {{"=Odd", "", askingPrices(scenario.tiers[1].tier.units)}};
    scenario.tiers[1].candidates[0].prices[0] = Price{100};
    scenario.tiers[2].seen = true;
    return scenario;
}

RefreshPlan planFor(const Scenario& scenario, std::vector<TierCase> list)
{
    auto plan = planRefresh(scenario, scenario.currency, std::move(list));
    if (!plan.ok())
        qFatal("%s", plan.trouble().c_str());
    return std::move(plan).value();
}

RefreshPlan plan()
{
    const Scenario scenario = before();
    std::vector<TierCase> list;
    for (const TierCase& tierCase : scenario.tiers)
        list.push_back({tierCase.tier, {}, {}, {}, {}, false, {}});
    std::vector<Unit>& units = list[0].tier.units;
    units[0].asking = Price{590000};    // what was handed over
    units[2].asking = Price{625000};    // clashes with the candidate
    units[4].status = Status::occupied; // newly let
    units.erase(units.begin() + 3);     // gone, with a change
    units.push_back({"8-10/9", Price{700000}, {}, false, {}, {}, {}});
    list.erase(list.begin() + 1);
    return planFor(scenario, list);
}

} // namespace

class RefreshDialogTest : public QObject
{
    Q_OBJECT
private slots:
    void init()
    {
        QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom));
        m_plan = std::make_unique<RefreshPlan>(plan());
        m_dialog =
            std::make_unique<RefreshDialog>(*m_plan, Currency{"EUR", 2}, QStringLiteral("/lists/week 49.csv"), nullptr, &m_questions);
        m_dialog->open();
        QVERIFY(QTest::qWaitForWindowActive(m_dialog.get()));
    }
    void cleanup() { m_dialog.reset(); }

    void theSummaryIsPlain();
    void everyTopicShowsItsLines();
    void keysWalkTheTopics();
    void enterRefreshesAndEscapeLeaves();
    void theButtonsDoWhatTheySay();
    void tablesAreCopiedAndSaved();
    void aFileThatCannotBeWrittenIsTold();
    void whatWasNotTakenStandsFirst();
    void aLockIsAReasonToClash();
    void aCurrencyNotYetKnownIsSaid();
    void nothingToDoIsSaid();
    void aHundredThousandLinesAppearAtOnce();
    void everythingHasAName();

private:
    QListWidget& topics() { return *m_dialog->findChild<QListWidget*>(QStringLiteral("topicsList")); }
    QTableView& table() { return *m_dialog->findChild<QTableView*>(QStringLiteral("linesTable")); }
    QPushButton& button(const char* name) { return *m_dialog->findChild<QPushButton*>(QString::fromLatin1(name)); }
    QString label(const char* name) { return m_dialog->findChild<QLabel*>(QString::fromLatin1(name))->text(); }
    /// A click on the topic of that text.
    void choose(const QString& text)
    {
        const QList<QListWidgetItem*> found = topics().findItems(text, Qt::MatchExactly);
        QVERIFY2(found.size() == 1, qPrintable(text));
        topics().scrollToItem(found[0]);
        QTest::mouseClick(topics().viewport(), Qt::LeftButton, {}, topics().visualItemRect(found[0]).center());
    }
    QStringList row(int row)
    {
        QStringList cells;
        for (int column = 0; column < table().model()->columnCount(); ++column)
            cells << table().model()->index(row, column).data().toString();
        return cells;
    }

    PresetQuestions m_questions;
    std::unique_ptr<RefreshPlan> m_plan;
    std::unique_ptr<RefreshDialog> m_dialog;
};

void RefreshDialogTest::theSummaryIsPlain()
{
    QVERIFY(label("titleLabel").contains(QStringLiteral("week 49.csv")));
    QCOMPARE(label("sentenceLabel"), QStringLiteral("The list changes something in 1 of 2 tiers that stay. 1 tier leaves. Units: 18 today, "
                                                    "12 then. One tier marked as seen is to be looked at again."));
    QCOMPARE(label("candidatesLabel"),
             QStringLiteral("1 of 2 candidates leave with their tiers. Of the price changes made in them, 1 is kept, 1 "
                            "is kept and clashes with the list, 1 is asked by the list now, 2 are dropped."));
    QCOMPARE(label("signedLabel"), QStringLiteral("Of 1 price sheet handed over: 1 applied in part."));
    QStringList texts;
    for (int i = 0; i < topics().count(); ++i)
        texts << topics().item(i)->text();
    const QStringList wanted{QStringLiteral("What the list changes"),
                             QStringLiteral("All 12 changes"),
                             QStringLiteral("1 tier gone"),
                             QStringLiteral("1 new unit"),
                             QStringLiteral("7 units gone"),
                             QStringLiteral("1 unit newly let"),
                             QStringLiteral("1 price raised, by 150.00 in all"),
                             QStringLiteral("1 price lowered, by 100.00 in all"),
                             QStringLiteral("Your candidates"),
                             QStringLiteral("2 candidates"),
                             QStringLiteral("1 price change kept"),
                             QStringLiteral("1 kept, clashes with the list"),
                             QStringLiteral("1 asked by the list now"),
                             QStringLiteral("1 dropped, unit gone"),
                             QStringLiteral("1 dropped, tier gone"),
                             QStringLiteral("Handed over, and asked now"),
                             QStringLiteral("1 price sheet")};
    QCOMPARE(texts, wanted);
}

void RefreshDialogTest::everyTopicShowsItsLines()
{
    const QAbstractItemModelTester tester(table().model());
    QCOMPARE(table().model()->rowCount(), 12); // all changes come first
    choose(QStringLiteral("1 price raised, by 150.00 in all"));
    QCOMPARE(table().model()->rowCount(), 1);
    QCOMPARE(row(0).mid(1), (QStringList{QStringLiteral("Mill Quay"), QStringLiteral("Room 8-10"), QStringLiteral("8-10/2"),
                                         QStringLiteral("6,100.00"), QStringLiteral("6,250.00")}));
    choose(QStringLiteral("1 unit newly let"));
    QCOMPARE(row(0).mid(4), (QStringList{statusText(Status::vacant), statusText(Status::occupied)}));
    choose(QStringLiteral("1 kept, clashes with the list"));
    QCOMPARE(row(0), (QStringList{QStringLiteral("Mill Quay"), QStringLiteral("Room 8-10"), QStringLiteral("Lower"),
                                  QStringLiteral("8-10/2"), QStringLiteral("6,100.00"), QStringLiteral("6,000.00"),
                                  QStringLiteral("6,250.00"), QStringLiteral("new price")}));
    choose(QStringLiteral("2 candidates"));
    QCOMPARE(row(1)[3], QStringLiteral("leaves with its tier"));
    choose(QStringLiteral("1 price sheet"));
    QCOMPARE(row(0)[4], QStringLiteral("partly: 1 of 2"));
    QCOMPARE(row(1).mid(4), (QStringList{QStringLiteral("another price is asked"), QStringLiteral("8-10/1"), QStringLiteral("6,050.00"),
                                         QStringLiteral("5,950.00"), QStringLiteral("6,050.00")}));
    choose(QStringLiteral("All 12 changes"));
    QCOMPARE(table().model()->rowCount(), 12);
}

void RefreshDialogTest::keysWalkTheTopics()
{
    QVERIFY(topics().hasFocus());
    QCOMPARE(topics().currentItem()->text(), QStringLiteral("All 12 changes"));
    QTest::keyClick(&topics(), Qt::Key_Down);
    QCOMPARE(topics().currentItem()->text(), QStringLiteral("1 tier gone"));
    QCOMPARE(table().model()->rowCount(), 1);
    for (int i = 0; i < 6; ++i)
        QTest::keyClick(&topics(), Qt::Key_Down); // past the heading
    QCOMPARE(topics().currentItem()->text(), QStringLiteral("2 candidates"));
    QTest::keyClick(m_dialog.get(), Qt::Key_Tab);
    QVERIFY(table().hasFocus());
}

void RefreshDialogTest::enterRefreshesAndEscapeLeaves()
{
    QTest::keyClick(m_dialog->focusWidget(), Qt::Key_Return);
    QCOMPARE(m_dialog->result(), static_cast<int>(QDialog::Accepted));
    m_dialog->open();
    QVERIFY(QTest::qWaitForWindowActive(m_dialog.get()));
    QTest::keyClick(m_dialog->focusWidget(), Qt::Key_Escape);
    QCOMPARE(m_dialog->result(), static_cast<int>(QDialog::Rejected));
}

void RefreshDialogTest::theButtonsDoWhatTheySay()
{
    QTest::mouseClick(&button("refreshButton"), Qt::LeftButton);
    QCOMPARE(m_dialog->result(), static_cast<int>(QDialog::Accepted));
    m_dialog->open();
    QTest::mouseClick(&button("leaveButton"), Qt::LeftButton);
    QCOMPARE(m_dialog->result(), static_cast<int>(QDialog::Rejected));
    QVERIFY(!m_dialog->isVisible());
}

void RefreshDialogTest::tablesAreCopiedAndSaved()
{
    choose(QStringLiteral("1 dropped, tier gone"));
    QTest::mouseClick(&button("copyButton"), Qt::LeftButton);
    const QString caution = cautionText().replace(QLatin1Char('"'), QStringLiteral("\"\"")); // quoted, as in CSV
    QCOMPARE(QGuiApplication::clipboard()->text(), QStringLiteral("Site\tTier\tCandidate\tUnit\tAsked before\tCandidate’s\tAsked then\n"
                                                                  "Mill Quay\tRoom 3-5\t'=Odd\t3-5/0\t6,000.00\t1.00\t\n\n\"%1\"")
                                                       .arg(caution));
    QVERIFY(!cautionText().isEmpty());
    QCOMPARE(label("cautionLabel"), cautionText());
    QVERIFY(m_dialog->findChild<QLabel*>(QStringLiteral("cautionLabel"))->isVisible());
    table().selectRow(0); // the shortcut and the menu's entry do the same
    QGuiApplication::clipboard()->clear();
    table().findChild<QAction*>(QStringLiteral("copyAction"))->trigger();
    QVERIFY(QGuiApplication::clipboard()->text().endsWith(QStringLiteral("\n\n\"%1\"").arg(caution)));
    QTemporaryDir folder;
    m_questions.nextPath = folder.filePath(QStringLiteral("lines")); // the suffix is ours to add
    QTest::mouseClick(&button("saveButton"), Qt::LeftButton);
    QTRY_VERIFY(label("resultLabel").startsWith(QStringLiteral("✓")));
    QFile saved(folder.filePath(QStringLiteral("lines.csv")));
    QVERIFY(saved.open(QIODevice::ReadOnly));
    QCOMPARE(saved.readAll(), QByteArrayLiteral("Site,Tier,Candidate,Unit,Asked before,Candidate\xe2\x80\x99s,Asked then\r\n"
                                                "Mill Quay,Room 3-5,'=Odd,3-5/0,6000.00,1.00,\r\n"));
    QVERIFY(label("resultLabel").contains(QStringLiteral("lines.csv")));
}

void RefreshDialogTest::aFileThatCannotBeWrittenIsTold()
{
    QTemporaryDir folder;
    m_questions.nextPath = folder.filePath(QStringLiteral("no/such/folder/lines.csv"));
    QTest::mouseClick(&button("saveButton"), Qt::LeftButton);
    QTRY_VERIFY(label("resultLabel").contains(QStringLiteral("Not saved")));
    m_questions.nextPath.clear(); // given up: nothing is said
    QTest::mouseClick(&button("saveButton"), Qt::LeftButton);
}

void RefreshDialogTest::whatWasNotTakenStandsFirst()
{
    QVERIFY(!m_dialog->findChild<QLabel*>(QStringLiteral("warningsLabel"))->isVisible());
    RefreshDialog dialog(*m_plan, Currency{"EUR", 2}, QStringLiteral("week.csv"), nullptr, &m_questions,
                         {QStringLiteral("12 rows were left out."), QStringLiteral("tiers taken without a floor: 1")});
    dialog.open();
    QVERIFY(QTest::qWaitForWindowActive(&dialog));
    const auto& warnings = *dialog.findChild<QLabel*>(QStringLiteral("warningsLabel"));
    QVERIFY(warnings.isVisible());
    QCOMPARE(warnings.text(), QStringLiteral("⚠ 12 rows were left out.\n⚠ tiers taken without a floor: 1"));
    QVERIFY(warnings.y() < dialog.findChild<QLabel*>(QStringLiteral("sentenceLabel"))->y());
}

void RefreshDialogTest::aLockIsAReasonToClash()
{
    const Scenario scenario = before();
    std::vector<TierCase> list(scenario.tiers.begin(), scenario.tiers.end());
    list[0].tier.units[0].locked = true;
    const RefreshPlan locking = planFor(scenario, list);
    const RefreshLines lines(locking, scenario.currency, {RefreshTopic::What::fates, static_cast<int>(ChangeFate::clash), QString(), 1, 1});
    QCOMPARE(lines.rows(), 1);
    QCOMPARE(lines.texts(0, false).last(), QStringLiteral("now locked"));
}

void RefreshDialogTest::aCurrencyNotYetKnownIsSaid()
{
    Scenario scenario = before();
    scenario.currency = Currency{"XXX", 2};
    const auto plan = planRefresh(scenario, Currency{"EUR", 2}, {scenario.tiers.begin(), scenario.tiers.end()});
    QVERIFY(plan.ok());
    RefreshDialog dialog(plan.value(), plan.value().currency, QStringLiteral("week.csv"));
    QVERIFY(dialog.findChild<QLabel*>(QStringLiteral("sentenceLabel"))->text().contains(QStringLiteral("takes the list’s: EUR.")));
    QVERIFY(dialog.findChild<QPushButton*>(QStringLiteral("refreshButton"))->isEnabled());
    QVERIFY(dialog.findChild<QListWidget*>(QStringLiteral("topicsList"))->item(0)->text() == QStringLiteral("Your candidates"));
}

void RefreshDialogTest::nothingToDoIsSaid()
{
    Scenario scenario = before();
    for (TierCase& tierCase : scenario.tiers) {
        tierCase.candidates.clear();
        tierCase.signedOff.reset();
        tierCase.seen = false;
    }
    std::vector<TierCase> list(scenario.tiers.begin(), scenario.tiers.end());
    const RefreshPlan same = planFor(scenario, list);
    RefreshDialog dialog(same, scenario.currency, QStringLiteral("same.csv"));
    dialog.open();
    QVERIFY(QTest::qWaitForWindowActive(&dialog));
    QVERIFY(!dialog.findChild<QTableView*>()->isVisible());
    QVERIFY(!dialog.findChild<QPushButton*>(QStringLiteral("refreshButton"))->isEnabled());
    QVERIFY(dialog.findChild<QLabel*>(QStringLiteral("sentenceLabel"))
                ->text()
                .startsWith(QStringLiteral("The list says what the scenario says already")));
    QTest::keyClick(dialog.focusWidget(), Qt::Key_Return);
    QCOMPARE(dialog.result(), static_cast<int>(QDialog::Rejected));
}

void RefreshDialogTest::aHundredThousandLinesAppearAtOnce()
{
    Scenario scenario;
    scenario.currency = Currency{"EUR", 2};
    for (int t = 0; t < 2100; ++t) {
        TierCase tierCase;
        tierCase.tier = {"Site", "Tier " + std::to_string(t), Price{100}, std::vector<Unit>(50)};
        for (std::size_t u = 0; u < 50; ++u) {
            tierCase.tier.units[u].name = std::to_string(u);
            tierCase.tier.units[u].asking = Price{1000};
        }
        scenario.tiers.push_back(tierCase);
    }
    std::vector<TierCase> list(scenario.tiers.begin(), scenario.tiers.end());
    for (TierCase& tierCase : list) {
        for (Unit& unit : tierCase.tier.units)
            unit.asking = Price{1100};
    }
    const RefreshPlan many = planFor(scenario, list);
    QElapsedTimer timer;
    timer.start();
    RefreshDialog dialog(many, scenario.currency, QStringLiteral("many.csv"));
    dialog.open();
    QVERIFY(QTest::qWaitForWindowExposed(&dialog));
    QCoreApplication::processEvents();
    qInfo("100,000 lines on screen after %lld ms", static_cast<long long>(timer.elapsed()));
    auto& lines = *dialog.findChild<QTableView*>();
    QCOMPARE(lines.model()->rowCount(), 100'000);
    timer.restart();
    QTest::keyClick(&lines, Qt::Key_End, Qt::ControlModifier);
    lines.viewport()->repaint();
    qInfo("scrolled to the end in %lld ms", static_cast<long long>(timer.elapsed()));
    QVERIFY(dialog.findChild<QLabel*>(QStringLiteral("keptLabel"))->text().startsWith(QStringLiteral("100,000 of 105,000 lines shown")));
    QGuiApplication::clipboard()->setText(QStringLiteral("kept"));
    QTest::mouseClick(dialog.findChild<QPushButton*>(QStringLiteral("copyButton")), Qt::LeftButton);
    QCOMPARE(QGuiApplication::clipboard()->text(), QStringLiteral("kept"));
    QVERIFY(dialog.findChild<QLabel*>(QStringLiteral("resultLabel"))
                ->text()
                .startsWith(QStringLiteral("⚠ Not copied: 100,000 rows are too many at once.")));
}

void RefreshDialogTest::everythingHasAName()
{
    for (const QWidget* widget : std::initializer_list<const QWidget*>{&topics(), &table()}) {
        QVERIFY(!widget->accessibleName().isEmpty());
        QVERIFY(!widget->accessibleDescription().isEmpty());
    }
    for (const QPushButton* one : m_dialog->findChildren<QPushButton*>())
        QVERIFY(one->text().contains(u'&') && !one->accessibleDescription().isEmpty());
}

QTEST_MAIN(RefreshDialogTest)
#include "refresh_dialog_test.moc"
