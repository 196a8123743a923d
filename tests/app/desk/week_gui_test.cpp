// SPDX-License-Identifier: GPL-3.0-or-later
// A week at the desk: a sheet is handed over, a floor is learnt, and Monday's list comes in and goes out again.
#include "desk_fixture.h"
#include "scenario_json.h"

#include <QAction>
#include <QDateTime>
#include <QDialog>
#include <QListWidget>
#include <QPushButton>

using namespace rungwright;

class WeekGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void initTestCase() { QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom)); }
    void init()
    {
        m_desk = std::make_unique<DeskFixture>();
        QVERIFY(m_desk->open(write("first.csv", kFirst)));
        QCOMPARE(document().scenario().tiers.size(), std::size_t(2));
    }
    void cleanup() { m_desk.reset(); }

    void aSheetThatLeavesIsRemembered();
    void aSheetLookedAtIsNot();
    void aFloorIsTypedAndTakenAway();
    void theNextListIsTakenAndUndone();
    void theNextListIsLeft();
    void aRowLeftOutIsToldFirst();
    void aCurrencyNotYetKnownComesWithTheList();

private:
    static const QByteArray kFirst;
    static const QByteArray kSecond;

    Document& document() { return m_desk->window->document(); }
    QString write(const char* name, const QByteArray& bytes)
    {
        const QString path = m_desk->folder.filePath(QString::fromLatin1(name));
        QFile file(path);
        if (!file.open(QIODevice::WriteOnly) || file.write(bytes) != bytes.size())
            qFatal("cannot write a test file");
        return path;
    }
    QDialog* dialog(const char* name)
    {
        for (QWidget* widget : QApplication::topLevelWidgets()) {
            if (widget->isVisible() && widget->objectName() == QLatin1String(name))
                return qobject_cast<QDialog*>(widget);
        }
        return nullptr;
    }
    void click(QDialog* in, const char* name) { QTest::mouseClick(in->findChild<QPushButton*>(QString::fromLatin1(name)), Qt::LeftButton); }
    int tierNamed(const char* name)
    {
        const TierCase* found = findTier(document().scenario(), "Fern Lane", name);
        for (int i = 0; found && i < static_cast<int>(document().scenario().tiers.size()); ++i) {
            if (document().tier(i) == found)
                return i;
        }
        return -1;
    }
    /// A candidate with the first unit of "Small" one price point lower, by the key a person would press.
    void lowerTheFirstUnit()
    {
        m_desk->bench().showTier(tierNamed("Small"));
        m_desk->bench().select({0});
        m_desk->ladder().setFocus();
        QTest::keyClick(&m_desk->ladder(), Qt::Key_Down);
        QCOMPARE(document().tier(tierNamed("Small"))->candidates.size(), std::size_t(1));
    }
    void askRefresh(const QString& path)
    {
        m_desk->questions.nextPath = path;
        m_desk->window->findChild<QAction*>(QStringLiteral("refreshAction"))->trigger();
        QTRY_VERIFY(dialog("RefreshDialog"));
    }

    std::unique_ptr<DeskFixture> m_desk;
};

const QByteArray WeekGuiTest::kFirst = "site,tier,unit,asking_price,status,advertised_floor,currency\n"
                                       "Fern Lane,Small,S1,60.00,vacant,55.00,EUR\n"
                                       "Fern Lane,Small,S2,62.00,vacant,,EUR\n"
                                       "Fern Lane,Small,S3,66.00,occupied,,EUR\n"
                                       "Fern Lane,Small,S4,70.00,vacant,,EUR\n"
                                       "Fern Lane,Large,L1,99.00,vacant,95.00,EUR\n"
                                       "Fern Lane,Large,L2,104.00,vacant,,EUR\n";

/// S1 was let at what the sheet asked, S2 is dearer, S4 is gone and S5 has come; nothing is new in "Large".
const QByteArray WeekGuiTest::kSecond = "site,tier,unit,asking_price,status,advertised_floor,currency\n"
                                        "Fern Lane,Large,L1,99.00,vacant,95.00,EUR\n"
                                        "Fern Lane,Large,L2,104.00,vacant,,EUR\n"
                                        "Fern Lane,Small,S1,60.00,occupied,55.00,EUR\n"
                                        "Fern Lane,Small,S2,63.50,vacant,,EUR\n"
                                        "Fern Lane,Small,S3,66.00,occupied,,EUR\n"
                                        "Fern Lane,Small,S5,72.00,vacant,,EUR\n";

