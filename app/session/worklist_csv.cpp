// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_csv.h"

#include "sheet_cells.h"

#include <array>
#include <charconv>
#include <cmath>
#include <string>

namespace rungwright
{

namespace
{

/// Plain digits where they stay short: a price of 1400000 is not to read 1.4e+06.
std::string number(std::optional<double> value)
{
    if (!value || !std::isfinite(*value))
        return {};
    const double size = std::abs(*value);
    const auto format = size == 0 || (size >= 1e-5 && size < 1e16) ? std::chars_format::fixed : std::chars_format::scientific;
    std::array<char, 64> text{};
    const auto end = std::to_chars(text.data(), text.data() + text.size(), *value, format);
    return {text.data(), end.ptr};
}

std::string text(const std::string& utf8) { return csvCell(guarded(utf8)); }

std::string flagCell(FlagSet flags)
{
    std::string words;
    for (const Flag flag : kFlags) {
        if (flags.has(flag))
            words += (words.empty() ? "" : "; ") + flagWord(flag).toStdString();
    }
    return text(words);
}

} // namespace

QByteArray worklistCsv(const Worklist& list, std::span<const int> tiers)
{
    const Currency& currency = list.document().scenario().currency;
    const auto money = [&](std::optional<double> minor) { return minor ? number(currency.major(*minor)) : std::string(); };
    std::string csv =
        "site,tier,on_offer,rentable,advertised_floor,expected_cheapest,gap,gap_share,skew_moment,flags,seen,note,currency\r\n";
    for (const int tier : tiers) {
        const TierCase& tierCase = list.tierCase(tier);
        const WorklistRow& row = list.row(tier);
        csv += text(tierCase.tier.site) + ',' + text(tierCase.tier.name) + ',';
        csv += (row.measured ? std::to_string(row.onOffer) : std::string()) + ',';
        csv += (row.measured ? std::to_string(row.rentable) : std::string()) + ',';
        csv += (tierCase.tier.hasFloor() ? plainText(tierCase.tier.advertisedFloor, currency) : std::string()) + ',';
        csv += money(row.cheapest) + ',' + money(row.gap) + ',' + number(row.share) + ',' + number(row.lean) + ',';
        csv += flagCell(list.flags(tier)) + ',' + (tierCase.seen ? "yes" : "no") + ',' + text(tierCase.note) + ',';
        csv += text(currency.code) + "\r\n";
    }
    return QByteArray::fromStdString(csv);
}

} // namespace rungwright
