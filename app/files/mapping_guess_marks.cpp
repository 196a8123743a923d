// SPDX-License-Identifier: GPL-3.0-or-later
// Which texts beside numbers are proposed to be taken off, and which are not because they change the amount.
#include "mapping_guess.h"
#include "trade_words.h"
#include "words.h"

#include <algorithm>
#include <map>
#include <optional>

namespace rungwright
{

namespace
{

constexpr std::size_t kMostMarks = 20;

// As plainWords has them, in seven languages; common practice, no source. Where two periods stand beside as many prices, the first counts.
constexpr std::array<const char*, 4> kPeriods{
    "mo|mon|mth|month|months|monthly|p m|pm|pcm|p c m|monat|monatlich|mtl|mois|mensuel|mes|mensual|mese|mensile|maand|mnd|mensal",
    "w|wk|week|weekly|p w|woche|wochentlich|semaine|sem|semana|settimana|sett",
    "d|day|daily|night|tag|jour|nuit|dia|noche|giorno|notte|dag|nacht|noite",
    "y|yr|year|yearly|p a|pa|annum|jahr|jahrlich|an|annee|ano|anno|annuo|jaar|jr"};
constexpr const char* kUnits = "m2|sqm|sq m|qm|mq|square metres|square meters|quadratmeter|metres carres|metros cuadrados|metri quadrati|"
                               "vierkante meter|metros quadrados";
constexpr const char* kBetween = "per|a|the|pro|je|par|por|al|la|le|el|cada|e|ogni";
// 1.5k is fifteen hundred: taken off, they would leave an amount that is wrong by a factor.
constexpr const char* kMagnitudes =
    "k|m|b|t|mn|mm|bn|mio|mrd|tsd|mil|mill|mille|mila|duizend|tausend|thousand|million|hundred|lakh|cr|crore";

QStringList listOf(const char* words) { return QString::fromLatin1(words).split(QLatin1Char('|')); }

// The words of a mark without its currency and without what stands before a period: "EUR per month" is "month".
QString keyWords(const QString& mark)
{
    static const QStringList between = listOf(kBetween);
    QStringList kept;
    for (const QString& word : plainWords(mark).split(QLatin1Char(' '), Qt::SkipEmptyParts)) {
        if (!between.contains(word) && currencyOfSign(word).isEmpty())
            kept << word;
    }
    return kept.join(QLatin1Char(' '));
}

std::optional<std::size_t> periodOf(const QString& mark)
{
    static const auto periods = [] {
        std::array<QStringList, kPeriods.size()> all;
        std::transform(kPeriods.begin(), kPeriods.end(), all.begin(), listOf);
        return all;
    }();
    const QString whole = plainWords(mark);
    const QString words = keyWords(mark);
    for (std::size_t i = 0; i < periods.size(); ++i) {
        if (periods[i].contains(words) || periods[i].contains(whole))
            return i;
    }
    return {};
}

bool isUnit(const QString& mark)
{
    static const QStringList units = listOf(kUnits);
    return units.contains(keyWords(mark));
}

bool standsForMany(const QString& mark)
{
    return mark.contains(QLatin1Char('$')) || mark.contains(QChar(0xA5)) || mark == QLatin1String("kr");
}

// What changes the amount: brackets stand for a minus, letters for thousands.
bool changesTheAmount(const QString& mark)
{
    static const QString brackets = QStringLiteral("()[]{}");
    if (std::any_of(mark.begin(), mark.end(), [](QChar c) { return brackets.contains(c); }))
        return true;
    if (periodOf(mark) || isUnit(mark))
        return false;
    static const QStringList magnitudes = listOf(kMagnitudes);
    const QStringList words = plainWords(mark.section(QLatin1Char('/'), 0, 0)).split(QLatin1Char(' '));
    return std::any_of(words.begin(), words.end(), [](const QString& word) { return magnitudes.contains(word); });
}

// Does the mark say nothing that changes an amount, or is it told already?
bool isKnown(const QString& mark, bool besidePrices)
{
    if (!currencyOfSign(mark).isEmpty() || standsForMany(mark))
        return true;
    // A price for a square metre is not a price for a unit: that is told.
    return besidePrices ? periodOf(mark).has_value() : isUnit(mark);
}

bool holdsFiguresOrSign(const QString& mark)
{
    return std::any_of(mark.begin(), mark.end(), [](QChar c) {
        return (c >= QLatin1Char('0') && c <= QLatin1Char('9')) || c == QLatin1Char('-') || c == QLatin1Char('+') || c == QChar(0x2212);
    });
}

// The period that most prices are for, where they are for more than one.
struct Periods {
    std::optional<std::size_t> kept;
    std::array<QString, kPeriods.size()> shown; ///< As the first price of it has it.

    bool leaves(const QString& mark) const
    {
        const std::optional<std::size_t> period = periodOf(mark);
        return kept && period && *period != *kept;
    }
};

Periods periodsOf(const std::vector<QString>& prices)
{
    Periods periods;
    std::array<qsizetype, kPeriods.size()> counts{};
    std::map<QString, std::optional<std::size_t>> known; // Few marks, many prices.
    for (const QString& text : prices) {
        const NumberText number = takeApart(text);
        for (const QString& mark : {number.before, number.after}) {
            if (mark.isEmpty() || number.figures.isEmpty())
                continue;
            auto found = known.find(mark);
            if (found == known.end())
                found = known.emplace(mark, periodOf(mark)).first;
            if (!found->second)
                continue;
            ++counts[*found->second];
            if (periods.shown[*found->second].isEmpty())
                periods.shown[*found->second] = mark;
        }
    }
    const auto most = std::max_element(counts.begin(), counts.end());
    if (*most > 0)
        periods.kept = static_cast<std::size_t>(most - counts.begin());
    return periods;
}

void addMarks(const std::vector<QString>& texts, bool arePrices, const Periods& periods, NumbersGuess& guess)
{
    for (const QString& text : texts) {
        const NumberText number = takeApart(text);
        if (number.figures.isEmpty())
            continue;
        for (const QString& mark : {number.before, number.after}) {
            const bool seen = std::any_of(guess.style.marks.begin(), guess.style.marks.end(),
                                          [&mark](const NumberMark& one) { return one.text.compare(mark, Qt::CaseInsensitive) == 0; });
            if (mark.isEmpty() || seen || holdsFiguresOrSign(mark) || guess.style.marks.size() >= kMostMarks || changesTheAmount(mark) ||
                periods.leaves(mark))
                continue;
            const QString currency = currencyOfSign(mark);
            guess.style.marks.push_back({mark, currency});
            if (currency.isEmpty() && standsForMany(mark))
                guess.tellNothing << mark;
            if (!isKnown(mark, arePrices))
                guess.unknownMarks << mark;
        }
    }
}

} // namespace

void guessMarks(const std::vector<QString>& prices, const std::vector<QString>& others, NumbersGuess& guess)
{
    const Periods periods = periodsOf(prices);
    addMarks(prices, true, periods, guess);
    addMarks(others, false, {}, guess);
    for (std::size_t i = 0; periods.kept && i < periods.shown.size(); ++i) {
        if (i != *periods.kept && !periods.shown[i].isEmpty())
            guess.otherPeriods << periods.shown[i];
    }
    if (!guess.otherPeriods.isEmpty())
        guess.period = periods.shown[*periods.kept];
}

} // namespace rungwright
