// SPDX-License-Identifier: GPL-3.0-or-later
#include "scenario_json.h"

#include "cell_values.h"
#include "encoding.h"
#include "json_text.h"
#include "json_walk.h"
#include "rules_json.h"
#include "whole_file.h"
#include "words.h"

#include <QStringList>

#include <cmath>
#include <limits>
#include <map>
#include <set>
#include <unordered_map>
#include <utility>

namespace rungwright
{

namespace
{

using Key = QLatin1String;

constexpr qint64 kLargestScenario = qint64(256) << 20;
constexpr int kMostLeft = 1'000'000'000;
constexpr double kGreatestDouble = std::numeric_limits<double>::max();

QString text(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

class Reader
{
public:
    Scenario read(const QJsonValue& document)
    {
        const JsonWalk top(document, {},
                           {Key("format"), Key("version"), Key("title"), Key("currency"), Key("note"), Key("rules"), Key("own_rules"),
                            Key("flags"), Key("tiers")},
                           trouble);
        Scenario scenario;
        scenario.title = top.text(Key("title"));
        scenario.note = top.text(Key("note"));
        const std::string code = top.name(Key("currency"));
        // Files spell the code in capitals only, so that two spellings never make two files of one scenario.
        if (const auto currency = findCurrency(code))
            m_currency = *currency;
        else
            top.refuse(Key("currency"), Words::tr("not a currency"), Words::tr("a code of ISO 4217 such as EUR, JPY or KWD, in capitals"));
        scenario.currency = m_currency;
        if (top.has(Key("rules")))
            scenario.rules = readRules(top.value(Key("rules")), QStringLiteral("rules"), m_currency, trouble);
        scenario.ownRules = readOwnRules(top, m_currency, trouble);
        if (top.has(Key("flags")))
            scenario.flags = flags(top.value(Key("flags")));
        const QJsonArray tiers = top.list(Key("tiers"), true);
        std::map<std::pair<std::string, std::string>, qsizetype> seen;
        for (qsizetype i = 0; i < tiers.size() && !trouble.any(); ++i) {
            const QString place = top.placeOf(Key("tiers"), i);
            scenario.tiers.push_back(tier(tiers.at(i), place));
            const Tier& read = std::as_const(scenario.tiers).back().tier;
            const auto [same, fresh] = seen.emplace(std::pair(read.site, read.name), i);
            if (!fresh)
                trouble.set(place, Words::tr("the same site and tier as tiers[%1]").arg(same->second),
                            QStringLiteral("'%1', '%2'").arg(shownText(read.site), shownText(read.name)), Words::tr("each tier once"));
        }
        return scenario;
    }

    JsonTrouble trouble;

private:
    FlagThresholds flags(const QJsonValue& value)
    {
        const JsonWalk walk(value, QStringLiteral("flags"), {Key("leans_left"), Key("last_units"), Key("gap_share")}, trouble);
        FlagThresholds flags;
        flags.leansLeft = walk.number(Key("leans_left"), -kGreatestDouble, kGreatestDouble, true).value_or(flags.leansLeft);
        flags.lastUnits = walk.integer(Key("last_units"), 0, kMostLeft).value_or(flags.lastUnits);
        flags.gapShare = walk.number(Key("gap_share"), 0, kGreatestDouble, true).value_or(flags.gapShare);
        return flags;
    }

    TierCase tier(const QJsonValue& value, const QString& place)
    {
        const JsonWalk walk(value, place,
                            {Key("site"), Key("tier"), Key("advertised_floor"), Key("note"), Key("seen"), Key("model"), Key("units"),
                             Key("candidates"), Key("chosen"), Key("signed_off")},
                            trouble);
        TierCase tierCase;
        tierCase.tier.site = walk.name(Key("site"));
        tierCase.tier.name = walk.name(Key("tier"));
        tierCase.tier.advertisedFloor = walk.price(Key("advertised_floor"), m_currency).value_or(Price{});
        tierCase.note = walk.text(Key("note"));
        tierCase.seen = walk.yes(Key("seen"));
        if (walk.has(Key("model")))
            tierCase.model = model(walk.value(Key("model")), walk.placeOf(Key("model")));
        const QJsonArray units = walk.list(Key("units"), true);
        UnitIndex index;
        for (qsizetype i = 0; i < units.size() && !trouble.any(); ++i) {
            const QString unitPlace = walk.placeOf(Key("units"), i);
            tierCase.tier.units.push_back(unit(units.at(i), unitPlace));
            const std::string& name = tierCase.tier.units.back().name;
            const auto [same, fresh] = index.emplace(name, static_cast<std::size_t>(i));
            if (!fresh)
                trouble.set(unitPlace, Words::tr("the same unit as units[%1]").arg(qulonglong(same->second)),
                            QStringLiteral("'%1'").arg(shownText(name)), Words::tr("each unit once"));
        }
        const QJsonArray candidates = walk.list(Key("candidates"), false);
        std::set<std::string> names;
        for (qsizetype i = 0; i < candidates.size() && !trouble.any(); ++i) {
            const QString candidatePlace = walk.placeOf(Key("candidates"), i);
            tierCase.candidates.push_back(candidate(candidates.at(i), candidatePlace, index));
            const std::string& name = tierCase.candidates.back().name;
            if (name == kCurrentName || !names.insert(name).second)
                trouble.set(candidatePlace, Words::tr("a name that is taken"), QStringLiteral("'%1'").arg(shownText(name)),
                            Words::tr("a name of its own in the tier, other than '%1'").arg(text(kCurrentName)));
        }
        if (walk.has(Key("chosen")))
            tierCase.chosen = chosen(walk, tierCase);
        if (walk.has(Key("signed_off")))
            tierCase.signedOff = signedSheet(walk.value(Key("signed_off")), walk.placeOf(Key("signed_off")));
        return tierCase;
    }

    std::optional<int> chosen(const JsonWalk& walk, const TierCase& tierCase)
    {
        const std::string name = walk.name(Key("chosen"));
        for (std::size_t i = 0; i < tierCase.candidates.size(); ++i) {
            if (tierCase.candidates[i].name == name)
                return static_cast<int>(i);
        }
        walk.refuse(Key("chosen"), Words::tr("no candidate of that name"), Words::tr("the name of one of the tier's candidates"));
        return {};
    }

    ModelSettings model(const QJsonValue& value, const QString& place)
    {
        const JsonWalk walk(value, place, {Key("kind"), Key("left"), Key("load")}, trouble);
        ModelSettings model;
        const std::string word = walk.name(Key("kind"));
        if (const auto kind = modelFromWord(word)) {
            model.kind = *kind;
        } else {
            QStringList words;
            for (const ModelKind known : kModels)
                words << text(modelWord(known));
            walk.refuse(Key("kind"), Words::tr("not a model"), Words::tr("one of %1").arg(words.join(QStringLiteral(", "))));
        }
        model.left = walk.integer(Key("left"), 1, kMostLeft);
        model.load = walk.number(Key("load"), 0, kGreatestDouble);
        return model;
    }

    Unit unit(const QJsonValue& value, const QString& place)
    {
        const JsonWalk walk(value, place,
                            {Key("unit"), Key("price"), Key("status"), Key("locked"), Key("grade"), Key("area"), Key("vacancy_chance")},
                            trouble);
        Unit unit;
        unit.name = walk.name(Key("unit"));
        unit.asking = walk.neededPrice(Key("price"), m_currency);
        if (const auto status = statusFromWord(walk.name(Key("status"))))
            unit.status = *status;
        else
            walk.refuse(Key("status"), Words::tr("not a status"), Words::tr("vacant, occupied, reserved or closed"));
        unit.locked = walk.yes(Key("locked"));
        unit.grade = walk.integer(Key("grade"), std::numeric_limits<int>::min(), std::numeric_limits<int>::max());
        unit.areaM2 = walk.number(Key("area"), 0, kGreatestDouble);
        unit.vacancyChance = walk.number(Key("vacancy_chance"), 0, 1, true);
        return unit;
    }

    using UnitIndex = std::unordered_map<std::string, std::size_t>;

    Candidate candidate(const QJsonValue& value, const QString& place, const UnitIndex& units)
    {
        const JsonWalk walk(value, place, {Key("name"), Key("note"), Key("prices")}, trouble);
        Candidate candidate;
        candidate.name = walk.name(Key("name"));
        candidate.note = walk.text(Key("note"));
        candidate.prices.assign(units.size(), Price{});
        const QJsonArray prices = walk.list(Key("prices"), true);
        for (qsizetype i = 0; i < prices.size() && !trouble.any(); ++i) {
            const JsonWalk row(prices.at(i), walk.placeOf(Key("prices"), i), {Key("unit"), Key("price")}, trouble);
            const std::string name = row.name(Key("unit"));
            const Price price = row.neededPrice(Key("price"), m_currency);
            const auto unit = units.find(name);
            if (unit == units.end())
                row.refuse(Key("unit"), Words::tr("no unit of this tier"), Words::tr("the name of a unit in the tier's units"));
            else if (candidate.prices[unit->second] != Price{})
                row.refuse(Key("unit"), Words::tr("a unit that has its price already"), Words::tr("each unit once"));
            else
                candidate.prices[unit->second] = price;
        }
        if (!trouble.any() && static_cast<std::size_t>(prices.size()) < units.size())
            trouble.set(walk.placeOf(Key("prices")), Words::tr("not every unit has a price"), QString::number(prices.size()),
                        Words::tr("one price for each of the %1 units").arg(qulonglong(units.size())));
        return candidate;
    }

    // The units it names may be gone by now, so they are not looked up.
    SignedSheet signedSheet(const QJsonValue& value, const QString& place)
    {
        const JsonWalk walk(value, place, {Key("candidate"), Key("when"), Key("prices")}, trouble);
        SignedSheet sheet;
        sheet.candidate = walk.name(Key("candidate"));
        sheet.whenUtc = walk.name(Key("when"));
        const QJsonArray prices = walk.list(Key("prices"), true);
        std::set<std::string> names;
        for (qsizetype i = 0; i < prices.size() && !trouble.any(); ++i) {
            const JsonWalk row(prices.at(i), walk.placeOf(Key("prices"), i), {Key("unit"), Key("before"), Key("after")}, trouble);
            SignedPrice one;
            one.unit = row.name(Key("unit"));
            one.before = row.neededPrice(Key("before"), m_currency);
            one.after = row.neededPrice(Key("after"), m_currency);
            if (!trouble.any() && !names.insert(one.unit).second)
                row.refuse(Key("unit"), Words::tr("a unit that has its price already"), Words::tr("each unit once"));
            sheet.prices.push_back(std::move(one));
        }
        return sheet;
    }

    Currency m_currency;
};

// Is this a scenario at all, and one of a version this program knows? Asked before anything else is looked at.
QString envelopeTrouble(const QJsonDocument& document)
{
    const QJsonValue format = document.object().value(Key("format"));
    if (!document.isObject() || format.toString() != Key("rungwright-scenario"))
        return Words::tr(
            "this is not a scenario: it lacks \"format\": \"rungwright-scenario\". To bring in a unit list, save it as CSV and import it");
    const QJsonValue version = document.object().value(Key("version"));
    const double number = version.toDouble();
    if (version.isDouble() && number > kScenarioVersion)
        return Words::tr("the scenario is of format version %1, and this program knows versions up to %2. Open it with a newer Rungwright")
            .arg(QString::number(number, 'g', 12), QString::number(kScenarioVersion));
    // Version 2 is version 3 without rules of sites and tiers and without rules for whole tiers; version 1 lacks thresholds, seen marks and
    // sheets handed over besides.
    if (!version.isDouble() || number < 1 || number != std::floor(number))
        return Words::tr("version: not a version; found %1; wanted: a whole number from 1 to %2")
            .arg(shownValue(version), QString::number(kScenarioVersion));
    return {};
}

} // namespace

Outcome<Scenario> scenarioFromJson(const QByteArray& json, const QString& fileName)
{
    const auto refused = [](const QString& message) { return Trouble{message.toStdString()}; };
    TextDecoder decoder;
    std::string utf8;
    if (!decodeText(json, decoder, utf8))
        return refused(
            Words::tr("%1:%2: byte %3 of the file: %4")
                .arg(fileName, QString::number(decoder.troubleLine()), QString::number(decoder.troubleByte()), decoder.trouble()));
    QJsonDocument document;
    QString trouble;
    if (!parseJson(utf8, fileName, document, trouble))
        return refused(trouble);
    trouble = envelopeTrouble(document);
    if (!trouble.isEmpty())
        return refused(Words::tr("%1: %2").arg(fileName, trouble));
    Reader reader;
    Scenario scenario = reader.read(document.object());
    if (reader.trouble.any())
        return refused(Words::tr("%1: %2").arg(fileName, reader.trouble.text()));
    return scenario;
}

Outcome<Scenario> loadScenario(const QString& path)
{
    const Outcome<QByteArray> bytes = readWhole(path, kLargestScenario);
    if (!bytes.ok())
        return Trouble{bytes.trouble()};
    return scenarioFromJson(bytes.value(), path);
}

} // namespace rungwright
