// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_columns.h"

#include <algorithm>
#include <cmath>

namespace rungwright
{

bool UnitColumns::append(UnitPart part)
{
    if (part.rows() > kMostRows || m_parts.size() == std::numeric_limits<std::uint32_t>::max() >> kRowBits || !appendTiers(part))
        return false;
    m_rows += part.rows();
    part.tiers = {};
    for (std::uint32_t& tier : part.tier) {
        tier = m_ofPart[tier];
        ++m_tiers[tier].units;
    }
    if (part.rows() > 0)
        m_parts.push_back(std::move(part));
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
    for (UnitPart& part : m_parts) {
        std::uint32_t row = place;
        for (const std::uint32_t tier : part.tier)
            m_order[next[tier]++] = row++;
        part.tier = {};
        place += kMostRows;
    }
    return m_rows > 0;
}

bool UnitColumns::namesDiffer(std::size_t tier, std::vector<std::uint64_t>& scratch) const
{
    scratch.clear();
    for (std::uint32_t i = m_starts[tier]; i < m_starts[tier + 1]; ++i)
        scratch.push_back(m_parts[m_order[i] >> kRowBits].nameHash[m_order[i] % kMostRows]);
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
        const std::uint32_t place = m_order[m_starts[tier] + i];
        const UnitPart& part = m_parts[place >> kRowBits];
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
