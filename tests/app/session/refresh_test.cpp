// SPDX-License-Identifier: GPL-3.0-or-later
// A refresh is what importing the list anew gives, plus the surviving changes of the candidates; and an undo takes it back to the byte.
#include "refresh.h"

#include "document.h"
#include "invented_tier.h"
#include "refresh_reference.h"
#include "scenario_json.h"

#include <QElapsedTimer>
#include <QTest>

#include <random>

using namespace rungwright;

class RefreshTest : public QObject
{
    Q_OBJECT
private slots:
    void randomListsGiveWhatTheSlowWayGives();
    void aListThatSaysItAllIsImportedAnew();
    void undoAndRedoAreExactToTheByte();
    void theSameListChangesNothingButSeenMarks();
    void candidatesAreCarriedAsTold();
    void aMovedUnitIsOne();
    void twoOfANameAreNotTakenForAMove();
    void whatTheListDoesNotSayStays();
    void goneTiersLeaveWithTheirCandidates();
    void anotherCurrencyIsRefused();
    void aCurrencyNotYetKnownIsTaken();
    void aLockSetByTheListClashes();
    void stoppingChangesNothing();
    void signedSheetsAreCompared();
    void linesAreCappedAndAllCounted();
    void aMillionUnits();
};

namespace
{

using Random = std::mt19937;

bool chance(Random& random, unsigned percent) { return random() % 100 < percent; }
Price somePrice(Random& random) { return Price{5000 + 50 * static_cast<int>(random() % 12)}; }

Unit someUnit(Random& random, int number)
{
    Unit unit;
    unit.name = "U-" + std::to_string(number);
    unit.asking = somePrice(random);
    unit.status = static_cast<Status>(random() % 4);
    unit.locked = chance(random, 10);
    unit.grade = static_cast<int>(random() % 4);
    unit.areaM2 = 5.0 + static_cast<int>(random() % 6);
    unit.vacancyChance = static_cast<int>(random() % 4) / 4.0;
    return unit;
}

/// Three sites with up to four tiers of up to nine units; unit names come again in other tiers and sites.
Scenario someScenario(Random& random)
{
    Scenario scenario;
    scenario.currency = Currency{"EUR", 2};
    scenario.rules.points.step = Price{50};
    for (int t = 0; t < 12; ++t) {
        if (chance(random, 25))
            continue;
        TierCase tierCase;
        tierCase.tier.site = "Site " + std::to_string(t % 3);
        tierCase.tier.name = "Tier " + std::to_string(t / 3);
        tierCase.tier.advertisedFloor = chance(random, 15) ? Price{} : Price{4900};
        const int first = static_cast<int>(random() % 12);
        const int units = 1 + static_cast<int>(random() % 9);
        for (int u = 0; u < units; ++u)
            tierCase.tier.units.push_back(someUnit(random, first + u));
        for (unsigned c = random() % 3; c > 0; --c) {
            Candidate candidate{"Candidate " + std::to_string(c), "", askingPrices(tierCase.tier.units)};
            for (Price& price : candidate.prices) {
                if (chance(random, 40))
                    price = somePrice(random);
            }
            tierCase.candidates.push_back(candidate);
        }
        if (!tierCase.candidates.empty() && chance(random, 50))
            tierCase.chosen = 0;
        tierCase.note = chance(random, 30) ? "a note" : "";
        tierCase.seen = chance(random, 40);
        if (chance(random, 30))
            tierCase.signedOff =
                SignedSheet{"Candidate 1", "2026-11-30T09:00:00Z", {{tierCase.tier.units[0].name, Price{5000}, Price{5050}}}};
        scenario.tiers.push_back(tierCase);
    }
    return scenario;
}

/// The list of which the scenario could have been imported.
std::vector<TierCase> listOf(const Scenario& scenario)
{
    std::vector<TierCase> list;
    for (const TierCase& tierCase : scenario.tiers)
        list.push_back({tierCase.tier, {}, {}, {}, {}, false, {}});
    return list;
}

template <class T>
T& oneOf(std::vector<T>& values, Random& random)
{
    return values[random() % values.size()];
}

bool names(const Tier& tier, const std::string& unit)
{
    return std::any_of(tier.units.begin(), tier.units.end(), [&](const Unit& one) { return one.name == unit; });
}

/// What can happen to a list from one week to the next.
void edit(std::vector<TierCase>& list, Random& random)
{
    if (list.empty())
        return;
    Tier& tier = oneOf(list, random).tier;
    Unit& unit = oneOf(tier.units, random);
    switch (random() % 11) {
    case 0:
        unit.asking = somePrice(random);
        break;
    case 1:
        unit.status = static_cast<Status>(random() % 4);
        break;
    case 2: {
        const Unit fresh = someUnit(random, static_cast<int>(random() % 40));
        if (!names(tier, fresh.name))
            tier.units.insert(tier.units.begin() + static_cast<long>(random() % tier.units.size()), fresh);
        break;
    }
    case 3:
        if (tier.units.size() > 1)
            tier.units.erase(tier.units.begin() + (&unit - tier.units.data()));
        break;
    case 4: { // moves to another tier, now and then of another site
        Tier* found = &oneOf(list, random).tier;
        for (int tries = 0; tries < 5 && (found == &tier || found->site != tier.site); ++tries)
            found = &oneOf(list, random).tier;
        Tier& other = *found;
        if (&other != &tier && tier.units.size() > 1 && !names(other, unit.name)) {
            other.units.push_back(unit);
            tier.units.erase(tier.units.begin() + (&unit - tier.units.data()));
        }
        break;
    }
    case 5:
        tier.advertisedFloor = chance(random, 30) ? Price{} : somePrice(random);
        break;
    case 6: // renamed
        tier.name += "'";
        break;
    case 7:
        std::shuffle(tier.units.begin(), tier.units.end(), random);
        break;
    case 8:
        std::shuffle(list.begin(), list.end(), random);
        break;
    case 9:
        if (list.size() > 1)
            list.erase(list.begin() +
                       (reinterpret_cast<char*>(&tier) - reinterpret_cast<char*>(list.data())) / static_cast<long>(sizeof(TierCase)));
        break;
    default:
        unit.grade = static_cast<int>(random() % 4);
        unit.locked = chance(random, 50);
        unit.areaM2.reset();
    }
}

std::vector<TierCase> someList(const Scenario& scenario, Random& random)
{
    std::vector<TierCase> list = listOf(scenario);
    for (unsigned n = random() % 30; n > 0; --n)
        edit(list, random);
    // A column that the list does not have.
    const unsigned missing = random() % 5;
    for (TierCase& tierCase : list) {
        for (Unit& unit : tierCase.tier.units) {
            if (missing == 0)
                unit.grade.reset();
            if (missing == 1)
                unit.areaM2.reset();
            if (missing == 2)
                unit.vacancyChance.reset();
            if (missing == 3)
                unit.locked = false;
        }
    }
    return list;
}

std::vector<TierCase> vectorOf(const TierList& tiers) { return {tiers.begin(), tiers.end()}; }

RefreshPlan planned(const Scenario& scenario, std::vector<TierCase> list)
{
    auto plan = planRefresh(scenario, scenario.currency, std::move(list));
    if (!plan.ok())
        qFatal("%s", plan.trouble().c_str());
    return std::move(plan).value();
}

constexpr int kRounds = 1000;

} // namespace

