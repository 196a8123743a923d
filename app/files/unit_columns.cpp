// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_columns.h"

#include "list_so_far.h"

#include <algorithm>
#include <bit>
#include <cmath>

namespace rungwright
{

bool UnitColumns::append(UnitPart part)
{
    if (part.rows() > kMostRows || m_parts.size() == std::numeric_limits<std::uint32_t>::max() >> kRowBits)
        return false;
    HeldPart& held = m_parts.emplace_back(HeldPart{std::move(part), {}});
    m_rows += held.part.rows();
    return appendTiers(held);
}

bool UnitColumns::appendTiers(HeldPart& held)
{
    held.tiers.reserve(held.part.tiers.size());
    for (const UnitPart::PartTier& tier : held.part.tiers) {
        std::uint32_t place = 0;
        if (const auto known = m_byKey.find({tier.site, tier.name}); known != m_byKey.end()) {
            place = known->second;
            std::uint32_t& floor = m_tiers[place].floor;
            if (floor != 0 && tier.floor != 0 && floor != tier.floor)
                return false;
            floor = std::max(floor, tier.floor);
        } else {
            place = static_cast<std::uint32_t>(m_tiers.size());
            const HeldTier& fresh = m_tiers.emplace_back(HeldTier{std::string(tier.site), std::string(tier.name), tier.floor, 0});
            m_byKey.emplace(TierKey{fresh.site, fresh.name}, place);
        }
        m_tiers[place].units += tier.units;
        held.tiers.push_back(place);
    }
    held.part.tiers = {};
    return true;
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
    std::uint32_t place = 0;
    for (HeldPart& held : m_parts) {
        std::uint32_t row = place;
        for (const std::uint16_t tier : held.part.tier)
            m_order[next[held.tiers[tier]]++] = row++;
        held.part.tier = {};
        held.tiers = {};
        place += kMostRows;
    }
    return m_rows > 0;
}

std::vector<TierSoFar> UnitColumns::firstTiers(std::size_t most) const
{
    std::vector<TierSoFar> first;
    first.reserve(std::min(most, m_tiers.size()));
    for (std::size_t i = 0; i < std::min(most, m_tiers.size()); ++i)
        first.push_back({m_tiers[i].site, m_tiers[i].name, {m_tiers[i].floor}, m_tiers[i].units});
    return first;
}

bool UnitColumns::namesDiffer(std::size_t tier, std::vector<std::uint64_t>& scratch) const
{
    // A table of hashes, never more than half full; a place holds 0 as long as it is free.
    const std::size_t units = m_starts[tier + 1] - m_starts[tier];
    const std::size_t mask = std::bit_ceil(2 * units) - 1;
    scratch.assign(mask + 1, 0);
    for (std::uint32_t i = m_starts[tier]; i < m_starts[tier + 1]; ++i) {
        const UnitPart& part = m_parts[m_order[i] >> kRowBits].part;
        const std::size_t row = m_order[i] % kMostRows;
        const std::uint64_t hash = (std::uint64_t(part.hashHigh[row]) << 32 | part.hashLow[row]) + 1;
        std::size_t at = hash & mask;
        for (; scratch[at] != 0; at = (at + 1) & mask) {
            if (scratch[at] == hash)
                return false;
        }
        scratch[at] = hash;
    }
    return true;
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
        const std::uint32_t place = m_order[m_starts[tier] + i];
        const UnitPart& part = m_parts[place >> kRowBits].part;
        const std::size_t at = place % kMostRows;
        Unit& unit = out.units[i];
        if (!part.nameEnds.empty())
            unit.name = part.name(at);
        unit.asking = {part.asking[at]};
        unit.status = static_cast<Status>(part.state[at] & ~UnitPart::kLocked);
        unit.locked = (part.state[at] & UnitPart::kLocked) != 0;
        unit.grade.reset();
        if (!part.grade.empty() && part.grade[at] != UnitPart::kNoGrade)
            unit.grade = part.grade[at];
        unit.areaM2 = part.area.empty() ? std::nullopt : known(part.area[at]);
        unit.vacancyChance = part.chance.empty() ? std::nullopt : known(part.chance[at]);
    }
}

} // namespace rungwright
