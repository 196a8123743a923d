// SPDX-License-Identifier: GPL-3.0-or-later
// CSV as RFC 4180 has it, record by record, with the physical line each record starts on.
#pragma once

#include "text_encodings.h"

#include <QIODevice>
#include <QString>

#include <functional>
#include <optional>
#include <span>
#include <string_view>

namespace rungwright
{

/// The longest cell taken, in bytes of UTF-8. Names and notes stay far below it; a longer cell is nearly always a quotation mark
/// that is opened and never closed.
inline constexpr std::size_t kLongestCell = 1'048'576;
/// The most cells taken in one record, and the longest record in bytes.
inline constexpr std::size_t kMostCells = 1'000;
inline constexpr std::size_t kLongestRecord = 8 * kLongestCell;

/// One record: the line it starts on (from 1) and its cells, unquoted, UTF-8, spaces kept. Lines that hold nothing are no records.
/// The views are good until the call returns. Return false to read no further.
using CsvSink = std::function<bool(qint64 line, std::span<const std::string_view> cells)>;

/// How a reading ended.
struct CsvEnd {
    QString trouble;  ///< Empty, or "file:line: ..." with what is wrong and the remedy: encoding, quotes, sizes, a device that fails.
    QString encoding; ///< "UTF-8", "UTF-8 with BOM", "UTF-16LE", "UTF-16BE", or the one that was said.
    bool cancelled = false;
};

/// Reads the open device from where it stands to its end, in pieces. Comma, CR LF or LF or CR, quotes doubled, line ends inside quotes
/// kept. Strict: a quotation mark inside an unquoted cell, text after a closing one and an end inside quotes are refused with line and
/// column. `progress` gets the share done after each piece and cancels by returning false.
CsvEnd readCsv(QIODevice& device, const QString& fileName, const CsvSink& sink, const std::function<bool(double)>& progress = {});

/// How the text is written, where it is not ours: an encoding said beforehand (else told by the byte-order mark), another delimiter.
struct CsvLayout {
    std::optional<TextEncoding> encoding;
    char delimiter = ',';
};
CsvEnd readCsv(QIODevice& device, const QString& fileName, const CsvLayout& layout, const CsvSink& sink,
               const std::function<bool(double)>& progress = {});

} // namespace rungwright
