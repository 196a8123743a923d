// SPDX-License-Identifier: GPL-3.0-or-later
// A first guess at the mapping of a list nobody has described yet.
#pragma once

#include "mapping.h"
#include "outcome.h"

#include <QByteArray>

namespace rungwright
{

/// The beginning of a file, enough to look at, and its end, where totals stand.
struct ListSample {
    QByteArray bytes;
    bool whole = true;    ///< False when the file goes on.
    QByteArray tail = {}; ///< Unless whole, the last bytes; the first record in it is torn. Only lines that are no units are looked for.
};

inline constexpr qint64 kSampleBytes = 65'536;
inline constexpr qint64 kTailBytes = 8'192;
/// The first kSampleBytes of the file, and its last kTailBytes. From a pipe everything is read, since it cannot be read twice (refused
/// beyond 256 MB).
Outcome<ListSample> takeSample(const QString& path, qint64 most = kSampleBytes);

enum class Confidence : unsigned char { none, guess, likely, sure };

/// Why one of our columns got its source.
struct ColumnNote {
    Confidence confidence = Confidence::none;
    QString note; ///< "the header 'Miete' is a trade word for it", "nothing seems to hold it". May be empty.
};

struct MappingProposal {
    ImportMapping mapping;
    std::array<ColumnNote, kColumnNames.size()> columns; ///< In the order of kColumnNames.
    QStringList headers;                                 ///< Theirs, in file order.
    QStringList notes; ///< What the user should look at: an encoding that is a guess, numbers that can be read in two ways, status words
                       ///< that were not understood, rows passed over.
    bool numbersAmbiguous = false; ///< The sample does not tell whether 1.234 (or 1,234) has decimals or groups; the mapping holds one of
                                   ///< the two, and a note says so.
};

/// Detects encoding, delimiter, header row, columns (trade words in English, German, French, Spanish, Italian, Dutch and Portuguese, and
/// the values seen), status words, number style and total lines. Never fails: what was not found stays absent, with a note. The result
/// need not pass mappingTrouble(); the user completes it.
MappingProposal proposeMapping(const ListSample& sample);

/// The same for what depends on the layout the user has fixed by hand: encoding, delimiter, header row and header lines are taken from
/// `layout`, everything else is proposed anew. For a form in which the delimiter is changed.
MappingProposal proposeColumns(const ListSample& sample, const ImportMapping& layout);

} // namespace rungwright
