// SPDX-License-Identifier: GPL-3.0-or-later
// Copying from tables: tab-separated text as a spreadsheet takes it.
#pragma once

#include <QString>

class QTableView;

namespace rungwright
{

// Roles that the desk's table models share for sorting and copying.

/// The bare value: a number, or a QString for a text. Invalid = undefined. Serves sorting, and tells a copy what is a text and is to be
/// guarded; of models without this role, signed figures are taken for numbers.
inline constexpr int kValueRole = Qt::UserRole + 100;
/// What a copy takes when it is not what is shown.
inline constexpr int kCopyRole = Qt::UserRole + 101;

enum class CopyPart { selection, everything };

/// Rows and columns in the order shown, hidden ones left out, with headings when more than one cell is copied. Cells that hold a tab, a
/// line end or a quotation mark are quoted; texts that a spreadsheet would take for a formula get a leading apostrophe. Of a selection with
/// holes the bounding rows and columns are taken and what is not selected stays empty. Without a selection the result is empty.
QString copiedText(const QTableView& view, CopyPart part);

/// Puts copiedText() on the clipboard; an empty text leaves the clipboard alone. Returns the number of rows copied, headings not counted.
int copyTable(const QTableView& view, CopyPart part);

/// Ctrl+C in the table copies its selection, and its context menu offers "Copy" and "Copy all".
void makeCopyable(QTableView& view);

} // namespace rungwright
