// SPDX-License-Identifier: GPL-3.0-or-later
// Isotonic regression under bounds that differ from place to place.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Neighbouring places that share one fitted value.
struct IsotonicBlock {
    std::size_t begin = 0;
    std::size_t end = 0; ///< One past the last place.
    double weight = 0;   ///< Sum of the places' weights.
    double sum = 0;      ///< Sum of weight times target.
    double value = 0;
    bool held = false; ///< A bound holds the value: a small change of the targets would not move it.
};

/// The first two places that cannot both keep their bounds and the order: place `lower` may not go below a value that place `upper`, which
/// comes after it, may not go above.
struct BoundConflict {
    std::size_t lower = 0;
    std::size_t upper = 0;
};

/// Draws the bounds together as far as the order lets them: lo becomes its running maximum, hi its running minimum from the far end. A
/// nondecreasing sequence lies within the new bounds exactly if it lies within the old ones, and both new bounds are such sequences.
/// Bounds may be infinite. A conflict when none fits; the bounds are then of no use.
std::optional<BoundConflict> tightenBounds(std::span<double> lo, std::span<double> hi);

/// The nondecreasing x within [lo, hi] that minimises sum weight_i (x_i - target_i)^2, weights > 0, as blocks from the first place to the
/// last. `lo` and `hi` must have been through tightenBounds(). O(n); keeps `blocks`' storage.
///
/// Pool adjacent violators in its general form: every place has a convex function (the square inside its bounds, infinite outside); walking
/// up, a block's value is what minimises the sum of its functions, that is, its weighted mean clipped to [greatest lo, least hi] of the
/// block, and as long as a block lies above the next one the two become one. With tightened bounds the greatest lo is the last place's and
/// the least hi the first place's; two blocks that violate the order always leave the joint one a value, since the former lies at or
/// below its least hi and the latter at or above its greatest lo. Clipping after an unbounded fit is exact only where all places have the
/// same bounds.
///
/// Barlow, Bartholomew, Bremner & Brunk, Statistical Inference under Order Restrictions (1972); Robertson, Wright & Dykstra, Order
/// Restricted Statistical Inference (1988), for bounds; Best, Chakravarti & Ubhaya, Minimizing separable convex functions subject to simple
/// chain constraints, SIAM J. Optim. 10 (2000), for the general form (all from memory).
void fitIsotonic(std::span<const double> target, std::span<const double> weight, std::span<const double> lo, std::span<const double> hi,
                 std::vector<IsotonicBlock>& blocks);

/// The nondecreasing x within tightened [lo, hi] that minimises sum slope_i x_i; of several, the least. The same walk: a block's value is
/// its greatest lo where its slopes add up to something >= 0, else its least hi. Bounds must be finite. `weight` and `held` of the blocks
/// are not set.
void fitLinear(std::span<const double> slope, std::span<const double> lo, std::span<const double> hi, std::vector<IsotonicBlock>& blocks);

/// Writes every block's value to its places.
void spreadBlocks(std::span<const IsotonicBlock> blocks, std::span<double> x);

} // namespace rungwright
