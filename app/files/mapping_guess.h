// SPDX-License-Identifier: GPL-3.0-or-later
// Which column is which, and how the numbers in them are written.
#pragma once

#include "mapping_layout.h"

namespace rungwright
{

/// What the cells of one of their columns look like. Shares are of the cells that hold something.
struct ColumnLook {
    qsizetype filled = 0;
    qsizetype distinct = 0;
    double numbers = 0;          ///< Figures, perhaps with marks, signs and a currency beside them.
    double signs = 0;            ///< Of a currency, beside a number.
    double statuses = 0;         ///< Trade words for a status.
    double yesNo = 0;            ///< Words for yes or no.
    double currencies = 0;       ///< ISO 4217 codes or signs.
    double letters = 0;          ///< Hold a letter.
    std::vector<QString> values; ///< Trimmed, in row order, the empty ones left out.
};

ColumnLook lookAt(const SampleRecords& rows, qsizetype column);

/// One number, taken apart: "€ 1.234,50 /month" is "€", "1.234,50" and "/month". Empty `figures` when the text holds none, or words
/// between.
struct NumberText {
    QString before, figures, after;
    bool percent = false;
};
NumberText takeApart(const QString& text);

struct ColumnGuess {
    int place = -1; ///< Index of their column; -1 for none.
    int score = 0;  ///< 90 and more: sure; 55 and more: likely.
    bool byWord = false;
};

/// The best use of their columns, each for one of ours at most.
std::array<ColumnGuess, kColumnNames.size()> guessColumns(const QStringList& headers, const std::vector<ColumnLook>& looks);

struct NumbersGuess {
    NumberStyle style;
    bool ambiguous = false;   ///< Two styles read everything, and differently.
    QString example;          ///< The text that can be read in two ways.
    QStringList tellNothing;  ///< Signs that stand for more than one currency.
    QStringList unknownMarks; ///< Marks of the style that are neither a currency nor a period beside a price, nor a measure elsewhere.
    QString period;           ///< "/month", where prices are told by more than one period: the one most of them have, a mark of the style.
    QStringList otherPeriods; ///< "/week": no marks, since an amount for a week is not one for a month.
};

/// The texts beside the figures that may be taken off. Never brackets (a minus to bookkeepers) and never letters for thousands (1.5k).
void guessMarks(const std::vector<QString>& prices, const std::vector<QString>& others, NumbersGuess& guess);

/// `prices` holds the texts of prices and floors, `others` those of areas, grades and chances. Where both a decimal point and a decimal
/// comma read every text, what a price would then look like decides (at most two decimals), and the guess is called ambiguous.
NumbersGuess guessNumbers(const std::vector<QString>& prices, const std::vector<QString>& others, char delimiter);

} // namespace rungwright
