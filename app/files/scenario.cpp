// SPDX-License-Identifier: GPL-3.0-or-later
#include "scenario.h"

#include <cassert>

namespace rungwright
{

const TierCase* findTier(const Scenario& scenario, std::string_view site, std::string_view tier)
{
    for (const TierCase& tierCase : scenario.tiers) {
        if (tierCase.tier.name == tier && tierCase.tier.site == site)
            return &tierCase;
    }
    return nullptr;
}

std::vector<Price> pricesOf(const TierCase& tierCase, int candidate)
{
    assert(candidate >= -1 && candidate < static_cast<int>(tierCase.candidates.size()));
    if (candidate < 0)
        return askingPrices(tierCase.tier.units);
    return tierCase.candidates[static_cast<std::size_t>(candidate)].prices;
}

} // namespace rungwright
