// SPDX-License-Identifier: GPL-3.0-or-later
// What the dialogs type, read, name and copy, without the dialogs.
#include "compared_tier.h"
#include "file_names.h"
#include "ladder_change.h"
#include "ladder_pick.h"
#include "rules_text.h"
#include "sheet_remarks.h"
#include "table_text.h"
#include "wording.h"

#include <QClipboard>
#include <QGuiApplication>
#include <QHeaderView>
#include <QStandardItemModel>
#include <QTableView>
#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

namespace
{

const Currency kEuro = *findCurrency("EUR");
const QLocale kEnglish(QLocale::English, QLocale::UnitedKingdom);
const QLocale kGerman(QLocale::German, QLocale::Germany);

QList<qlonglong> minors(const Outcome<std::vector<Price>>& read)
{
    QList<qlonglong> all;
    for (const Price price : read.value())
        all << price.minor;
    return all;
}

} // namespace

class TextsTest : public QObject
{
    Q_OBJECT

private slots:
    void initTestCase() { QLocale::setDefault(kEnglish); }

    void amountsAreReadOrRefusedInWords()
    {
        QVERIFY(!readAmount(QStringLiteral("  "), kEuro).value());
        QCOMPARE(readAmount(QStringLiteral("1,250.50"), kEuro).value()->minor, qlonglong(125050));
        QCOMPARE(readAmount(QStringLiteral(".5"), kEuro).value()->minor, qlonglong(50));
        QCOMPARE(readAmount(QStringLiteral("0,5"), kEuro, kGerman).value()->minor, qlonglong(50));
        const QLocale egypt(QLocale::Arabic, QLocale::Egypt);
        QCOMPARE(readAmount(moneyText(Price{125050}, kEuro, egypt), kEuro, egypt).value()->minor, qlonglong(125050));
        QCOMPARE(readAmount(QStringLiteral("12"), *findCurrency("JPY")).value()->minor, qlonglong(12));
        for (const char* bad : {"abc", "1.234", "12 EUR"})
            QVERIFY2(QString::fromStdString(readAmount(QString::fromLatin1(bad), kEuro).trouble()).contains(QStringLiteral("12.50")), bad);
        for (const char* bad : {"0", "-3"})
            QCOMPARE(readAmount(QString::fromLatin1(bad), kEuro).trouble(), std::string("Must be more than zero."));
    }

    void percentagesAreReadInBothSpellings()
    {
        QVERIFY(!readPercent(QString()).value());
        QCOMPARE(*readPercent(QStringLiteral("7.5 %")).value(), 7.5);
        QCOMPARE(*readPercent(QStringLiteral("7,5"), kGerman).value(), 7.5);
        QCOMPARE(*readPercent(QStringLiteral("7.5"), kGerman).value(), 7.5);
        for (const char* bad : {"%", "x", "0", "-1", "nan", "inf"})
            QVERIFY2(!readPercent(QString::fromLatin1(bad)).ok(), bad);
        QCOMPARE(percentFieldText(12.5, kGerman), QStringLiteral("12,5"));
    }

    void endingsAreReadAsTheLocaleListsThem()
    {
        const std::optional<Price> one(Price{100});
        QCOMPARE(minors(readEndings(QStringLiteral(".99, .00,.50 .95; .50"), one, kEuro)), (QList<qlonglong>{0, 50, 95, 99}));
        QCOMPARE(minors(readEndings(QStringLiteral("0,50; ,95"), one, kEuro, kGerman)), (QList<qlonglong>{50, 95}));
        QCOMPARE(minors(readEndings(QStringLiteral("0,50, 0,95"), one, kEuro, kGerman)), (QList<qlonglong>{50, 95}));
        QCOMPARE(minors(readEndings(QStringLiteral(".00,.50"), one, kEuro, kGerman)), (QList<qlonglong>{0, 50}));
        QCOMPARE(minors(readEndings(QStringLiteral(" ,; "), one, kEuro)), QList<qlonglong>());
        QVERIFY(QString::fromStdString(readEndings(QStringLiteral(".00, 3"), one, kEuro).trouble())
                    .contains(QStringLiteral("“3” is not below the step of 1.00")));
        QVERIFY(QString::fromStdString(readEndings(QStringLiteral(".5x"), one, kEuro).trouble()).contains(QStringLiteral("“.5x”")));
        QVERIFY(!readEndings(QStringLiteral("-0.5"), one, kEuro).ok());
        QVERIFY(!readEndings(QStringLiteral(".50"), std::nullopt, kEuro).ok());
    }

