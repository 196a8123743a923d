// SPDX-License-Identifier: GPL-3.0-or-later
// One piece of a unit list, read fast.
#pragma once

#include "unit_columns.h"
#include "unit_list_header.h"

#include <span>
#include <string_view>
#include <unordered_map>
#include <vector>

namespace rungwright
{

bool isBlankRow(std::span<const std::string_view> cells);

/// Reads pieces of a list whose header and currency are known. One for each thread.
class PlainRows
{
public:
    PlainRows(const UnitListHeader& header, const Currency& currency, KeepUnits keep);

    /// Whether the first record that is not blank is the header row.
    enum class Begins : unsigned char { withHeader, withRow };
    /// Reads whole records into `part`, whose views point into the text. False at the first thing that is not plainly fine; the careful
    /// reader then has to say what it is. kPadding zeros follow `end`; the text is written to.
    bool read(char* begin, char* end, Begins begins, UnitPart& part);

private:
    bool take(std::span<const std::string_view> cells, UnitPart& part);
    bool takeValues(std::span<const std::string_view> cells, UnitPart& part);
    bool tierOf(TierKey key, std::string_view floor, UnitPart& part);
    std::string_view cell(std::span<const std::string_view> cells, Column column) const;

    UnitListHeader m_header;
    Currency m_currency;
    KeepUnits m_keep;
    std::vector<std::string_view> m_cells;
    std::unordered_map<TierKey, std::uint16_t, TierKeyHash> m_byKey; ///< Of the part.
    std::uint16_t m_lastTier = 0;
    std::size_t m_rowsBefore = 0; ///< Of the part before: about as many will come again.
};

} // namespace rungwright