void RefreshTest::randomListsGiveWhatTheSlowWayGives()
{
    std::array<std::int64_t, kRefreshKinds> seenKinds{};
    std::array<std::int64_t, kChangeFates> seenFates{};
    for (unsigned seed = 0; seed < kRounds; ++seed) {
        Random random(seed);
        const Scenario scenario = someScenario(random);
        const std::vector<TierCase> list = someList(scenario, random);
        if (list.empty())
            continue;
        const RefreshPlan plan = planned(scenario, list);
        const reference::Refreshed wanted = reference::Slowly(vectorOf(scenario.tiers), list).work();
        QVERIFY2(vectorOf(plan.after) == wanted.tiers, qPrintable(QString::number(seed)));
        QVERIFY(plan.before == scenario.tiers);
        for (std::size_t k = 0; k < kRefreshKinds; ++k) {
            const auto found = wanted.counts.find(static_cast<RefreshKind>(k));
            QCOMPARE(plan.counts[k], found == wanted.counts.end() ? 0 : found->second);
            QCOMPARE(static_cast<std::int64_t>(plan.lines[k].size()), plan.counts[k]);
            seenKinds[k] += plan.counts[k];
        }
        std::array<std::int64_t, kChangeFates> summed{};
        for (std::size_t f = 0; f < kChangeFates; ++f) {
            const auto found = wanted.fates.find(static_cast<ChangeFate>(f));
            QCOMPARE(plan.changeCounts[f], found == wanted.fates.end() ? 0 : found->second);
            QCOMPARE(static_cast<std::int64_t>(plan.changes[f].size()), plan.changeCounts[f]);
            seenFates[f] += plan.changeCounts[f];
            for (const CandidateOutcome& outcome : plan.candidates)
                summed[f] += outcome.changes[f];
        }
        QVERIFY(summed == plan.changeCounts);
        QCOMPARE(plan.raisedBy.minor, wanted.raisedBy);
        QCOMPARE(plan.loweredBy.minor, wanted.loweredBy);
    }
    // The dice have thrown everything that can happen.
    for (const std::int64_t times : seenKinds)
        QVERIFY2(times >= 10, qPrintable(QString::number(times)));
    for (const std::int64_t times : seenFates)
        QVERIFY2(times >= 10, qPrintable(QString::number(times)));
}

