// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder/ladder.h"

#include <algorithm>
#include <cassert>

namespace rungwright
{

namespace
{

bool belongs(const Unit& unit, Among among)
{
    switch (among) {
    case Among::onOffer:
        return unit.onOffer();
    case Among::rentable:
        return unit.rentable();
    case Among::all:
        return true;
    }
    return true;
}

} // namespace

void sortLadder(std::span<const Unit> units, std::span<const Price> prices, Among among, std::vector<Rung>& out)
{
    assert(prices.size() == units.size());
    out.clear();
    for (std::uint32_t i = 0; i < units.size(); ++i)
        if (belongs(units[i], among))
            out.push_back({prices[i], i});
    // With the index as second key a plain sort keeps tied units in the order of the list, and needs no storage as a stable one does.
    std::ranges::sort(out, [](const Rung& a, const Rung& b) { return a.price != b.price ? a.price < b.price : a.unit < b.unit; });
}

std::vector<Rung> sortedLadder(std::span<const Unit> units, std::span<const Price> prices, Among among)
{
    std::vector<Rung> ladder;
    sortLadder(units, prices, among, ladder);
    return ladder;
}

} // namespace rungwright
