// SPDX-License-Identifier: GPL-3.0-or-later
// The names of the worklist's tiers, made ready for sorting, grouping and searching.
#pragma once

#include "scenario.h"

#include <QString>

#include <cstdint>
#include <vector>

namespace rungwright
{

struct WorklistNames {
    std::vector<QString> sites;      ///< Each once, in the order they come.
    std::vector<std::uint32_t> site; ///< By tier: index into `sites`.
};

WorklistNames worklistNames(const TierList& tiers);

/// Places in the user's alphabet, numbers in names by their value ("Room 2" before "Room 10"); equal names have equal places.
struct NameRanks {
    std::vector<std::uint32_t> site; ///< By index into WorklistNames::sites.
    std::vector<std::uint32_t> tier; ///< By tier.
};

/// The slow part: to be called from any thread.
NameRanks nameRanks(const TierList& tiers);

/// Site and name, case folded, to look for words in.
QString searchText(const Tier& tier);
std::vector<QString> searchTexts(const TierList& tiers);

} // namespace rungwright
