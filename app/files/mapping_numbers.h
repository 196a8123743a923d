// SPDX-License-Identifier: GPL-3.0-or-later
// Numbers in others' spelling turned into ours.
#pragma once

#include "cell_values.h"
#include "mapping.h"

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace rungwright
{

/// Any case of letters, white space at the ends gone and runs of it made one space: how words and headers of others' are compared.
QString foldedText(const QString& text);
QString foldedText(std::string_view utf8);

/// A number as it was understood.
struct ReadNumber {
    std::string plain;         ///< Our spelling: an optional minus, digits, perhaps a point and digits.
    std::string_view currency; ///< The code its marks stand for, or empty. Good while the reader is.
    bool percent = false;      ///< A percent sign stood behind it; `plain` is not divided yet.
};

/// Reads numbers of one style.
class NumberReader
{
public:
    explicit NumberReader(const NumberStyle& style);

    /// A trimmed text that is not empty. False when it is no number in this style. "45.-" and "45,–" (no cents) are taken.
    bool read(std::string_view text, ReadNumber& out) const;
    /// "1.234,50", "1234.50": what a number looks like in this style.
    const QString& example() const { return m_example; }
    /// The code a text that is nothing but a mark stands for ("€"), or nothing.
    std::optional<std::string_view> currencyOfMark(std::string_view text) const;

private:
    struct Mark {
        std::string text;
        std::string currency;
    };

    bool takeMarks(std::string_view& text, ReadNumber& out) const;
    bool readDigits(std::string_view text, std::string& plain) const;
    std::size_t groupMarkAt(std::string_view text, std::size_t at) const;

    char m_decimal;
    Grouping m_grouping;
    std::vector<Mark> m_marks; ///< The longest first, so that "US$" is not taken for "$".
    QString m_example;
};

/// A price of one to three figures and exactly three decimals may as well be a grouped whole number: 1.250 is one and a quarter or one
/// thousand two hundred and fifty. Asked where the style has no grouping mark that would tell; nothing for a currency of three decimals.
std::optional<Complaint> twoWaysTrouble(std::string_view plain, const Currency& currency);

/// `folded` begins with `prefix`, and no word goes on behind it: "sum" begins "sum of may", not "summer lane". Both as foldedText has them.
bool beginsWithWords(const QString& folded, const QString& prefix);

/// A hundredth of a plain number, exactly: "25" gives "0.25".
std::string hundredthOf(std::string_view plain);

} // namespace rungwright