void RefreshTest::aListThatSaysItAllIsImportedAnew()
{
    const auto byName = [](const auto& a, const auto& b) { return a.name < b.name; };
    const auto byNames = [](const Tier& a, const Tier& b) { return std::pair(a.site, a.name) < std::pair(b.site, b.name); };
    for (unsigned seed = 0; seed < kRounds; ++seed) {
        Random random(seed);
        Scenario scenario = someScenario(random);
        std::vector<TierCase> list = listOf(scenario);
        for (unsigned n = random() % 30; n > 0; --n)
            edit(list, random);
        if (list.empty())
            continue;
        // Floors are in the list, no lock is set on the desk, and of each optional column at least one cell is filled.
        for (TierCase& tierCase : list)
            tierCase.tier.advertisedFloor = Price{4800};
        list[0].tier.units[0].areaM2 = 7.5;
        for (TierCase& tierCase : scenario.tiers) {
            for (Unit& unit : tierCase.tier.units)
                unit.locked = false;
        }
        std::vector<Tier> wanted;
        for (const TierCase& listed : list)
            wanted.push_back(listed.tier);
        std::vector<Tier> found;
        const RefreshPlan plan = planned(scenario, list);
        for (const TierCase& tierCase : plan.after)
            found.push_back(tierCase.tier);
        for (std::vector<Tier>* tiers : {&wanted, &found}) {
            std::sort(tiers->begin(), tiers->end(), byNames);
            for (Tier& tier : *tiers)
                std::sort(tier.units.begin(), tier.units.end(), byName);
        }
        QVERIFY2(found == wanted, qPrintable(QString::number(seed)));
    }
}

void RefreshTest::undoAndRedoAreExactToTheByte()
{
    for (unsigned seed = 0; seed < 60; ++seed) {
        Random random(seed);
        Document document;
        document.begin(someScenario(random), {}, true);
        const std::vector<TierCase> list = someList(document.scenario(), random);
        if (list.empty())
            continue;
        const QByteArray before = scenarioToJson(document.scenario());
        const RefreshPlan plan = planned(document.scenario(), list);
        QVERIFY(document.refresh(plan, QStringLiteral("week.csv")));
        const QByteArray after = scenarioToJson(document.scenario());
        const auto read = scenarioFromJson(after, QStringLiteral("after")); // what comes out can be kept and opened again
        QVERIFY2(read.ok(), read.ok() ? "" : read.trouble().c_str());
        QVERIFY(read.value() == document.scenario());
        document.undoStack().undo();
        QCOMPARE(scenarioToJson(document.scenario()), before);
        document.undoStack().redo();
        QCOMPARE(scenarioToJson(document.scenario()), after);
        QVERIFY(planned(document.scenario(), list).changesNothing()); // once is enough
    }
}

