// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_header.h"

#include "cell_values.h"

#include <algorithm>

namespace rungwright
{

bool isEmptyRecord(std::span<const std::string_view> cells)
{
    return std::all_of(cells.begin(), cells.end(), [](std::string_view cell) { return trimmedText(cell).empty(); });
}

QStringList cellTexts(std::span<const std::string_view> cells)
{
    QStringList texts;
    texts.reserve(qsizetype(cells.size()));
    for (const std::string_view cell : cells)
        texts << QString::fromUtf8(cell.data(), qsizetype(cell.size()));
    return texts;
}

HeaderGate::Place HeaderGate::pass(std::span<const std::string_view> cells)
{
    ++m_record;
    if (m_record > m_last)
        return Place::row;
    if (m_record < m_first)
        return Place::above;
    if (m_record < m_last) {
        m_upper = cellTexts(cells);
        return Place::header;
    }
    m_headers = m_first == m_last ? joinedHeaders(cellTexts(cells)) : joinedHeaders(m_upper, cellTexts(cells));
    return Place::headerEnds;
}

} // namespace rungwright
