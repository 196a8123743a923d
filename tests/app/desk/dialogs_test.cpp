// SPDX-License-Identifier: GPL-3.0-or-later
// The price sheet, the price rules and the refused rows, as a person at the desk meets them.
#include "caution.h"
#include "compared_tier.h"
#include "refused_rows_dialog.h"
#include "rules_dialog.h"
#include "sheet_dialog.h"

#include <QAbstractItemModelTester>
#include <QAbstractProxyModel>
#include <QApplication>
#include <QCheckBox>
#include <QClipboard>
#include <QDialogButtonBox>
#include <QGuiApplication>
#include <QHeaderView>
#include <QLabel>
#include <QLineEdit>
#include <QPushButton>
#include <QRandomGenerator>
#include <QSignalSpy>
#include <QTableView>
#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

namespace
{

const Currency kEuro = *findCurrency("EUR");

template <class T>
T& child(QWidget& in, const char* name)
{
    T* found = in.findChild<T*>(QString::fromLatin1(name));
    if (!found)
        qFatal("no child of that name: %s", name);
    return *found;
}

QString labelText(QWidget& in, const char* name) { return child<QLabel>(in, name).text(); }

void click(QWidget& widget) { QTest::mouseClick(&widget, Qt::LeftButton); }

/// Puts the text in a field as a person does: select all, type, leave.
void type(QWidget& dialog, const char* field, const QString& text)
{
    auto& edit = child<QLineEdit>(dialog, field);
    edit.setFocus();
    QTest::keySequence(&edit, QKeySequence::SelectAll);
    QTest::keyClick(&edit, Qt::Key_Delete);
    QTest::keyClicks(&edit, text);
    QTest::keyClick(&edit, Qt::Key_Tab);
}

QString firstColumn(const QTableView& table)
{
    QStringList texts;
    for (int row = 0; row < table.model()->rowCount(); ++row)
        texts << table.model()->index(row, 0).data().toString();
    return texts.join(QLatin1Char(' '));
}

void showActive(QDialog& dialog)
{
    dialog.open();
    QVERIFY(QTest::qWaitForWindowActive(&dialog));
}

} // namespace

