// SPDX-License-Identifier: GPL-3.0-or-later
#include "cell_values.h"

#include "words.h"

#include <QChar>

#include <algorithm>
#include <charconv>
#include <cmath>
#include <string>

namespace rungwright
{

namespace
{

bool isDigit(char c) { return c >= '0' && c <= '9'; }

std::string asciiLower(std::string_view text)
{
    std::string lower(text);
    for (char& c : lower) {
        if (c >= 'A' && c <= 'Z')
            c = static_cast<char>(c - 'A' + 'a');
    }
    return lower;
}

// One code point of well-formed UTF-8 that starts at text[at].
char32_t codePointAt(std::string_view text, std::size_t at)
{
    const auto first = static_cast<unsigned char>(text[at]);
    if (first < 0x80)
        return first;
    const std::size_t more = first >= 0xF0 ? 3 : first >= 0xE0 ? 2 : 1;
    char32_t c = first & (0x3FU >> more);
    for (std::size_t k = 1; k <= more && at + k < text.size(); ++k)
        c = c << 6 | (static_cast<unsigned char>(text[at + k]) & 0x3FU);
    return c;
}

std::size_t lengthAt(std::string_view text, std::size_t at)
{
    std::size_t length = 1;
    while (at + length < text.size() && (static_cast<unsigned char>(text[at + length]) & 0xC0U) == 0x80U)
        ++length;
    return length;
}

// An optional sign, digits, and perhaps a point and digits.
bool isPlainNumber(std::string_view text)
{
    std::size_t i = !text.empty() && (text[0] == '+' || text[0] == '-') ? 1 : 0;
    const std::size_t start = i;
    while (i < text.size() && isDigit(text[i]))
        ++i;
    if (i == start)
        return false;
    if (i == text.size())
        return true;
    if (text[i] != '.' || i + 1 == text.size())
        return false;
    return std::all_of(text.begin() + static_cast<std::ptrdiff_t>(i) + 1, text.end(), isDigit);
}

// Decimals that are not trailing zeros.
std::size_t decimalsOf(std::string_view plain)
{
    const std::size_t point = plain.find('.');
    if (point == std::string_view::npos)
        return 0;
    const std::size_t last = plain.find_last_not_of('0');
    return last - point;
}

std::string_view withoutPlus(std::string_view text)
{
    if (!text.empty() && text[0] == '+')
        text.remove_prefix(1);
    return text;
}

std::optional<double> plainDouble(std::string_view text)
{
    if (!isPlainNumber(text))
        return {};
    text = withoutPlus(text);
    double value = 0;
    const auto [end, error] = std::from_chars(text.data(), text.data() + text.size(), value, std::chars_format::fixed);
    if (error != std::errc() || end != text.data() + text.size() || !std::isfinite(value))
        return {};
    return value;
}

QString wantedPrice(const Currency& currency)
{
    const QString code = QString::fromStdString(currency.code);
    const QString example = QString::fromStdString(plainText(Price{69 * currency.minorPerMajor()}, currency));
    if (currency.decimals == 0)
        return Words::tr("a whole amount above 0 such as %1 (%2 has no decimals), without currency sign or grouping").arg(example, code);
    return Words::tr("an amount above 0 such as %1, with a decimal point and at most %2 decimals (%3), without currency sign or grouping")
        .arg(example, QString::number(currency.decimals), code);
}

} // namespace

std::string_view trimmedText(std::string_view text)
{
    std::size_t from = 0;
    while (from < text.size() && QChar::isSpace(codePointAt(text, from)))
        from += lengthAt(text, from);
    std::size_t to = text.size();
    while (to > from) {
        std::size_t start = to - 1;
        while (start > from && (static_cast<unsigned char>(text[start]) & 0xC0U) == 0x80U)
            --start;
        if (!QChar::isSpace(codePointAt(text, start)))
            break;
        to = start;
    }
    return text.substr(from, to - from);
}

std::optional<Complaint> readPrice(std::string_view text, const Currency& currency, Price& out)
{
    const auto complaint = [&currency](const QString& wrong) { return Complaint{wrong, wantedPrice(currency)}; };
    if (text.empty())
        return complaint(Words::tr("no price"));
    if (!isPlainNumber(text))
        return complaint(Words::tr("not a price"));
    if (decimalsOf(text) > static_cast<std::size_t>(currency.decimals))
        return complaint(Words::tr("more decimals than the currency has"));
    const std::optional<Price> price = parsePlain(text, currency);
    if (!price)
        return Complaint{Words::tr("too large a price"),
                         Words::tr("at most %1").arg(QString::fromStdString(plainText(kGreatestPrice, currency)))};
    if (price->minor <= 0)
        return complaint(Words::tr("not above 0"));
    out = *price;
    return {};
}

std::optional<Complaint> readStatus(std::string_view text, Status& out)
{
    const std::optional<Status> status = statusFromWord(asciiLower(text));
    if (!status)
        return Complaint{text.empty() ? Words::tr("no status") : Words::tr("not a status"),
                         Words::tr("vacant, occupied, reserved or closed")};
    out = *status;
    return {};
}

std::optional<Complaint> readGrade(std::string_view text, int& out)
{
    const std::string_view digits = withoutPlus(text);
    int value = 0;
    const auto [end, error] = std::from_chars(digits.data(), digits.data() + digits.size(), value);
    if (digits.empty() || !isPlainNumber(text) || error != std::errc() || end != digits.data() + digits.size())
        return Complaint{Words::tr("not a grade"), Words::tr("a whole number such as 3 (higher is more desirable), or nothing")};
    out = value;
    return {};
}

std::optional<Complaint> readArea(std::string_view text, double& out)
{
    const std::optional<double> value = plainDouble(text);
    if (!value || !(*value > 0))
        return Complaint{value ? Words::tr("not above 0") : Words::tr("not an area"),
                         Words::tr("square metres above 0 such as 4.5, with a decimal point, or nothing")};
    out = *value;
    return {};
}

std::optional<Complaint> readChance(std::string_view text, double& out)
{
    const std::optional<double> value = plainDouble(text);
    if (!value || !(*value >= 0 && *value <= 1))
        return Complaint{value ? Words::tr("not between 0 and 1") : Words::tr("not a chance"),
                         Words::tr("a number from 0 to 1 such as 0.25, with a decimal point, or nothing")};
    out = *value == 0 ? 0.0 : *value; // "-0" is 0.
    return {};
}

std::optional<Complaint> readYesNo(std::string_view text, bool& out)
{
    const std::string word = asciiLower(text);
    if (word != "yes" && word != "no")
        return Complaint{Words::tr("neither yes nor no"), Words::tr("yes or no, or nothing for no")};
    out = word == "yes";
    return {};
}

std::optional<Complaint> readCurrency(std::string_view text, Currency& out)
{
    std::string code(text);
    for (char& c : code) {
        if (c >= 'a' && c <= 'z')
            c = static_cast<char>(c - 'a' + 'A');
    }
    std::optional<Currency> currency = findCurrency(code);
    if (!currency)
        return Complaint{Words::tr("not a currency"),
                         Words::tr("a code of ISO 4217 such as EUR, JPY or KWD (XXX where no currency is meant)")};
    out = *std::move(currency);
    return {};
}

} // namespace rungwright
