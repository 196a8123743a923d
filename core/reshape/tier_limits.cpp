// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/tier_limits.h"

#include <algorithm>

namespace rungwright
{

namespace
{

struct WholeTier {
    Price total;
    std::size_t atFloor = 0;
};

WholeTier wholeTier(const Tier& tier, std::span<const Price> prices, Price floor)
{
    WholeTier whole;
    for (std::size_t i = 0; i < prices.size(); ++i) {
        if (!tier.units[i].onOffer())
            continue;
        whole.total += prices[i];
        whole.atFloor += prices[i] <= floor ? 1 : 0;
    }
    return whole;
}

} // namespace

TierLimits tierLimitsOf(const Tier& tier, const PriceRules& rules)
{
    Price today;
    std::size_t onOffer = 0;
    for (const Unit& unit : tier.units) {
        if (!unit.onOffer())
            continue;
        today += unit.asking;
        ++onOffer;
    }
    return {totalRoomOf(today, rules), tier.advertisedFloor, tier.hasFloor() ? unitsWantedAtFloor(onOffer, rules) : 0};
}

Bound oversteppedLimit(const Tier& tier, const TierLimits& limits, std::span<const Price> start, std::span<const Price> prices)
{
    const WholeTier before = wholeTier(tier, start, limits.floor);
    const WholeTier after = wholeTier(tier, prices, limits.floor);
    if (limits.total &&
        (after.total < std::min(limits.total->least, before.total) || after.total > std::max(limits.total->most, before.total)))
        return limits.total->bound;
    if (after.atFloor < std::min(limits.atFloor, before.atFloor))
        return Bound::shareAtFloor;
    return Bound::none;
}

} // namespace rungwright
