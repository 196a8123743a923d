// SPDX-License-Identifier: GPL-3.0-or-later
// How somebody else's list is read as a unit list: which of their columns is which of ours, and how they write things.
#pragma once

#include "text_encodings.h"
#include "unit_list_header.h"

#include "ladder/unit.h"

#include <QString>
#include <QStringList>

#include <array>
#include <vector>

namespace rungwright
{

/// A column of theirs, by the text of its header (trimmed) and which of the columns with that text it is, from 1.
struct TheirColumn {
    QString header;
    int occurrence = 1;

    bool operator==(const TheirColumn&) const = default;
};

/// Where one of our columns comes from.
struct ColumnSource {
    enum class Kind : unsigned char { absent, column, constant };
    Kind kind = Kind::absent;
    TheirColumn column; ///< For Kind::column.
    QString constant;   ///< For Kind::constant: the value in OUR spelling ("vacant", "69.00", "EUR", "yes"), the same for every row.

    static ColumnSource of(const QString& header, int occurrence = 1) { return {Kind::column, {header, occurrence}, {}}; }
    static ColumnSource always(const QString& value) { return {Kind::constant, {}, value}; }
    bool operator==(const ColumnSource&) const = default;
};

/// A text that may stand before or after a number and is taken off: a currency sign or code, "m²", "/month".
struct NumberMark {
    QString text;
    QString currency; ///< ISO 4217 code the mark stands for, or empty: then it tells nothing.

    bool operator==(const NumberMark&) const = default;
};

enum class DecimalMark : unsigned char { point, comma };
/// `space` takes a space, a no-break, a narrow no-break and a thin space; `apostrophe` takes ' and U+2019. Groups have three figures.
enum class Grouping : unsigned char { none, comma, point, space, apostrophe };

/// How they write numbers: prices, floors, areas, grades and chances alike.
struct NumberStyle {
    DecimalMark decimal = DecimalMark::point;
    Grouping grouping = Grouping::none;
    std::vector<NumberMark> marks;
    /// A vacancy chance without a sign is a percentage (25 = 0.25). One with a percent sign always is.
    bool chanceInPercent = false;

    bool operator==(const NumberStyle&) const = default;
};

/// A word of theirs for a status. Compared trimmed and in any case of letters; the empty word stands for an empty cell.
struct StatusWord {
    QString word;
    Status status = Status::vacant;

    bool operator==(const StatusWord&) const = default;
};

/// Rows that are no units (totals, footers): passed over, counted, and reported, never silently.
struct SkipRule {
    enum class Kind : unsigned char { isEmpty, beginsWith };
    Kind kind = Kind::isEmpty;
    TheirColumn column;
    QString text; ///< For Kind::beginsWith: the beginning, whole words, in any case of letters. Not empty.

    bool operator==(const SkipRule&) const = default;
};

/// Everything needed to read a list of one layout. Holds no path. Default: our own format.
struct ImportMapping {
    TextEncoding encoding = TextEncoding::utf8; ///< A byte-order mark that fits is passed over; one that contradicts it is refused.
    char delimiter = ',';                       ///< One of kDelimiters.
    int headerRow = 1;   ///< Record the header (its first line) stands in, from 1; lines that hold nothing are not counted.
    int headerLines = 1; ///< 1 or 2. Two lines are joined: "Rent" over "net" is the header "Rent net". See joinedHeaders().
    std::array<ColumnSource, kColumnNames.size()> sources;
    NumberStyle numbers;
    std::vector<StatusWord> statuses;
    QStringList yesWords, noWords; ///< For `locked`, in any case of letters; an empty cell is no.
    std::vector<SkipRule> skip;
    /// The floors come from a second file, given beside the list (columns site, tier, advertised_floor): the source of advertised_floor
    /// is then absent.
    bool floorsFromFile = false;
    /// Tiers without a floor are taken: their advertisedFloor is 0, "no floor known".
    bool floorsMayBeMissing = false;
    /// All header texts of the file the mapping was made for, in file order: what it is known by when such a file comes back.
    QStringList headers;

    ColumnSource& from(Column column) { return sources[static_cast<std::size_t>(column)]; }
    const ColumnSource& from(Column column) const { return sources[static_cast<std::size_t>(column)]; }
    bool operator==(const ImportMapping&) const = default;
};

inline constexpr std::array kDelimiters{',', ';', '\t', '|'};

/// The mapping that reads our own format: every column of ours from the column of that name; status, yes and no in our words.
ImportMapping ownFormatMapping();

/// What keeps the mapping from being used, in words fit to show; empty when nothing does. Looks at the mapping alone: a needed column
/// without a source, a constant that is no value, one mark for decimals and groups, a word that stands for two statuses.
QString mappingTrouble(const ImportMapping& mapping);

/// Header texts, trimmed, line ends in them made spaces. With two lines, the upper text and the lower with a space between; where the
/// upper cell is empty the last text to its left counts for it (a merged cell).
QStringList joinedHeaders(const QStringList& upper, const QStringList& lower = {});

} // namespace rungwright
