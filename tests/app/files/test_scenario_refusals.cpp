// SPDX-License-Identifier: GPL-3.0-or-later
// Scenario files that are refused: with line and column where the JSON is broken, with the place where a value is wrong.
#include "odd_scenario.h"
#include "scenario_json.h"

#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

const QByteArray kGood = R"({
  "format": "rungwright-scenario",
  "version": 1,
  "title": "t",
  "currency": "EUR",
  "note": "n",
  "rules": {"step": "0.50", "endings": ["0.00", "0.25"], "least": "1", "greatest": "900", "greatest_change_percent": 10, "greatest_change": "9", "ceiling": "800"},
  "tiers": [
    {"site": "S", "tier": "T", "advertised_floor": "69.00", "note": "tn", "model": {"kind": "perceived", "left": 3, "load": 1.5},
     "units": [
       {"unit": "A", "price": "70.00", "status": "vacant", "locked": false, "grade": 2, "area": 4.5, "vacancy_chance": 0.5},
       {"unit": "B", "price": "71.00", "status": "closed"}
     ],
     "candidates": [{"name": "c1", "note": "cn", "prices": [{"unit": "A", "price": "72.00"}, {"unit": "B", "price": "73.00"}]}],
     "chosen": "c1"}
  ]
}
)";

QString troubleOf(const QByteArray& json)
{
    const auto read = scenarioFromJson(json, QStringLiteral("F"));
    return read.ok() ? QString() : QString::fromStdString(read.trouble());
}

} // namespace

class TestScenarioRefusals : public QObject
{
    Q_OBJECT

private slots:
    void theGoodOneIsGood() { QCOMPARE(troubleOf(kGood), QString()); }

