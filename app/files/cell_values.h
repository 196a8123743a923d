// SPDX-License-Identifier: GPL-3.0-or-later
// From a cell's text to its value, or to what is wrong with it.
#pragma once

#include "ladder/currency.h"
#include "ladder/unit.h"

#include <QString>

#include <optional>
#include <string_view>

namespace rungwright
{

/// What is wrong with a text, and what is wanted instead.
struct Complaint {
    QString wrong;
    QString wanted;
};

/// Without the Unicode white space at both ends (no-break and ideographic spaces too).
std::string_view trimmedText(std::string_view utf8);

// Each reads a trimmed text into `out` and gives nothing back, or leaves `out` alone and says what is wrong.
// Plain ASCII figures, decimal point, no grouping, no exponent, whatever the user's locale.

/// Above 0, at most kGreatestPrice, no more decimals than the currency has (zeros beyond them do no harm).
std::optional<Complaint> readPrice(std::string_view text, const Currency& currency, Price& out);
std::optional<Complaint> readStatus(std::string_view text, Status& out);
std::optional<Complaint> readGrade(std::string_view text, int& out);
/// Above 0 and finite, square metres.
std::optional<Complaint> readArea(std::string_view text, double& out);
/// From 0 to 1.
std::optional<Complaint> readChance(std::string_view text, double& out);
std::optional<Complaint> readYesNo(std::string_view text, bool& out);
/// An ISO 4217 code with a minor unit, or XXX; small letters are taken for capitals.
std::optional<Complaint> readCurrency(std::string_view text, Currency& out);

} // namespace rungwright
