// SPDX-License-Identifier: GPL-3.0-or-later
// The document: every edit one named undo step, undone and redone to the byte-identical scenario.
#include "document.h"

#include "invented_tier.h"
#include "refresh.h"
#include "scenario_json.h"

#include <QSignalSpy>
#include <QTemporaryDir>
#include <QTest>

#include <random>

using namespace rungwright;

class DocumentTest : public QObject
{
    Q_OBJECT
private slots:
    void firstEditOfTheCurrentLadderMakesACandidate();
    void everyEditIsOneStep();
    void rulesOfAScopeAreSteps();
    void marksFloorsAndSheetsAreSteps();
    void aRefreshTakesThePlansTiersWhileTheyFit();
    void fortyStepsAreUndoneToTheByte();
    void nudgesOfTheSameUnitsAreOneStep();
    void aNudgeBackDropsItsStep();
    void discardedCandidateComesBackChosen();
    void namesStayUnique();
    void savingMakesItClean();
    void savingToNowhereKeepsItModified();
};

namespace
{

std::vector<PriceChange> lower(const Scenario& scenario, int tier, std::uint32_t unit, std::int64_t by)
{
    const Price asking = scenario.tiers[static_cast<std::size_t>(tier)].tier.units[unit].asking;
    return {{unit, asking, asking - Price{by}}};
}

} // namespace

void DocumentTest::firstEditOfTheCurrentLadderMakesACandidate()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    const int candidate = document.setPrices(0, -1, lower(document.scenario(), 0, 3, 100), QStringLiteral("B-13"));
    QCOMPARE(candidate, 0);
    QCOMPARE(document.undoStack().count(), 1);
    QCOMPARE(document.tier(0)->candidates.at(0).prices.at(3), Price{7400});
    QCOMPARE(document.tier(0)->candidates.at(0).name, std::string("Candidate 1"));
    // The current ladder itself is never altered.
    QCOMPARE(document.tier(0)->tier, inventedScenario().tiers[0].tier);
    document.undoStack().undo();
    QVERIFY(document.tier(0)->candidates.empty());
}

void DocumentTest::everyEditIsOneStep()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    QSignalSpy changes(&document, &Document::changed);
    document.copyCandidate(0, -1);
    document.renameCandidate(0, 0, QStringLiteral("Lower"));
    document.setCandidateNote(0, 0, QStringLiteral("for March"));
    document.chooseCandidate(0, 0);
    const std::uint32_t units[] = {1, 2};
    document.setLocked(0, units, true);
    document.setModel(0, {ModelKind::remainder, 4, {}}, QStringLiteral("4 left"));
    PriceRules rules;
    rules.ceiling = Price{20000};
    document.setRules(rules);
    document.setTierNote(0, QStringLiteral("tier"));
    document.setScenarioNote(QStringLiteral("scenario"));
    QCOMPARE(document.undoStack().count(), 9);
    QCOMPARE(changes.count(), 9);
    for (int i = 0; i < 9; ++i)
        QVERIFY(!document.undoStack().text(i).isEmpty());
    // What changes nothing is no step.
    document.setLocked(0, units, true);
    document.setRules(rules);
    document.chooseCandidate(0, 0);
    QCOMPARE(document.undoStack().count(), 9);
}

void DocumentTest::rulesOfAScopeAreSteps()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    QList<QByteArray> states{scenarioToJson(document.scenario())};
    connect(&document, &Document::changed, this, [&](const DocumentChange& change) {
        QVERIFY(change.kind == DocumentChange::Kind::rules);
        states << scenarioToJson(document.scenario());
    });
    const Tier& tier = document.tier(0)->tier;
    const RuleScope site{tier.site, {}};
    const RuleScope own{tier.site, tier.name};
    PriceRules rules;
    rules.ceiling = Price{20000};
    document.setRules(site, rules);
    QVERIFY(rulesFor(document.scenario(), tier) == rules);
    rules.leastShareAtFloor = 0.1;
    document.setRules(own, rules);
    document.setRules(own, rules); // changes nothing
    QVERIFY(rulesFor(document.scenario(), tier) == rules);
    document.dropRules(site);
    document.dropRules(site); // nothing left to drop
    QVERIFY(rulesFor(document.scenario(), tier) == rules);
    document.dropRules(own);
    QCOMPARE(document.undoStack().count(), 4);
    QCOMPARE(states.last(), states.first());
    for (int step = 3; step >= 0; --step) {
        const QByteArray wanted = states.at(step);
        document.undoStack().undo();
        QCOMPARE(scenarioToJson(document.scenario()), wanted);
    }
}

