// SPDX-License-Identifier: GPL-3.0-or-later
#include "figures_list.h"

#include "sheet_cells.h"

#include <QJsonArray>
#include <QJsonDocument>

#include <array>
#include <charconv>
#include <cmath>

namespace rungwright
{

namespace
{

using Value = decltype(NamedFigure::value);

Value number(std::optional<double> value) { return value && std::isfinite(*value) ? Value(*value) : Value(); }

class Money
{
public:
    explicit Money(const Currency& currency) : m_currency(currency) {}

    Value operator()(std::optional<double> minorUnits) const { return minorUnits ? number(m_currency.major(*minorUnits)) : Value(); }
    Value operator()(std::optional<Price> price) const { return price ? number(m_currency.major(double(price->minor))) : Value(); }

private:
    const Currency& m_currency;
};

/// Without odds the chance is known only when nothing can be on offer at all.
Value chanceNone(const CheapestOdds& odds)
{
    const bool never = odds.note == OddsNote::nothingOnOffer || odds.note == OddsNote::nothingRentable || odds.note == OddsNote::neverFree;
    return odds.defined() || never ? number(odds.none) : Value();
}

Value whole(std::optional<int> n)
{
    if (n)
        return std::int64_t(*n);
    return {};
}

Value count(std::size_t n) { return std::int64_t(n); }

} // namespace

std::vector<NamedFigure> namedFigures(const MeasuredLadder& measured, const Currency& currency)
{
    const Measurement& m = measured.measurement;
    const Tier& tier = measured.ladder.tierCase->tier;
    const Money money(currency);
    return {
        {"", "site", tier.site},
        {"", "tier", tier.name},
        {"", "candidate", std::string(measured.ladder.candidateName())},
        {"", "units", count(m.units)},
        {"", "rentable", count(m.rentable)},
        {"", "on_offer", count(m.onOffer)},
        {"", "advertised_floor", tier.hasFloor() ? money(m.advertisedFloor) : Value{}},
        {"", "lowest", money(m.figures.lowest)},
        {"", "highest", money(m.figures.highest)},
        {"", "width", money(m.figures.width)},
        {"", "mean", money(m.figures.mean)},
        {"", "median", money(m.figures.median)},
        {"", "asking_total", money(m.figures.total)},
        {"", "mean_standing", number(m.figures.meanStanding)},
        {"skew", "moment", number(m.figures.skew.moment)},
        {"skew", "adjusted", number(m.figures.skew.adjusted)},
        {"skew", "medcouple", number(m.figures.skew.medcouple)},
        {"skew", "l", number(m.figures.skew.l)},
        {"", "inversions", count(m.figures.inversions)},
        {"", "model", std::string(modelWord(m.model))},
        {"", "left", whole(m.odds.left)},
        {"", "load", number(m.odds.load)},
        {"", "chance_none", chanceNone(m.odds)},
        {"", "expected_cheapest", money(m.gap.expectedCheapest)},
        {"", "gap", money(m.gap.gap)},
        {"", "gap_share", number(m.gap.gapShare)},
        {"", "claim_part", money(m.gap.claimPart)},
        {"", "shape_part", money(m.gap.shapePart)},
        {"", "chance_floor_met", number(m.gap.chanceFloorMet)},
        {"", "gap_median", money(m.gap.gapMedian)},
        {"", "gap_p90", money(m.gap.gapP90)},
    };
}

namespace
{

/// The text of plainNumber(), written to `text`.
std::string_view shortestText(double value, std::array<char, 64>& text)
{
    // Plain digits where they stay short: a price of 1400000 is not to read 1.4e+06.
    const double size = std::abs(value);
    const auto format = value == 0 || (size >= 1e-5 && size < 1e16) ? std::chars_format::fixed : std::chars_format::scientific;
    const auto end = std::to_chars(text.data(), text.data() + text.size(), value, format);
    return {text.data(), static_cast<std::size_t>(end.ptr - text.data())};
}

} // namespace

QByteArray plainNumber(double value)
{
    std::array<char, 64> text{};
    const std::string_view number = shortestText(value, text);
    return {number.data(), qsizetype(number.size())};
}

namespace
{

/// Qt's own escaping, taken out of a one-element array.
QByteArray jsonString(const std::string& utf8)
{
    const QByteArray array = QJsonDocument(QJsonArray{QString::fromStdString(utf8)}).toJson(QJsonDocument::Compact);
    return array.mid(1, array.size() - 2);
}

QByteArray jsonValue(const Value& value)
{
    if (const auto* text = std::get_if<std::string>(&value))
        return jsonString(*text);
    if (const auto* whole = std::get_if<std::int64_t>(&value))
        return QByteArray::number(qint64(*whole));
    if (const auto* real = std::get_if<double>(&value))
        return plainNumber(*real);
    return "null";
}

QByteArray jsonObject(const std::vector<NamedFigure>& figures)
{
    QByteArray json = "{";
    QByteArray group;
    for (const NamedFigure& figure : figures) {
        if (group != figure.group && !group.isEmpty())
            json += '}';
        if (json.size() > 1)
            json += ", ";
        if (group != figure.group && *figure.group)
            json += QByteArray("\"") + figure.group + "\": {";
        group = figure.group;
        json += QByteArray("\"") + figure.key + "\": " + jsonValue(figure.value);
    }
    if (!group.isEmpty())
        json += '}';
    return json + '}';
}

} // namespace

QByteArray measurementsToJson(const std::vector<MeasuredLadder>& all, const Currency& currency)
{
    QByteArray json = "{\"currency\": " + jsonString(currency.code) + ", \"tiers\": [";
    const char* between = "\n  ";
    for (const MeasuredLadder& one : all) {
        json += between + jsonObject(namedFigures(one, currency));
        between = ",\n  ";
    }
    return json + "]}\n";
}

namespace
{

/// Numbers are numbers to a spreadsheet, a minus sign included; texts are guarded against being taken for formulas.
void appendCell(const Value& value, std::string& out)
{
    std::array<char, 64> text{};
    if (const auto* words = std::get_if<std::string>(&value))
        out += csvCell(guarded(*words));
    else if (const auto* whole = std::get_if<std::int64_t>(&value))
        out.append(text.data(), std::to_chars(text.data(), text.data() + text.size(), *whole).ptr);
    else if (const auto* real = std::get_if<double>(&value))
        out += shortestText(*real, text);
}

std::string heading(const NamedFigure& figure) { return (*figure.group ? std::string(figure.group) + '_' : std::string()) + figure.key; }

} // namespace

std::string csvHeadings(const Currency& currency)
{
    // A tier without units has the same figures as any other: its names make the header, for an empty worklist too.
    const TierCase none{};
    std::string csv;
    for (const NamedFigure& figure : namedFigures({{&none, -1, {}}, {}}, currency))
        csv += heading(figure) + ',';
    return csv + "currency\r\n";
}

void appendCsvRow(const MeasuredLadder& measured, const Currency& currency, std::string& out)
{
    for (const NamedFigure& figure : namedFigures(measured, currency)) {
        appendCell(figure.value, out);
        out += ',';
    }
    out += csvCell(currency.code) + "\r\n";
}

} // namespace rungwright
