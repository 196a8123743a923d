// SPDX-License-Identifier: GPL-3.0-or-later
// What a ladder changes against what is asked today.
#pragma once

#include "ladder/ladder.h"

#include <optional>
#include <span>

namespace rungwright
{

/// Differences between a ladder's prices and the units' asking prices of today.
struct LadderChange {
    std::size_t unitsChanged = 0;        ///< Of all units of the tier, whatever their status.
    std::optional<Price> askingTotal;    ///< Of the units on offer, as the asking total counts them; nothing when none is on offer.
    std::optional<Price> greatest;       ///< The change of greatest size, with its sign; of a rise and a cut of one size the rise.
    std::optional<double> greatestShare; ///< The same, of the unit's price of today: 0.05 = 5 % up. May be another unit's.
};

/// `prices` holds one price per unit, by unit index. `greatest` and `greatestShare` are empty when no unit changes.
LadderChange ladderChange(std::span<const Unit> units, std::span<const Price> prices);

/// Amount of change: root of the mean squared change of the units `among`, minor units; 0 when there are none. With the units a model works
/// on (modelUnits()) it is what the least change and the trade-off count.
double typicalChange(std::span<const Unit> units, std::span<const Price> prices, Among among);

} // namespace rungwright
