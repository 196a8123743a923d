// SPDX-License-Identifier: GPL-3.0-or-later
#include "refresh_match.h"

namespace rungwright
{

TierMatch matchTiers(const TierList& before, std::span<const TierCase> list)
{
    std::unordered_map<NamePair, int, NamePairHash> inList;
    inList.reserve(list.size());
    for (std::size_t i = 0; i < list.size(); ++i)
        inList.emplace(NamePair{list[i].tier.site, list[i].tier.name}, static_cast<int>(i));

    TierMatch match;
    match.places.reserve(list.size());
    std::vector<bool> known(list.size(), false);
    for (std::size_t i = 0; i < before.size(); ++i) {
        const Tier& tier = before[i].tier;
        const auto found = inList.find({tier.site, tier.name});
        if (found == inList.end()) {
            match.gone.push_back(static_cast<int>(i));
        } else {
            match.places.push_back({static_cast<int>(i), found->second});
            known[static_cast<std::size_t>(found->second)] = true;
        }
    }
    for (std::size_t i = 0; i < list.size(); ++i) {
        if (!known[i])
            match.places.push_back({-1, static_cast<int>(i)});
    }
    return match;
}

void UnitMatcher::match(std::span<const Unit> before, std::span<const Unit> list)
{
    m_inList.assign(before.size(), -1);
    m_fresh.clear();
    m_places.clear();
    std::size_t expected = 0; // most lists name the units in the order of the week before
    for (std::size_t i = 0; i < list.size(); ++i) {
        std::size_t place = before.size();
        if (expected < before.size() && before[expected].name == list[i].name) {
            place = expected;
        } else {
            if (m_places.empty()) {
                for (std::size_t u = 0; u < before.size(); ++u)
                    m_places.emplace(before[u].name, u);
            }
            const auto found = m_places.find(list[i].name);
            if (found != m_places.end())
                place = found->second;
        }
        if (place == before.size()) {
            m_fresh.push_back(static_cast<int>(i));
        } else {
            m_inList[place] = static_cast<int>(i);
            expected = place + 1;
        }
    }
}

} // namespace rungwright
