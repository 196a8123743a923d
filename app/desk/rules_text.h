// SPDX-License-Identifier: GPL-3.0-or-later
// Price rules as a person types and reads them.
#pragma once

#include "ladder/currency.h"
#include "outcome.h"

#include <QLocale>
#include <QString>

#include <optional>
#include <vector>

namespace rungwright
{

// Readers of one field each: what was typed, nothing for an empty field, or what is wrong with it in words.

/// An amount above zero, as the locale writes it or plainly with a point.
Outcome<std::optional<Price>> readAmount(const QString& text, const Currency& currency, const QLocale& locale = QLocale());
/// A percentage above zero, with or without its sign.
Outcome<std::optional<double>> readPercent(const QString& text, const QLocale& locale = QLocale());
/// Endings, each at least zero and below the step: sorted, repeats left out. Set apart by semicolons or blanks; where the locale's decimal
/// sign is a point, by commas too. ".95" is 0.95. `step` empty: none was typed, and endings have nothing to stand on.
Outcome<std::vector<Price>> readEndings(const QString& text, std::optional<Price> step, const Currency& currency,
                                        const QLocale& locale = QLocale());

/// What readEndings reads: ".00, .50, .95" or "0,00; 0,50; 0,95".
QString endingsText(const std::vector<Price>& endings, const Currency& currency, const QLocale& locale = QLocale());
/// "12.5", as short as it can be said.
QString percentFieldText(double percent, const QLocale& locale = QLocale());

} // namespace rungwright
