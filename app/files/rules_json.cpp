// SPDX-License-Identifier: GPL-3.0-or-later
#include "rules_json.h"

#include "cell_values.h"
#include "encoding.h"
#include "json_text.h"
#include "whole_file.h"
#include "words.h"

#include <algorithm>
#include <charconv>
#include <limits>

namespace rungwright
{

namespace
{

using RuleKey = QLatin1String;

constexpr qint64 kLargestRules = qint64(16) << 20;

// The shortest decimal that reads back as the same double.
std::string ruleNumber(double value)
{
    char text[32];
    const auto end = std::to_chars(text, text + sizeof text, value).ptr;
    return std::string(text, end);
}

std::string rulePrice(Price value, const Currency& currency) { return '"' + plainText(value, currency) + '"'; }

void readEnding(const QJsonValue& value, const QString& place, const Currency& currency, PricePoints& points, JsonTrouble& trouble)
{
    const std::optional<Price> price = value.isString() ? parsePlain(value.toString().toStdString(), currency) : std::nullopt;
    if (!price || price->minor < 0 || *price >= points.step || (!points.endings.empty() && *price <= points.endings.back()))
        trouble.set(place, Words::tr("not an ending"), shownValue(value),
                    Words::tr("amounts in quotation marks from 0 up to, not including, the step, in rising order"));
    else
        points.endings.push_back(*price);
}

OrderKept readOrder(const JsonWalk& walk)
{
    if (!walk.has(RuleKey("order")))
        return OrderKept::present;
    const std::string word = walk.name(RuleKey("order"));
    if (word != "present" && word != "grade")
        walk.refuse(RuleKey("order"), Words::tr("not an order"), Words::tr("'present' or 'grade'"));
    return word == "grade" ? OrderKept::grade : OrderKept::present;
}

} // namespace

void writeRules(std::string& out, const PriceRules& rules, const Currency& currency, const std::string& indent)
{
    out += "{\n" + indent + "  \"step\": " + rulePrice(rules.points.step, currency);
    if (!rules.points.endings.empty()) {
        std::string endings;
        for (const Price ending : rules.points.endings)
            endings += (endings.empty() ? "" : ", ") + rulePrice(ending, currency);
        out += ",\n" + indent + "  \"endings\": [" + endings + "]";
    }
    const auto line = [&](std::string_view key, const std::string& value) {
        out += ",\n" + indent + "  \"";
        (out += key) += "\": " + value;
    };
    const auto amount = [&](std::string_view key, const std::optional<Price>& price) {
        if (price)
            line(key, rulePrice(*price, currency));
    };
    const auto number = [&](std::string_view key, const std::optional<double>& value) {
        if (value)
            line(key, ruleNumber(*value));
    };
    amount("least", rules.points.least);
    amount("greatest", rules.points.greatest);
    number("greatest_change_percent", rules.greatestChangePercent);
    amount("greatest_change", rules.greatestChange);
    amount("ceiling", rules.ceiling);
    amount("lowest_asking", rules.least);
    number("greatest_total_change_percent", rules.greatestTierChangePercent);
    amount("greatest_total_change", rules.greatestTierChange);
    if (rules.order == OrderKept::grade)
        line("order", "\"grade\"");
    number("least_share_at_floor", rules.leastShareAtFloor);
    out += "\n" + indent + "}";
}

void writeOwnRules(std::string& out, const std::vector<OwnRules>& all, const Currency& currency, const std::string& indent)
{
    out += "[";
    for (const OwnRules& own : all) {
        out += &own == &all.front() ? "\n" : ",\n";
        out += indent + "  {\"site\": " + quotedJson(own.scope.site);
        if (!own.scope.tier.empty())
            out += ", \"tier\": " + quotedJson(own.scope.tier);
        out += ", \"rules\": ";
        writeRules(out, own.rules, currency, indent + "  ");
        out += "}";
    }
    out += all.empty() ? "]" : "\n" + indent + "]";
}

PriceRules readRules(const QJsonValue& value, const QString& place, const Currency& currency, JsonTrouble& trouble)
{
    constexpr double most = std::numeric_limits<double>::max();
    const JsonWalk walk(value, place,
                        {RuleKey("step"), RuleKey("endings"), RuleKey("least"), RuleKey("greatest"), RuleKey("greatest_change_percent"),
                         RuleKey("greatest_change"), RuleKey("ceiling"), RuleKey("lowest_asking"), RuleKey("greatest_total_change_percent"),
                         RuleKey("greatest_total_change"), RuleKey("order"), RuleKey("least_share_at_floor")},
                        trouble);
    PriceRules rules;
    rules.points.step = walk.price(RuleKey("step"), currency).value_or(rules.points.step);
    const QJsonArray endings = walk.list(RuleKey("endings"), false);
    for (qsizetype i = 0; i < endings.size() && !trouble.any(); ++i)
        readEnding(endings.at(i), walk.placeOf(RuleKey("endings"), i), currency, rules.points, trouble);
    rules.points.least = walk.price(RuleKey("least"), currency);
    rules.points.greatest = walk.price(RuleKey("greatest"), currency);
    if (rules.points.least && rules.points.greatest && *rules.points.greatest < *rules.points.least)
        walk.refuse(RuleKey("greatest"), Words::tr("below the least price"), Words::tr("at least the least price"));
    rules.greatestChangePercent = walk.number(RuleKey("greatest_change_percent"), 0, most);
    rules.greatestChange = walk.price(RuleKey("greatest_change"), currency);
    rules.ceiling = walk.price(RuleKey("ceiling"), currency);
    rules.least = walk.price(RuleKey("lowest_asking"), currency);
    if (rules.ceiling && rules.least && *rules.ceiling < *rules.least)
        walk.refuse(RuleKey("lowest_asking"), Words::tr("above the ceiling"), Words::tr("at most the ceiling"));
    rules.greatestTierChangePercent = walk.number(RuleKey("greatest_total_change_percent"), 0, most);
    rules.greatestTierChange = walk.price(RuleKey("greatest_total_change"), currency);
    rules.order = readOrder(walk);
    rules.leastShareAtFloor = walk.number(RuleKey("least_share_at_floor"), 0, 1);
    return rules;
}

std::vector<OwnRules> readOwnRules(const JsonWalk& walk, const Currency& currency, JsonTrouble& trouble)
{
    std::vector<OwnRules> all;
    const QJsonArray list = walk.list(RuleKey("own_rules"), false);
    for (qsizetype i = 0; i < list.size() && !trouble.any(); ++i) {
        const JsonWalk row(list.at(i), walk.placeOf(RuleKey("own_rules"), i), {RuleKey("site"), RuleKey("tier"), RuleKey("rules")},
                           trouble);
        OwnRules own;
        own.scope.site = row.name(RuleKey("site"));
        if (row.has(RuleKey("tier")))
            own.scope.tier = row.name(RuleKey("tier"));
        own.rules = readRules(row.value(RuleKey("rules")), row.placeOf(RuleKey("rules")), currency, trouble);
        const auto place = std::ranges::lower_bound(all, own.scope, {}, &OwnRules::scope);
        if (!trouble.any() && place != all.end() && place->scope == own.scope)
            row.refuse(own.scope.tier.empty() ? RuleKey("site") : RuleKey("tier"), Words::tr("a site or tier that has its rules already"),
                       Words::tr("each once"));
        all.insert(place, std::move(own));
    }
    return all;
}

QByteArray rulesToJson(const RuleSet& rules, const Currency& currency)
{
    std::string out = "{\n  \"format\": \"rungwright-rules\",\n";
    out += "  \"version\": " + std::to_string(kRulesVersion) + ",\n";
    out += "  \"currency\": " + quotedJson(currency.code) + ",\n";
    out += "  \"rules\": ";
    writeRules(out, rules.rules, currency, "  ");
    if (!rules.ownRules.empty()) {
        out += ",\n  \"own_rules\": ";
        writeOwnRules(out, rules.ownRules, currency, "  ");
    }
    out += "\n}\n";
    return QByteArray::fromStdString(out);
}

Outcome<RuleSet> rulesFromJson(const QByteArray& json, const QString& fileName, const Currency& currency)
{
    const auto refused = [](const QString& message) { return Trouble{message.toStdString()}; };
    TextDecoder decoder;
    std::string utf8;
    if (!decodeText(json, decoder, utf8))
        return refused(
            Words::tr("%1:%2: byte %3 of the file: %4")
                .arg(fileName, QString::number(decoder.troubleLine()), QString::number(decoder.troubleByte()), decoder.trouble()));
    QJsonDocument document;
    QString wrong;
    if (!parseJson(utf8, fileName, document, wrong))
        return refused(wrong);
    const QJsonObject object = document.object();
    if (!document.isObject() || object.value(RuleKey("format")).toString() != RuleKey("rungwright-rules"))
        return refused(Words::tr("%1: this is not a file of price rules: it lacks \"format\": \"rungwright-rules\"").arg(fileName));
    const QJsonValue version = object.value(RuleKey("version"));
    if (version.isDouble() && version.toDouble() > kRulesVersion)
        return refused(
            Words::tr("%1: the rules are of format version %2, and this program knows versions up to %3. Open them with a newer Rungwright")
                .arg(fileName, shownValue(version), QString::number(kRulesVersion)));
    if (version != QJsonValue(kRulesVersion))
        return refused(Words::tr("%1: version: not a version this program knows; found %2; wanted: %3")
                           .arg(fileName, shownValue(version), QString::number(kRulesVersion)));
    JsonTrouble trouble;
    const JsonWalk top(object, {}, {RuleKey("format"), RuleKey("version"), RuleKey("currency"), RuleKey("rules"), RuleKey("own_rules")},
                       trouble);
    const std::string code = top.name(RuleKey("currency"));
    if (!trouble.any() && code != currency.code)
        top.refuse(RuleKey("currency"), Words::tr("another currency than that of the prices"), QString::fromStdString(currency.code));
    RuleSet rules;
    rules.rules = readRules(top.value(RuleKey("rules")), QStringLiteral("rules"), currency, trouble);
    rules.ownRules = readOwnRules(top, currency, trouble);
    if (trouble.any())
        return refused(Words::tr("%1: %2").arg(fileName, trouble.text()));
    return rules;
}

Outcome<RuleSet> loadRules(const QString& path, const Currency& currency)
{
    const Outcome<QByteArray> bytes = readWhole(path, kLargestRules);
    if (!bytes.ok())
        return Trouble{bytes.trouble()};
    return rulesFromJson(bytes.value(), path, currency);
}

} // namespace rungwright