void RefreshTest::theSameListChangesNothingButSeenMarks()
{
    Random random(7);
    Scenario scenario = someScenario(random);
    for (std::size_t i = 0; i < scenario.tiers.size(); ++i)
        scenario.tiers[i].seen = i == 2;
    std::vector<TierCase> list = listOf(scenario);
    std::shuffle(list.begin(), list.end(), random);
    for (TierCase& tierCase : list)
        std::shuffle(tierCase.tier.units.begin(), tierCase.tier.units.end(), random);
    const RefreshPlan plan = planned(scenario, list);
    QVERIFY(plan.changesNothing());
    QCOMPARE(plan.seenCleared, 1);
    QCOMPARE(plan.tiersTouched, 0);
    for (std::size_t i = 0; i < scenario.tiers.size(); ++i)
        QCOMPARE(plan.after.shares(i, scenario.tiers, i), i != 2);
    scenario.tiers[2].seen = false;
    QVERIFY(plan.after == scenario.tiers);
    QCOMPARE(plan.count(ChangeFate::clash) + plan.count(ChangeFate::nowAsked) + plan.count(ChangeFate::unitGone), 0);
}

void RefreshTest::candidatesAreCarriedAsTold()
{
    Scenario scenario = inventedScenario();
    TierCase& tierCase = scenario.tiers[0];
    // B-10 60.00, B-11 65.00, B-12 70.00, B-13 75.00, ...; the candidate wants the first four 1.00 lower.
    Candidate lower{"Lower", "", askingPrices(tierCase.tier.units)};
    for (std::size_t u = 0; u < 4; ++u)
        lower.prices[u] -= Price{100};
    tierCase.candidates = {lower};
    tierCase.chosen = 0;
    std::vector<TierCase> list = listOf(scenario);
    std::vector<Unit>& units = list[0].tier.units;
    units[1].asking = Price{6400};  // what the candidate wants
    units[2].asking = Price{7200};  // something else
    units[4].asking = Price{8200};  // the candidate had not touched it
    units.erase(units.begin() + 3); // B-13
    units.push_back({"B-99", Price{9900}, {}, false, {}, {}, {}});
    const RefreshPlan plan = planned(scenario, list);
    const TierCase& after = plan.after[0];
    QCOMPARE(after.chosen, std::optional<int>(0));
    const std::vector<Price>& prices = after.candidates[0].prices;
    QCOMPARE(prices[0], Price{5900});
    QCOMPARE(prices[1], Price{6400});
    QCOMPARE(prices[2], Price{6900});
    QCOMPARE(after.tier.units[3].name, std::string("B-14"));
    QCOMPARE(prices[3], Price{8200});
    QCOMPARE(after.tier.units.back().name, std::string("B-99"));
    QCOMPARE(prices.back(), Price{9900});
    for (const ChangeFate fate : {ChangeFate::kept, ChangeFate::nowAsked, ChangeFate::clash, ChangeFate::unitGone})
        QCOMPARE(plan.count(fate), 1);
    QCOMPARE(plan.changes[static_cast<std::size_t>(ChangeFate::clash)][0].unitBefore, 2);
    QCOMPARE(plan.changes[static_cast<std::size_t>(ChangeFate::unitGone)][0].unitBefore, 3);
    QCOMPARE(plan.candidates[0].dropped(), 1);
    QVERIFY(plan.after.shares(1, scenario.tiers, 1)); // the other tier is left alone
    QCOMPARE(plan.tiersTouched, 1);
}

