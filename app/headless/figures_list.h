// SPDX-License-Identifier: GPL-3.0-or-later
// The figures of one ladder as commands write them, JSON and CSV alike.
#pragma once

#include "ladder/currency.h"
#include "selection.h"

#include <QByteArray>

#include <cstdint>
#include <string>
#include <variant>
#include <vector>

namespace rungwright
{

/// A figure under its key. Money is in major units. No value (monostate) = undefined.
struct NamedFigure {
    const char* group; ///< The object it stands in ("skew"), or empty. Figures of one group follow each other.
    const char* key;
    std::variant<std::monostate, std::string, std::int64_t, double> value;
};

/// All figures, in the order files have them. The chance that nothing is on offer is undefined where the model cannot tell (no load
/// can be inferred); where nothing is on offer it is 1.
std::vector<NamedFigure> namedFigures(const MeasuredLadder& measured, const Currency& currency);

/// The fewest digits (17 at most) that read back as the same double; decimal point, no grouping, whatever the locale. Finite values only.
QByteArray plainNumber(double value);

/// One object, one tier a line, ending with a newline. Equal input gives equal bytes.
QByteArray measurementsToJson(const std::vector<MeasuredLadder>& all, const Currency& currency);

/// RFC 4180, CRLF: the same figures flattened ("skew_moment"), the currency behind them. Undefined figures are empty cells. The row of
/// headings, and one ladder's row.
std::string csvHeadings(const Currency& currency);
void appendCsvRow(const MeasuredLadder& measured, const Currency& currency, std::string& out);

} // namespace rungwright
