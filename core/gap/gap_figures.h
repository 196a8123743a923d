// SPDX-License-Identifier: GPL-3.0-or-later
// Cheapest odds + advertised floor -> gap figures and curves.
#pragma once

#include "cheapest/fitted.h"
#include "cheapest/odds.h"

#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Given that something is on offer. Amounts in minor units. Everything is empty when the odds are undefined.
/// gap = claimPart + shapePart; gapShare = gap / s. A negative claim part says that a unit is asked below the floor.
struct GapFigures {
    std::optional<double> expectedCheapest;
    std::optional<double> gap;
    std::optional<double> gapShare;
    std::optional<double> claimPart;      ///< Lowest price of the ladder the model works on, minus s.
    std::optional<double> shapePart;      ///< gap - claimPart; >= 0, but for the fitted form, which knows prices below the lowest.
    std::optional<double> chanceFloorMet; ///< P(cheapest <= s).
    std::optional<double> gapMedian;      ///< Median of cheapest - s: by the least rung price whose cumulated odds reach 1/2.
    std::optional<double> gapP90;
};

/// A quantile compares cumulated odds with p less a few roundings, so that an exact half is met in floating point too.
GapFigures gapFigures(std::span<const Rung> ladder, const CheapestOdds& odds, Price advertisedFloor);
/// The same for the fitted form; the claim part is taken at the lowest price on offer. Having no mass at the floor itself, that form gives
/// the chance 0 of meeting it, however many units are asked at it.
GapFigures gapFigures(const FittedRange& fit, double n, Price lowest, Price advertisedFloor);

/// One corner of the curtain: for prices in (previous price, price] the chance that nothing on offer costs less than that price is
/// `chance`.
struct CurtainStep {
    double price = 0;  ///< Minor units.
    double chance = 0; ///< In [0, 1], never increasing.
};

/// P(cheapest >= x) as a curve: steps for the discrete models (one a distinct price, ascending; the last step ends at the
/// highest price with odds), a polyline of `smoothPoints` >= 4 points for the fitted form. The area under it from s upwards is the gap
/// (when no unit lies below s). Empty when undefined.
void curtainSteps(std::span<const Rung> ladder, const CheapestOdds& odds, std::vector<CurtainStep>& out);
void curtainCurve(const FittedRange& fit, double n, int smoothPoints, std::vector<CurtainStep>& out);

} // namespace rungwright
