// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_guess.h"
#include "trade_words.h"

#include <QSet>

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr int kSure = 90;
constexpr int kLeast = 30;

bool hasLetter(const QString& text)
{
    return std::any_of(text.begin(), text.end(), [](QChar c) { return c.isLetter(); });
}

// Values that cannot be what the column is said to be weigh more than any word.
bool canBe(Column column, const ColumnLook& look)
{
    constexpr double nearlyAll = 0.8;
    if (look.filled == 0)
        return true;
    switch (column) {
    case Column::askingPrice:
    case Column::advertisedFloor:
    case Column::grade:
    case Column::area:
    case Column::vacancyChance:
        return look.numbers >= nearlyAll;
    case Column::status: {
        constexpr qsizetype mostWords = 30;
        return look.distinct <= mostWords && (look.numbers < nearlyAll || look.yesNo >= nearlyAll);
    }
    case Column::currency:
        return look.currencies >= nearlyAll;
    case Column::locked:
        return look.yesNo >= nearlyAll;
    case Column::site:
    case Column::tier:
    case Column::unit:
        break;
    }
    return look.signs == 0;
}

double distinctShare(const ColumnLook& look) { return look.filled == 0 ? 0 : double(look.distinct) / double(look.filled); }

// What the values alone speak for.
int valueScore(Column column, const ColumnLook& look)
{
    constexpr qsizetype enough = 3;
    if (look.filled < enough)
        return 0;
    switch (column) {
    case Column::status:
        return look.statuses >= 0.8 ? 70 : 0;
    case Column::currency:
        return look.currencies >= 0.9 && look.letters > 0 ? 60 : 0;
    case Column::askingPrice:
        return look.signs >= 0.5 ? 45 : 0;
    case Column::unit:
        return distinctShare(look) >= 0.9 && look.letters >= 0.5 ? 35 : 0;
    default:
        return 0;
    }
}

// Between columns whose words speak alike.
int leaning(Column column, const ColumnLook& look)
{
    switch (column) {
    case Column::area:
        return look.numbers >= 0.8 ? 15 : 0;
    case Column::tier:
        return distinctShare(look) > 0.9 && look.filled > 20 ? -25 : look.letters > 0.5 ? 10 : 0;
    case Column::unit:
        return distinctShare(look) > 0.8 ? 15 : distinctShare(look) < 0.2 && look.filled > 20 ? -25 : 0;
    case Column::site:
        return look.letters > 0.5 ? 10 : 0;
    case Column::status:
        return look.statuses >= 0.5 ? 20 : 0;
    default:
        return 0;
    }
}

int scoreOf(Column column, const QString& header, const ColumnLook& look, int word)
{
    if (!canBe(column, look) || (column == Column::area && saysOtherArea(header)))
        return 0;
    // "Let: yes / no" is a status when the header is a status word itself.
    if (column == Column::status && look.yesNo >= 0.8 && look.statuses < 0.8 && look.filled > 0 && !statusOfYes(header))
        return 0;
    const int values = valueScore(column, look);
    return word > 0 ? word + leaning(column, look) + values / 3 : values;
}

} // namespace

ColumnLook lookAt(const SampleRecords& rows, qsizetype column)
{
    ColumnLook look;
    QSet<QString> seen;
    const auto add = [](double& count, bool is) { count += is ? 1 : 0; };
    for (const QStringList& row : rows) {
        const QString text = row.value(column).trimmed();
        if (text.isEmpty())
            continue;
        ++look.filled;
        seen.insert(text);
        const NumberText number = takeApart(text);
        add(look.numbers, !number.figures.isEmpty() && number.before.size() + number.after.size() <= 12);
        add(look.signs, !number.figures.isEmpty() && (!currencyOfSign(number.before).isEmpty() || !currencyOfSign(number.after).isEmpty() ||
                                                      number.before == QLatin1String("$") || number.after == QLatin1String("$")));
        add(look.statuses, statusOfTradeWord(text).has_value());
        add(look.yesNo, yesNoOfTradeWord(text).has_value());
        add(look.currencies, !currencyOfSign(text).isEmpty());
        add(look.letters, hasLetter(text));
        look.values.push_back(text);
    }
    look.distinct = seen.size();
    if (look.filled > 0) {
        for (double* share : {&look.numbers, &look.signs, &look.statuses, &look.yesNo, &look.currencies, &look.letters})
            *share /= double(look.filled);
    }
    return look;
}

std::array<ColumnGuess, kColumnNames.size()> guessColumns(const QStringList& headers, const std::vector<ColumnLook>& looks)
{
    struct Pair {
        int score;
        int word;
        std::size_t ours;
        std::size_t theirs;
    };
    std::vector<Pair> pairs;
    for (std::size_t ours = 0; ours < kColumnNames.size(); ++ours) {
        const auto column = static_cast<Column>(ours);
        for (std::size_t theirs = 0; theirs < looks.size(); ++theirs) {
            const QString& header = headers[qsizetype(theirs)];
            const int word = headerFit(column, header);
            const int score = scoreOf(column, header, looks[theirs], word);
            if (score >= kLeast)
                pairs.push_back({score, word, ours, theirs});
        }
    }
    std::stable_sort(pairs.begin(), pairs.end(), [](const Pair& a, const Pair& b) { return a.score > b.score; });
    std::array<ColumnGuess, kColumnNames.size()> guesses;
    std::vector<bool> taken(looks.size(), false);
    for (const Pair& pair : pairs) {
        if (guesses[pair.ours].place >= 0 || taken[pair.theirs])
            continue;
        guesses[pair.ours] = {static_cast<int>(pair.theirs), pair.word > 0 ? pair.score : std::min(pair.score, kSure - 1), pair.word > 0};
        taken[pair.theirs] = true;
    }
    return guesses;
}

} // namespace rungwright
