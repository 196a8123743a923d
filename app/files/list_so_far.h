// SPDX-License-Identifier: GPL-3.0-or-later
// What of a long unit list has been read while the rest is still being read: to be looked at, not to be reckoned with.
#pragma once

#include "unit_list.h"

#include <cstdint>
#include <functional>
#include <string>
#include <vector>

namespace rungwright
{

struct TierSoFar {
    std::string site, name;
    Price floor;             ///< 0: none on the rows read.
    std::uint32_t units = 0; ///< On the rows read; more may follow.
};

struct ListSoFar {
    Currency currency;
    std::size_t units = 0, tiers = 0; ///< Of all rows read.
    std::vector<TierSoFar> first;     ///< The first of the tiers, at most kTiersToldSoFar, in order of first appearance.
};

inline constexpr std::size_t kTiersToldSoFar = 200;

/// Called by the thread that reads, now and then, and only while much is left to read. Whether the list is taken in the end is not known
/// then: a later row may be refused.
using TellSoFar = std::function<void(const ListSoFar&)>;

/// loadUnitList() that tells on the way, as long as the list is plainly fine.
UnitListResult loadUnitList(const QString& path, const UnitListOptions& options, const Progress& progress, const TellSoFar& tell);

} // namespace rungwright
