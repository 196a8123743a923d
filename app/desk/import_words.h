// SPDX-License-Identifier: GPL-3.0-or-later
// How the parts of a mapping are put into words for the form, and read back from it.
#pragma once

#include "mapping_preview.h"

#include <QString>
#include <QStringList>

#include <optional>

namespace rungwright
{

/// What our columns are called on screen.
QString columnTitle(Column column);
/// The text with the names our columns have in files put as they are on screen: "'asking_price' has no source" becomes "“Asking price”
/// ...".
QString onScreen(QString text);
/// Where in `headers` a column of theirs stands; -1 when it is not there.
qsizetype placeOf(const QStringList& headers, const TheirColumn& column);
/// The column at a place, with which of the same name it is.
TheirColumn columnAt(const QStringList& headers, qsizetype place);
/// "Miete", "Miete (2nd of that name)", "column 7, without a header".
QString headerText(const QStringList& headers, qsizetype place);

/// "€ = EUR; /month".
QString marksText(const std::vector<NumberMark>& marks);
std::vector<NumberMark> marksFromText(const QString& text);
/// Apart by commas.
QStringList wordsFromText(const QString& text);

/// "412 of 415 rows understood, 3 would be refused."; the first trouble in words behind it.
QString understoodText(const MappingPreview& preview, bool whole);
/// The first trouble of the rows shown: "Line 17, asking price: ...". Empty when there is none.
QString firstTrouble(const MappingPreview& preview);

} // namespace rungwright
