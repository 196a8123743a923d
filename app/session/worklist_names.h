// SPDX-License-Identifier: GPL-3.0-or-later
// The names of the worklist's tiers, made ready for sorting, grouping and searching.
#pragma once

#include "scenario.h"

#include <QString>

#include <atomic>
#include <cstdint>
#include <vector>

namespace rungwright
{

struct WorklistNames {
    std::vector<QString> sites;      ///< Each once, in the order they come.
    std::vector<std::uint32_t> site; ///< By tier: index into `sites`.
};

/// For who has the time.
inline const std::atomic<bool> kNeverCancelled{false};

WorklistNames worklistNames(const TierList& tiers);

/// Places in the user's alphabet, numbers in names by their value ("Room 2" before "Room 10"); equal names have equal places.
struct NameRanks {
    std::vector<std::uint32_t> site; ///< By index into WorklistNames::sites.
    std::vector<std::uint32_t> tier; ///< By tier.
};

/// The slow part: to be called from any thread. What comes back after `cancel` became true is worth nothing.
NameRanks nameRanks(const TierList& tiers, const std::atomic<bool>& cancel = kNeverCancelled);

/// Site and name, case folded, to look for words in.
QString searchText(const Tier& tier);
/// Cancelled as above.
std::vector<QString> searchTexts(const TierList& tiers, const std::atomic<bool>& cancel = kNeverCancelled);

} // namespace rungwright
