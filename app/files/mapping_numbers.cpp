// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_numbers.h"

#include "words.h"

#include <algorithm>
#include <span>

namespace rungwright
{

namespace
{

using namespace std::string_view_literals;

bool isDigit(char c) { return c >= '0' && c <= '9'; }

char asciiLower(char c) { return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c; }

bool equalLetters(std::string_view a, std::string_view b)
{
    return std::equal(a.begin(), a.end(), b.begin(), b.end(), [](char x, char y) { return asciiLower(x) == asciiLower(y); });
}

bool startsWith(std::string_view text, std::string_view mark)
{
    return text.size() >= mark.size() && equalLetters(text.substr(0, mark.size()), mark);
}

bool endsWith(std::string_view text, std::string_view mark)
{
    return text.size() >= mark.size() && equalLetters(text.substr(text.size() - mark.size()), mark);
}

constexpr std::array kSpaces{" "sv, "\u00A0"sv, "\u202F"sv, "\u2009"sv};
constexpr std::array kApostrophes{"'"sv, "\u2019"sv};
// What stands for "no cents" behind the decimal mark.
constexpr std::array kDashes{"-"sv, "\u2013"sv, "\u2014"sv};
constexpr std::string_view kMinus = "\u2212";

std::size_t lengthOfOne(std::span<const std::string_view> marks, std::string_view rest)
{
    for (const std::string_view mark : marks) {
        if (rest.substr(0, mark.size()) == mark)
            return mark.size();
    }
    return 0;
}

} // namespace

QString foldedText(const QString& text) { return text.simplified().toCaseFolded(); }

QString foldedText(std::string_view utf8) { return foldedText(QString::fromUtf8(utf8.data(), qsizetype(utf8.size()))); }

NumberReader::NumberReader(const NumberStyle& style) :
    m_decimal(style.decimal == DecimalMark::comma ? ',' : '.'), m_grouping(style.grouping)
{
    for (const NumberMark& mark : style.marks)
        m_marks.push_back({std::string(trimmedText(mark.text.toStdString())), mark.currency.toStdString()});
    std::erase_if(m_marks, [](const Mark& mark) { return mark.text.empty(); });
    std::stable_sort(m_marks.begin(), m_marks.end(), [](const Mark& a, const Mark& b) { return a.text.size() > b.text.size(); });

    constexpr std::array<const char*, 5> groupMarks{"", ",", ".", " ", "'"};
    m_example = QLatin1Char('1') + QLatin1String(groupMarks[static_cast<std::size_t>(style.grouping)]) + QStringLiteral("234") +
                QLatin1Char(m_decimal) + QStringLiteral("50");
}

std::optional<std::string_view> NumberReader::currencyOfMark(std::string_view text) const
{
    for (const Mark& mark : m_marks) {
        if (!mark.currency.empty() && equalLetters(mark.text, text))
            return mark.currency;
    }
    return {};
}

bool NumberReader::read(std::string_view text, ReadNumber& out) const
{
    out.plain.clear();
    out.currency = {};
    out.percent = false;
    bool signSeen = false;
    const auto takeSign = [&] {
        const std::size_t length = startsWith(text, kMinus) ? kMinus.size() : startsWith(text, "-") || startsWith(text, "+") ? 1 : 0;
        if (length == 0 || signSeen)
            return;
        signSeen = true;
        if (text[0] != '+')
            out.plain = "-";
        text = trimmedText(text.substr(length));
    };
    // The sign stands before the currency or behind it: -€5, € -5.
    takeSign();
    if (!takeMarks(text, out))
        return false;
    takeSign();
    return readDigits(text, out.plain);
}

// At both ends, any number of them ("EUR 69,00 /month"), each currency the same.
bool NumberReader::takeMarks(std::string_view& text, ReadNumber& out) const
{
    for (bool found = true; found;) {
        found = false;
        if (!out.percent && endsWith(text, "%")) {
            out.percent = found = true;
            text = trimmedText(text.substr(0, text.size() - 1));
        }
        for (const Mark& mark : m_marks) {
            const bool before = startsWith(text, mark.text);
            if (!before && !endsWith(text, mark.text))
                continue;
            found = true;
            text = trimmedText(before ? text.substr(mark.text.size()) : text.substr(0, text.size() - mark.text.size()));
            if (mark.currency.empty())
                break;
            if (!out.currency.empty() && out.currency != mark.currency)
                return false;
            out.currency = mark.currency;
            break;
        }
    }
    return true;
}

std::size_t NumberReader::groupMarkAt(std::string_view text, std::size_t at) const
{
    switch (m_grouping) {
    case Grouping::comma:
        return text[at] == ',' ? 1 : 0;
    case Grouping::point:
        return text[at] == '.' ? 1 : 0;
    case Grouping::space:
        return lengthOfOne(kSpaces, text.substr(at));
    case Grouping::apostrophe:
        return lengthOfOne(kApostrophes, text.substr(at));
    case Grouping::none:
        break;
    }
    return 0;
}

// Groups have three figures, the first one to three and no leading nought (0.500 is half of something, not five hundred); a number is
// grouped throughout or not at all.
bool NumberReader::readDigits(std::string_view text, std::string& plain) const
{
    std::size_t inGroup = 0;
    bool grouped = false;
    std::size_t i = 0;
    const bool nought = !text.empty() && text[0] == '0';
    while (i < text.size() && text[i] != m_decimal) {
        if (isDigit(text[i])) {
            plain += text[i];
            ++inGroup;
            ++i;
            continue;
        }
        const std::size_t length = groupMarkAt(text, i);
        if (length == 0 || nought || inGroup == 0 || (grouped ? inGroup != 3 : inGroup > 3))
            return false;
        grouped = true;
        inGroup = 0;
        i += length;
    }
    if (inGroup == 0 || (grouped && inGroup != 3))
        return false;
    if (i == text.size())
        return true;
    const std::string_view decimals = text.substr(i + 1);
    if (std::find(kDashes.begin(), kDashes.end(), decimals) != kDashes.end())
        return true;
    if (decimals.empty() || !std::all_of(decimals.begin(), decimals.end(), isDigit))
        return false;
    (plain += '.') += decimals;
    return true;
}

std::optional<Complaint> twoWaysTrouble(std::string_view plain, const Currency& currency)
{
    const std::size_t point = plain.find('.');
    const bool groupOfThree = point != std::string_view::npos && point >= 1 && point <= 3 && plain.size() - point == 4 &&
                              std::all_of(plain.begin(), plain.end(), [](char c) { return isDigit(c) || c == '.'; });
    if (!groupOfThree || plain[0] == '0' || currency.decimals >= 3)
        return {};
    return Complaint{
        Words::tr("can be read in two ways, with decimals or as thousands"),
        currency.decimals == 0
            ? Words::tr("the grouping mark in the mapping, or an amount without decimals (%1)").arg(QString::fromStdString(currency.code))
            : Words::tr("the grouping mark in the mapping, or an amount with two decimals (%1)")
                  .arg(QString::fromStdString(currency.code))};
}

bool beginsWithWords(const QString& folded, const QString& prefix)
{
    if (!folded.startsWith(prefix))
        return false;
    if (prefix.isEmpty() || folded.size() == prefix.size())
        return true;
    const auto isOfWord = [](char32_t c) { return QChar::isLetter(c) || QChar::isMark(c); };
    const QList<uint> last = prefix.right(2).toUcs4();
    const QList<uint> next = folded.mid(prefix.size(), 2).toUcs4();
    return !isOfWord(last.back()) || !isOfWord(next.front());
}

std::string hundredthOf(std::string_view plain)
{
    const bool negative = !plain.empty() && plain[0] == '-';
    if (negative)
        plain.remove_prefix(1);
    const std::size_t point = std::min(plain.find('.'), plain.size());
    std::string digits(plain.substr(0, point));
    std::string decimals(point < plain.size() ? plain.substr(point + 1) : std::string_view());
    if (digits.size() < 3)
        digits.insert(0, 3 - digits.size(), '0');
    decimals.insert(0, digits, digits.size() - 2, 2);
    digits.resize(digits.size() - 2);
    return (negative ? "-" : "") + digits + '.' + decimals;
}

} // namespace rungwright
