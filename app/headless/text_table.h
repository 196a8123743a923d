// SPDX-License-Identifier: GPL-3.0-or-later
// Columns of text for a terminal.
#pragma once

#include <QString>
#include <QStringList>

#include <vector>

namespace rungwright
{

/// How many terminal cells a text takes: wide East Asian characters and emoji two, combining marks none.
/// Unicode Standard Annex 11 (East Asian Width), its wide blocks; a terminal may differ on single characters.
int cellWidth(const QString& text);

/// On one line, and nothing in it that a terminal would obey: a name from a file may hold anything.
QString oneLine(const QString& text);

/// Rows of equal length under a heading; the columns named in `toTheLeft` start at the left, the others end at the right.
/// Two blanks between columns, none at line ends. Names longer than kLongestName cells are cut at their end.
inline constexpr int kLongestName = 40;

class TextTable
{
public:
    TextTable(const QStringList& heading, std::vector<int> toTheLeft);
    void add(const QStringList& row);
    QString text() const;

private:
    std::vector<QStringList> m_rows; ///< The heading first.
    std::vector<int> m_toTheLeft;
};

} // namespace rungwright
