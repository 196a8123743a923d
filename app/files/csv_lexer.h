// SPDX-License-Identifier: GPL-3.0-or-later
// libcsv, fed line by line so that the place of everything is known.
#pragma once

#include "csv_records.h"

#include <csv.h>

#include <string>
#include <vector>

namespace rungwright
{

/// Takes UTF-8 text in pieces of any size and hands whole records to the sink.
class CsvLexer
{
public:
    explicit CsvLexer(const CsvSink& sink, char delimiter = ',');
    ~CsvLexer();
    CsvLexer(const CsvLexer&) = delete;
    CsvLexer& operator=(const CsvLexer&) = delete;

    /// False when the text is refused (trouble() says why) or the sink wants no more (stopped()).
    bool feed(std::string_view text);
    /// After the last piece: hands over a last record without line end.
    bool finish();

    bool stopped() const { return m_stopped; }
    const QString& trouble() const { return m_trouble; }
    qint64 troubleLine() const { return m_troubleLine; }
    /// Character in the line, from 1; 0 when the line as a whole is meant.
    qint64 troubleColumn() const { return m_troubleColumn; }

private:
    bool feedPart(std::string_view part, bool lineEnds);
    void endLine();
    qint64 openQuoteLine() const;
    bool refuse(qint64 line, qint64 column, const QString& why);
    bool refuseMalformed(std::string_view part, std::size_t done);
    void takeCell(const char* text, std::size_t size);
    void takeRecord();

    csv_parser m_parser{};
    CsvSink m_sink;
    char m_delimiter;
    std::string m_text; ///< The record's cells, one after the other.
    std::vector<std::size_t> m_ends;
    std::vector<std::string_view> m_cells;
    qint64 m_line = 0;       ///< The physical line being fed.
    qint64 m_recordLine = 0; ///< The line the record in hand starts on.
    qint64 m_quoteLine = 0;  ///< The line of the quotation mark still open at the end of the line before.
    qint64 m_column = 0;     ///< Characters of this line fed so far.
    bool m_lineFresh = true; ///< The next piece begins a line.
    bool m_heldCr = false;   ///< A CR ended the last piece: whether LF follows is not known yet.
    bool m_open = false;     ///< A record goes on over the line end.
    bool m_sawText = false, m_cellEnded = false, m_recordEnded = false; ///< On this line.
    bool m_stopped = false;
    QString m_trouble;
    qint64 m_troubleLine = 0, m_troubleColumn = 0;
};

} // namespace rungwright
