// SPDX-License-Identifier: GPL-3.0-or-later
#include "csv_lexer.h"

#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

qint64 characters(std::string_view utf8)
{
    return std::count_if(utf8.begin(), utf8.end(), [](char c) { return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U; });
}

QString delimiterName(char delimiter)
{
    switch (delimiter) {
    case ',':
        return Words::tr("a comma");
    case ';':
        return Words::tr("a semicolon");
    case '\t':
        return Words::tr("a tab");
    default:
        return Words::tr("a %1").arg(QLatin1Char(delimiter));
    }
}

// RFC 4180, section 2, point 4: spaces are part of a cell.
int noSpace(unsigned char) { return 0; }

} // namespace

CsvLexer::CsvLexer(const CsvSink& sink, char delimiter) : m_sink(sink), m_delimiter(delimiter)
{
    csv_init(&m_parser, CSV_STRICT | CSV_STRICT_FINI);
    csv_set_delim(&m_parser, static_cast<unsigned char>(delimiter));
    csv_set_space_func(&m_parser, noSpace);
    csv_set_blk_size(&m_parser, 16'384); // The default of 128 bytes would grow a long cell's buffer thousands of times.
}

CsvLexer::~CsvLexer() { csv_free(&m_parser); }

bool CsvLexer::feed(std::string_view text)
{
    if (m_heldCr && !text.empty()) {
        m_heldCr = false;
        const bool lfFollows = text.front() == '\n';
        if (!feedPart(lfFollows ? "\r\n" : "\r", true))
            return false;
        text.remove_prefix(lfFollows ? 1 : 0);
    }
    while (!text.empty()) {
        const auto end = std::find_if(text.begin(), text.end(), [](char c) { return c == '\n' || c == '\r'; });
        auto length = static_cast<std::size_t>(end - text.begin());
        if (length == text.size())
            return feedPart(text, false);
        if (text[length] == '\r' && length + 1 == text.size()) {
            m_heldCr = true;
            return length == 0 || feedPart(text.substr(0, length), false);
        }
        length += text[length] == '\r' && text[length + 1] == '\n' ? 2 : 1;
        if (!feedPart(text.substr(0, length), true))
            return false;
        text.remove_prefix(length);
    }
    return true;
}

bool CsvLexer::finish()
{
    if (m_heldCr && !feedPart("\r", true))
        return false;
    const auto onCell = [](void* text, std::size_t size, void* self) {
        static_cast<CsvLexer*>(self)->takeCell(static_cast<const char*>(text), size);
    };
    const auto onRecord = [](int, void* self) { static_cast<CsvLexer*>(self)->takeRecord(); };
    const qint64 quoteLine = openQuoteLine();
    const auto cell = static_cast<qlonglong>(m_ends.size() + 1);
    if (csv_fini(&m_parser, onCell, onRecord, this) != 0)
        return refuse(
            quoteLine, 0,
            Words::tr("the file ends inside a quoted cell: the quotation mark that opens cell %1 here is never closed. Close it, or "
                      "double it if it belongs to the text")
                .arg(cell));
    return m_trouble.isEmpty() && !m_stopped;
}

bool CsvLexer::feedPart(std::string_view part, bool lineEnds)
{
    if (m_lineFresh) {
        m_lineFresh = false;
        ++m_line;
        m_column = 0;
        m_sawText = m_cellEnded = m_recordEnded = false;
        if (!m_open)
            m_recordLine = m_line;
    }
    m_sawText = m_sawText || (part.front() != '\r' && part.front() != '\n');
    const auto onCell = [](void* text, std::size_t size, void* self) {
        static_cast<CsvLexer*>(self)->takeCell(static_cast<const char*>(text), size);
    };
    const auto onRecord = [](int, void* self) { static_cast<CsvLexer*>(self)->takeRecord(); };
    const std::size_t done = csv_parse(&m_parser, part.data(), part.size(), onCell, onRecord, this);
    if (!m_trouble.isEmpty() || m_stopped)
        return false;
    if (done < part.size())
        return refuseMalformed(part, done);
    if (m_parser.entry_pos > kLongestCell)
        return refuse(
            openQuoteLine(), 0,
            Words::tr("cell %1 is longer than 1 MB. Most likely a quotation mark opened here is never closed: close it, or double it if it "
                      "belongs to the text")
                .arg(static_cast<qlonglong>(m_ends.size() + 1)));
    m_column += characters(part);
    if (lineEnds)
        endLine();
    return true;
}

void CsvLexer::endLine()
{
    const qint64 quoteLine = openQuoteLine();
    m_open = !m_recordEnded && (m_open || m_sawText);
    if (m_open)
        m_quoteLine = quoteLine;
    m_lineFresh = true;
}

// If a cell ended on this line, or the record began on it, then what is open now was opened on it too.
qint64 CsvLexer::openQuoteLine() const
{
    if (m_lineFresh)
        return m_quoteLine;
    return m_cellEnded || m_recordLine == m_line ? m_line : m_quoteLine;
}

bool CsvLexer::refuse(qint64 line, qint64 column, const QString& why)
{
    m_trouble = why;
    m_troubleLine = line;
    m_troubleColumn = column;
    return false;
}

bool CsvLexer::refuseMalformed(std::string_view part, std::size_t done)
{
    if (csv_error(&m_parser) != CSV_EPARSE)
        return refuse(m_line, 0, Words::tr("there is not enough memory for this cell"));
    const qint64 column = m_column + characters(part.substr(0, done)) + 1;
    if (m_parser.quoted == 0)
        return refuse(
            m_line, column,
            Words::tr("a quotation mark inside a cell that does not begin with one. Put the whole cell in quotation marks and double "
                      "those inside it, or take it out"));
    return refuse(
        m_line, column,
        Words::tr("text after the quotation mark that closes a cell. Put %1 or a line end after it, or double it if it belongs to "
                  "the text")
            .arg(delimiterName(m_delimiter)));
}

void CsvLexer::takeCell(const char* text, std::size_t size)
{
    m_cellEnded = true;
    if (!m_trouble.isEmpty())
        return;
    if (size > kLongestCell || m_text.size() + size > kLongestRecord)
        refuse(m_recordLine, 0, Words::tr("the row is too long: a cell holds at most 1 MB, a row at most 8 MB. Shorten it"));
    else if (m_ends.size() == kMostCells)
        refuse(m_recordLine, 0,
               Words::tr("the row has more than %1 cells. Remove the columns that are not needed").arg(qlonglong(kMostCells)));
    if (!m_trouble.isEmpty())
        return;
    if (size > 0)
        m_text.append(text, size);
    m_ends.push_back(m_text.size());
}

void CsvLexer::takeRecord()
{
    m_recordEnded = true;
    if (!m_trouble.isEmpty() || m_stopped)
        return;
    m_cells.clear();
    std::size_t from = 0;
    for (const std::size_t end : m_ends) {
        m_cells.push_back(std::string_view(m_text).substr(from, end - from));
        from = end;
    }
    m_stopped = !m_sink(m_recordLine, m_cells);
    m_text.clear();
    m_ends.clear();
}

} // namespace rungwright