void WeekGuiTest::aSheetThatLeavesIsRemembered()
{
    lowerTheFirstUnit();
    const int small = tierNamed("Small");
    const Price lowered = document().tier(small)->candidates[0].prices[0];
    m_desk->window->showSheet(0);
    QTRY_VERIFY(dialog("SheetDialog"));
    const int steps = document().undoStack().count();
    QDialog* sheet = dialog("SheetDialog");
    click(sheet, "saveButton"); // the question for a name is given up
    QVERIFY(!document().tier(small)->signedOff);
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("sheet.csv"));
    click(sheet, "saveButton");
    QVERIFY(document().tier(small)->signedOff);
    const SignedSheet handedOver = *document().tier(small)->signedOff;
    QCOMPARE(handedOver.candidate, document().tier(small)->candidates[0].name);
    const std::vector<SignedPrice> wanted{{"S1", Price{6000}, lowered}}; // only what changes
    QVERIFY(handedOver.prices == wanted);
    const QDateTime when = QDateTime::fromString(QString::fromStdString(handedOver.whenUtc), Qt::ISODate);
    QVERIFY(when.isValid() && handedOver.whenUtc.back() == 'Z');
    QVERIFY(qAbs(when.secsTo(QDateTime::currentDateTimeUtc())) < 600);
    QVERIFY(document().undoStack().undoText().startsWith(QStringLiteral("Hand over the price sheet of")));
    m_desk->questions.nextPath = m_desk->folder.filePath(QStringLiteral("again.csv"));
    click(sheet, "saveButton"); // the same sheet in another file
    QCOMPARE(document().undoStack().count(), steps + 1);
    click(sheet, "closeButton");
    document().undoStack().undo();
    QVERIFY(!document().tier(small)->signedOff);
}

void WeekGuiTest::aSheetLookedAtIsNot()
{
    m_desk->bench().showTier(tierNamed("Small"));
    m_desk->window->showSheet(-1);
    QTRY_VERIFY(dialog("SheetDialog"));
    QTest::keyClick(dialog("SheetDialog"), Qt::Key_Escape);
    QVERIFY(!document().undoStack().canUndo());
}

void WeekGuiTest::aFloorIsTypedAndTakenAway()
{
    const int small = tierNamed("Small");
    m_desk->bench().showTier(small);
    QAction& action = *m_desk->window->findChild<QAction*>(QStringLiteral("tierFloorAction"));
    QVERIFY(action.isEnabled());
    m_desk->questions.texts = {QStringLiteral("fifty"), QStringLiteral("-3"), QStringLiteral(" 58.50 ")};
    action.trigger();
    QCOMPARE(m_desk->questions.told.size(), 2);
    QCOMPARE(document().tier(small)->tier.advertisedFloor, Price{5850});
    QCOMPARE(m_desk->figure("gap", FiguresModel::currentColumn), m_desk->coreGap());
    m_desk->questions.texts = {QStringLiteral("")};
    action.trigger();
    QVERIFY(!document().tier(small)->tier.hasFloor());
    action.trigger(); // given up
    QCOMPARE(document().undoStack().count(), 2);
    document().undoStack().undo();
    document().undoStack().undo();
    QCOMPARE(document().tier(small)->tier.advertisedFloor, Price{5500});
}

