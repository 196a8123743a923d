// SPDX-License-Identifier: GPL-3.0-or-later
// Where the cells and the header of an unknown list are.
#pragma once

#include "mapping_propose.h"

namespace rungwright
{

/// The records of a sample, as texts.
using SampleRecords = std::vector<QStringList>;

/// What can be read of the sample in this layout, the first `most` records.
SampleRecords sampleRecords(const ListSample& sample, TextEncoding encoding, char delimiter, std::size_t most);

/// The delimiter that gives most records the same number of cells, and a header that holds trade words.
char guessDelimiter(const ListSample& sample, TextEncoding encoding);

struct HeaderGuess {
    int row = 1; ///< From 1.
    int lines = 1;
    int fits = 0; ///< How many of our columns its words speak for.
};

/// Among the first records: the one with most trade words for different columns, and whether the one below or above belongs to it (no
/// figures, no status word, as many cells).
HeaderGuess guessHeader(const SampleRecords& records);

/// A cell that might be data: it holds a figure other than that of "m2", or is a status word.
bool looksLikeData(const QString& cell);

} // namespace rungwright
