// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_columns.h"

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

/// Appends `count` entries of a column that may be empty for all rows of the part, of the block, or of both.
template <class T>
void appendOptional(std::vector<T>& block, std::size_t blockRows, const std::vector<T>& part, std::size_t from, std::size_t count, T none,
                    std::size_t room)
{
    if (part.empty() && block.empty())
        return;
    block.reserve(room);
    block.resize(blockRows, none);
    if (part.empty())
        block.resize(blockRows + count, none);
    else
        block.insert(block.end(), part.begin() + static_cast<std::ptrdiff_t>(from),
                     part.begin() + static_cast<std::ptrdiff_t>(from + count));
}

template <class T>
void append(std::vector<T>& block, const std::vector<T>& part, std::size_t from, std::size_t count, std::size_t room)
{
    block.reserve(room);
    block.insert(block.end(), part.begin() + static_cast<std::ptrdiff_t>(from), part.begin() + static_cast<std::ptrdiff_t>(from + count));
}

} // namespace

void UnitPart::clear()
{
    tiers.clear();
    tier.clear();
    asking.clear();
    nameHash.clear();
    state.clear();
    grade.clear();
    area.clear();
    chance.clear();
    names.clear();
    nameEnds.clear();
}

bool UnitColumns::append(UnitPart& part)
{
    // Row numbers are 32 bits wide; a larger list takes the careful way.
    if (part.rows() >= std::numeric_limits<std::uint32_t>::max() - m_rows || !appendTiers(part))
        return false;
    if (part.nameEnds.empty()) {
        appendRows(part, {});
    } else {
        m_names.push_back(part.names);
        appendRows(part, m_names.back());
    }
    return true;
}

bool UnitColumns::appendTiers(const UnitPart& part)
{
    m_ofPart.clear();
    for (const UnitPart::PartTier& tier : part.tiers) {
        std::uint32_t place = 0;
        if (const auto known = m_byKey.find({tier.site, tier.name}); known != m_byKey.end()) {
            place = known->second;
            HeldTier& held = m_tiers[place];
            if (held.floor != 0 && tier.floor != 0 && held.floor != tier.floor)
                return false;
            held.floor = std::max(held.floor, tier.floor);
        } else {
            place = static_cast<std::uint32_t>(m_tiers.size());
            const HeldTier& held = m_tiers.emplace_back(HeldTier{std::string(tier.site), std::string(tier.name), tier.floor, 0});
            m_byKey.emplace(TierKey{held.site, held.name}, place);
        }
        m_ofPart.push_back(place);
    }
    return true;
}

void UnitColumns::appendRows(const UnitPart& part, const std::string& names)
{
    for (std::size_t from = 0; from < part.rows();) {
        const std::size_t inBlock = m_rows % kBlockRows;
        if (inBlock == 0)
            m_blocks.emplace_back();
        Block& block = m_blocks.back();
        const std::size_t count = std::min(part.rows() - from, kBlockRows - inBlock);
        rungwright::append(block.asking, part.asking, from, count, kBlockRows);
        rungwright::append(block.nameHash, part.nameHash, from, count, kBlockRows);
        rungwright::append(block.state, part.state, from, count, kBlockRows);
        appendOptional(block.grade, inBlock, part.grade, from, count, UnitPart::kNoGrade, kBlockRows);
        appendOptional(block.area, inBlock, part.area, from, count, std::nan(""), kBlockRows);
        appendOptional(block.chance, inBlock, part.chance, from, count, std::nan(""), kBlockRows);
        block.tier.reserve(kBlockRows);
        for (std::size_t row = from; row < from + count; ++row) {
            const std::uint32_t tier = m_ofPart[part.tier[row]];
            block.tier.push_back(tier);
            ++m_tiers[tier].units;
        }
        if (!part.nameEnds.empty()) {
            block.name.reserve(kBlockRows);
            for (std::size_t row = from; row < from + count; ++row) {
                const std::uint32_t begin = row == 0 ? 0 : part.nameEnds[row - 1];
                block.name.push_back(std::string_view(names).substr(begin, part.nameEnds[row] - begin));
            }
        }
        from += count;
        m_rows += count;
    }
}

bool UnitColumns::group()
{
    m_byKey = {};
    m_starts.reserve(m_tiers.size() + 1);
    std::uint32_t rows = 0;
    for (const HeldTier& tier : m_tiers) {
        if (tier.floor == 0)
            return false;
        m_starts.push_back(rows);
        rows += tier.units;
    }
    std::vector<std::uint32_t> next = m_starts;
    m_starts.push_back(rows);
    m_order.resize(m_rows);
    std::uint32_t row = 0;
    for (Block& block : m_blocks) {
        for (const std::uint32_t tier : block.tier)
            m_order[next[tier]++] = row++;
        block.tier = {};
    }
    return m_rows > 0;
}

bool UnitColumns::namesDiffer(std::size_t tier, std::vector<std::uint64_t>& scratch) const
{
    scratch.clear();
    for (std::uint32_t i = m_starts[tier]; i < m_starts[tier + 1]; ++i)
        scratch.push_back(m_blocks[m_order[i] >> kRowBits].nameHash[m_order[i] % kBlockRows]);
    std::sort(scratch.begin(), scratch.end());
    return std::adjacent_find(scratch.begin(), scratch.end()) == scratch.end();
}

void UnitColumns::fill(std::size_t tier, Tier& out) const
{
    const HeldTier& held = m_tiers[tier];
    out.site = held.site;
    out.name = held.name;
    out.advertisedFloor = {held.floor};
    out.units.resize(held.units);
    const auto known = [](double value) { return std::isnan(value) ? std::nullopt : std::optional(value); };
    for (std::uint32_t i = 0; i < held.units; ++i) {
        const std::uint32_t row = m_order[m_starts[tier] + i];
        const Block& block = m_blocks[row >> kRowBits];
        const std::size_t at = row % kBlockRows;
        Unit& unit = out.units[i];
        if (!block.name.empty())
            unit.name = block.name[at];
        unit.asking = {block.asking[at]};
        unit.status = static_cast<Status>(block.state[at] & ~UnitPart::kLocked);
        unit.locked = (block.state[at] & UnitPart::kLocked) != 0;
        unit.grade.reset();
        if (!block.grade.empty() && block.grade[at] != UnitPart::kNoGrade)
            unit.grade = block.grade[at];
        unit.areaM2 = block.area.empty() ? std::nullopt : known(block.area[at]);
        unit.vacancyChance = block.chance.empty() ? std::nullopt : known(block.chance[at]);
    }
}

} // namespace rungwright
