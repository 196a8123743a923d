// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist's rows, flags, order, groups and table, against plain re-computations.
#include "invented_portfolio.h"
#include "worklist_csv.h"
#include "worklist_order.h"

#include <QSignalSpy>
#include <QTest>

#include <cmath>
#include <map>
#include <mutex>

using namespace rungwright;

namespace
{

/// Everything the flags need, written out anew from their definitions.
struct Plain {
    std::vector<double> prices; ///< On offer, ascending.
    std::size_t rentable = 0;
    bool inversions = false;

    explicit Plain(const Tier& tier)
    {
        for (const Unit& a : tier.units) {
            rentable += a.status != Status::closed;
            if (a.status != Status::vacant)
                continue;
            prices.push_back(static_cast<double>(a.asking.minor));
            for (const Unit& b : tier.units) {
                if (b.status == Status::vacant && a.grade && b.grade && *a.grade > *b.grade && a.asking < b.asking)
                    inversions = true;
            }
        }
        std::sort(prices.begin(), prices.end());
    }
    std::optional<double> lean() const
    {
        const auto n = static_cast<double>(prices.size());
        double mean = 0;
        for (const double p : prices)
            mean += p / n;
        double m2 = 0;
        double m3 = 0;
        for (const double p : prices) {
            m2 += std::pow(p - mean, 2) / n;
            m3 += std::pow(p - mean, 3) / n;
        }
        // Of equal prices rounding may leave a trace of a variance.
        return prices.empty() || prices.front() == prices.back() ? std::nullopt : std::optional(m3 / std::pow(m2, 1.5));
    }
    /// The expected least of n draws with replacement from n prices: the perceived range with as many draws as units on offer.
    double expectedCheapest() const
    {
        const auto n = static_cast<double>(prices.size());
        double sum = 0;
        for (std::size_t i = 0; i < prices.size(); ++i) {
            const double atLeast = (n - static_cast<double>(i)) / n;
            sum += prices[i] * (std::pow(atLeast, n) - std::pow(atLeast - 1 / n, n));
        }
        return sum;
    }
};

bool closeTo(double a, double b) { return std::abs(a - b) <= 1e-9 * std::max({1.0, std::abs(a), std::abs(b)}); }

WorklistWish wishFor(WorklistKey key, bool descending)
{
    WorklistWish wish;
    wish.key = key;
    wish.descending = descending;
    return wish;
}

} // namespace

class WorklistTest : public QObject
{
    Q_OBJECT
private slots:
    void rowsAndFlagsAreWhatTheirDefinitionsSay();
    void backgroundGivesTheSame_data();
    void backgroundGivesTheSame();
    void preparingNamesIsGivenUp();
    void editsMeanwhileAreNotOverwritten();
    void thresholdsFlagAnewWithoutMeasuring();
    void orderIsStableAndUndefinedLast();
    void everyWordMustBeThere();
    void filtersByFlagUnseenAndPick();
    void groupsBySite();
    void numbersInNamesSortByValue();
    void tableIsExactAndGuarded();
};

void WorklistTest::rowsAndFlagsAreWhatTheirDefinitionsSay()
{
    Document document;
    document.begin(inventedPortfolio(180), {}, true);
    const Worklist list(document);
    QVERIFY(!list.measuring());
    std::map<Flag, int> seen;
    for (const FlagThresholds& t : {FlagThresholds{}, FlagThresholds{-0.1, 6, 0.03}}) {
        for (int i = 0; i < list.count(); ++i) {
            const Tier& tier = list.tierCase(i).tier;
            const Plain plain(tier);
            const WorklistRow& row = list.row(i);
            QCOMPARE(std::size_t(row.onOffer), plain.prices.size());
            QCOMPARE(std::size_t(row.rentable), plain.rentable);
            const auto lean = plain.lean();
            QCOMPARE(row.lean.has_value(), lean.has_value());
            QVERIFY(!lean || closeTo(*row.lean, *lean));
            const auto floor = static_cast<double>(tier.advertisedFloor.minor);
            std::optional<double> share;
            if (!plain.prices.empty()) {
                QVERIFY(closeTo(*row.cheapest, plain.expectedCheapest()));
                if (floor > 0)
                    share = (plain.expectedCheapest() - floor) / floor;
            }
            QCOMPARE(row.share.has_value(), share.has_value());
            QVERIFY(!share || closeTo(*row.share, *share));

            const bool any = !plain.prices.empty();
            const FlagSet flags = flagsOf(row, t);
            const std::map<Flag, bool> wanted{{Flag::noneOnOffer, !any},
                                              {Flag::noFloor, floor == 0},
                                              {Flag::floorNotOnSale, floor > 0 && any && plain.prices.front() > floor},
                                              {Flag::belowFloor, floor > 0 && any && plain.prices.front() < floor},
                                              {Flag::wideGap, share && *share >= t.gapShare},
                                              {Flag::leansLeft, lean && *lean < t.leansLeft},
                                              {Flag::lastUnits, any && static_cast<int>(plain.prices.size()) <= t.lastUnits},
                                              {Flag::inversions, plain.inversions}};
            int count = 0;
            for (const auto& [flag, on] : wanted) {
                QVERIFY2(flags.has(flag) == on, qPrintable(QStringLiteral("tier %1: %2").arg(i).arg(flagWord(flag))));
                QCOMPARE(flagWords(flags).contains(flagWord(flag)), on);
                seen[flag] += on;
                count += on;
            }
            QCOMPARE(flags.count(), count);
        }
    }
    for (const Flag flag : kFlags)
        QVERIFY2(seen[flag] > 0, qPrintable(flagWord(flag))); // the portfolio tries them all
}

