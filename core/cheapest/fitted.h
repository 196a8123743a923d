// SPDX-License-Identifier: GPL-3.0-or-later
// The continuous form of the perceived range: a fitted distribution and the integral of its survival function.
#pragma once

#include "ladder/ladder.h"

#include <functional>
#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Expected least of N independent draws from a distribution with survival function S on [lower, upper] (either may be infinite):
///   E = anchor + integral_anchor^upper S(x)^N dx - integral_lower^anchor (1 - S(x)^N) dx
/// for any anchor in [lower, upper]; tanh-sinh (finite) or exp-sinh (infinite) quadrature from Boost.Math, aimed at 1e-11 relative.
/// N > 0 need not be whole.
double expectedLeast(const std::function<double(double)>& survival, double lower, double upper, double anchor, double n);

/// A beta distribution on [floor, highest], by the method of moments.
struct FittedRange {
    double floor = 0;   ///< Minor units.
    double highest = 0; ///< Minor units, > floor.
    double alpha = 0;
    double beta = 0;

    /// P(price > x).
    double survival(double x) const;
};

/// By the population mean and variance of the prices on offer: they are the whole population.
/// Nothing when the fit is not feasible: fewer than two units, highest <= floor, a price below the floor, no variance, or variance >= mean
/// (1 - mean) on the unit scale.
std::optional<FittedRange> fitRange(std::span<const Rung> sorted, Price advertisedFloor);

/// Expected cheapest in minor units, for N draws.
double expectedCheapest(const FittedRange& fit, double n);
/// Quantile of the cheapest of N draws: the price x with P(cheapest <= x) = p, 0 <= p <= 1.
double cheapestQuantile(const FittedRange& fit, double n, double p);
/// Expected cheapest for N = 1..count at once, from one set of tanh-sinh nodes. Agrees with expectedCheapest to 1e-9 relative.
void expectedCheapestForAll(const FittedRange& fit, int count, std::vector<double>& out);

} // namespace rungwright
