// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/isotonic.h"

#include <algorithm>
#include <cassert>

namespace rungwright
{

namespace
{

/// Walks up the places; `make(i)` is the block of one place, `evaluate` sets a joint block's value.
template <class Make, class Evaluate>
void pool(std::size_t places, Make make, Evaluate evaluate, std::vector<IsotonicBlock>& blocks)
{
    blocks.clear();
    blocks.reserve(places); // However many blocks there are this time.
    for (std::size_t i = 0; i < places; ++i) {
        IsotonicBlock block = make(i);
        evaluate(block);
        while (!blocks.empty() && blocks.back().value > block.value) {
            const IsotonicBlock& before = blocks.back();
            block.begin = before.begin;
            block.weight += before.weight;
            block.sum += before.sum;
            evaluate(block);
            blocks.pop_back();
        }
        blocks.push_back(block);
    }
}

} // namespace

std::optional<BoundConflict> tightenBounds(std::span<double> lo, std::span<double> hi)
{
    assert(lo.size() == hi.size());
    std::size_t greatest = 0; // Where the running maximum comes from.
    for (std::size_t i = 0; i < lo.size(); ++i) {
        if (lo[i] >= lo[greatest])
            greatest = i;
        else
            lo[i] = lo[greatest];
        if (lo[i] > hi[i])
            return BoundConflict{greatest, i};
    }
    for (std::size_t i = hi.size(); i-- > 1;)
        hi[i - 1] = std::min(hi[i - 1], hi[i]);
    return {};
}

void fitIsotonic(std::span<const double> target, std::span<const double> weight, std::span<const double> lo, std::span<const double> hi,
                 std::vector<IsotonicBlock>& blocks)
{
    assert(weight.size() == target.size() && lo.size() == target.size() && hi.size() == target.size());
    pool(
        target.size(), [&](std::size_t i) { return IsotonicBlock{i, i + 1, weight[i], weight[i] * target[i], 0, false}; },
        [&](IsotonicBlock& block) {
            const double mean = block.sum / block.weight;
            const double least = lo[block.end - 1];
            const double most = hi[block.begin];
            block.held = !(mean > least && mean < most);
            block.value = mean <= least ? least : std::min(mean, most);
        },
        blocks);
}

void fitLinear(std::span<const double> slope, std::span<const double> lo, std::span<const double> hi, std::vector<IsotonicBlock>& blocks)
{
    assert(lo.size() == slope.size() && hi.size() == slope.size());
    pool(
        slope.size(), [&](std::size_t i) { return IsotonicBlock{i, i + 1, 0, slope[i], 0, true}; },
        [&](IsotonicBlock& block) { block.value = block.sum >= 0 ? lo[block.end - 1] : hi[block.begin]; }, blocks);
}

void spreadBlocks(std::span<const IsotonicBlock> blocks, std::span<double> x)
{
    for (const IsotonicBlock& block : blocks)
        std::fill(x.begin() + static_cast<std::ptrdiff_t>(block.begin), x.begin() + static_cast<std::ptrdiff_t>(block.end), block.value);
}

} // namespace rungwright