class DialogsTest : public QObject
{
    Q_OBJECT

private slots:
    void initTestCase() { QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom)); }
    void init()
    {
        m_document.begin(comparedScenario(), {}, true);
        QGuiApplication::clipboard()->clear();
    }

    // Price sheet ----------------------------------------------------------------------------------------------------

    void theSheetSaysWhatItChanges()
    {
        SheetDialog dialog(m_document, 0, 0, m_answers);
        showActive(dialog);
        QVERIFY(labelText(dialog, "titleLabel").contains(QStringLiteral("Lower end")));
        // Worked out in compared_tier.h.
        QCOMPARE(labelText(dialog, "unitsChanged"), QStringLiteral("1 of 4"));
        QCOMPARE(labelText(dialog, "totalToday"), QStringLiteral("170.00"));
        QCOMPARE(labelText(dialog, "totalSheet"), QStringLiteral("160.00"));
        QCOMPARE(labelText(dialog, "totalChange"), QStringLiteral("−10.00"));
        QCOMPARE(labelText(dialog, "gapToday"), QStringLiteral("12.50"));
        QCOMPARE(labelText(dialog, "gapSheet"), QStringLiteral("5.00"));
        QCOMPARE(labelText(dialog, "gapChange"), QStringLiteral("−7.50"));
        QCOMPARE(labelText(dialog, "shareToday"), QStringLiteral("18\u00a0%"));
        QCOMPARE(labelText(dialog, "shareSheet"), QStringLiteral("7.1\u00a0%"));
        QCOMPARE(child<QLabel>(dialog, "gapSheet").accessibleName(), QStringLiteral("Gap, On the sheet: 5.00"));
        QVERIFY(child<QLabel>(dialog, "remarksLabel").isHidden());
        QCOMPARE(labelText(dialog, "cautionLabel"), cautionText());
        QVERIFY(child<QLabel>(dialog, "cautionLabel").isVisible());
        QVERIFY(child<QLabel>(dialog, "resultLabel").isHidden());
    }

    void theSheetRemarksOnWhatShouldBeSeen()
    {
        SheetDialog dialog(m_document, 0, 1, m_answers);
        showActive(dialog);
        QVERIFY(child<QLabel>(dialog, "remarksLabel").isVisible());
        QCOMPARE(labelText(dialog, "remarksLabel").split(QLatin1Char('\n')).size(), 2);
    }

    void theSheetIsWrittenAndReadBack()
    {
        const QTemporaryDir folder;
        SheetDialog dialog(m_document, 0, 0, m_answers);
        showActive(dialog);
        QSignalSpy saved(&dialog, &SheetDialog::saved);
        click(child<QPushButton>(dialog, "saveButton")); // the question is given up
        QCOMPARE(m_answers.suggested.takeLast(), QStringLiteral("Tern Wharf (invented) Box 4 Lower end.csv"));
        QVERIFY(child<QLabel>(dialog, "resultLabel").isHidden());

        const QString path = folder.filePath(QStringLiteral("sheet.csv"));
        m_answers.path = folder.filePath(QStringLiteral("sheet"));
        QTest::keyClick(&dialog, Qt::Key_Return); // the default button
        QCOMPARE(saved.count(), 1);
        QCOMPARE(saved.at(0).at(0).toString(), path);
        QVERIFY(labelText(dialog, "resultLabel").contains(QStringLiteral("Written and read back: 4 rows agree. ") + path));
        QVERIFY(child<QLabel>(dialog, "resultLabel").isVisible());
        QFile file(path);
        QVERIFY(file.open(QIODevice::ReadOnly));
        const auto read = sheetFromCsv(file.readAll(), path);
        QVERIFY(read.ok());
        QVERIFY(read.value() == sheetRows(m_document.scenario(), *m_document.tier(0), 0));
        QVERIFY(!m_document.modified()); // looking and writing change nothing
    }

    void aSheetThatCannotBeWrittenSaysWhy()
    {
        const QTemporaryDir folder;
        SheetDialog dialog(m_document, 0, 0, m_answers);
        showActive(dialog);
        QSignalSpy saved(&dialog, &SheetDialog::saved);
        m_answers.path = folder.filePath(QStringLiteral("no such folder/sheet.csv"));
        click(child<QPushButton>(dialog, "saveButton"));
        QCOMPARE(saved.count(), 0);
        QVERIFY(labelText(dialog, "resultLabel").startsWith(QStringLiteral("⚠ Not saved: ")));
        QVERIFY(!QFile::exists(folder.filePath(QStringLiteral("no such folder"))));
    }

    void theRowsAreSortedFilteredAndCopied()
    {
        SheetDialog dialog(m_document, 0, 2, m_answers);
        showActive(dialog);
        auto& table = child<QTableView>(dialog, "rowsTable");
        const QAbstractItemModelTester tester(table.model(), QAbstractItemModelTester::FailureReportingMode::QtTest);
        const QAbstractItemModelTester source(qobject_cast<QAbstractProxyModel*>(table.model())->sourceModel(),
                                              QAbstractItemModelTester::FailureReportingMode::QtTest);
        // Those that change first, each group in ladder order.
        QCOMPARE(firstColumn(table), QStringLiteral("A-1 A-3 A-2 =B-4"));
        const auto clickHeading = [&](int column) {
            const QHeaderView& header = *table.horizontalHeader();
            QTest::mouseClick(header.viewport(), Qt::LeftButton, {},
                              QPoint(header.sectionViewportPosition(column) + 8, header.height() / 2));
        };
        clickHeading(SheetModel::fromColumn);
        QCOMPARE(firstColumn(table), QStringLiteral("A-1 A-2 A-3 =B-4"));
        clickHeading(SheetModel::fromColumn);
        QCOMPARE(firstColumn(table), QStringLiteral("=B-4 A-3 A-2 A-1"));
        clickHeading(SheetModel::fromColumn); // a third click gives the first order back
        QCOMPARE(firstColumn(table), QStringLiteral("A-1 A-3 A-2 =B-4"));

        auto& box = child<QCheckBox>(dialog, "changedOnlyBox");
        box.setFocus();
        QTest::keyClick(&box, Qt::Key_Space);
        QCOMPARE(firstColumn(table), QStringLiteral("A-1 A-3"));
        click(child<QPushButton>(dialog, "copyButton"));
        QCOMPARE(QGuiApplication::clipboard()->text(), QStringLiteral("Unit\tStatus\tFrom\tTo\tChange\tPercent\n"
                                                                      "A-1\tvacant\t80.00\t70.00\t−10.00\t−12.50\u00a0%\n"
                                                                      "A-3\toccupied\t100.00\t95.00\t−5.00\t−5.00\u00a0%"));
        QTest::keyClick(&box, Qt::Key_Space);
        table.setFocus();
        table.selectRow(3);
        QTest::keySequence(&table, QKeySequence::Copy);
        QCOMPARE(QGuiApplication::clipboard()->text(), QStringLiteral("Unit\tStatus\tFrom\tTo\tChange\tPercent\n"
                                                                      "'=B-4\tclosed\t110.00\t110.00\tno change\t"));
    }

    void longNamesDoNotStretchTheDialog()
    {
        Scenario scenario = comparedScenario();
        TierCase& tierCase = scenario.tiers.front();
        const std::string longName(5000, 'x');
        tierCase.tier.site = tierCase.tier.name = tierCase.candidates[1].name = tierCase.tier.units[0].name = longName;
        scenario.rules.greatestChange = Price{1};
        m_document.begin(scenario, {}, true);
        SheetDialog dialog(m_document, 0, 1, m_answers);
        showActive(dialog);
        QVERIFY2(dialog.width() <= 1280 && dialog.height() <= 720,
                 qPrintable(QStringLiteral("%1 x %2").arg(dialog.width()).arg(dialog.height())));
        RefusedRowsDialog refused(readUnitList("site\n", QString::fromStdString(longName), {}), QString::fromStdString(longName));
        showActive(refused);
        QVERIFY2(refused.width() <= 1280, qPrintable(QString::number(refused.width())));
    }

    void theCurrentLadderHasASheetToo()
    {
        SheetDialog dialog(m_document, 0, -1, m_answers);
        showActive(dialog);
        QCOMPARE(labelText(dialog, "unitsChanged"), QStringLiteral("0 of 4"));
        QCOMPARE(labelText(dialog, "totalChange"), QStringLiteral("no change"));
        QVERIFY(!child<QCheckBox>(dialog, "changedOnlyBox").isEnabled());
    }

    // Price rules ----------------------------------------------------------------------------------------------------

    void rulesAreTyped()
    {
        RulesDialog dialog({}, kEuro);
        showActive(dialog);
        QVERIFY(dialog.rules() == PriceRules{});
        QCOMPARE(child<QLineEdit>(dialog, "ceilingEdit").placeholderText(), QStringLiteral("no limit"));
        type(dialog, "stepEdit", QStringLiteral("1"));
        type(dialog, "endingsEdit", QStringLiteral(".99,.00, .50"));
        type(dialog, "leastEdit", QStringLiteral("20"));
        type(dialog, "greatestEdit", QStringLiteral("1,500.00"));
        type(dialog, "changePercentEdit", QStringLiteral("12.5"));
        type(dialog, "changeMoneyEdit", QStringLiteral("15"));
        type(dialog, "ceilingEdit", QStringLiteral("110"));

        PriceRules wanted;
        wanted.points = {Price{100}, {Price{0}, Price{50}, Price{99}}, Price{2000}, Price{150000}};
        wanted.greatestChangePercent = 12.5;
        wanted.greatestChange = Price{1500};
        wanted.ceiling = Price{11000};
        QVERIFY(dialog.rules() == wanted);
        // What was understood stands in the fields.
        QCOMPARE(child<QLineEdit>(dialog, "stepEdit").text(), QStringLiteral("1.00"));
        QCOMPARE(child<QLineEdit>(dialog, "endingsEdit").text(), QStringLiteral(".00, .50, .99"));

        // By hand: price points around 100.00; 100.00 may go down 12.5 % to 87.50 and up to the ceiling of 110.00.
        const QString preview = labelText(dialog, "previewLabel");
        QVERIFY2(preview.contains(QStringLiteral("99.00   99.50   99.99   100.00   100.50   100.99   101.00")), qPrintable(preview));
        QVERIFY2(preview.contains(QStringLiteral("from 87.50 to 110.00")), qPrintable(preview));
        QSignalSpy accepted(&dialog, &QDialog::accepted);
        click(*child<QDialogButtonBox>(dialog, "buttonBox").button(QDialogButtonBox::Ok));
        QCOMPARE(accepted.count(), 1);
    }

    void wrongRulesAreFlaggedAtTheirField_data()
    {
        QTest::addColumn<QString>("field");
        QTest::addColumn<QString>("typed");
        QTest::addColumn<QString>("flagged");
        QTest::addColumn<QString>("words");
        const auto row = [](const char* field, const char* typed, const char* flagged, const char* words) {
            QTest::addRow("%s %s", field, typed) << field << typed << flagged << words;
        };
        row("step", "abc", "step", "Not an amount");
        row("step", "0", "step", "more than zero");
        row("endings", "2", "endings", "not below the step");
        row("endings", "x", "endings", "not an ending");
        row("greatest", "5", "greatest", "below the least");
        row("ceiling", "5", "ceiling", "below the least");
        row("changePercent", "-1", "changePercent", "more than zero");
        row("changeMoney", "1.234", "changeMoney", "Not an amount");
    }

    void wrongRulesAreFlaggedAtTheirField()
    {
        QFETCH(const QString, field);
        QFETCH(const QString, typed);
        QFETCH(const QString, flagged);
        QFETCH(const QString, words);
        PriceRules rules;
        rules.points = {Price{100}, {Price{50}}, Price{1000}, {}};
        RulesDialog dialog(rules, kEuro);
        showActive(dialog);
        QPushButton& ok = *child<QDialogButtonBox>(dialog, "buttonBox").button(QDialogButtonBox::Ok);
        QVERIFY(ok.isEnabled());
        type(dialog, qPrintable(field + QStringLiteral("Edit")), typed);
        QVERIFY(!ok.isEnabled());
        for (const char* other : {"step", "endings", "least", "greatest", "changePercent", "changeMoney", "ceiling"}) {
            const QString hint = labelText(dialog, qPrintable(QLatin1String(other) + QStringLiteral("Hint")));
            const bool wrong = flagged == QLatin1String(other);
            QVERIFY2(hint.startsWith(QStringLiteral("⚠")) == wrong, qPrintable(hint));
            QVERIFY2(!wrong || hint.contains(words), qPrintable(hint));
        }
        QVERIFY(child<QLineEdit>(dialog, qPrintable(flagged + QStringLiteral("Edit"))).accessibleDescription().contains(words));
        type(dialog, qPrintable(field + QStringLiteral("Edit")), QString());
        QCOMPARE(ok.isEnabled(), field != QStringLiteral("step")); // an ending needs its step
    }

    void limitsThatLeaveNoPriceAreRefused()
    {
        RulesDialog dialog({}, kEuro);
        showActive(dialog);
        type(dialog, "stepEdit", QStringLiteral("100"));
        type(dialog, "leastEdit", QStringLiteral("120"));
        type(dialog, "greatestEdit", QStringLiteral("180"));
        QVERIFY(labelText(dialog, "greatestHint").contains(QStringLiteral("No price point")));
        type(dialog, "greatestEdit", QStringLiteral("200"));
        QCOMPARE(dialog.rules().points.greatest->minor, qlonglong(20000));
    }

    /// Whatever rules there are: opened and closed without typing, in any locale and currency, they stay as they were.
    void rulesOpenedAndLeftAloneStayAsTheyAre()
    {
        QRandomGenerator random(20261201);
        for (const auto& [locale, code] : std::initializer_list<std::pair<QLocale, const char*>>{
                 {QLocale(QLocale::English, QLocale::UnitedKingdom), "EUR"},
                 {QLocale(QLocale::German), "EUR"},
                 {QLocale(QLocale::French), "KWD"},
                 {QLocale(QLocale::Japanese), "JPY"},
                 {QLocale(QLocale::Arabic, QLocale::Egypt), "EGP"},
             }) {
            QLocale::setDefault(locale);
            for (int i = 0; i < 40; ++i) {
                PriceRules rules;
                rules.points.step = Price{random.bounded(1, 5000)};
                std::vector<Price>& endings = rules.points.endings;
                for (int n = random.bounded(4); n > 0; --n)
                    endings.push_back(Price{random.bounded(static_cast<int>(rules.points.step.minor))});
                std::sort(endings.begin(), endings.end());
                endings.erase(std::unique(endings.begin(), endings.end()), endings.end());
                if (random.bounded(2))
                    rules.points.least = Price{random.bounded(1, 100'000)};
                if (random.bounded(2))
                    rules.points.greatest = Price{random.bounded(200'000, 90'000'000)};
                if (random.bounded(2))
                    rules.greatestChangePercent = random.generateDouble() * 2000 + 0.001;
                if (random.bounded(2))
                    rules.greatestChange = Price{random.bounded(1, 1'000'000)};
                if (random.bounded(2))
                    rules.ceiling = Price{random.bounded(200'000, 90'000'000)};
                RulesDialog dialog(rules, *findCurrency(code));
                QVERIFY2(dialog.rules() == rules, code);
                QVERIFY2(child<QDialogButtonBox>(dialog, "buttonBox").button(QDialogButtonBox::Ok)->isEnabled(), qPrintable(locale.name()));
                // Leaving a field writes back what was understood, and that is the same again.
                for (auto* edit : dialog.findChildren<QLineEdit*>())
                    emit edit->editingFinished();
                QVERIFY2(dialog.rules() == rules, qPrintable(locale.name()));
            }
        }
        QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom));
    }

    // Refused rows ---------------------------------------------------------------------------------------------------

    void refusedRowsAreShownAndCopied()
    {
        const QByteArray csv = "site,tier,unit,asking_price,status,advertised_floor\n"
                               "W,T,1,70.00,vacant,70\n"
                               "W,T,2,\"7\t0\",vacant,\n"
                               "W,T,3,80.00,=free,\n";
        RefusedRowsDialog dialog(readUnitList(csv, QStringLiteral("list.csv"), {}), QStringLiteral("/some/where/list.csv"));
        showActive(dialog);
        QCOMPARE(labelText(dialog, "countLabel"), QStringLiteral("2 rows refused; 1 row is fine."));
        auto& table = child<QTableView>(dialog, "rowsTable");
        const QAbstractItemModelTester tester(table.model(), QAbstractItemModelTester::FailureReportingMode::QtTest);
        const auto text = [&](int row, RefusedRowsModel::Column column) { return table.model()->index(row, column).data().toString(); };
        QCOMPARE(text(0, RefusedRowsModel::lineColumn), QStringLiteral("3"));
        QCOMPARE(text(0, RefusedRowsModel::columnColumn), QStringLiteral("asking_price (4)"));
        QCOMPARE(text(1, RefusedRowsModel::lineColumn), QStringLiteral("4"));
        QCOMPARE(text(1, RefusedRowsModel::columnColumn), QStringLiteral("status (5)"));

        // The table has the keyboard at once; the row in full stands below it.
        QCOMPARE(QApplication::focusWidget(), &table);
        QTest::keyClick(&table, Qt::Key_Down);
        QVERIFY(labelText(dialog, "detailLabel").startsWith(QStringLiteral("list.csv:4: ")));
        QTest::keySequence(&table, QKeySequence::Copy);
        QCOMPARE(QGuiApplication::clipboard()->text().split(QLatin1Char('\n')).at(1).split(QLatin1Char('\t')).at(3),
                 QStringLiteral("'=free"));
        click(child<QPushButton>(dialog, "copyButton"));
        QCOMPARE(QGuiApplication::clipboard()->text().count(QLatin1Char('\n')), 2);
        QVERIFY(QGuiApplication::clipboard()->text().startsWith(QStringLiteral("Line\tColumn\tWhat is wrong\tFound\tWanted\n3\t")));

        QSignalSpy accepted(&dialog, &QDialog::accepted);
        click(child<QPushButton>(dialog, "goOnButton"));
        QCOMPARE(accepted.count(), 1);
    }

    void manyRefusedRowsAreCounted()
    {
        QByteArray csv = "site,tier,unit,asking_price,status,advertised_floor\n";
        for (int i = 0; i < 2390; ++i)
            csv += "W,T,f" + QByteArray::number(i) + ",70.00,vacant,70\n";
        for (int i = 0; i < 1234; ++i)
            csv += "W,T,b" + QByteArray::number(i) + ",none,vacant,70\n";
        RefusedRowsDialog dialog(readUnitList(csv, QStringLiteral("list.csv"), {}), QStringLiteral("list.csv"));
        QCOMPARE(labelText(dialog, "countLabel"), QStringLiteral("1,234 rows refused, the first 1,000 shown; 2,390 rows are fine."));
        QCOMPARE(child<QTableView>(dialog, "rowsTable").model()->rowCount(), 1000);
    }

    void thereIsNoGoingOnWithNothing()
    {
        const QByteArray csv = "site,tier,unit,asking_price,status,advertised_floor\nW,T,1,free,vacant,70\n";
        RefusedRowsDialog dialog(readUnitList(csv, QStringLiteral("list.csv"), {}), QStringLiteral("list.csv"));
        showActive(dialog);
        QCOMPARE(labelText(dialog, "countLabel"), QStringLiteral("1 row refused; no row is left to go on with."));
        QVERIFY(!child<QPushButton>(dialog, "goOnButton").isEnabled());
        QSignalSpy rejected(&dialog, &QDialog::rejected);
        QTest::keyClick(&dialog, Qt::Key_Escape);
        QCOMPARE(rejected.count(), 1);
    }

private:
    Document m_document;
    PathAnswers m_answers;
};

QTEST_MAIN(DialogsTest)
#include "dialogs_test.moc"
