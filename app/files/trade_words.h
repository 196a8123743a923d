// SPDX-License-Identifier: GPL-3.0-or-later
// What people who let things call their columns and their statuses, in seven languages. Common practice, no source.
#pragma once

#include "unit_list_header.h"

#include "ladder/unit.h"

#include <QString>
#include <QStringList>

#include <optional>

namespace rungwright
{

/// Small letters and figures only, words with one space between, accents gone: "Größe (m²)" is "grosse m2".
QString plainWords(const QString& text);

/// How well a header fits one of our columns: 0 for not at all, about 50 for a word inside a compound, 70 for a word among others, 100 and
/// more when it is just that word.
int headerFit(Column column, const QString& header);
/// Does the header say that the area is not in square metres?
bool saysOtherArea(const QString& header);

std::optional<Status> statusOfTradeWord(const QString& word);
/// For a header such as "Let" over yes and no: the status that yes stands for (occupied or vacant).
std::optional<Status> statusOfYes(const QString& header);
std::optional<bool> yesNoOfTradeWord(const QString& word);

/// "Total", "Summe": the beginning of a line that is no unit. The word as it stands in the text, or empty.
QString totalWordAtBeginning(const QString& text);

/// The ISO 4217 code of a sign or code that stands for one currency only, else empty ("$", "kr" stand for many).
QString currencyOfSign(const QString& sign);

} // namespace rungwright