void WeekGuiTest::theNextListIsTakenAndUndone()
{
    lowerTheFirstUnit();
    document().setSeen(tierNamed("Large"), true);
    m_desk->bench().showTier(tierNamed("Small"), 0);
    const QByteArray before = scenarioToJson(document().scenario());
    const Price lowered = document().tier(tierNamed("Small"))->candidates[0].prices[0];
    askRefresh(write("second.csv", kSecond));
    QCOMPARE(scenarioToJson(document().scenario()), before); // a look changes nothing
    auto& topics = *dialog("RefreshDialog")->findChild<QListWidget*>(QStringLiteral("topicsList"));
    for (const char* topic : {"1 new unit", "1 unit gone", "1 unit newly let", "1 price raised, by 1.50 in all", "1 price change kept"})
        QCOMPARE(topics.findItems(QString::fromLatin1(topic), Qt::MatchExactly).size(), 1);
    click(dialog("RefreshDialog"), "refreshButton");
    QTRY_VERIFY(document().undoStack().undoText().startsWith(QStringLiteral("Refresh from second.csv")));

    const TierCase& small = *document().tier(tierNamed("Small"));
    QCOMPARE(small.tier.units.size(), std::size_t(4));
    QCOMPARE(small.tier.units[1].asking, Price{6350});
    QCOMPARE(small.tier.units[0].status, Status::occupied);
    const std::vector<Price> carried{lowered, Price{6350}, Price{6600}, Price{7200}};
    QVERIFY(small.candidates[0].prices == carried);
    QVERIFY(!document().tier(tierNamed("Large"))->seen);
    // The bench stays where it was, and shows what is asked now.
    QCOMPARE(m_desk->bench().tier(), tierNamed("Small"));
    QCOMPARE(m_desk->bench().candidate(), 0);
    QCOMPARE(m_desk->bench().currentPrices()[1], Price{6350});
    const QByteArray after = scenarioToJson(document().scenario());

    // Without a window manager the window does not become active again by itself.
    m_desk->window->activateWindow();
    QVERIFY(QTest::qWaitForWindowActive(m_desk->window.get()));
    QTest::keySequence(m_desk->window.get(), QKeySequence::Undo);
    QCOMPARE(scenarioToJson(document().scenario()), before);
    QCOMPARE(m_desk->bench().currentPrices()[1], Price{6200});
    QTest::keySequence(m_desk->window.get(), QKeySequence::Redo);
    QCOMPARE(scenarioToJson(document().scenario()), after);
}

void WeekGuiTest::theNextListIsLeft()
{
    const QByteArray before = scenarioToJson(document().scenario());
    askRefresh(write("second.csv", kSecond));
    QTest::keyClick(dialog("RefreshDialog"), Qt::Key_Escape);
    QTRY_VERIFY(!dialog("RefreshDialog"));
    QCOMPARE(scenarioToJson(document().scenario()), before);
    QVERIFY(!document().undoStack().canUndo());
}

void WeekGuiTest::aRowLeftOutIsToldFirst()
{
    QByteArray bad = kSecond;
    bad.replace("Small,S2,63.50", "Small,S2,many");
    m_desk->questions.nextPath = write("bad.csv", bad);
    m_desk->window->findChild<QAction*>(QStringLiteral("refreshAction"))->trigger();
    QTRY_VERIFY(dialog("RefusedRowsDialog"));
    dialog("RefusedRowsDialog")->accept(); // go on without it
    QTRY_VERIFY(dialog("RefreshDialog"));
    const auto& warnings = *dialog("RefreshDialog")->findChild<QLabel*>(QStringLiteral("warningsLabel"));
    QVERIFY(warnings.isVisible());
    QCOMPARE(warnings.text(), QStringLiteral("⚠ 1 row was left out: its unit counts as gone."));
    // S2 among them, which the list does name.
    auto& topics = *dialog("RefreshDialog")->findChild<QListWidget*>(QStringLiteral("topicsList"));
    QCOMPARE(topics.findItems(QStringLiteral("2 units gone"), Qt::MatchExactly).size(), 1);
    QTest::keyClick(dialog("RefreshDialog"), Qt::Key_Escape);
    QTRY_VERIFY(!dialog("RefreshDialog"));
    QVERIFY(!document().undoStack().canUndo());
}

void WeekGuiTest::aCurrencyNotYetKnownComesWithTheList()
{
    QByteArray unnamed = kFirst;
    unnamed.replace(",EUR\n", "\n").replace(",currency\n", "\n");
    m_desk->questions.answers = {1, 1}; // as a new one; go on without saving
    m_desk->questions.texts = {QStringLiteral("")};
    QVERIFY(m_desk->open(write("unnamed.csv", unnamed)));
    QCOMPARE(document().scenario().currency.code, std::string("XXX"));
    const QByteArray before = scenarioToJson(document().scenario());
    askRefresh(write("second.csv", kSecond));
    click(dialog("RefreshDialog"), "refreshButton");
    QTRY_COMPARE(document().scenario().currency.code, std::string("EUR"));
    document().undoStack().undo();
    QCOMPARE(scenarioToJson(document().scenario()), before);
}

QTEST_MAIN(WeekGuiTest)
#include "week_gui_test.moc"
