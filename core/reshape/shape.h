// SPDX-License-Identifier: GPL-3.0-or-later
// A whole ladder made from a shape: floor, top and lean; even steps; or a few price steps.
#pragma once

#include "outcome.h"
#include "reshape/ladder_chain.h"

#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Parameters of a beta distribution on [0, 1], both > 0.
struct BetaShape {
    double alpha = 1;
    double beta = 1;
};

/// L-moments of a beta distribution on [0, 1]: mean a / (a + b), L-scale 2 B(2a, 2b) / ((a + b) B(a, b)^2) (half its mean difference; the
/// closed form from memory, checked against quadrature), and L-skewness t3 by quadrature of l3 = integral F (1 - F) (2 F - 1) dx.
/// Hosking, L-moments, JRSS B 52 (1990) (from memory).
struct BetaLMoments {
    double mean = 0;
    double scale = 0;
    double skewness = 0;
};
BetaLMoments lMomentsOf(const BetaShape& shape);

/// Method of L-moments: the beta distribution with this mean and L-scale on the unit scale (0 = floor, 1 = top). Nothing unless 0 < mean <
/// 1 and 0 < scale < mean (1 - mean), between a single point and all weight on the two ends.
std::optional<BetaShape> betaFromLMoments(double mean, double scale);
/// One dial: the power shapes, beta (c, 1) leaning left and beta (1, c) leaning right, by their L-skewness in (-1/3, 1/3); 0 is even steps.
/// With k = 1 / c the quantile function u^k has t3 = (k - 1) / (k + 3). Nothing outside.
std::optional<BetaShape> betaFromLean(double lSkewness);
/// The mean and L-scale of today's ladder on the unit scale (from its own lowest to its highest price), to begin shaping from: by unbiased
/// probability-weighted moments. Nothing for fewer than two units or equal prices.
std::optional<BetaLMoments> unitLMoments(std::span<const Rung> sorted);

/// A price and the share of units asked at it.
struct PriceStep {
    Price price;
    double share = 0; ///< >= 0; shares need not add up to 1, they are taken in proportion.
};

struct LadderShape {
    Price floor; ///< Lowest rung; > 0.
    Price top;   ///< Highest rung, >= floor.
    /// Rung i of m is asked at floor + (top - floor) Q((i - 1) / (m - 1)), Q the quantile function of `beta`: ends exact. (1, 1): even
    /// steps. A single rung is asked at the floor.
    BetaShape beta;
    /// Not empty: a few price steps instead, in any order; floor, top and beta are not looked at. How many units each gets: its share of m,
    /// by largest remainder, the cheaper first of equal remainders.
    std::vector<PriceStep> steps;
};

struct ShapePlacing {
    Among among = Among::onOffer; ///< Which units are shaped; the others keep their prices.
    OrderKept order = OrderKept::present;
    bool onPricePoints = true; ///< Move each price to the nearest price point.
    /// Hold each unit inside its room (roomOf()), and the lowest units on offer at the advertised floor that the rules want there; with
    /// this, prices are also on price points.
    bool withinRules = true;
};

/// Prices by unit index. Locked units keep theirs, and their rung of the shape goes to nobody. Trouble, in words for the user, when the
/// shape makes no sense: floor above top, no share above 0, parameters not above 0, a price that is not above 0; and, within the rules,
/// when too few units can come down to the floor or the asking total would change by more than they allow.
Outcome<std::vector<Price>> shapedPrices(const Tier& tier, const PriceRules& rules, const LadderShape& shape, const ShapePlacing& placing);

/// The shape's own prices for m rungs, nondecreasing, rounded to whole minor units. The shape must make sense.
std::vector<Price> shapeRungs(const LadderShape& shape, std::size_t m);

} // namespace rungwright
