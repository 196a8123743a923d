// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist: a row a tier, the greatest gap share first, measured by several threads.
#pragma once

#include "selection.h"
#include "whole_file.h"

#include <cstddef>
#include <deque>
#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace rungwright
{

/// The ladder at a place, called from several threads at once; what it points to must stay as it is until the same `thread` asks again.
/// Nothing ends everything.
using LadderAt = std::function<std::optional<ChosenLadder>(std::size_t place, unsigned thread)>;

/// A worklist as CSV (csvHeadings, appendCsvRow), the greatest gap share first; equal shares keep the order of places, and undefined ones
/// come last. The same bytes for any number of threads.
class WorklistCsv
{
public:
    /// Measures `ladders` ladders. `measured` is told the share done, from the calling thread. Nothing when `ladderAt` ended it.
    static std::optional<WorklistCsv> of(const Currency& currency, std::size_t ladders, unsigned threads, const LadderAt& ladderAt,
                                         const std::function<void(double)>& measured);

    /// The bytes from the first on, while the worklist is there.
    NextPiece pieces() const;

private:
    WorklistCsv() = default;

    std::string m_headings;
    std::vector<std::deque<std::string>> m_texts; ///< Of each thread; what the rows point into.
    std::vector<std::string_view> m_rows;
};

} // namespace rungwright