void WorklistTest::backgroundGivesTheSame_data()
{
    QTest::addColumn<int>("threads");
    for (const int threads : {1, 2, 3, 8})
        QTest::newRow(qPrintable(QString::number(threads))) << threads;
}

void WorklistTest::backgroundGivesTheSame()
{
    QFETCH(int, threads);
    const Scenario scenario = inventedPortfolio(700, 12);
    std::vector<WorklistRow> rows(scenario.tiers.size());
    std::mutex mutex;
    std::atomic<bool> cancel = false;
    QVERIFY(measureRows(scenario.tiers, static_cast<unsigned>(threads), cancel, [&](std::size_t first, std::vector<WorklistRow> some) {
        const std::lock_guard lock(mutex);
        std::copy(some.begin(), some.end(), rows.begin() + static_cast<std::ptrdiff_t>(first));
    }));
    Measurer measurer;
    for (std::size_t i = 0; i < rows.size(); ++i)
        QVERIFY(rows[i] == measureRow(measurer, scenario.tiers[i]));

    Document document;
    Worklist list(document);
    document.begin(scenario, {}, true);
    QVERIFY(list.measuring());
    QCOMPARE(list.count(), 700);
    QVERIFY(!list.row(3).measured && list.flags(3).empty());
    QTRY_VERIFY(!list.measuring());
    for (int i = 0; i < list.count(); ++i) {
        QVERIFY(list.row(i) == rows[static_cast<std::size_t>(i)]);
        QVERIFY(list.flags(i) == flagsOf(list.row(i), list.thresholds()));
    }
    cancel = true;
    QVERIFY(!measureRows(scenario.tiers, static_cast<unsigned>(threads), cancel, [](std::size_t, const std::vector<WorklistRow>&) {}));
    // Another scenario, and the end of the list itself, while measuring goes on: nothing of the old one arrives.
    document.begin(inventedPortfolio(600, 12), {}, true);
    document.begin(inventedPortfolio(20), {}, true);
    QVERIFY(!list.measuring());
    QCoreApplication::processEvents();
    QCOMPARE(list.measuredCount(), 20);
    document.begin(inventedPortfolio(600, 12), {}, true);
}

void WorklistTest::preparingNamesIsGivenUp()
{
    const TierList tiers = inventedPortfolio(40).tiers;
    std::atomic<bool> cancel = false;
    QCOMPARE(nameRanks(tiers, cancel).tier.size(), tiers.size());
    QCOMPARE(searchTexts(tiers, cancel).size(), tiers.size());
    cancel = true;
    QVERIFY(nameRanks(tiers, cancel).tier.empty());
    QVERIFY(searchTexts(tiers, cancel).empty());
}

void WorklistTest::editsMeanwhileAreNotOverwritten()
{
    Document document;
    Worklist list(document);
    document.begin(inventedPortfolio(900, 12), {}, true);
    QVERIFY(list.measuring());
    QSignalSpy done(&list, &Worklist::measured);
    document.setFloor(5, Price{123});
    QVERIFY(list.row(5).measured);
    QCOMPARE(list.row(5).floor, Price{123});
    QTRY_VERIFY(!list.measuring());
    QCOMPARE(done.count(), 1);
    QCOMPARE(list.measuredCount(), 900);
    Measurer measurer;
    QVERIFY(list.row(5) == measureRow(measurer, list.tierCase(5)));
    document.undoStack().undo();
    QVERIFY(list.row(5) == measureRow(measurer, list.tierCase(5)));
    document.setModel(7, {ModelKind::remainder, 2, {}}, QStringLiteral("model"));
    QVERIFY(list.row(7) == measureRow(measurer, list.tierCase(7)));
}

