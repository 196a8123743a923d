// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder_change.h"

#include <cassert>
#include <cmath>

namespace rungwright
{

LadderChange ladderChange(std::span<const Unit> units, std::span<const Price> prices)
{
    assert(units.size() == prices.size());
    LadderChange result;
    double squares = 0;
    for (std::size_t i = 0; i < units.size(); ++i) {
        const Price by = prices[i] - units[i].asking;
        if (units[i].onOffer())
            result.askingTotal = result.askingTotal.value_or(Price{}) + by;
        if (by == Price{})
            continue;
        ++result.unitsChanged;
        squares += inMinor(by) * inMinor(by);
        const auto size = std::abs(by.minor);
        const auto greatest = result.greatest ? std::abs(result.greatest->minor) : 0;
        if (size > greatest || (size == greatest && by > *result.greatest))
            result.greatest = by;
        const double share = static_cast<double>(by.minor) / static_cast<double>(units[i].asking.minor);
        const double greatestShare = result.greatestShare ? std::abs(*result.greatestShare) : 0.0;
        if (std::abs(share) > greatestShare || (std::abs(share) == greatestShare && share > *result.greatestShare))
            result.greatestShare = share;
    }
    if (!units.empty())
        result.rootMeanSquare = std::sqrt(squares / static_cast<double>(units.size()));
    return result;
}

} // namespace rungwright