void RefreshTest::aMovedUnitIsOne()
{
    Scenario scenario = inventedScenario();
    std::vector<Unit>& here = scenario.tiers[0].tier.units;
    here[0].name = "X-1";
    here[0].locked = true;
    scenario.tiers[0].candidates = {{"Lower", "", askingPrices(here)}};
    scenario.tiers[0].candidates[0].prices[0] = Price{5000};
    std::vector<TierCase> list = listOf(scenario);
    Unit moved = list[0].tier.units[0];
    list[0].tier.units.erase(list[0].tier.units.begin());
    moved.asking = Price{6100};
    moved.locked = false; // the list has no locks
    list[1].tier.units.push_back(moved);
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.count(RefreshKind::movedTier), 1);
    QCOMPARE(plan.count(RefreshKind::raised), 1);
    QCOMPARE(plan.count(RefreshKind::newUnit) + plan.count(RefreshKind::unitGone), 0);
    QCOMPARE(plan.count(ChangeFate::unitMoved), 1);
    QCOMPARE(plan.after[1].tier.units.back().name, std::string("X-1"));
    QVERIFY(plan.after[1].tier.units.back().locked);
}

void RefreshTest::twoOfANameAreNotTakenForAMove()
{
    // The invented tiers have the same unit names: one that leaves both and comes to a third could be either.
    const Scenario scenario = inventedScenario();
    std::vector<TierCase> list = listOf(scenario);
    const Unit unit = list[0].tier.units[0];
    for (TierCase& tierCase : list)
        tierCase.tier.units.erase(tierCase.tier.units.begin());
    list.push_back({Tier{"Mill Quay", "Room 1-2", Price{4000}, {unit}}, {}, {}, {}, {}, false, {}});
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.count(RefreshKind::movedTier), 0);
    QCOMPARE(plan.count(RefreshKind::newUnit), 1);
    QCOMPARE(plan.count(RefreshKind::unitGone), 2);
    QCOMPARE(plan.count(RefreshKind::newTier), 1);
}

void RefreshTest::whatTheListDoesNotSayStays()
{
    Scenario scenario = inventedScenario();
    Unit& unit = scenario.tiers[0].tier.units[0];
    unit.grade = 3;
    unit.areaM2 = 9.5;
    unit.vacancyChance = 0.25;
    unit.locked = true;
    std::vector<TierCase> list = listOf(scenario);
    Unit& listed = list[0].tier.units[0];
    listed = {listed.name, listed.asking, listed.status, false, {}, {}, {}};
    list[0].tier.advertisedFloor = Price{};
    QVERIFY(planned(scenario, list).changesNothing());
    // One grade anywhere in the list: the column is there, and the empty cell says that the unit has none.
    list[1].tier.units[5].grade = 1;
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.count(RefreshKind::newGrade), 2);
    QVERIFY(!plan.after[0].tier.units[0].grade);
    QCOMPARE(plan.after[0].tier.units[0].areaM2, std::optional<double>(9.5));
}

void RefreshTest::goneTiersLeaveWithTheirCandidates()
{
    Scenario scenario = inventedScenario();
    for (TierCase& tierCase : scenario.tiers)
        tierCase.candidates = {{"Same", "", askingPrices(tierCase.tier.units)}, {"Lower", "", askingPrices(tierCase.tier.units)}};
    scenario.tiers[0].candidates[1].prices[5] = Price{100};
    std::vector<TierCase> list = listOf(scenario);
    list.erase(list.begin());
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.after.size(), std::size_t(1));
    QVERIFY(plan.after.shares(0, scenario.tiers, 1));
    QCOMPARE(plan.candidates.size(), std::size_t(4));
    QCOMPARE(plan.candidates[0].tierAfter, -1);
    QCOMPARE(plan.candidates[1].dropped(), 1);
    QCOMPARE(plan.candidates[2].tierAfter, 0);
    QCOMPARE(plan.count(ChangeFate::tierDropped), 1);
}

void RefreshTest::anotherCurrencyIsRefused()
{
    const Scenario scenario = inventedScenario();
    const auto plan = planRefresh(scenario, Currency{"GBP", 2}, listOf(scenario));
    QVERIFY(!plan.ok());
    QVERIFY(plan.trouble().find("GBP") != std::string::npos && plan.trouble().find("EUR") != std::string::npos);
    QVERIFY(!planRefresh(scenario, scenario.currency, {}).ok());
}