void WorklistTest::thresholdsFlagAnewWithoutMeasuring()
{
    Document document;
    document.begin(inventedPortfolio(100), {}, true);
    Worklist list(document);
    const auto count = [&](Flag flag) {
        int n = 0;
        for (int i = 0; i < list.count(); ++i)
            n += list.flags(i).has(flag);
        return n;
    };
    const int before = count(Flag::wideGap);
    QSignalSpy changed(&list, &Worklist::rowsChanged);
    document.setFlagThresholds({-0.5, 3, 1e6});
    QCOMPARE(changed.count(), 1);
    QCOMPARE(count(Flag::wideGap), 0);
    document.undoStack().undo();
    QVERIFY(before > 0);
    QCOMPARE(count(Flag::wideGap), before);
}

void WorklistTest::orderIsStableAndUndefinedLast()
{
    Document document;
    document.begin(inventedPortfolio(190), {}, true);
    document.setSeen(std::vector{1, 4, 9}, true);
    document.setTierNote(3, QStringLiteral("look"));
    const Worklist list(document);
    for (const WorklistKey key : {WorklistKey::tier, WorklistKey::site, WorklistKey::onOffer, WorklistKey::floor, WorklistKey::cheapest,
                                  WorklistKey::gap, WorklistKey::lean, WorklistKey::flags, WorklistKey::seen, WorklistKey::note}) {
        for (const bool descending : {false, true}) {
            const std::vector<int> tiers = arranged(list, wishFor(key, descending)).tiers;
            QCOMPARE(static_cast<int>(tiers.size()), list.count());
            for (std::size_t i = 1; i < tiers.size(); ++i) {
                const auto a = sortNumber(list, tiers[i - 1], key);
                const auto b = sortNumber(list, tiers[i], key);
                QVERIFY(a || !b);
                if (!a != !b)
                    continue;
                if (!a || *a == *b)
                    QVERIFY(tiers[i - 1] < tiers[i]);
                else
                    QVERIFY(descending ? *a > *b : *a < *b);
            }
        }
    }
    // Worst first, by share.
    const int worst = arranged(list, WorklistWish{}).tiers.front();
    QCOMPARE(worst, list.worstTier());
}

void WorklistTest::everyWordMustBeThere()
{
    Document document;
    document.begin(inventedPortfolio(64), {}, true);
    document.setTierNote(10, QStringLiteral("Ask the Mayor"));
    const Worklist list(document);
    const auto found = [&](const char* typed) {
        WorklistWish wish;
        wish.setWords(QString::fromUtf8(typed));
        return arranged(list, wish).tiers;
    };
    QCOMPARE(found("").size(), std::size_t(64));
    QCOMPARE(found("  SITE 8 ").size(), std::size_t(8));
    QCOMPARE(found("site 8 m² 15").size(), std::size_t(1));
    QCOMPARE(found("mayor"), std::vector{10});
    QCOMPARE(found("no such tier").size(), std::size_t(0));
    std::size_t left = 0;
    for (int i = 0; i < list.count(); ++i)
        left += list.flags(i).has(Flag::leansLeft);
    QVERIFY(left > 0);
    QCOMPARE(found("left leans").size(), left);
}

void WorklistTest::filtersByFlagUnseenAndPick()
{
    Document document;
    document.begin(inventedPortfolio(150), {}, true);
    document.setSeen(std::vector{0, 1, 2, 50}, true);
    Worklist list(document);
    list.pick({0, 3, 50, 51, 51});
    QCOMPARE(list.pickedCount(), 4);
    WorklistWish wish;
    wish.anyFlag.set(Flag::lastUnits);
    wish.anyFlag.set(Flag::noFloor);
    wish.unseenOnly = true;
    QVERIFY(wish.filters());
    for (const bool picked : {false, true}) {
        wish.pickedOnly = picked;
        std::vector<bool> shown(150);
        for (const int tier : arranged(list, wish).tiers)
            shown[static_cast<std::size_t>(tier)] = true;
        for (int i = 0; i < 150; ++i) {
            const bool wanted = (list.flags(i).has(Flag::lastUnits) || list.flags(i).has(Flag::noFloor)) && !list.tierCase(i).seen &&
                                (!picked || i == 3 || i == 51);
            QCOMPARE(bool(shown[static_cast<std::size_t>(i)]), wanted);
        }
    }
    list.clearPick();
    QCOMPARE(list.pickedCount(), 0);
}

