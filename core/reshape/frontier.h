// SPDX-License-Identifier: GPL-3.0-or-later
// What a smaller gap costs: in change of prices, and in asking total.
#pragma once

#include "reshape/ladder_chain.h"
#include "reshape/least_change.h"

#include <vector>

namespace rungwright
{

/// Amounts in minor units. A ladder for it on price points comes from LeastChange with target gap = `gap` and the same wish.
struct FrontierPoint {
    double gap = 0;
    double rmsChange = 0;   ///< Root of the mean squared change of the ladder's units (weighted, if the wish has weights).
    double totalChange = 0; ///< Of the asking total of the units on offer, against today's.
};

/// Keeps its storage between calls. Both are empty where the model has no odds, the tier no floor, or the rules admit no ladder at all.
class FrontierTracer
{
public:
    /// The smallest gap for an amount of change, under the wish's order and total; its target is not looked at. `count` >= 2 points from
    /// the ladder that changes least (today's, unless order or total ask for changes) to the smallest gap there is, evenly spaced in gap:
    /// each is the least change for its gap, so that no ladder with as small a gap changes less. Gaps fall and changes grow along it; the
    /// curve is convex in the squared change (checked by tests). One point when the gap cannot be made smaller. Under the fitted range the
    /// points are those of the perceived range with their fitted gaps (NaN where no fit is feasible).
    const std::vector<FrontierPoint>& byChange(const Tier& tier, const ModelSettings& model, const PriceRules& rules,
                                               const ChangeWish& wish, int count);
    /// The smallest gap there is at each of `count` >= 2 asking totals, evenly spaced from today's less `percent` to today's plus `percent`
    /// as far as the rules reach, however much prices change; rmsChange is NaN. Not for the fitted range (empty).
    const std::vector<FrontierPoint>& byTotal(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish,
                                              double percent, int count);

private:
    bool prepare(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish);

    LadderChain m_chain;
    ChainSolver m_solver;
    double m_floor = 0;
    double m_weightAll = 0;
    std::vector<Rung> m_sorted;
    std::vector<FrontierPoint> m_points;
};

} // namespace rungwright
