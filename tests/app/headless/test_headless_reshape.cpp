// SPDX-License-Identifier: GPL-3.0-or-later
// `reshape`: candidates and price sheets under rules, which tiers have no ladder as wished and why, and nothing lost on the way.
#include "program.h"

#include "gap/measure.h"
#include "price_sheet.h"
#include "rules_json.h"
#include "scenario_json.h"

#include <QTemporaryDir>
#include <QTest>

using namespace rungwright;

namespace
{

const QString kScenario = QStringLiteral("quillmere-storage.rungs.json");

Scenario loaded(const QString& path)
{
    Outcome<Scenario> read = loadScenario(path);
    return read.ok() ? std::move(read).value() : Scenario{};
}

QStringList words(const char* text) { return QString::fromUtf8(text).split(QLatin1Char(' '), Qt::SkipEmptyParts); }

double gapOf(const TierCase& tierCase, std::span<const Price> prices)
{
    return measured(tierCase.tier, prices, tierCase.model, MeasureParts::figuresOnly).gap.gap.value_or(-1e9);
}

Price offered(const Tier& tier, std::span<const Price> prices)
{
    Price total;
    for (std::size_t i = 0; i < prices.size(); ++i)
        total += tier.units[i].onOffer() ? prices[i] : Price{};
    return total;
}

} // namespace

class TestHeadlessReshape : public QObject
{
    Q_OBJECT

private slots:
    void candidatesIntoANewScenario();
    void candidatesIntoTheSameScenario();
    void aUnitListBecomesAScenario();
    void aPriceSheet();
    void tiersWithoutALadderAreListed();
    void rulesOfATierBind();
    void wrongUsage_data();
    void wrongUsage();
    void nothingIsOverwritten();
    void rulesAreRefused();

private:
    QTemporaryDir m_dir;
    QString path(const char* name) const { return m_dir.filePath(QString::fromLatin1(name)); }
    Ran reshape(const QString& file, const char* options, const QStringList& more) const
    {
        return run(QStringList{QStringLiteral("reshape"), file} + words(options) + more);
    }
};

void TestHeadlessReshape::candidatesIntoANewScenario()
{
    const QString out = path("new.rungs.json");
    const Ran ran = reshape(sample(qPrintable(kScenario)), "--gap-share 25 --free-total",
                            {QStringLiteral("--candidate"), QStringLiteral("Spring"), QStringLiteral("--out"), out});
    QVERIFY(ran.out.isEmpty());
    QVERIFY2(ran.message.endsWith(caution()), ran.message);
    Scenario before = loaded(sample(qPrintable(kScenario)));
    Scenario after = loaded(out);
    QCOMPARE(after.tiers.size(), before.tiers.size());
    int made = 0;
    bool lacking = false;
    for (std::size_t t = 0; t < before.tiers.size(); ++t) {
        const TierCase& tierCase = std::as_const(after.tiers)[t];
        const std::size_t more = tierCase.candidates.size() - std::as_const(before.tiers)[t].candidates.size();
        QVERIFY(more <= 1);
        if (more == 0) {
            lacking = lacking || gapOf(tierCase, askingPrices(tierCase.tier.units)) > 0.25 * inMinor(tierCase.tier.advertisedFloor);
            continue;
        }
        ++made;
        const Candidate& candidate = tierCase.candidates.back();
        QCOMPARE(candidate.name, std::string("Spring"));
        QVERIFY(gapOf(tierCase, askingPrices(tierCase.tier.units)) > 0.25 * inMinor(tierCase.tier.advertisedFloor));
        QVERIFY(gapOf(tierCase, candidate.prices) <= 0.25 * inMinor(tierCase.tier.advertisedFloor) + 1e-6);
        for (std::size_t i = 0; i < candidate.prices.size(); ++i) {
            const Room room = roomOf(tierCase.tier.units[i], before.rules);
            QVERIFY(candidate.prices[i] >= room.lo && candidate.prices[i] <= room.hi);
        }
        // Nothing but the candidate is new.
        after.tiers[t].candidates.pop_back();
    }
    QVERIFY(made > 0);
    QCOMPARE(ran.status, lacking ? 5 : 0);
    QVERIFY2(ran.message.contains("tiers reshaped: " + QByteArray::number(made)), ran.message);
    QVERIFY(after == before);
}