void WorklistTest::groupsBySite()
{
    Document document;
    document.begin(inventedPortfolio(100), {}, true);
    document.setSeen(std::vector{0, 1, 2}, true);
    const Worklist list(document);
    WorklistWish wish;
    wish.grouped = true;
    const WorklistArrangement shown = arranged(list, wish);
    QCOMPARE(shown.rows.size(), std::size_t(100 + 13)); // 12 sites of eight tiers and one of four
    int site = -1;
    std::optional<double> worstBefore;
    std::optional<double> shareBefore;
    for (const ShownRow& row : shown.rows) {
        if (row.isSite()) {
            site = row.site;
            SiteSummary wanted;
            for (int i = 0; i < list.count(); ++i) {
                if (list.tierCase(i).tier.site != list.names().sites[static_cast<std::size_t>(site)].toStdString())
                    continue;
                ++wanted.tiers;
                wanted.flagged += list.flags(i).count() > 0;
                wanted.unseen += !list.tierCase(i).seen;
                wanted.onOffer += list.row(i).onOffer;
                wanted.rentable += list.row(i).rentable;
                wanted.worstShare = std::max(wanted.worstShare, list.row(i).share);
            }
            const SiteSummary& sum = shown.sites[static_cast<std::size_t>(site)];
            QCOMPARE(sum.tiers, wanted.tiers);
            QCOMPARE(sum.flagged, wanted.flagged);
            QCOMPARE(sum.unseen, wanted.unseen);
            QCOMPARE(sum.onOffer, wanted.onOffer);
            QCOMPARE(sum.rentable, wanted.rentable);
            QCOMPARE(sum.worstShare, wanted.worstShare);
            QVERIFY(!worstBefore || !sum.worstShare || *worstBefore >= *sum.worstShare);
            worstBefore = sum.worstShare;
            shareBefore.reset();
            continue;
        }
        QCOMPARE(row.site, site);
        const auto share = list.row(row.tier).share;
        QVERIFY(!shareBefore || !share || *shareBefore >= *share);
        shareBefore = share;
    }
    wish.folded.insert(QStringLiteral("Invented site 3"));
    const WorklistArrangement folded = arranged(list, wish);
    QCOMPARE(folded.rows.size(), shown.rows.size() - 8);
    QCOMPARE(folded.tiers, shown.tiers);
}

void WorklistTest::numbersInNamesSortByValue()
{
    if (QLocale().language() == QLocale::C)
        QLocale::setDefault(QLocale(QLocale::English, QLocale::UnitedKingdom));
    Document document;
    document.begin(inventedPortfolio(8 * 12), {}, true);
    const Worklist list(document);
    const std::vector<int> tiers = arranged(list, wishFor(WorklistKey::site, false)).tiers;
    for (std::size_t i = 0; i < tiers.size(); ++i)
        QCOMPARE(tiers[i], static_cast<int>(i)); // site 2 before site 10
}

void WorklistTest::tableIsExactAndGuarded()
{
    Scenario scenario = inventedPortfolio(40);
    scenario.tiers[2].tier.name = "=SUM(A1)";
    scenario.tiers[2].note = "says \"wait\", see\nbelow";
    scenario.tiers[2].seen = true;
    Document document;
    document.begin(scenario, {}, true);
    const Worklist list(document);
    const QByteArray csv = worklistCsv(list, std::vector{2, 22, 30});
    const QList<QByteArray> lines = csv.split('\n');
    QCOMPARE(lines[0],
             QByteArray("site,tier,on_offer,rentable,advertised_floor,expected_cheapest,gap,gap_share,skew_moment,flags,seen,note,"
                        "currency\r"));
    QVERIFY(csv.contains("Invented site 1,'=SUM(A1),"));
    QVERIFY(csv.contains(",yes,\"says \"\"wait\"\", see\nbelow\",EUR\r\n"));
    // Nothing on offer: no figures but the floor. No floor: no gap.
    QVERIFY(csv.contains("Invented site 3,Room 13 m²,0,"));
    QVERIFY(csv.contains(",,,,,none on offer,no,,EUR\r\n"));
    const QList<QByteArray> cells = lines[1].split(',');
    QCOMPARE(cells[7].toDouble(), *list.row(2).share); // reads back as the same double
    QCOMPARE(cells[5].toDouble(), *list.row(2).cheapest / 100);
    QVERIFY(lines[4].contains("no floor") && lines[4].split(',')[4].isEmpty() && lines[4].split(',')[6].isEmpty());
}

QTEST_GUILESS_MAIN(WorklistTest)
#include "worklist_test.moc"