    void endingsReadBackAsWritten()
    {
        const std::vector<Price> cents{Price{0}, Price{50}, Price{99}};
        QCOMPARE(endingsText(cents, kEuro, kEnglish), QStringLiteral(".00, .50, .99"));
        QCOMPARE(endingsText(cents, kEuro, kGerman), QStringLiteral("0,00; 0,50; 0,99"));
        const std::vector<Price> large{Price{900}, Price{123450}};
        QCOMPARE(endingsText(large, kEuro, kEnglish), QStringLiteral("9.00, 1234.50"));
        for (const QLocale& locale : {kEnglish, kGerman, QLocale(QLocale::French), QLocale(QLocale::Arabic, QLocale::Egypt)}) {
            for (const char* code : {"EUR", "JPY", "KWD"}) {
                const Currency currency = *findCurrency(code);
                for (const auto& endings : {cents, large})
                    QVERIFY2(readEndings(endingsText(endings, currency, locale), Price{1000000}, currency, locale).value() == endings,
                             qPrintable(locale.name() + QLatin1Char(' ') + QLatin1String(code)));
            }
        }
    }

    void fileNamesLeaveOutWhatFileSystemsRefuse()
    {
        QCOMPARE(fileNameFrom({QStringLiteral("North/quay"), QStringLiteral(" Box: 4 "), QStringLiteral("")}, QStringLiteral("csv")),
                 QStringLiteral("North-quay Box- 4.csv"));
        QCOMPARE(fileNameFrom({QStringLiteral("../..")}, QStringLiteral("csv")), QStringLiteral("sheet.csv"));
        QCOMPARE(fileNameFrom({QStringLiteral("港"), QStringLiteral("線")}, QStringLiteral("png")), QStringLiteral("港 線.png"));
        // 255 bytes is what common file systems take (NAME_MAX).
        const QString longName(5000, QChar(0x6E2F));
        const QString cut = fileNameFrom({longName, longName, longName}, QStringLiteral("csv"));
        QVERIFY(cut.toUtf8().size() <= 255);
        QVERIFY(cut.startsWith(QChar(0x6E2F)) && cut.endsWith(QStringLiteral(".csv")));
    }

    void aSuffixIsAddedOnlyWhereNothingIsOverwritten()
    {
        const QTemporaryDir folder;
        const QString bare = folder.filePath(QStringLiteral("sheet"));
        QCOMPARE(withSuffix(bare, QStringLiteral("csv")), bare + QStringLiteral(".csv"));
        QCOMPARE(withSuffix(bare + QStringLiteral(".txt"), QStringLiteral("csv")), bare + QStringLiteral(".txt"));
        QFile there(bare + QStringLiteral(".csv"));
        QVERIFY(there.open(QIODevice::WriteOnly));
        QCOMPARE(withSuffix(bare, QStringLiteral("csv")), bare);
    }

    void copiesWhatIsShownInTheOrderShown()
    {
        QStandardItemModel model(3, 4);
        model.setHorizontalHeaderLabels(
            {QStringLiteral("Unit"), QStringLiteral("Change"), QStringLiteral("Hidden"), QStringLiteral("Note")});
        const QList<QStringList> cells{
            {QStringLiteral("=B-1"), QStringLiteral("+3.00"), QStringLiteral("x"), QStringLiteral("a\tb")},
            {QStringLiteral("-1+2"), QStringLiteral("-12.50 %"), QStringLiteral("y"), QStringLiteral("say \"so\"")},
            {QStringLiteral("C"), QStringLiteral("0.00"), QStringLiteral("z"), QString()}};
        for (int r = 0; r < 3; ++r)
            for (int c = 0; c < 4; ++c)
                model.setItem(r, c, new QStandardItem(cells[r][c]));
        QTableView view;
        view.setModel(&model);
        view.verticalHeader()->hide();
        view.horizontalHeader()->hideSection(2);
        view.horizontalHeader()->moveSection(1, 0);

        // The list of characters that start a formula: OWASP, "CSV Injection". A signed figure is none.
        QCOMPARE(copiedText(view, CopyPart::everything), QStringLiteral("Change\tUnit\tNote\n"
                                                                        "+3.00\t'=B-1\t\"a\tb\"\n"
                                                                        "-12.50 %\t'-1+2\t\"say \"\"so\"\"\"\n"
                                                                        "0.00\tC\t"));
        QVERIFY(copiedText(view, CopyPart::selection).isEmpty());
        view.selectionModel()->select(model.index(1, 1), QItemSelectionModel::Select);
        QCOMPARE(copiedText(view, CopyPart::selection), QStringLiteral("-12.50 %"));
        // A selection with holes: what is not selected stays empty.
        view.selectionModel()->select(model.index(2, 0), QItemSelectionModel::Select);
        QCOMPARE(copiedText(view, CopyPart::selection), QStringLiteral("Change\tUnit\n-12.50 %\t\n\tC"));
        QCOMPARE(copyTable(view, CopyPart::selection), 2);
        QCOMPARE(QGuiApplication::clipboard()->text(), copiedText(view, CopyPart::selection));
    }