void DocumentTest::marksFloorsAndSheetsAreSteps()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    QList<QByteArray> states{scenarioToJson(document.scenario())};
    QList<DocumentChange> changes;
    connect(&document, &Document::changed, this, [&](const DocumentChange& change) {
        changes << change;
        states << scenarioToJson(document.scenario());
    });
    const int both[] = {1, 0, 1};
    const SignedSheet sheet{"Lower", "2026-12-01T09:30:00Z", {{"B-10", Price{6000}, Price{5900}}}};
    document.setFlagThresholds({-0.25, 5, 0.2});
    document.setSeen(0, true);
    document.setSeen(both, true); // only the second is left to mark
    document.setSeen(both, false);
    document.setFloor(1, Price{});
    document.recordSignedSheet(0, sheet);
    QCOMPARE(document.undoStack().count(), 6);
    using Kind = DocumentChange::Kind;
    const std::pair<Kind, int> told[] = {{Kind::flags, -1}, {Kind::seen, 0},  {Kind::seen, 1},
                                         {Kind::seen, -1},  {Kind::floor, 1}, {Kind::signedOff, 0}};
    for (int i = 0; i < 6; ++i) {
        QCOMPARE(changes[i].kind, told[i].first);
        QCOMPARE(changes[i].tier, told[i].second);
    }
    QCOMPARE(document.undoStack().undoText(), QStringLiteral("Hand over the price sheet of Lower"));
    QVERIFY(!document.tier(1)->tier.hasFloor());
    QCOMPARE(document.tier(0)->signedOff, sheet);
    // What changes nothing is no step.
    document.setFlagThresholds({-0.25, 5, 0.2});
    document.setSeen(both, false);
    document.setFloor(1, Price{});
    document.recordSignedSheet(0, sheet);
    QCOMPARE(document.undoStack().count(), 6);
    for (int step = 5; step >= 0; --step) {
        document.undoStack().undo();
        QCOMPARE(scenarioToJson(document.scenario()), states.at(step));
    }
}

void DocumentTest::aRefreshTakesThePlansTiersWhileTheyFit()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    const QByteArray before = scenarioToJson(document.scenario());
    RefreshPlan plan;
    plan.currency = document.scenario().currency;
    plan.before = plan.after = document.scenario().tiers;
    QVERIFY(document.refresh(plan, QStringLiteral("a.csv")));
    QCOMPARE(document.undoStack().count(), 0); // nothing would change
    plan.after[1].tier.units[0].asking = Price{6100};
    QVERIFY(document.refresh(plan, QStringLiteral("a.csv")));
    QCOMPARE(document.undoStack().undoText(), QStringLiteral("Refresh from a.csv"));
    QVERIFY(document.scenario().tiers.shares(1, plan.after, 1));
    const QByteArray after = scenarioToJson(document.scenario());
    document.undoStack().undo();
    QCOMPARE(scenarioToJson(document.scenario()), before);
    document.undoStack().redo();
    QCOMPARE(scenarioToJson(document.scenario()), after);
    // The plan was for what was there before.
    QVERIFY(!document.refresh(plan, QStringLiteral("a.csv")));
    QCOMPARE(scenarioToJson(document.scenario()), after);
}

void DocumentTest::fortyStepsAreUndoneToTheByte()
{
    std::mt19937 random(20261201);
    Document document;
    document.begin(inventedScenario(), {}, true);
    QList<QByteArray> states{scenarioToJson(document.scenario())};
    while (document.undoStack().count() < 40) {
        const int tier = static_cast<int>(random() % 2);
        const int candidates = static_cast<int>(document.tier(tier)->candidates.size());
        const int candidate = static_cast<int>(random() % static_cast<unsigned>(candidates + 1)) - 1;
        const auto unit = static_cast<std::uint32_t>(random() % 12);
        const int before = document.undoStack().count();
        switch (random() % 7) {
        case 0:
            document.copyCandidate(tier, candidate);
            break;
        case 1:
            if (candidate >= 0)
                document.discardCandidate(tier, candidate);
            break;
        case 2:
            if (candidate >= 0)
                document.renameCandidate(tier, candidate, QStringLiteral("Name %1").arg(random() % 1000));
            break;
        case 3:
            document.setLocked(tier, std::span(&unit, 1), random() % 2 == 0);
            break;
        case 4:
            if (candidate >= 0)
                document.chooseCandidate(tier, candidate);
            break;
        case 5:
            document.setModel(tier, {ModelKind::perceived, static_cast<int>(1 + random() % 9), {}}, QStringLiteral("left"));
            break;
        default: {
            const Price now = pricesOf(*document.tier(tier), candidate)[unit];
            const PriceChange change{unit, now, now + Price{50 * static_cast<int>(1 + random() % 5)}};
            document.setPrices(tier, candidate, std::span(&change, 1), QStringLiteral("drag"));
        }
        }
        if (document.undoStack().count() > before)
            states << scenarioToJson(document.scenario());
    }
    for (int step = 39; step >= 0; --step) {
        document.undoStack().undo();
        QCOMPARE(scenarioToJson(document.scenario()), states.at(step));
    }
    for (int step = 1; step <= 40; ++step) {
        document.undoStack().redo();
        QCOMPARE(scenarioToJson(document.scenario()), states.at(step));
    }
}