void TestHeadlessReshape::candidatesIntoTheSameScenario()
{
    const QString file = written(path("same.rungs.json"), contents(sample(qPrintable(kScenario))));
    const QStringList one{QStringLiteral("--site"),    QStringLiteral("Quillmere Quay"), QStringLiteral("--tier"),
                          QStringLiteral("Room 4 m²"), QStringLiteral("--out"),          file};
    const std::size_t had = findTier(loaded(file), "Quillmere Quay", "Room 4 m²")->candidates.size();
    for (int times = 1; times <= 2; ++times) {
        const Ran ran = reshape(file, "--total-change 2 --candidate Up", one);
        QVERIFY2(ran.status == 0, ran.message);
        const Scenario now = loaded(file);
        const TierCase& tierCase = *findTier(now, "Quillmere Quay", "Room 4 m²");
        QCOMPARE(tierCase.candidates.size(), had + std::size_t(times));
        QCOMPARE(tierCase.candidates.back().name, times == 1 ? std::string("Up") : std::string("Up 2"));
        const Price today = offered(tierCase.tier, askingPrices(tierCase.tier.units));
        const Price then = offered(tierCase.tier, tierCase.candidates.back().prices);
        QVERIFY(std::abs(inMinor(then) - 1.02 * inMinor(today)) <= inMinor(now.rules.points.step)); // Rounded to the price points.
    }
}

void TestHeadlessReshape::aUnitListBecomesAScenario()
{
    const QString list = written(path("list.csv"), "site,tier,unit,asking_price,status,advertised_floor\n"
                                                   "Q,T,A,54.00,vacant,50.00\nQ,T,B,60.00,vacant,50.00\nQ,T,C,70.00,vacant,50.00\n");
    RuleSet rules;
    rules.rules.points.step = Price{50};
    rules.ownRules = {{{"Q", "T"}, rules.rules}};
    rules.ownRules[0].rules.greatestChange = Price{300};
    const QString rulesFile = written(path("house.rules.json"), rulesToJson(rules, {"EUR", 2}));
    const QString out = path("list.rungs.json");
    const Ran ran = reshape(list, "--currency EUR --gap 1.50 --model on-hand --free-total",
                            {QStringLiteral("--rules"), rulesFile, QStringLiteral("--out"), out});
    QVERIFY2(ran.status == 0, ran.message);
    const Scenario made = loaded(out);
    QVERIFY(made.rules == rules.rules && made.ownRules == rules.ownRules);
    // By hand: on hand, the cheapest is A; 54.00 has to come down to 51.50, which the greatest change of 3.00 allows. The total is free.
    const TierCase& tierCase = std::as_const(made.tiers)[0];
    QCOMPARE(tierCase.candidates.size(), std::size_t(1));
    QCOMPARE(tierCase.candidates[0].prices, (std::vector<Price>{{5150}, {6000}, {7000}}));
    QCOMPARE(tierCase.candidates[0].name, std::string("Least change: gap at most 1.50"));

    // 0.50 is out of its reach: 54.00 less 3.00 is 51.00.
    const Ran deeper = reshape(list, "--currency EUR --gap 0.50 --model on-hand --free-total",
                               {QStringLiteral("--rules"), rulesFile, QStringLiteral("--out"), path("deeper.rungs.json")});
    QCOMPARE(deeper.status, 5);
    QVERIFY2(deeper.message.contains("Q / T: The smallest gap reachable is 1.00."), deeper.message);
    QVERIFY2(deeper.message.contains("Without the greatest change in money"), deeper.message);
    QVERIFY(!QFile::exists(path("deeper.rungs.json")));
}

