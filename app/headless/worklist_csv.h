// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist: a row a tier, the greatest gap share first, measured by several threads.
#pragma once

#include "selection.h"

#include <QByteArray>

#include <cstddef>
#include <functional>
#include <optional>

namespace rungwright
{

/// The ladder at a place, called from several threads at once; what it points to must stay as it is until the same `thread` asks again.
/// Nothing ends everything.
using LadderAt = std::function<std::optional<ChosenLadder>(std::size_t place, unsigned thread)>;

/// Measures `ladders` ladders and writes them as CSV (csvHeadings, appendCsvRow), the greatest gap share first; equal shares keep the order
/// of places, and undefined ones come last. The same bytes for any number of threads. `measured` is told the share done, from the calling
/// thread. Nothing when `ladderAt` ended it.
std::optional<QByteArray> worklistCsv(const Currency& currency, std::size_t ladders, unsigned threads, const LadderAt& ladderAt,
                                      const std::function<void(double)>& measured);

} // namespace rungwright
