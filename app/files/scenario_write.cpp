// SPDX-License-Identifier: GPL-3.0-or-later
#include "scenario_json.h"

#include "json_text.h"
#include "rules_json.h"
#include "whole_file.h"
#include "words.h"

#include <cassert>
#include <charconv>

namespace rungwright
{

namespace
{

// The shortest decimal that reads back as the same double.
std::string number(double value)
{
    char text[32];
    const auto end = std::to_chars(text, text + sizeof text, value).ptr;
    return std::string(text, end);
}

class Writer
{
public:
    explicit Writer(const Currency& currency) : m_currency(currency) {}

    std::string price(Price value) const { return '"' + plainText(value, m_currency) + '"'; }

    void rules(const Scenario& scenario)
    {
        m_out += "  \"rules\": ";
        writeRules(m_out, scenario.rules, m_currency, "  ");
        m_out += ",\n";
        if (scenario.ownRules.empty())
            return;
        m_out += "  \"own_rules\": ";
        writeOwnRules(m_out, scenario.ownRules, m_currency, "  ");
        m_out += ",\n";
    }

    void flags(const FlagThresholds& flags)
    {
        m_out += "  \"flags\": {\"leans_left\": " + number(flags.leansLeft) + ", \"last_units\": " + std::to_string(flags.lastUnits) +
                 ", \"gap_share\": " + number(flags.gapShare) + "},\n";
    }

    void tier(const TierCase& tierCase)
    {
        const Tier& tier = tierCase.tier;
        m_out += "    {\n";
        m_out += "      \"site\": " + quotedJson(tier.site) + ",\n";
        m_out += "      \"tier\": " + quotedJson(tier.name) + ",\n";
        if (tier.hasFloor())
            m_out += "      \"advertised_floor\": " + price(tier.advertisedFloor) + ",\n";
        if (!tierCase.note.empty())
            m_out += "      \"note\": " + quotedJson(tierCase.note) + ",\n";
        if (tierCase.seen)
            m_out += "      \"seen\": true,\n";
        model(tierCase.model);
        m_out += "      \"units\": [";
        list(tier.units.size(), "        ", "      ", [&](std::size_t i) { unit(tier.units[i]); });
        m_out += ",\n      \"candidates\": [";
        list(tierCase.candidates.size(), "        ", "      ", [&](std::size_t i) { candidate(tierCase.candidates[i], tier.units); });
        if (tierCase.chosen)
            m_out += ",\n      \"chosen\": " + quotedJson(tierCase.candidates[static_cast<std::size_t>(*tierCase.chosen)].name);
        if (tierCase.signedOff)
            signedSheet(*tierCase.signedOff);
        m_out += "\n    }";
    }

    template <class Each>
    void list(std::size_t count, const char* inner, const char* outer, Each each)
    {
        for (std::size_t i = 0; i < count; ++i) {
            (m_out += i == 0 ? "\n" : ",\n") += inner;
            each(i);
        }
        if (count > 0)
            (m_out += "\n") += outer;
        m_out += "]";
    }

    std::string m_out;

private:
    void model(const ModelSettings& model)
    {
        m_out += "      \"model\": {\"kind\": \"";
        m_out += modelWord(model.kind);
        m_out += "\"";
        if (model.left)
            m_out += ", \"left\": " + std::to_string(*model.left);
        if (model.load)
            m_out += ", \"load\": " + number(*model.load);
        m_out += "},\n";
    }

    void unit(const Unit& unit)
    {
        m_out += "{\"unit\": " + quotedJson(unit.name) + ", \"price\": " + price(unit.asking) + ", \"status\": \"";
        m_out += statusWord(unit.status);
        m_out += "\"";
        if (unit.locked)
            m_out += ", \"locked\": true";
        if (unit.grade)
            m_out += ", \"grade\": " + std::to_string(*unit.grade);
        if (unit.areaM2)
            m_out += ", \"area\": " + number(*unit.areaM2);
        if (unit.vacancyChance)
            m_out += ", \"vacancy_chance\": " + number(*unit.vacancyChance);
        m_out += "}";
    }

    void candidate(const Candidate& candidate, const std::vector<Unit>& units)
    {
        assert(candidate.prices.size() == units.size());
        m_out += "{\n          \"name\": " + quotedJson(candidate.name) + ",\n";
        if (!candidate.note.empty())
            m_out += "          \"note\": " + quotedJson(candidate.note) + ",\n";
        m_out += "          \"prices\": [";
        list(candidate.prices.size(), "            ", "          ", [&](std::size_t i) {
            m_out += "{\"unit\": " + quotedJson(units[i].name) + ", \"price\": " + price(candidate.prices[i]) + "}";
        });
        m_out += "\n        }";
    }

    void signedSheet(const SignedSheet& sheet)
    {
        m_out += ",\n      \"signed_off\": {\n        \"candidate\": " + quotedJson(sheet.candidate) +
                 ",\n        \"when\": " + quotedJson(sheet.whenUtc) + ",\n        \"prices\": [";
        list(sheet.prices.size(), "          ", "        ", [&](std::size_t i) {
            const SignedPrice& one = sheet.prices[i];
            m_out += "{\"unit\": " + quotedJson(one.unit) + ", \"before\": " + price(one.before) + ", \"after\": " + price(one.after) + "}";
        });
        m_out += "\n      }";
    }

    const Currency& m_currency;
};

} // namespace

QByteArray scenarioToJson(const Scenario& scenario)
{
    Writer writer(scenario.currency);
    std::string& out = writer.m_out;
    out += "{\n  \"format\": \"rungwright-scenario\",\n";
    out += "  \"version\": " + std::to_string(kScenarioVersion) + ",\n";
    out += "  \"title\": " + quotedJson(scenario.title) + ",\n";
    out += "  \"currency\": " + quotedJson(scenario.currency.code) + ",\n";
    out += "  \"note\": " + quotedJson(scenario.note) + ",\n";
    writer.rules(scenario);
    writer.flags(scenario.flags);
    out += "  \"tiers\": [";
    writer.list(scenario.tiers.size(), "", "  ", [&](std::size_t i) { writer.tier(scenario.tiers[i]); });
    out += "\n}\n";
    return QByteArray::fromStdString(out);
}

Outcome<bool> saveScenario(const Scenario& scenario, const QString& path)
{
    const QByteArray bytes = scenarioToJson(scenario);
    // Better an error now, while the scenario is in hand, than a file tomorrow that cannot be opened.
    const Outcome<Scenario> read = scenarioFromJson(bytes, path);
    if (!read.ok())
        return Trouble{Words::tr("not saved, because the file could not be opened again: %1")
                           .arg(QString::fromStdString(read.trouble()))
                           .toStdString()};
    if (!(read.value() == scenario))
        return Trouble{Words::tr("%1: not saved, because the file would not hold the same scenario").arg(path).toStdString()};
    return writeWhole(path, bytes);
}

} // namespace rungwright