void TestHeadlessReshape::aPriceSheet()
{
    const QString out = path("sheet.csv");
    const Ran ran = reshape(sample(qPrintable(kScenario)), "--gap-share 25 --free-total", {QStringLiteral("--sheet"), out});
    QVERIFY(ran.message.endsWith(caution()));
    const auto rows = sheetFromCsv(contents(out), out);
    QVERIFY(rows.ok());
    // The same prices as the candidates of the same wish.
    const QString other = path("beside.rungs.json");
    const Ran beside = reshape(sample(qPrintable(kScenario)), "--gap-share 25 --free-total", {QStringLiteral("--out"), other});
    QCOMPARE(beside.status, ran.status);
    const Scenario made = loaded(other);
    int changed = 0;
    for (const SheetRow& row : rows.value()) {
        const TierCase* tierCase = findTier(made, row.site, row.tier);
        QVERIFY(tierCase);
        const auto unit = std::ranges::find(tierCase->tier.units, row.unit, &Unit::name) - tierCase->tier.units.begin();
        const bool current = row.candidate == kCurrentName;
        QCOMPARE(row.newPrice, current ? row.currentPrice : tierCase->candidates.back().prices[std::size_t(unit)]);
        QVERIFY(current || row.candidate == tierCase->candidates.back().name);
        changed += row.newPrice != row.currentPrice;
    }
    QVERIFY(changed > 0);
}

void TestHeadlessReshape::tiersWithoutALadderAreListed()
{
    const QString list = written(path("mixed.csv"), "site,tier,unit,asking_price,status,advertised_floor,locked\n"
                                                    "Q,Good,A,54.00,vacant,50.00,no\nQ,Good,B,60.00,vacant,50.00,no\n"
                                                    "Q,Stuck,A,54.00,vacant,50.00,yes\nQ,Stuck,B,60.00,vacant,50.00,yes\n"
                                                    "Q,Empty,A,54.00,occupied,50.00,no\n");
    const QString out = path("mixed.rungs.json");
    const Ran ran = reshape(list, "--currency EUR --gap 1 --model on-hand --hold-total", {QStringLiteral("--out"), out});
    QCOMPARE(ran.status, 5);
    QVERIFY2(ran.message.contains("Q / Stuck: The smallest gap reachable is 4.00. Without the locks there need be no gap."), ran.message);
    QVERIFY2(ran.message.contains("Q / Empty: "), ran.message);
    QVERIFY2(ran.message.contains("tiers reshaped: 1, already as wished: 0, without a ladder as wished: 2"), ran.message);
    QVERIFY(!ran.message.contains("Q / Good:"));
    const Scenario made = loaded(out);
    QCOMPARE(made.tiers.size(), std::size_t(3)); // The others are there, as they were.
    QCOMPARE(findTier(made, "Q", "Good")->candidates.size(), std::size_t(1));
    QCOMPARE(findTier(made, "Q", "Stuck")->candidates.size(), std::size_t(0));
    // A sheet holds only tiers with a ladder as wished.
    const Ran sheet = reshape(list, "--currency EUR --gap 1 --model on-hand", {QStringLiteral("--sheet"), path("mixed-sheet.csv")});
    QCOMPARE(sheet.status, 5);
    const auto rows = sheetFromCsv(contents(path("mixed-sheet.csv")), QString());
    QCOMPARE(rows.value().size(), std::size_t(2));
}

void TestHeadlessReshape::rulesOfATierBind()
{
    Scenario scenario;
    scenario.currency = {"EUR", 2};
    for (const char* name : {"Own", "Wide"}) {
        TierCase tierCase;
        tierCase.tier = {"Q", name, {5000}, {}};
        for (const int price : {5400, 6000, 7000})
            tierCase.tier.units.push_back({std::to_string(price), {price}, Status::vacant, false, {}, {}, {}});
        scenario.tiers.push_back(tierCase);
    }
    PriceRules share;
    share.leastShareAtFloor = 0.5;
    setRulesOf(scenario, {"Q", "Own"}, share);
    const QString file = path("own.rungs.json");
    QVERIFY(saveScenario(scenario, file).ok());
    const Ran ran = reshape(file, "--gap 30 --free-total", {QStringLiteral("--out"), path("own-out.rungs.json")});
    QVERIFY2(ran.status == 0, ran.message);
    const Scenario made = loaded(path("own-out.rungs.json"));
    // Half of three units is two at the floor, which is a change though the target is met already.
    QCOMPARE(findTier(made, "Q", "Own")->candidates.at(0).prices, (std::vector<Price>{{5000}, {5000}, {7000}}));
    QVERIFY(findTier(made, "Q", "Wide")->candidates.empty());
    QVERIFY2(ran.message.contains("tiers reshaped: 1, already as wished: 1, without a ladder as wished: 0"), ran.message);
}