    void wrongValues_data()
    {
        QTest::addColumn<QByteArray>("from");
        QTest::addColumn<QByteArray>("to");
        QTest::addColumn<QString>("says");
        const auto add = [](const char* from, const char* to, const char* says) {
            QTest::newRow(qPrintable(QStringLiteral("%1 -> %2").arg(QLatin1String(from), QLatin1String(to))))
                << QByteArray(from) << QByteArray(to) << says;
        };
        add("\"rungwright-scenario\"", "\"other\"", "F: this is not a scenario");
        add("\"format\"", "\"formart\"", "F: this is not a scenario");
        add("\"version\": 1", "\"version\": 4",
            "F: the scenario is of format version 4, and this program knows versions up to 3. Open it with a newer");
        add("\"version\": 1", "\"version\": 1e300", "F: the scenario is of format version 1e+300");
        add("\"version\": 1", "\"version\": 0", "F: version: not a version; found 0; wanted: a whole number from 1 to 3");
        add("\"version\": 1", "\"version\": 0.5", "F: version: not a version; found 0.5");
        add("\"version\": 1", "\"version\": \"1\"", "F: version: not a version; found '1'");
        add("\"version\": 1,", "", "F: version: not a version; found nothing");
        add("\"title\": \"t\"", "\"title\": 5", "F: title: not a text; found 5");
        add("\"title\": \"t\"", "\"title\": \"a\\u0000\"", "F: title: a text with a NUL");
        add("\"title\": \"t\"", "\"title\": \"\\ud800\"", "F: title: a text with a NUL or half a character");
        add("\"title\"", "\"titel\"", "F: the document: a key that is not known; found 'titel'; wanted: one of format, version, title");
        add("\"EUR\"", "\"eur\"", "F: currency: not a currency; found 'eur'");
        add("\"EUR\"", "\"XAU\"", "F: currency: not a currency; found 'XAU'");
        add("\"currency\": \"EUR\",", "", "F: currency: missing; found nothing");
        add("\"0.50\"", "0.5", "F: rules.step: not a price in quotation marks; found 0.5");
        add("\"0.50\"", "\"0\"", "F: rules.step: not above 0; found '0'");
        add("\"0.25\"", "\"0.50\"", "F: rules.endings[1]: not an ending; found '0.50'");
        add("\"0.25\"", "\"0.00\"", "F: rules.endings[1]: not an ending; found '0.00'");
        add("\"0.25\"", "\"-0.25\"", "F: rules.endings[1]: not an ending");
        add("\"0.25\"", "null", "F: rules.endings[1]: not an ending; found null");
        add("[\"0.00\", \"0.25\"]", "\"0.25\"", "F: rules.endings: not a list; found '0.25'");
        add("\"greatest\": \"900\"", "\"greatest\": \"0.99\"", "F: rules.greatest: below the least price");
        add("_percent\": 10", "_percent\": 0",
            "F: rules.greatest_change_percent: not a number in range; found 0; wanted: a number above 0");
        add("_percent\": 10", "_percent\": \"10\"", "F: rules.greatest_change_percent: not a number in range; found '10'");
        add("\"greatest_change\": \"9\"", "\"greatest_change\": \"-9\"", "F: rules.greatest_change: not above 0");
        add("\"ceiling\": \"800\"", "\"ceiling\": \"8e2\"", "F: rules.ceiling: not a price; found '8e2'");
        const auto rule = [&](const char* text, const char* words) {
            add("\"ceiling\": \"800\"", qPrintable(QStringLiteral("\"ceiling\": \"800\", %1").arg(QLatin1String(text))), words);
        };
        rule("\"lowest_asking\": \"800.01\"", "F: rules.lowest_asking: above the ceiling; found '800.01'; wanted: at most the ceiling");
        rule("\"greatest_total_change_percent\": 0", "F: rules.greatest_total_change_percent: not a number in range; found 0");
        rule("\"greatest_total_change\": \"0\"", "F: rules.greatest_total_change: not above 0; found '0'");
        rule("\"order\": \"grades\"", "F: rules.order: not an order; found 'grades'; wanted: 'present' or 'grade'");
        rule("\"order\": 1", "F: rules.order: ");
        rule("\"least_share_at_floor\": 1.01", "F: rules.least_share_at_floor: not a number in range; found 1.01");
        const auto own = [&](const char* text, const char* words) {
            add("\"rules\": {", qPrintable(QStringLiteral("\"own_rules\": %1, \"rules\": {").arg(QLatin1String(text))), words);
        };
        own("{}", "F: own_rules: not a list; found an object");
        own("[{\"rules\": {}}]", "F: own_rules[0].site: ");
        own("[{\"site\": \"S\", \"tier\": \" \", \"rules\": {}}]", "F: own_rules[0].tier: ");
        own("[{\"site\": \"S\"}]", "F: own_rules[0].rules: ");
        own("[{\"site\": \"S\", \"rules\": {\"step\": 1}}]", "F: own_rules[0].rules.step: not a price in quotation marks; found 1");
        own("[{\"site\": \"S\", \"note\": 1, \"rules\": {}}]", "F: own_rules[0]: a key that is not known; found 'note'");
        own("[{\"site\": \"S\", \"rules\": {}}, {\"site\": \"S\", \"rules\": {}}]",
            "F: own_rules[1].site: a site or tier that has its rules already; found 'S'; wanted: each once");
        add("\"ceiling\"", "\"cieling\"", "F: rules: a key that is not known; found 'cieling'");
        add("\"site\": \"S\"", "\"site\": \" \\u00a0\"", "F: tiers[0].site: no name");
        add("\"site\": \"S\", ", "", "F: tiers[0].site: missing");
        add("\"tier\": \"T\"", "\"tier\": [\"T\"]", "F: tiers[0].tier: not a text; found a list");
        add("\"69.00\"", "\"69.001\"", "F: tiers[0].advertised_floor: more decimals than the currency has; found '69.001'");
        add("\"advertised_floor\": \"69.00\", ", "\"advertised_floor\": null, ", "F: tiers[0].advertised_floor: ");
        add("\"advertised_floor\": \"69.00\", ", "\"advertised_floor\": \"0.00\", ", "F: tiers[0].advertised_floor: not above 0");
        add("\"chosen\": \"c1\"", "\"chosen\": \"c1\", \"seen\": 1", "F: tiers[0].seen: neither true nor false; found 1");
        add("\"chosen\": \"c1\"", "\"chosen\": \"c1\", \"signed_off\": {\"when\": \"now\", \"prices\": []}",
            "F: tiers[0].signed_off.candidate: missing");
        add("\"chosen\": \"c1\"",
            "\"chosen\": \"c1\", \"signed_off\": {\"candidate\": \"c\", \"when\": \"now\", \"prices\": [{\"unit\": \"A\", \"before\": "
            "\"1\"}]}",
            "F: tiers[0].signed_off.prices[0].after: missing");
        add("\"chosen\": \"c1\"",
            "\"chosen\": \"c1\", \"signed_off\": {\"candidate\": \"c\", \"when\": \"now\", \"prices\": ["
            "{\"unit\": \"A\", \"before\": \"1\", \"after\": \"2\"}, {\"unit\": \"A\", \"before\": \"1\", \"after\": \"2\"}]}",
            "F: tiers[0].signed_off.prices[1].unit: a unit that has its price already");
        add("\"tiers\": [", "\"flags\": {\"last_units\": -1}, \"tiers\": [", "F: flags.last_units: not a whole number in range; found -1");
        add("\"tiers\": [", "\"flags\": {\"gap_share\": -0.5}, \"tiers\": [", "F: flags.gap_share: not a number in range; found -0.5");
        add("\"perceived\"", "\"guess\"", "F: tiers[0].model.kind: not a model; found 'guess'; wanted: one of perceived, fitted");
        add("\"left\": 3", "\"left\": 0", "F: tiers[0].model.left: not a whole number in range; found 0; wanted: a whole number from 1");
        add("\"left\": 3", "\"left\": 2.5", "F: tiers[0].model.left: not a whole number in range; found 2.5");
        add("\"left\": 3", "\"left\": 1e20", "F: tiers[0].model.left: not a whole number in range; found 1e+20");
        add("\"load\": 1.5", "\"load\": -1", "F: tiers[0].model.load: not a number in range; found -1");
        add("\"unit\": \"A\", \"price\": \"70.00\"", "\"price\": \"70.00\"", "F: tiers[0].units[0].unit: missing");
        add("\"71.00\"", "\"seventy\"", "F: tiers[0].units[1].price: not a price; found 'seventy'; wanted: an amount above 0");
        add("\"71.00\"", "71", "F: tiers[0].units[1].price: not a price in quotation marks; found 71; wanted: \"69.00\"");
        add("\"71.00\"", "\"9000000000.01\"", "F: tiers[0].units[1].price: too large a price");
        add("\"closed\"", "\"Closed\"", "F: tiers[0].units[1].status: not a status; found 'Closed'");
        add("\"closed\"", "null", "F: tiers[0].units[1].status: not a text; found null");
        add("\"locked\": false", "\"locked\": 0", "F: tiers[0].units[0].locked: neither true nor false; found 0");
        add("\"grade\": 2", "\"grade\": 2.5", "F: tiers[0].units[0].grade: not a whole number in range");
        add("\"grade\": 2", "\"grade\": 99999999999", "F: tiers[0].units[0].grade: not a whole number in range");
        add("\"area\": 4.5", "\"area\": 0", "F: tiers[0].units[0].area: not a number in range");
        add("\"vacancy_chance\": 0.5", "\"vacancy_chance\": 1.5",
            "F: tiers[0].units[0].vacancy_chance: not a number in range; found 1.5; wanted: a number from 0 to 1");
        add("\"vacancy_chance\"", "\"chance\"", "F: tiers[0].units[0]: a key that is not known; found 'chance'");
        add("{\"unit\": \"B\", \"price\": \"71.00\", \"status\": \"closed\"}", "7", "F: tiers[0].units[1]: not an object; found 7");
        add("\"unit\": \"B\", \"price\": \"71.00\"", "\"unit\": \"A\", \"price\": \"71.00\"",
            "F: tiers[0].units[1]: the same unit as units[0]; found 'A'");
        add("\"name\": \"c1\"", "\"name\": \"current\"", "F: tiers[0].candidates[0]: a name that is taken; found 'current'");
        add("{\"unit\": \"B\", \"price\": \"73.00\"}", "{\"unit\": \"C\", \"price\": \"73.00\"}",
            "F: tiers[0].candidates[0].prices[1].unit: no unit of this tier; found 'C'");
        add("{\"unit\": \"B\", \"price\": \"73.00\"}", "{\"unit\": \"A\", \"price\": \"73.00\"}",
            "F: tiers[0].candidates[0].prices[1].unit: a unit that has its price already");
        add(", {\"unit\": \"B\", \"price\": \"73.00\"}", "",
            "F: tiers[0].candidates[0].prices: not every unit has a price; found 1; wanted: one price for each of the 2 units");
        add("\"73.00\"", "\"0.00\"", "F: tiers[0].candidates[0].prices[1].price: not above 0");
        add("\"chosen\": \"c1\"", "\"chosen\": \"c2\"", "F: tiers[0].chosen: no candidate of that name; found 'c2'");
        add("\"chosen\": \"c1\"", "\"chosen\": 0", "F: tiers[0].chosen: not a text; found 0");
    }

