// SPDX-License-Identifier: GPL-3.0-or-later
// What a mapping makes of the first rows of a list, for a form that shows it while it is being changed.
#pragma once

#include "mapping_propose.h"

namespace rungwright
{

/// One of our columns in one row.
struct PreviewCell {
    QString text;    ///< As understood, in our spelling ("1234.50", "vacant"); empty when the source is absent or the cell is.
    QString trouble; ///< Empty, or what is wrong, found and wanted.
};

struct PreviewRow {
    qint64 line = 0;         ///< Physical line of the file, from 1.
    QStringList raw;         ///< Their cells.
    bool passedOver = false; ///< By one of the mapping's rules; `cells` is empty texts then.
    std::array<PreviewCell, kColumnNames.size()> cells;
    QString trouble; ///< Of the row as a whole: too many or too few cells.
};

struct MappingPreview {
    QString
        trouble; ///< Empty, or why nothing can be shown: bytes that are not in the encoding, no header row, quotes. Rows before it stand.
    QStringList headers;            ///< Theirs, joined when there are two header lines. As many as the header row has cells.
    std::vector<QStringList> above; ///< Records above the header and the header's own lines, raw: for choosing the header row.
    std::vector<PreviewRow> rows;   ///< At most as many as asked for.
    /// Of every row in the sample, not only of those shown:
    qint64 rowsSeen = 0;
    qint64 rowsInTrouble = 0; ///< Cells only: duplicates and floors that clash are found when the whole list is read.
    qint64 rowsPassedOver = 0;
    std::array<qint64, kColumnNames.size()> troubles{}; ///< Cells in trouble by column of ours.
    QStringList missingColumns;                         ///< Columns that the mapping names and the header row does not have.
};

/// Works with an incomplete mapping too: a column without source is shown empty.
MappingPreview previewMapping(const ListSample& sample, const ImportMapping& mapping, int rows = 50);

struct DistinctValue {
    QString text; ///< Trimmed.
    qint64 count = 0;
};

/// The different texts of one of their columns, the most frequent first (then in order of first appearance), at most `limit` of them;
/// rows that the mapping passes over are left out. Of the mapping only the layout (encoding, delimiter, header) and those rules count. When
/// the file cannot be read to its end (wrong encoding, quotes), what was seen before.
std::vector<DistinctValue> distinctValues(const ListSample& sample, const ImportMapping& mapping, const TheirColumn& column, int limit);
/// The same over a whole file, in bounded memory: beyond `limit` different texts no new one is kept.
std::vector<DistinctValue> distinctValuesOf(const QString& path, const ImportMapping& mapping, const TheirColumn& column, int limit);

} // namespace rungwright
