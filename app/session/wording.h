// SPDX-License-Identifier: GPL-3.0-or-later
// How figures are put into words and digits for a person: the user's locale, the trade's terms.
#pragma once

#include "gap/measure.h"
#include "ladder/currency.h"

#include <QLocale>
#include <QString>

#include <optional>
#include <span>

namespace rungwright
{

/// "69.00", "1,419.50", "12 300" as the locale writes it; no currency sign. Rounded for display only.
QString moneyText(Price price, const Currency& currency, const QLocale& locale = QLocale());
QString moneyText(double minorUnits, const Currency& currency, const QLocale& locale = QLocale());
/// With an explicit + or minus sign; zero without.
QString signedMoneyText(double minorUnits, const Currency& currency, const QLocale& locale = QLocale());
/// "42 %" for 0.42; one decimal below 10 % when `fine`.
QString percentText(double share, bool fine = false, const QLocale& locale = QLocale());
/// Two decimals, a true minus sign.
QString numberText(double value, int decimals = 2, const QLocale& locale = QLocale());
/// What stands for a figure that is undefined.
QString undefinedText();
/// The advertised floor as money, or undefinedText() when none is known.
QString floorText(Price advertisedFloor, const Currency& currency, const QLocale& locale = QLocale());

/// Reads an amount typed by the user in their locale, or plainly with a point. Nothing when it is no amount of that currency.
std::optional<Price> moneyFromText(const QString& text, const Currency& currency, const QLocale& locale = QLocale());

/// "Perceived range", "Random remainder", ... and one sentence that says what the model assumes.
QString modelName(ModelKind kind);
QString modelExplanation(ModelKind kind);
/// Why there are no odds, in one sentence.
QString oddsNoteText(OddsNote note);

/// The reading line: the gap as the largest thing on the page and where it comes from.
struct Reading {
    QString headline; ///< "Gap 29.19"
    QString share;    ///< "42 % of the floor", may be empty.
    QString sentence; ///< One or two plain sentences, fitting for every special case.
};
Reading reading(const Measurement& m, const Currency& currency, const QLocale& locale = QLocale());

/// One row of the Figures.
struct FigureRow {
    enum class Kind { money, share, number, count };
    const char* key;   ///< The key of `measure --json` ("gap", "skew.moment", ...), stable.
    const char* label; ///< Short, untranslated source text.
    Kind kind;
    int indent;                                         ///< 1 = a part of the row above it.
    std::optional<double> (*value)(const Measurement&); ///< Money in minor units.
    const char* formula;
    const char* unit;
    const char* source;
    int better; ///< -1: lower is better for the enquirer's side of the desk; +1: higher; 0: neither is claimed.
};
std::span<const FigureRow> figureRows();
QString figureText(const FigureRow& row, std::optional<double> value, const Currency& currency, const QLocale& locale = QLocale());
/// A change of a figure, with its sign; empty text for no change.
QString figureChangeText(const FigureRow& row, std::optional<double> from, std::optional<double> to, const Currency& currency,
                         const QLocale& locale = QLocale());

} // namespace rungwright
