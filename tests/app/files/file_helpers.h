// SPDX-License-Identifier: GPL-3.0-or-later
// Small things several tests of this room need.
#pragma once

#include "csv_lexer.h"
#include "csv_records.h"
#include "scenario.h"
#include "unit_list.h"

#include <QBuffer>
#include <QByteArray>

#include <random>
#include <string>
#include <vector>

namespace rungwright::tests
{

/// Records as they were read.
struct Records {
    std::vector<std::vector<std::string>> rows;
    std::vector<qint64> lines;
    QString trouble;
    QString encoding;
};

inline Records readRecords(const QByteArray& bytes)
{
    Records records;
    QBuffer buffer;
    buffer.setData(bytes);
    buffer.open(QIODevice::ReadOnly);
    const CsvEnd end = readCsv(buffer, QStringLiteral("F"), [&records](qint64 line, std::span<const std::string_view> cells) {
        records.rows.emplace_back(cells.begin(), cells.end());
        records.lines.push_back(line);
        return true;
    });
    records.trouble = end.trouble;
    records.encoding = end.encoding;
    return records;
}

/// The same text fed in pieces of `size` bytes.
inline Records lexInPieces(std::string_view text, std::size_t size)
{
    Records records;
    CsvLexer lexer([&records](qint64 line, std::span<const std::string_view> cells) {
        records.rows.emplace_back(cells.begin(), cells.end());
        records.lines.push_back(line);
        return true;
    });
    bool fine = true;
    for (std::size_t at = 0; at < text.size() && fine; at += size)
        fine = lexer.feed(text.substr(at, size));
    if (fine)
        lexer.finish();
    records.trouble = lexer.trouble();
    return records;
}

inline const QByteArray kNeededHeader = "site,tier,unit,asking_price,status,advertised_floor";

/// A list with the needed columns, from rows without line ends.
inline QByteArray unitList(std::initializer_list<QByteArray> rows)
{
    QByteArray out = kNeededHeader + '\n';
    for (const QByteArray& row : rows)
        out += row + '\n';
    return out;
}

inline UnitListResult readList(const QByteArray& bytes, bool withoutBadRows = false, const QString& currency = {})
{
    return readUnitList(bytes, QStringLiteral("F"), {currency, withoutBadRows});
}

/// Whole numbers from a fixed seed, the same everywhere (the standard fixes the engine, not its distributions).
class Dice
{
public:
    explicit Dice(unsigned seed) : m_engine(seed) {}
    int whole(int least, int greatest) { return least + static_cast<int>(m_engine() % static_cast<unsigned>(greatest - least + 1)); }
    bool coin() { return whole(0, 1) == 1; }

private:
    std::mt19937 m_engine;
};

/// A text of up to `most` characters out of several scripts and of everything that files like to trip over.
inline std::string oddText(Dice& dice, int most)
{
    static const std::vector<std::string> pool{"a",    "Z",    "0",  " ",  ",",  ";",  "\"", "'",           "\\",     "/",
                                               "\n",   "\r",   "\t", "=",  "+",  "-",  "@",  "%1",          "é",      "ß",
                                               "م",    "خ",    "ש",  "倉", "庫", "あ", "📦",  "👩‍👧", "\u2028", "\u00a0",
                                               "\x01", "\x7f", "{",  "}",  "[",  "]",  ":",  "\u200f",      "\uffff"};
    std::string out;
    for (int i = dice.whole(1, most); i > 0; --i)
        out += pool[static_cast<std::size_t>(dice.whole(0, static_cast<int>(pool.size()) - 1))];
    return out;
}

} // namespace rungwright::tests