void RefreshTest::aCurrencyNotYetKnownIsTaken()
{
    Scenario scenario = inventedScenario();
    scenario.currency = Currency{"XXX", 2};
    Document document;
    document.begin(scenario, {}, true);
    const auto plan = planRefresh(document.scenario(), Currency{"EUR", 2}, listOf(scenario));
    QVERIFY(plan.ok());
    QVERIFY(plan.value().takesCurrency);
    QVERIFY(!plan.value().changesNothing());
    QVERIFY(document.refresh(plan.value(), QStringLiteral("week.csv")));
    QCOMPARE(document.scenario().currency.code, std::string("EUR"));
    QCOMPARE(document.undoStack().count(), 1);
    document.undoStack().undo();
    QVERIFY(document.scenario() == scenario);
    document.undoStack().redo();
    QCOMPARE(document.scenario().currency.code, std::string("EUR"));
    // The yen has no decimals (ISO 4217): amounts with two cannot become amounts in it.
    const auto yen = planRefresh(scenario, Currency{"JPY", 0}, listOf(scenario));
    QVERIFY(!yen.ok());
    QVERIFY(yen.trouble().find("JPY") != std::string::npos && yen.trouble().find("2 decimals") != std::string::npos);
}

void RefreshTest::aLockSetByTheListClashes()
{
    Scenario scenario = inventedScenario();
    Tier& tier = scenario.tiers[0].tier;
    tier.units[0].locked = false;
    tier.units[1].locked = true;
    scenario.tiers[0].candidates = {{"Lower", "", askingPrices(tier.units)}};
    scenario.tiers[0].candidates[0].prices[0] -= Price{100};
    scenario.tiers[0].candidates[0].prices[1] -= Price{100};
    std::vector<TierCase> list = listOf(scenario);
    list[0].tier.units[0].locked = true;
    list[0].tier.units[1].locked = true;
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.count(ChangeFate::clash), 1);
    QCOMPARE(plan.count(ChangeFate::kept), 1); // that one was locked before
    QCOMPARE(plan.changes[static_cast<std::size_t>(ChangeFate::clash)][0].unitBefore, 0);
    QVERIFY(plan.after[0].candidates[0].prices == scenario.tiers[0].candidates[0].prices);
}

void RefreshTest::stoppingChangesNothing()
{
    const Scenario scenario = inventedScenario();
    double last = -1;
    const auto plan = planRefresh(scenario, scenario.currency, listOf(scenario), [&](double share) {
        const bool forward = share >= last;
        last = share;
        return forward;
    });
    QVERIFY(plan.ok());
    QCOMPARE(last, 1.0);
    QVERIFY(!planRefresh(scenario, scenario.currency, listOf(scenario), [](double) { return false; }).ok());
    QVERIFY(!planRefresh(scenario, scenario.currency, listOf(scenario), [](double share) { return share < 0.5; }).ok());
}

void RefreshTest::signedSheetsAreCompared()
{
    using State = SignedCheck::State;
    const Tier tier = inventedScenario().tiers[0].tier; // B-10 60.00, B-11 65.00, ...
    const SignedPrice applied{"B-10", Price{6100}, Price{6000}};
    const SignedPrice open{"B-11", Price{6500}, Price{6400}};
    const SignedPrice gone{"Z-1", Price{100}, Price{90}};
    const auto check = [&](std::vector<SignedPrice> prices, const Tier* asked) {
        return checkSigned(SignedSheet{"Lower", "2026-12-01T09:30:00Z", std::move(prices)}, asked);
    };
    QCOMPARE(check({}, &tier).state, State::nothingSigned);
    QCOMPARE(check({applied}, &tier).state, State::applied);
    QCOMPARE(check({open}, &tier).state, State::notApplied);
    QCOMPARE(check({open, gone}, &tier).state, State::notApplied);
    QCOMPARE(check({gone}, &tier).state, State::cannotTell);
    QCOMPARE(check({applied}, nullptr).state, State::cannotTell);
    const SignedCheck partly = check({applied, open, gone}, &tier);
    QCOMPARE(partly.state, State::partly);
    QCOMPARE(partly.applied, 1);
    QCOMPARE(partly.gone, 1);
    const std::vector<SignedDifference> differences{{"B-11", Price{6500}, Price{6400}, Price{6500}}, {"Z-1", Price{100}, Price{90}, {}}};
    QVERIFY(partly.differences == differences);

    // With a refresh: against what is asked then. Without: against today.
    Scenario scenario = inventedScenario();
    scenario.tiers[0].signedOff = SignedSheet{"Lower", "2026-12-01T09:30:00Z", {open}};
    std::vector<TierCase> list = listOf(scenario);
    list[0].tier.units[1].asking = Price{6400};
    QCOMPARE(checkSigned(scenario.tiers)[0].check.state, State::notApplied);
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.signedTiers.size(), std::size_t(1));
    QCOMPARE(plan.signedTiers[0].check.state, State::applied);
    QCOMPARE(plan.after[0].signedOff, scenario.tiers[0].signedOff);
}

