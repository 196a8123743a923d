// SPDX-License-Identifier: GPL-3.0-or-later
#include "sheet_cells.h"

#include <csv.h>

#include <algorithm>

namespace rungwright
{

namespace
{

bool startsFormula(std::string_view text)
{
    constexpr std::string_view triggers = "=+-@\t\r\n";
    const std::size_t first = text.find_first_not_of('\'');
    return first != std::string_view::npos && triggers.find(text[first]) != std::string_view::npos;
}

} // namespace

std::string guarded(std::string_view text)
{
    std::string out;
    if (startsFormula(text))
        out += '\'';
    return out.append(text);
}

std::string unguarded(std::string_view text)
{
    if (!text.empty() && text.front() == '\'' && startsFormula(text))
        text.remove_prefix(1);
    return std::string(text);
}

std::string csvCell(std::string_view text)
{
    const bool spaceAtEnd = !text.empty() && (text.front() == ' ' || text.back() == ' ');
    if (!spaceAtEnd && text.find_first_of(",\"\r\n;\t") == std::string_view::npos)
        return std::string(text);
    std::string out(csv_write(nullptr, 0, text.data(), text.size()), '\0');
    csv_write(out.data(), out.size(), text.data(), text.size());
    return out;
}

std::string changePercent(Price before, Price now)
{
    if (before.minor <= 0)
        return {};
    // Hundredths of a percent, in integers: below 9 * 10^15 in size for prices the tool takes.
    const std::int64_t change = (now - before).minor;
    const std::int64_t size = change < 0 ? -change : change;
    const std::int64_t hundredths = (size * 10'000 + before.minor / 2) / before.minor;
    std::string out = change < 0 && hundredths != 0 ? "-" : "";
    out += std::to_string(hundredths / 100);
    out += '.';
    out += static_cast<char>('0' + hundredths / 10 % 10);
    out += static_cast<char>('0' + hundredths % 10);
    return out;
}

} // namespace rungwright
