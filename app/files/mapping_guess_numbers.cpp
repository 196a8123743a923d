// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_guess.h"
#include "mapping_numbers.h"

#include <algorithm>
#include <optional>

namespace rungwright
{

namespace
{

bool isSpace(QChar c) { return c.isSpace(); }

bool isApostrophe(QChar c) { return c == QLatin1Char('\'') || c == QChar(0x2019); }

bool isDash(QChar c) { return c == QLatin1Char('-') || c == QChar(0x2013) || c == QChar(0x2014); }

bool isFigure(QChar c) { return c >= QLatin1Char('0') && c <= QLatin1Char('9'); }

bool belongsToFigures(QChar c) { return isFigure(c) || c == QLatin1Char('.') || c == QLatin1Char(',') || isSpace(c) || isApostrophe(c); }

bool isSign(QChar c) { return c == QLatin1Char('-') || c == QLatin1Char('+') || c == QChar(0x2212); }

struct Reading {
    NumberStyle style;
    qsizetype read = 0;
    qsizetype likePrices = 0;        ///< Prices with at most two decimals.
    std::vector<std::string> values; ///< One for each text; empty when it is not read.
};

Reading tried(DecimalMark decimal, Grouping grouping, const std::vector<QString>& prices, const std::vector<QString>& others)
{
    Reading candidate;
    candidate.style.decimal = decimal;
    candidate.style.grouping = grouping;
    const NumberReader reader(candidate.style);
    const auto look = [&](const QString& text, bool isPrice) {
        ReadNumber number;
        const std::string utf8 = text.toStdString();
        std::string& value = candidate.values.emplace_back();
        if (!reader.read(utf8, number))
            return;
        ++candidate.read;
        value = number.plain;
        const std::size_t point = value.find('.');
        candidate.likePrices += isPrice && (point == std::string::npos || value.size() - point - 1 <= 2) ? 1 : 0;
    };
    for (const QString& text : prices)
        look(text, true);
    for (const QString& text : others)
        look(text, false);
    return candidate;
}

std::vector<QString> figuresOf(const std::vector<QString>& texts)
{
    std::vector<QString> figures;
    for (const QString& text : texts) {
        if (const NumberText number = takeApart(text); !number.figures.isEmpty())
            figures.push_back(number.figures);
    }
    return figures;
}

} // namespace

NumberText takeApart(const QString& text)
{
    NumberText number;
    QString rest = text.trimmed();
    if (rest.endsWith(QLatin1Char('%'))) {
        number.percent = true;
        rest = rest.chopped(1).trimmed();
    }
    const auto first = std::find_if(rest.begin(), rest.end(), isFigure);
    if (first == rest.end())
        return number;
    auto end = first;
    auto last = first;
    while (end != rest.end() && belongsToFigures(*end)) {
        if (isFigure(*end))
            last = end;
        ++end;
    }
    // "45.-": the dash stands for cents.
    if (end != rest.end() && isDash(*end) && end != first && (*(end - 1) == QLatin1Char('.') || *(end - 1) == QLatin1Char(',')))
        last = end;
    const auto from = first - rest.begin();
    const auto to = last - rest.begin() + 1;
    number.before = rest.left(from).trimmed();
    number.after = rest.mid(to).trimmed();
    while (!number.before.isEmpty() && isSign(number.before.back()))
        number.before = number.before.chopped(1).trimmed();
    while (!number.before.isEmpty() && isSign(number.before.front()))
        number.before = number.before.mid(1).trimmed();
    number.figures = rest.mid(from, to - from);
    return number;
}

NumbersGuess guessNumbers(const std::vector<QString>& prices, const std::vector<QString>& others, char delimiter)
{
    NumbersGuess guess;
    guessMarks(prices, others, guess);
    const std::vector<QString> priceFigures = figuresOf(prices);
    const std::vector<QString> otherFigures = figuresOf(others);
    const qsizetype all = qsizetype(priceFigures.size() + otherFigures.size());

    // Without groups first: what is not needed is not proposed.
    std::vector<Reading> candidates;
    const bool commaFirst = delimiter == ';';
    for (const DecimalMark decimal :
         {commaFirst ? DecimalMark::comma : DecimalMark::point, commaFirst ? DecimalMark::point : DecimalMark::comma}) {
        for (const Grouping grouping : {Grouping::none, Grouping::comma, Grouping::point, Grouping::space, Grouping::apostrophe}) {
            const bool clash = (decimal == DecimalMark::comma && grouping == Grouping::comma) ||
                               (decimal == DecimalMark::point && grouping == Grouping::point);
            if (!clash)
                candidates.push_back(tried(decimal, grouping, priceFigures, otherFigures));
        }
    }
    const auto better = [](const Reading& a, const Reading& b) { return a.read != b.read ? a.read > b.read : a.likePrices > b.likePrices; };
    const Reading* best = &candidates.front();
    for (const Reading& candidate : candidates) {
        if (better(candidate, *best))
            best = &candidate;
    }
    guess.style.decimal = best->style.decimal;
    guess.style.grouping = best->style.grouping;
    for (const Reading& other : candidates) {
        if (guess.ambiguous || other.read < best->read || all == 0 || other.values == best->values)
            continue;
        const auto [mine, theirs] = std::mismatch(best->values.begin(), best->values.end(), other.values.begin());
        guess.ambiguous = true;
        const auto at = static_cast<std::size_t>(mine - best->values.begin());
        guess.example = at < priceFigures.size() ? priceFigures[at] : otherFigures[at - priceFigures.size()];
    }
    return guess;
}

} // namespace rungwright
