// SPDX-License-Identifier: GPL-3.0-or-later
// A tier's units put in order of asking price.
#pragma once

#include "ladder/unit.h"

#include <cstdint>
#include <span>
#include <vector>

namespace rungwright
{

/// One place on a ladder.
struct Rung {
    Price price;
    std::uint32_t unit = 0; ///< Index into the tier's units.
};

/// Which units a ladder is made of.
enum class Among : unsigned char { onOffer, rentable, all };

/// The chosen units of a tier in order of price, cheapest first; tied units keep the order of the unit list.
/// `prices` holds one price per unit of the tier, by unit index (a candidate's, or askingPrices()).
/// Reuses `out`'s storage. prices.size() == units.size() is asserted.
void sortLadder(std::span<const Unit> units, std::span<const Price> prices, Among among, std::vector<Rung>& out);
std::vector<Rung> sortedLadder(std::span<const Unit> units, std::span<const Price> prices, Among among);

} // namespace rungwright
