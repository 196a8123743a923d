// SPDX-License-Identifier: GPL-3.0-or-later
// A price rule by mouse and keyboard: set in the form, felt in a drag, dropped again.
#include "desk_fixture.h"
#include "rules_dialog.h"
#include "scenario_json.h"
#include "wording.h"

#include <QCheckBox>
#include <QComboBox>
#include <QDialogButtonBox>
#include <QLineEdit>
#include <QPushButton>

#include <algorithm>

using namespace rungwright;

class RulesGuiTest : public QObject
{
    Q_OBJECT
private slots:
    void init();
    void cleanup() { m_desk.reset(); }

    void aRuleOfTheTierStopsTheDrag();
    void theTotalStopsTheDrag();

private:
    DeskFixture& desk() { return *m_desk; }
    /// Opens the form by its key, asks for rules of the tier's own by keys and mouse, types into one field and presses Enter.
    void setOwn(const char* field, const QString& typed);

    std::unique_ptr<DeskFixture> m_desk;
};

void RulesGuiTest::init()
{
    m_desk = std::make_unique<DeskFixture>();
    QVERIFY(desk().open(desk().sample("quillmere-storage.rungs.json")));
    QVERIFY(desk().bench().tierCase());
    desk().bench().workOn(-1);
}

void RulesGuiTest::setOwn(const char* field, const QString& typed)
{
    desk().window->activateWindow();
    QVERIFY(QTest::qWaitForWindowActive(desk().window.get()));
    QTest::keyClick(desk().window.get(), Qt::Key_R, Qt::ControlModifier | Qt::ShiftModifier);
    auto* dialog = desk().window->findChild<RulesDialog*>();
    QVERIFY(dialog);
    QVERIFY(QTest::qWaitForWindowExposed(dialog));
    // The preview is about a price of this tier: half of them are at or below it.
    auto prices = askingPrices(desk().bench().tierCase()->tier.units);
    std::ranges::sort(prices);
    const QString middle = moneyText(prices[prices.size() / 2], desk().bench().currency());
    const auto labels = dialog->findChildren<QLabel*>();
    QVERIFY(std::ranges::any_of(labels, [&](const QLabel* label) { return label->text().contains(QStringLiteral("around ") + middle); }));
    auto* scope = dialog->findChild<QComboBox*>(QStringLiteral("scopeBox"));
    scope->setFocus();
    QTest::keyClick(scope, Qt::Key_End);
    QCOMPARE(scope->currentIndex(), 2);
    auto* own = dialog->findChild<QCheckBox*>(QStringLiteral("ownBox"));
    auto* edit = dialog->findChild<QLineEdit*>(QLatin1String(field));
    if (!own->isChecked()) {
        QVERIFY(!edit->isEnabled());
        QTest::mouseClick(own, Qt::LeftButton, {}, QPoint(8, own->height() / 2));
    }
    QVERIFY(own->isChecked() && edit->isEnabled());
    QVERIFY(dialog->findChild<QLabel*>(QStringLiteral("inForceLabel"))->text().contains(QStringLiteral("rules of its own")));
    QTest::mouseClick(edit, Qt::LeftButton);
    edit->selectAll();
    QTest::keyClicks(edit, typed);
    QTest::keyClick(edit, Qt::Key_Return);
    QTRY_VERIFY(!desk().window->findChild<RulesDialog*>());
}

void RulesGuiTest::aRuleOfTheTierStopsTheDrag()
{
    Document& document = desk().window->document();
    const QByteArray before = scenarioToJson(document.scenario());
    const PriceRules wide = document.scenario().rules;
    setOwn("changeMoneyEdit", QStringLiteral("2"));
    QCOMPARE(document.undoStack().count(), 1);
    QVERIFY(document.scenario().rules == wide);
    QCOMPARE(document.scenario().ownRules.size(), std::size_t(1));
    QCOMPARE(desk().bench().rules().greatestChange, std::optional(Price{200}));

    const auto unit = desk().unitOnOffer(0);
    const Price start = desk().bench().workedPrices()[unit];
    const QPoint from = desk().rung(unit);
    DeskFixture::pressAndMove(desk().ladder(), from, from + QPoint(0, 120));
    QCOMPARE(desk().bench().workedPrices()[unit], start - Price{200});
    QCOMPARE(desk().bench().boundText(), QStringLiteral("held: greatest change 2.00"));
    QTest::mouseRelease(&desk().ladder(), Qt::LeftButton, {}, from + QPoint(0, 120));
    QCOMPARE(document.undoStack().count(), 2);

    // Off again by the same form, and undone to the byte.
    document.undoStack().undo();
    desk().window->activateWindow();
    QVERIFY(QTest::qWaitForWindowActive(desk().window.get()));
    QTest::keyClick(desk().window.get(), Qt::Key_R, Qt::ControlModifier | Qt::ShiftModifier);
    auto* dialog = desk().window->findChild<RulesDialog*>();
    QVERIFY(dialog && QTest::qWaitForWindowExposed(dialog));
    auto* own = dialog->findChild<QCheckBox*>(QStringLiteral("ownBox"));
    QVERIFY(own->isChecked()); // It begins with the rules in force.
    QTest::mouseClick(own, Qt::LeftButton, {}, QPoint(8, own->height() / 2));
    QTest::mouseClick(dialog->findChild<QDialogButtonBox*>()->button(QDialogButtonBox::Ok), Qt::LeftButton);
    QVERIFY(document.scenario().ownRules.empty());
    QCOMPARE(scenarioToJson(document.scenario()), before);
    document.undoStack().undo();
    QCOMPARE(document.scenario().ownRules.size(), std::size_t(1));
    document.undoStack().undo();
    QCOMPARE(scenarioToJson(document.scenario()), before);
}

void RulesGuiTest::theTotalStopsTheDrag()
{
    setOwn("totalMoneyEdit", QStringLiteral("3"));
    const auto unit = desk().unitOnOffer(1);
    const Price start = desk().bench().workedPrices()[unit];
    const QPoint from = desk().rung(unit);
    DeskFixture::pressAndMove(desk().ladder(), from, from + QPoint(0, 120));
    QCOMPARE(desk().bench().workedPrices()[unit], start - Price{300});
    QCOMPARE(desk().bench().boundText(), QStringLiteral("held: greatest change of the asking total 3.00"));
    QTest::mouseRelease(&desk().ladder(), Qt::LeftButton, {}, from + QPoint(0, 120));
    // Another unit has no room left downwards, and all of it upwards.
    const auto other = desk().unitOnOffer(2);
    QTest::mouseClick(&desk().ladder(), Qt::LeftButton, {}, desk().rung(other));
    const Price there = desk().bench().workedPrices()[other];
    QTest::keyClick(&desk().ladder(), Qt::Key_Down);
    QCOMPARE(desk().bench().workedPrices()[other], there);
    QTest::keyClick(&desk().ladder(), Qt::Key_Up);
    QVERIFY(desk().bench().workedPrices()[other] > there);
}

QTEST_MAIN(RulesGuiTest)
#include "rules_gui_test.moc"
