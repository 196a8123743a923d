// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder/price_points.h"

#include <algorithm>
#include <cassert>
#include <span>

namespace rungwright
{

namespace
{

constexpr Price kOnlyEnding{0};

/// The grid k * step + ending for every whole k, without limits: what the limited questions below are answered from.
struct Grid {
    std::int64_t step;
    std::span<const Price> endings;

    explicit Grid(const PricePoints& points) :
        step(std::max<std::int64_t>(points.step.minor, 1)),
        endings(points.endings.empty() ? std::span<const Price>(&kOnlyEnding, 1) : std::span<const Price>(points.endings))
    {
        assert(points.step.minor >= 1);
        assert(std::ranges::is_sorted(endings) && endings.front().minor >= 0 && endings.back().minor < step);
    }

    /// The start of the step that `minor` lies in; rounds down for negative amounts too.
    std::int64_t stepStart(std::int64_t minor) const
    {
        const std::int64_t rest = minor % step;
        return minor - (rest < 0 ? rest + step : rest);
    }
    std::int64_t atOrBelow(std::int64_t minor) const
    {
        const std::int64_t start = stepStart(minor);
        const auto next = std::ranges::upper_bound(endings, Price{minor - start});
        return next == endings.begin() ? start - step + endings.back().minor : start + std::prev(next)->minor;
    }
    std::int64_t atOrAbove(std::int64_t minor) const
    {
        const std::int64_t start = stepStart(minor);
        const auto here = std::ranges::lower_bound(endings, Price{minor - start});
        return here == endings.end() ? start + step + endings.front().minor : start + here->minor;
    }
    /// Points counted from 0 upwards; `point` must be one.
    std::int64_t rank(std::int64_t point) const
    {
        const std::int64_t start = stepStart(point);
        const auto here = std::ranges::lower_bound(endings, Price{point - start});
        return start / step * static_cast<std::int64_t>(endings.size()) + (here - endings.begin());
    }
    std::int64_t pointOf(std::int64_t wantedRank) const
    {
        const auto perStep = static_cast<std::int64_t>(endings.size());
        return wantedRank / perStep * step + endings[static_cast<std::size_t>(wantedRank % perStep)].minor;
    }
};

struct Limits {
    std::int64_t lo;
    std::int64_t hi;

    explicit Limits(const PricePoints& points) :
        lo(std::max<std::int64_t>(points.least.value_or(Price{1}).minor, 1)),
        hi(std::min(points.greatest.value_or(kGreatestPrice), kGreatestPrice).minor)
    {
    }
};

std::int64_t nearer(std::int64_t wanted, std::int64_t below, std::int64_t above) { return above - wanted < wanted - below ? above : below; }

} // namespace

bool PricePoints::allows(Price price) const { return atOrBelow(price) == price; }

std::optional<Price> PricePoints::atOrBelow(Price price) const
{
    const Limits limits(*this);
    const std::int64_t point = Grid(*this).atOrBelow(std::min(price.minor, limits.hi));
    return point >= limits.lo ? std::optional(Price{point}) : std::nullopt;
}

std::optional<Price> PricePoints::atOrAbove(Price price) const
{
    const Limits limits(*this);
    const std::int64_t point = Grid(*this).atOrAbove(std::max(price.minor, limits.lo));
    return point <= limits.hi ? std::optional(Price{point}) : std::nullopt;
}

std::optional<Price> PricePoints::nearest(Price price) const
{
    const auto below = atOrBelow(price);
    const auto above = atOrAbove(price);
    if (!below || !above)
        return below ? below : above;
    return Price{nearer(price.minor, below->minor, above->minor)};
}

Price PricePoints::nearestWithoutLimits(Price price) const
{
    const Grid grid(*this);
    return Price{nearer(price.minor, grid.atOrBelow(price.minor), grid.atOrAbove(price.minor))};
}

Price PricePoints::stepped(Price price, int steps) const
{
    if (steps == 0)
        return price;
    const Grid grid(*this);
    const auto first = steps > 0 ? atOrAbove(price + Price{1}) : atOrBelow(price - Price{1});
    if (!first)
        return price;
    // `first` exists, so there is a last point on either side of it as well.
    const std::int64_t lowest = grid.rank(atOrAbove(Price{1})->minor);
    const std::int64_t highest = grid.rank(atOrBelow(kGreatestPrice)->minor);
    const std::int64_t more = std::int64_t{steps} - (steps > 0 ? 1 : -1);
    return Price{grid.pointOf(std::clamp(grid.rank(first->minor) + more, lowest, highest))};
}

} // namespace rungwright