void DocumentTest::nudgesOfTheSameUnitsAreOneStep()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    document.copyCandidate(0, -1);
    const PriceChange first{4, Price{8000}, Price{8050}};
    const PriceChange second{4, Price{8050}, Price{8100}};
    const PriceChange other{5, Price{8500}, Price{8550}};
    document.setPrices(0, 0, std::span(&first, 1), QStringLiteral("one"), true);
    document.setPrices(0, 0, std::span(&second, 1), QStringLiteral("two"), true);
    QCOMPARE(document.undoStack().count(), 2);
    QCOMPARE(document.undoStack().undoText(), QStringLiteral("two"));
    document.setPrices(0, 0, std::span(&other, 1), QStringLiteral("other"), true);
    QCOMPARE(document.undoStack().count(), 3);
    document.undoStack().undo();
    document.undoStack().undo();
    QCOMPARE(document.tier(0)->candidates[0].prices[4], Price{8000});
}

void DocumentTest::aNudgeBackDropsItsStep()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    document.copyCandidate(0, -1);
    const QByteArray before = scenarioToJson(document.scenario());
    const PriceChange up{4, Price{8000}, Price{8050}};
    const PriceChange down{4, Price{8050}, Price{8000}};
    document.setPrices(0, 0, std::span(&up, 1), QStringLiteral("up"), true);
    document.setPrices(0, 0, std::span(&down, 1), QStringLiteral("down"), true);
    QCOMPARE(document.undoStack().count(), 1);
    QCOMPARE(scenarioToJson(document.scenario()), before);
}

void DocumentTest::discardedCandidateComesBackChosen()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    for (int i = 0; i < 3; ++i)
        document.copyCandidate(0, -1);
    document.chooseCandidate(0, 2);
    const QByteArray before = scenarioToJson(document.scenario());
    document.discardCandidate(0, 0);
    QCOMPARE(document.tier(0)->chosen, std::optional<int>(1));
    document.discardCandidate(0, 1);
    QVERIFY(!document.tier(0)->chosen);
    document.undoStack().undo();
    document.undoStack().undo();
    QCOMPARE(scenarioToJson(document.scenario()), before);
}

void DocumentTest::namesStayUnique()
{
    Document document;
    document.begin(inventedScenario(), {}, true);
    document.copyCandidate(0, -1);
    document.copyCandidate(0, 0);
    QCOMPARE(document.tier(0)->candidates[1].name, std::string("Candidate 1 2"));
    QVERIFY(!document.renameCandidate(0, 1, QStringLiteral("Candidate 1")));
    QVERIFY(!document.renameCandidate(0, 1, QStringLiteral("current")));
    QVERIFY(!document.renameCandidate(0, 1, QStringLiteral("  ")));
    QVERIFY(document.renameCandidate(0, 1, QStringLiteral(" With %1 in it ")));
    document.copyCandidate(0, 1);
    QCOMPARE(document.tier(0)->candidates[2].name, std::string("With %1 in it 2"));
}

void DocumentTest::savingMakesItClean()
{
    QTemporaryDir folder;
    Document document;
    document.begin(inventedScenario(), {}, false);
    QVERIFY(document.modified());
    const QString path = folder.filePath(QStringLiteral("a.rungs.json"));
    QVERIFY(document.saveTo(path).ok());
    QVERIFY(!document.modified());
    document.copyCandidate(0, -1);
    QVERIFY(document.modified());
    document.undoStack().undo();
    QVERIFY(!document.modified());
    const auto back = loadScenario(path);
    QVERIFY(back.ok());
    QCOMPARE(back.value(), document.scenario());
}

void DocumentTest::savingToNowhereKeepsItModified()
{
    QTemporaryDir folder;
    Document document;
    document.begin(inventedScenario(), {}, false);
    const auto saved = document.saveTo(folder.filePath(QStringLiteral("no/such/folder/a.rungs.json")));
    QVERIFY(!saved.ok());
    QVERIFY(!saved.trouble().empty());
    QVERIFY(document.modified());
    QVERIFY(document.path().isEmpty());
}

QTEST_GUILESS_MAIN(DocumentTest)
#include "document_test.moc"
