// SPDX-License-Identifier: GPL-3.0-or-later
// The gap against the number of units left on offer.
#pragma once

#include "cheapest/fitted.h"
#include "cheapest/odds.h"

#include <span>
#include <vector>

namespace rungwright
{

/// Tables that depend on the tier's size only and are kept between calls (turnover's loads), and scratch storage.
struct ThinningWorkspace {
    std::vector<double> loads; ///< turnover: the load at which k units are free on average, by k = 1..M-1.
    int loadsFor = 0;          ///< The M that `loads` belongs to.
    std::vector<double> a, b, c;
};

/// gap[k-1] in minor units for k = 1..M (M = rentable units of the tier), all at once in O(m M), from:
///  perceived, fitted  N = k draws.
///  remainder          k of M units left.
///  unit               given that exactly k units are free (Poisson-binomial; equal chances give `remainder`), by a backward recursion;
///                     NaN where that has no chance.
///  turnover           at the load at which k units are free on average (k = M: the limit of no load, the lowest price).
///  onHand             when the cheapest of the m on offer have gone first and k of them are left; k = 1..m only.
/// Empty when the model's odds are undefined. `ladder` as for cheapestOdds.
void thinningCurve(std::span<const Rung> ladder, std::span<const Unit> units, const ModelSettings& settings,
                   const std::optional<FittedRange>& fit, Price advertisedFloor, ThinningWorkspace& work, std::vector<double>& gap);

} // namespace rungwright
