// SPDX-License-Identifier: GPL-3.0-or-later
// Finding a list's tiers and units among those there are, by name.
#pragma once

#include "scenario.h"

#include <cstddef>
#include <functional>
#include <span>
#include <string_view>
#include <unordered_map>
#include <vector>

namespace rungwright
{

/// Two names that only together say what is meant.
struct NamePair {
    std::string_view first;
    std::string_view second;

    bool operator==(const NamePair&) const = default;
};

struct NamePairHash {
    std::size_t operator()(const NamePair& pair) const
    {
        const std::size_t a = std::hash<std::string_view>{}(pair.first);
        return a ^ (std::hash<std::string_view>{}(pair.second) + 0x9e3779b97f4a7c15U + (a << 6) + (a >> 2));
    }
};

/// A place in the refreshed list of tiers: where it comes from, -1 for nowhere.
struct TierPlace {
    int before = -1;
    int list = -1;
};

struct TierMatch {
    std::vector<TierPlace> places; ///< Those that stay, in their order; then the new ones, in the list's.
    std::vector<int> gone;         ///< Indices before.
};
TierMatch matchTiers(const TierList& before, std::span<const TierCase> list);

/// Matches the units of one tier after the other; keeps its memory.
class UnitMatcher
{
public:
    void match(std::span<const Unit> before, std::span<const Unit> list);
    /// For every unit before: its index in the list, -1 = gone.
    std::span<const int> inList() const { return m_inList; }
    /// Indices in the list of the units that are new.
    std::span<const int> fresh() const { return m_fresh; }

private:
    std::vector<int> m_inList;
    std::vector<int> m_fresh;
    std::unordered_map<std::string_view, std::size_t> m_places;
};

} // namespace rungwright