    void wrongValues()
    {
        QFETCH(QByteArray, from);
        QFETCH(QByteArray, to);
        QFETCH(QString, says);
        QByteArray json = kGood;
        QVERIFY(json.contains(from));
        json.replace(json.indexOf(from), from.size(), to);
        const QString trouble = troubleOf(json);
        QVERIFY2(trouble.startsWith(says), qPrintable(trouble));
    }

    void tiersAndCandidatesOnce()
    {
        Scenario scenario = scenarioFromJson(kGood, QStringLiteral("F")).value();
        scenario.tiers.push_back(scenario.tiers[0]);
        QVERIFY(troubleOf(scenarioToJson(scenario))
                    .startsWith(QStringLiteral("F: tiers[1]: the same site and tier as tiers[0]; found 'S', 'T'")));
        scenario.tiers.pop_back();
        scenario.tiers[0].candidates.push_back(scenario.tiers[0].candidates[0]);
        QVERIFY(
            troubleOf(scenarioToJson(scenario)).startsWith(QStringLiteral("F: tiers[0].candidates[1]: a name that is taken; found 'c1'")));
    }

    void malformed_data()
    {
        QTest::addColumn<QByteArray>("json");
        QTest::addColumn<QString>("begins");
        QTest::addColumn<QString>("says");
        QTest::newRow("nothing") << QByteArray() << "F:1: character 1: "
                                 << "not valid JSON";
        QTest::newRow("missing comma") << QByteArray("{\n  \"a\": 1\n  \"b\": 2\n}") << "F:3: character 3: "
                                       << "comma is missing";
        QTest::newRow("characters, not bytes") << QByteArray("{\n\"倉é\": tru }") << "F:2: character 7: "
                                               << "a value that JSON does not know";
        QTest::newRow("CR LF lines") << QByteArray("{\r\n\"a\":\r\n x}") << "F:3: character 2: "
                                     << "not valid JSON";
        QTest::newRow("BOM does not shift") << QByteArray("\xEF\xBB\xBF{\n x}") << "F:2: character 2: "
                                            << "not valid JSON";
        QTest::newRow("open text") << QByteArray("{\"a\": \"b") << "F:1: character "
                                   << "closing quotation mark is missing";
        QTest::newRow("open object") << QByteArray("{\"a\": {") << "F:1: character "
                                     << "not valid JSON";
        QTest::newRow("garbage after") << kGood + "x"
                                       << "F:18: character 1: "
                                       << "after the end";
        QTest::newRow("huge number") << QByteArray("{\"a\": 1e999}") << "F:1: character "
                                     << "a number that JSON does not know, or one too large";
        QTest::newRow("comment") << QByteArray("{ // no\n}") << "F:1: character 3: "
                                 << "not valid JSON";
        QTest::newRow("not UTF-8") << QByteArray("{\n \"a\": \"\xE9\"}") << "F:2: byte 10 of the file: "
                                   << "UTF-8";
        QTest::newRow("NUL") << QByteArray("{\n\0}", 4) << "F:2: byte 3 of the file: "
                             << "NUL";
        QTest::newRow("a list") << QByteArray("[]") << "F: "
                                << "not a scenario";
        QTest::newRow("a unit list") << QByteArray("site,tier\nQ,T\n") << "F:1: character 1: "
                                     << "not valid JSON";
        QTest::newRow("key twice") << QByteArray("{\"a\": {\"b\": 1},\n \"a\": 2}") << "F:2: character 2: "
                                   << "'a' is written twice";
        QTest::newRow("key with an escape") << QByteArray("{\"\\u0061\": 1}") << "F:1: character 2: "
                                            << "escape";
        QTest::newRow("nested deep") << QByteArray(100'000, '[') << "F:1: character "
                                     << "nested too deep";
        QTest::newRow("nested deep, objects") << QByteArray("{\"a\":").repeated(100'000) << "F:1: character "
                                              << "nested too deep";
    }

    void malformed()
    {
        QFETCH(QByteArray, json);
        QFETCH(QString, begins);
        QFETCH(QString, says);
        const QString trouble = troubleOf(json);
        QVERIFY2(trouble.startsWith(begins), qPrintable(trouble));
        QVERIFY2(trouble.contains(says), qPrintable(trouble));
    }

    // The same key in two objects, and keys that look like a text's content, are no repetition.
    void sameKeyElsewhereIsFine()
    {
        QByteArray json = kGood;
        json.replace("\"title\": \"t\"", "\"title\": \"\\\"title\\\": {\\\"title\\\":}\\\\\"");
        QCOMPARE(troubleOf(json), QString());
    }

    // Damaged files from a fixed seed: an error or a scenario, never a crash; and what is read is read for good.
    void damagedFiles()
    {
        Dice dice(8259);
        int survived = 0;
        for (int round = 0; round < 4000; ++round) {
            Dice scenarioDice(static_cast<unsigned>(round / 100));
            QByteArray json = round % 4 == 0 ? scenarioToJson(oddScenario(scenarioDice)) : kGood;
            for (int i = dice.whole(1, 3); i > 0; --i) {
                const int at = dice.whole(0, int(json.size()) - 1);
                switch (dice.whole(0, 3)) {
                case 0:
                    json[at] = char(dice.whole(0, 255));
                    break;
                case 1:
                    json.insert(at, "{}[]\",:0-e\\"[dice.whole(0, 10)]);
                    break;
                case 2:
                    json.remove(at, dice.whole(1, 12));
                    break;
                default:
                    json.insert(at, json.mid(dice.whole(0, int(json.size()) - 1), dice.whole(1, 40)));
                }
                if (json.isEmpty())
                    json = "{";
            }
            const auto read = scenarioFromJson(json, QStringLiteral("F"));
            if (!read.ok())
                continue;
            ++survived;
            const QByteArray again = scenarioToJson(read.value());
            QVERIFY(scenarioFromJson(again, QStringLiteral("F")).value() == read.value());
        }
        qInfo("%d of 4000 damaged files could still be read", survived);
        QVERIFY(survived > 0); // Else the damage is too great to try the deeper checks.
    }
};

QTEST_GUILESS_MAIN(TestScenarioRefusals)
#include "test_scenario_refusals.moc"