namespace
{

Scenario bigScenario(int tiers, int units)
{
    Scenario scenario;
    scenario.currency = Currency{"EUR", 2};
    scenario.rules.points.step = Price{50};
    scenario.tiers.reserve(static_cast<std::size_t>(tiers));
    for (int t = 0; t < tiers; ++t) {
        TierCase tierCase;
        tierCase.tier.site = "Site " + std::to_string(t / 20);
        tierCase.tier.name = "Tier " + std::to_string(t % 20);
        tierCase.tier.advertisedFloor = Price{5000};
        tierCase.tier.units.resize(static_cast<std::size_t>(units));
        for (int u = 0; u < units; ++u) {
            Unit& unit = tierCase.tier.units[static_cast<std::size_t>(u)];
            unit.name = "U-" + std::to_string(t % 20) + '-' + std::to_string(u);
            unit.asking = Price{5000 + 50 * u};
            unit.status = u % 3 == 0 ? Status::vacant : Status::occupied;
        }
        scenario.tiers.push_back(std::move(tierCase));
    }
    return scenario;
}

} // namespace

void RefreshTest::linesAreCappedAndAllCounted()
{
    const Scenario scenario = bigScenario(2200, 50);
    std::vector<TierCase> list = listOf(scenario);
    for (TierCase& tierCase : list) {
        for (Unit& unit : tierCase.tier.units)
            unit.asking += Price{50};
    }
    list.back().tier.units.pop_back();
    const RefreshPlan plan = planned(scenario, list);
    QCOMPARE(plan.count(RefreshKind::raised), 2200 * 50 - 1);
    QCOMPARE(plan.lines[static_cast<std::size_t>(RefreshKind::raised)].size(), kRefreshLinesKept);
    // A rare change is not crowded out by the many.
    QCOMPARE(plan.lines[static_cast<std::size_t>(RefreshKind::unitGone)].size(), std::size_t(1));
}

void RefreshTest::aMillionUnits()
{
    const Scenario scenario = bigScenario(20'000, 50);
    const auto timed = [&](const char* what, std::vector<TierCase> list) {
        QElapsedTimer timer;
        timer.start();
        const RefreshPlan plan = planned(scenario, std::move(list));
        qInfo("1,000,000 units in 20,000 tiers, %s: planned in %lld ms", what, static_cast<long long>(timer.elapsed()));
        return plan.counts;
    };
    timed("the same list", listOf(scenario));
    std::vector<TierCase> list = listOf(scenario);
    std::int64_t changed = 0;
    for (std::size_t t = 0; t < list.size(); t += 3) {
        list[t].tier.units[4].asking += Price{100};
        list[t].tier.units[7].status = Status::reserved;
        ++changed;
    }
    const auto week = timed("a week later", list);
    QCOMPARE(week[static_cast<std::size_t>(RefreshKind::raised)], changed);
    for (TierCase& tierCase : list)
        tierCase.tier.name += " renamed";
    const auto renamed = timed("all tiers renamed", std::move(list));
    QCOMPARE(renamed[static_cast<std::size_t>(RefreshKind::movedTier)], 1'000'000);
}

QTEST_GUILESS_MAIN(RefreshTest)
#include "refresh_test.moc"