    void thePickFollowsCandidates()
    {
        using Ladders = std::vector<int>;
        LadderPick pick;
        pick.update({}, -1);
        QCOMPARE(pick.shown(), (Ladders{-1}));
        QStringList names{QStringLiteral("a"), QStringLiteral("b")};
        pick.update(names, -1);
        QCOMPARE(pick.shown(), (Ladders{-1, 0, 1}));
        pick.reorder({1, -1, 0});
        names << QStringLiteral("c"); // comes: added behind
        pick.update(names, 2);
        QCOMPARE(pick.shown(), (Ladders{1, -1, 0, 2}));
        names.removeFirst(); // goes: the others keep their places under new indices
        pick.update(names, -1);
        QCOMPARE(pick.shown(), (Ladders{0, -1, 1}));
        names[0] = QStringLiteral("renamed");
        pick.update(names, -1);
        QCOMPARE(pick.shown(), (Ladders{0, -1, 1}));
        QVERIFY(pick.setShown(1, false));
        QVERIFY(!pick.setShown(0, false)); // two is the least
        names = QStringList{QStringLiteral("c")};
        pick.update(names, -1); // what was shown is gone: filled up to two
        QCOMPARE(pick.shown(), (Ladders{-1, 0}));
    }

    void thePickKeepsItsLimits()
    {
        QStringList names;
        for (int i = 0; i < 8; ++i)
            names << QString::number(i);
        LadderPick pick;
        pick.update(names, 6);
        QCOMPARE(pick.shown(), (std::vector<int>{-1, 0, 1, 6})); // the one worked on is among them
        QVERIFY(pick.setShown(2, true));
        QVERIFY(pick.setShown(3, true));
        QVERIFY(!pick.setShown(4, true)); // six is the most
        names << QStringLiteral("new");
        pick.update(names, 8);
        QCOMPARE(pick.shown().size(), kMostCompared);
        QVERIFY(!pick.isShown(8));
    }

    void aLadderChangeCountsEveryUnitAndTotalsThoseOnOffer()
    {
        const TierCase tierCase = comparedScenario().tiers.front();
        const auto& units = tierCase.tier.units;
        // By hand: A-1 -10.00 of 80.00 is -12.5 %, A-3 (taken) -5.00 of 100.00 is -5 %.
        LadderChange change = ladderChange(units, tierCase.candidates[2].prices);
        QCOMPARE(change.unitsChanged, std::size_t(2));
        QCOMPARE(change.askingTotal->minor, qlonglong(-1000));
        QCOMPARE(change.greatest->minor, qlonglong(-1000));
        QCOMPARE(*change.greatestShare, -0.125);
        // A rise and a cut of one size: the rise. In percent 5 / 80 up is more than 5 / 90 down.
        change = ladderChange(units, std::vector<Price>{Price{8500}, Price{8500}, Price{10000}, Price{11000}});
        QCOMPARE(change.greatest->minor, qlonglong(500));
        QCOMPARE(*change.greatestShare, 0.0625);
        change = ladderChange(units, askingPrices(units));
        QCOMPARE(change.unitsChanged, std::size_t(0));
        QVERIFY(!change.greatest && !change.greatestShare);
        std::vector<Unit> taken = units;
        for (Unit& unit : taken)
            unit.status = Status::occupied;
        QVERIFY(!ladderChange(taken, askingPrices(taken)).askingTotal);
    }

    void remarksSayWhatALookAtTheLadderWould()
    {
        const Scenario scenario = comparedScenario();
        const TierCase& tierCase = scenario.tiers.front();
        const auto remarks = [&](const std::vector<Price>& prices, const PriceRules& rules = {}) {
            return sheetRemarks(tierCase.tier, prices, measured(tierCase.tier, prices, tierCase.model), rules, scenario.currency);
        };
        QVERIFY(remarks(tierCase.candidates[0].prices).isEmpty());
        const QStringList steeper = remarks(tierCase.candidates[1].prices);
        QCOMPARE(steeper.size(), 2);
        QCOMPARE(steeper[0], QStringLiteral("The advertised floor of 70.00 is not on sale: the cheapest unit on offer asks 82.00."));
        QVERIFY(steeper[1].startsWith(QStringLiteral("One inversion of grade")));

        PriceRules rules;
        rules.greatestChange = Price{900};
        rules.points.step = Price{500};
        const QStringList broken = remarks({Price{7000}, Price{9250}, Price{10000}, Price{11000}}, rules);
        QCOMPARE(broken, (QStringList{QStringLiteral("One new price lies beyond the price rules: A-1."),
                                      QStringLiteral("One new price is not a price point: A-2.")}));
        // Today's prices break no rule, whatever the rules are; a lock forbids moving, not what was moved before it.
        rules.points.step = Price{700};
        QVERIFY(!remarks(askingPrices(tierCase.tier.units), rules).join(QString()).contains(QStringLiteral("rules")));
        QCOMPARE(remarks({Price{6900}, Price{9000}, Price{10000}, Price{11000}}),
                 QStringList{QStringLiteral("One unit on offer is asked below the advertised floor.")});
        Tier lockedTier = tierCase.tier;
        for (Unit& unit : lockedTier.units)
            unit.locked = true;
        const auto& lower = tierCase.candidates[0].prices;
        const QString said = sheetRemarks(lockedTier, lower, measured(lockedTier, lower, tierCase.model), {}, scenario.currency).join(u' ');
        QVERIFY2(said.contains(QStringLiteral("though ")) && said.contains(QStringLiteral("locked: A-1")), qPrintable(said));
    }
};

QTEST_MAIN(TextsTest)
#include "texts_test.moc"
