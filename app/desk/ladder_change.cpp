// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder_change.h"

#include <algorithm>
#include <cassert>
#include <cmath>

namespace rungwright
{

LadderChange ladderChange(std::span<const Unit> units, std::span<const Price> prices)
{
    assert(units.size() == prices.size());
    LadderChange result;
    for (std::size_t i = 0; i < units.size(); ++i) {
        const Price by = prices[i] - units[i].asking;
        if (units[i].onOffer())
            result.askingTotal = result.askingTotal.value_or(Price{}) + by;
        if (by == Price{})
            continue;
        ++result.unitsChanged;
        const auto size = std::abs(by.minor);
        const auto greatest = result.greatest ? std::abs(result.greatest->minor) : 0;
        if (size > greatest || (size == greatest && by > *result.greatest))
            result.greatest = by;
        const double share = static_cast<double>(by.minor) / static_cast<double>(units[i].asking.minor);
        const double greatestShare = result.greatestShare ? std::abs(*result.greatestShare) : 0.0;
        if (std::abs(share) > greatestShare || (std::abs(share) == greatestShare && share > *result.greatestShare))
            result.greatestShare = share;
    }
    return result;
}

double typicalChange(std::span<const Unit> units, std::span<const Price> prices, Among among)
{
    assert(units.size() == prices.size());
    double squares = 0;
    double count = 0;
    for (std::size_t i = 0; i < units.size(); ++i) {
        if (among == Among::all || units[i].onOffer() || (among == Among::rentable && units[i].rentable())) {
            const double by = inMinor(prices[i] - units[i].asking);
            squares += by * by;
            ++count;
        }
    }
    return std::sqrt(squares / std::max(1.0, count));
}

} // namespace rungwright
