// SPDX-License-Identifier: GPL-3.0-or-later
#include "plain_rows.h"

#include "csv_records.h"
#include "plain_cells.h"
#include "plain_csv.h"

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

bool plainStatus(std::string_view text, Status& out)
{
    for (const Status status : {Status::vacant, Status::occupied, Status::reserved, Status::closed}) {
        if (text == statusWord(status)) {
            out = status;
            return true;
        }
    }
    return !readStatus(text, out);
}

/// Puts a value into a column that stays empty until the first one comes.
template <class T>
void putOptional(std::vector<T>& column, std::size_t row, T value, T none)
{
    column.resize(row, none);
    column.push_back(value);
}

} // namespace

bool isBlankRow(std::span<const std::string_view> cells)
{
    return std::all_of(cells.begin(), cells.end(), [](std::string_view cell) { return plainTrimmed(cell).empty(); });
}

PlainRows::PlainRows(const UnitListHeader& header, const Currency& currency, KeepUnits keep) :
    m_header(header), m_currency(currency), m_keep(keep)
{
}

bool PlainRows::read(char* begin, char* end, Begins begins, UnitPart& part)
{
    part = {};
    const std::size_t room = m_rowsBefore + m_rowsBefore / 32;
    part.tier.reserve(room);
    part.asking.reserve(room);
    part.hashLow.reserve(room);
    part.hashHigh.reserve(room);
    part.state.reserve(room);

    m_byKey.clear();
    if (!isPlainUtf8({begin, static_cast<std::size_t>(end - begin)}))
        return false;
    bool headerAhead = begins == Begins::withHeader;
    const bool fine = plainRecords(begin, end, kMostCells, m_cells, [&](std::span<const std::string_view> cells) {
        if (!headerAhead)
            return take(cells, part);
        headerAhead = isBlankRow(cells);
        return true;
    });
    m_rowsBefore = part.rows();
    return fine;
}

bool PlainRows::take(std::span<const std::string_view> cells, UnitPart& part)
{
    if (cells.size() != m_header.cells)
        return isBlankRow(cells);
    const TierKey key{cell(cells, Column::site), cell(cells, Column::tier)};
    const std::string_view name = cell(cells, Column::unit);
    if (key.site.empty() || key.name.empty() || name.empty())
        return isBlankRow(cells);
    std::uint32_t asking = 0;
    if (!plainPrice(cell(cells, Column::askingPrice), m_currency.decimals, asking) ||
        !tierOf(key, cell(cells, Column::advertisedFloor), part) || !takeValues(cells, part))
        return false;
    part.asking.push_back(asking);
    part.tier.push_back(m_lastTier);
    const std::uint64_t hash = std::hash<std::string_view>()(name);
    part.hashLow.push_back(static_cast<std::uint32_t>(hash));
    part.hashHigh.push_back(static_cast<std::uint16_t>(hash >> 32));
    if (m_keep == KeepUnits::whole) {
        part.names.append(name);
        part.nameEnds.push_back(static_cast<std::uint32_t>(part.names.size()));
    }
    return true;
}

bool PlainRows::takeValues(std::span<const std::string_view> cells, UnitPart& part)
{
    const std::size_t row = part.rows();
    Status status = Status::vacant;
    if (!plainStatus(cell(cells, Column::status), status))
        return false;
    auto state = static_cast<std::uint8_t>(status);
    if (const auto text = cell(cells, Column::currency); !text.empty() && text != m_currency.code) {
        Currency currency;
        if (readCurrency(text, currency) || currency.code != m_currency.code)
            return false;
    }
    if (const auto text = cell(cells, Column::grade); !text.empty()) {
        int grade = 0;
        if (readGrade(text, grade) || grade <= UnitPart::kNoGrade || grade > std::numeric_limits<std::int8_t>::max())
            return false;
        putOptional(part.grade, row, static_cast<std::int8_t>(grade), UnitPart::kNoGrade);
    } else if (!part.grade.empty()) {
        part.grade.push_back(UnitPart::kNoGrade);
    }
    if (const auto text = cell(cells, Column::area); !text.empty()) {
        double area = 0;
        if ((!plainNumber(text, area) || !(area > 0)) && readArea(text, area))
            return false;
        if (m_keep == KeepUnits::whole)
            putOptional(part.area, row, area, std::nan(""));
    } else if (!part.area.empty()) {
        part.area.push_back(std::nan(""));
    }
    if (const auto text = cell(cells, Column::vacancyChance); !text.empty()) {
        double chance = 0;
        if ((!plainNumber(text, chance) || !(chance <= 1)) && readChance(text, chance))
            return false;
        putOptional(part.chance, row, chance, std::nan(""));
    } else if (!part.chance.empty()) {
        part.chance.push_back(std::nan(""));
    }
    if (const auto text = cell(cells, Column::locked); !text.empty()) {
        bool locked = false;
        if (readYesNo(text, locked))
            return false;
        if (locked)
            state |= UnitPart::kLocked;
    }
    part.state.push_back(state);
    return true;
}

bool PlainRows::tierOf(TierKey key, std::string_view floorText, UnitPart& part)
{
    std::uint32_t floor = 0;
    if (!floorText.empty() && !plainPrice(floorText, m_currency.decimals, floor))
        return false;
    const auto isLast = [&] { return part.tiers[m_lastTier].name == key.name && part.tiers[m_lastTier].site == key.site; };
    if (part.tiers.empty() || !isLast()) {
        const auto [place, fresh] = m_byKey.try_emplace(key, static_cast<std::uint16_t>(part.tiers.size()));
        m_lastTier = place->second;
        if (fresh && part.tiers.size() == UnitPart::kMostTiers)
            return false;
        if (fresh)
            part.tiers.push_back({key.site, key.name, 0, 0});
    }
    UnitPart::PartTier& tier = part.tiers[m_lastTier];
    if (floor != 0 && tier.floor != 0 && floor != tier.floor)
        return false;
    tier.floor = std::max(tier.floor, floor);
    ++tier.units;
    return true;
}

std::string_view PlainRows::cell(std::span<const std::string_view> cells, Column column) const
{
    const int place = m_header.at(column);
    return place < 0 ? std::string_view() : plainTrimmed(cells[static_cast<std::size_t>(place)]);
}

} // namespace rungwright