void TestHeadlessReshape::wrongUsage_data()
{
    QTest::addColumn<QString>("options");
    QTest::addColumn<QByteArray>("says");
    const auto row = [](const char* options, const char* says) {
        QTest::newRow(options) << QString::fromUtf8(options) << QByteArray(says);
    };
    row("--gap 1", "--out, a scenario to write, or --sheet, a price sheet, is missing");
    row("--gap 1 --out a --sheet b", "--out and --sheet exclude each other");
    row("--gap 1 --gap-share 2 --out a", "--gap and --gap-share exclude each other");
    row("--gap 1 --hold-total --free-total --out a", "--hold-total and --free-total exclude each other");
    row("--out a", "nothing is wished for");
    row("--gap x --out a", "--gap wants an amount");
    row("--gap -1 --out a", "--gap wants an amount");
    row("--gap-share x --out a", "--gap-share wants a percentage");
    row("--floor-met 0 --out a", "--floor-met wants a percentage");
    row("--floor-met 101 --out a", "--floor-met wants a percentage");
    row("--total-change -100 --out a", "--total-change wants a percentage");
    row("--gap 1 --order up --out a", "--order knows no 'up'");
    row("--gap 1 --site Nowhere --out a", "holds nothing of site 'Nowhere'");
}

void TestHeadlessReshape::wrongUsage()
{
    QFETCH(const QString, options);
    QFETCH(const QByteArray, says);
    const Ran ran = reshape(sample(qPrintable(kScenario)), qPrintable(options), {});
    QCOMPARE(ran.status, 2);
    QVERIFY2(ran.message.contains(says), ran.message);
    QVERIFY(ran.out.isEmpty());
}

void TestHeadlessReshape::nothingIsOverwritten()
{
    const QByteArray bytes = contents(sample(qPrintable(kScenario)));
    const QString file = written(path("mine.rungs.json"), bytes);
    const QString other = written(path("other.rungs.json"), bytes);
    const Ran foreign = reshape(file, "--gap-share 25 --free-total", {QStringLiteral("--out"), other});
    QCOMPARE(foreign.status, 2);
    QVERIFY2(foreign.message.contains("would overwrite another scenario"), foreign.message);
    QCOMPARE(contents(other), bytes);
    const Ran sheetOver = reshape(file, "--gap-share 25 --free-total", {QStringLiteral("--sheet"), other});
    QCOMPARE(sheetOver.status, 2);
    QVERIFY2(sheetOver.message.contains("would overwrite a scenario"), sheetOver.message);
    QCOMPARE(contents(other), bytes);
    const Ran sheet = reshape(file, "--gap-share 25", {QStringLiteral("--sheet"), file});
    QCOMPARE(sheet.status, 2);
    QCOMPARE(contents(file), bytes);
    const QString rules = written(path("r.rules.json"), rulesToJson({}, {"EUR", 2}));
    QCOMPARE(reshape(file, "--gap-share 25", {QStringLiteral("--rules"), rules, QStringLiteral("--out"), rules}).status, 2);
    const Ran nowhere = reshape(file, "--gap-share 25 --free-total", {QStringLiteral("--out"), path("no/such/folder.rungs.json")});
    QCOMPARE(nowhere.status, 4);
    // A scenario that could not be written again stays as it is.
    QCOMPARE(contents(file), bytes);
}

void TestHeadlessReshape::rulesAreRefused()
{
    const QString rules =
        written(path("wrong.rules.json"), "{\"format\": \"rungwright-rules\", \"version\": 1, \"currency\": \"JPY\", \"rules\": {}}");
    const Ran ran = reshape(sample(qPrintable(kScenario)), "--gap-share 25",
                            {QStringLiteral("--rules"), rules, QStringLiteral("--out"), path("refused.rungs.json")});
    QCOMPARE(ran.status, 3);
    QVERIFY2(ran.message.contains("wrong.rules.json: currency: another currency than that of the prices"), ran.message);
    QVERIFY(!QFile::exists(path("refused.rungs.json")));
    QCOMPARE(reshape(sample(qPrintable(kScenario)), "--gap-share 25",
                     {QStringLiteral("--rules"), path("absent"), QStringLiteral("--out"), path("refused.rungs.json")})
                 .status,
             3);
}

QTEST_GUILESS_MAIN(TestHeadlessReshape)
#include "test_headless_reshape.moc"
