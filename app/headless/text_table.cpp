// SPDX-License-Identifier: GPL-3.0-or-later
#include "text_table.h"

#include <algorithm>
#include <array>

namespace rungwright
{

namespace
{

struct Block {
    char32_t first;
    char32_t last;
};

constexpr std::array kWide{
    Block{0x1100, 0x115F},   Block{0x2E80, 0x303E},   Block{0x3041, 0xA4CF},   Block{0xA960, 0xA97C}, Block{0xAC00, 0xD7A3},
    Block{0xF900, 0xFAFF},   Block{0xFE30, 0xFE6F},   Block{0xFF00, 0xFF60},   Block{0xFFE0, 0xFFE6}, Block{0x1F300, 0x1F64F},
    Block{0x1F680, 0x1F6FF}, Block{0x1F900, 0x1FAFF}, Block{0x20000, 0x3FFFD},
};

int cellsOf(char32_t c)
{
    switch (QChar::category(c)) {
    case QChar::Mark_NonSpacing:
    case QChar::Mark_Enclosing:
    case QChar::Other_Format:
        return 0;
    default:
        break;
    }
    return std::any_of(kWide.begin(), kWide.end(), [c](const Block& block) { return c >= block.first && c <= block.last; }) ? 2 : 1;
}

QString cutAtEnd(const QString& text)
{
    if (cellWidth(text) <= kLongestName)
        return text;
    QString kept;
    int width = 0;
    for (const char32_t c : text.toUcs4()) {
        width += cellsOf(c);
        if (width > kLongestName - 1)
            break;
        kept += QString::fromUcs4(&c, 1);
    }
    return kept + QChar(0x2026);
}

} // namespace

QString oneLine(const QString& text)
{
    QString plain = text;
    for (QChar& c : plain) {
        if (c.category() == QChar::Other_Control)
            c = QLatin1Char(' ');
    }
    return plain;
}

int cellWidth(const QString& text)
{
    int width = 0;
    for (const char32_t c : text.toUcs4())
        width += cellsOf(c);
    return width;
}

TextTable::TextTable(const QStringList& heading, std::vector<int> toTheLeft) : m_toTheLeft(std::move(toTheLeft)) { add(heading); }

void TextTable::add(const QStringList& row)
{
    QStringList cells;
    for (const QString& cell : row)
        cells += cutAtEnd(oneLine(cell));
    m_rows.push_back(cells);
}

QString TextTable::text() const
{
    std::vector<int> widths(std::size_t(m_rows.front().size()), 0);
    for (const QStringList& row : m_rows) {
        for (qsizetype column = 0; column < row.size(); ++column)
            widths[std::size_t(column)] = std::max(widths[std::size_t(column)], cellWidth(row[column]));
    }
    QString text;
    for (const QStringList& row : m_rows) {
        QString line;
        for (qsizetype column = 0; column < row.size(); ++column) {
            const bool left = std::find(m_toTheLeft.begin(), m_toTheLeft.end(), int(column)) != m_toTheLeft.end();
            const QString pad(widths[std::size_t(column)] - cellWidth(row[column]), QLatin1Char(' '));
            line += (column > 0 ? QStringLiteral("  ") : QString()) + (left ? row[column] + pad : pad + row[column]);
        }
        while (line.endsWith(QLatin1Char(' ')))
            line.chop(1);
        text += line + QLatin1Char('\n');
    }
    return text;
}

} // namespace rungwright
