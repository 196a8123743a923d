// SPDX-License-Identifier: GPL-3.0-or-later
// Text cells of a price sheet: safe in a spreadsheet, exact when read back.
#pragma once

#include "ladder/price.h"

#include <optional>
#include <string>
#include <string_view>

namespace rungwright
{

/// A text that begins with = + - @ TAB CR or LF, or with apostrophes followed by one of these, gets one apostrophe more in front; any
/// other text stays. Source of the list: OWASP, "CSV Injection". Apostrophes of the text's own are counted in so that unguarded() undoes it
/// exactly.
std::string guarded(std::string_view text);
std::string unguarded(std::string_view text);

/// As RFC 4180 writes a cell: in quotes, quotes doubled, where the text needs them (comma, quote, line end) and where a lenient reader may
/// take something away or split elsewhere (spaces at the ends, semicolon, tab).
std::string csvCell(std::string_view text);

/// 100 (now - before) / before with two decimals, halves away from zero, exact ("-3.66"; "0.00", never "-0.00"). Empty for before <= 0.
std::string changePercent(Price before, Price now);

} // namespace rungwright
