// SPDX-License-Identifier: GPL-3.0-or-later
// The smallest set of changes that puts a tier right under the house's rules.
#pragma once

#include "reshape/ladder_chain.h"

#include <optional>
#include <span>
#include <utility>
#include <vector>

namespace rungwright
{

enum class TargetKind : unsigned char {
    none,
    gap,      ///< Disappointment gap at most `value` minor units.
    gapShare, ///< Gap at most `value` of the advertised floor (0.05 = 5 %).
    floorMet, ///< The floor is met by at least the share `value` of enquirers, in (0, 1].
};

struct ChangeTarget {
    TargetKind kind = TargetKind::none;
    double value = 0;
};

/// What becomes of the asking total of the units on offer.
struct TotalWish {
    bool free = false;                   ///< May become what it likes, within `greatestChange`.
    double changePercent = 0;            ///< Unless free: today's total changed by so many percent (0: held), to the nearest minor unit.
    std::optional<Price> greatestChange; ///< When free: at most so much up or down.
};

/// The least and greatest asking total a wish allows, from today's; nothing when it is free without limits.
std::optional<std::pair<Price, Price>> totalLimits(Price today, const TotalWish& wish);
/// The same within the rules (totalRoomOf()); the first above the second when the rules forbid what is wished.
std::optional<std::pair<Price, Price>> totalLimits(Price today, const TotalWish& wish, const PriceRules& rules);

struct ChangeWish {
    OrderKept order = OrderKept::present;
    TotalWish total;
    ChangeTarget target;
    bool takenStay = false;          ///< Taken units keep their prices, where the model works on them at all.
    std::span<const double> weights; ///< What a change costs, by unit index, > 0; empty = 1 each.
};

/// Why there is no ladder as wished.
enum class Obstacle : unsigned char {
    none,
    order,        ///< The units `conflict` cannot keep their rules and the order at once.
    total,        ///< The asking total cannot be reached: it runs from leastTotal to mostTotal.
    target,       ///< The target cannot be reached: see nearestTarget.
    noOdds,       ///< The model has no odds here; `note` says why.
    noFloor,      ///< The tier has no advertised floor, so there is no gap to aim at.
    pricePoints,  ///< There is such a ladder, but none on the price points.
    shareAtFloor, ///< Too few units on offer can come down to the advertised floor: `reachFloor` of `wantedAtFloor`.
};

/// What setting aside one family of rules would give: the smallest gap in minor units (floorMet: the greatest share), or, for a total out
/// of reach, the total nearest to the one wished for; for the least share at the floor, how many units could come down to it. Only families
/// that make a difference are listed, the most telling first.
struct Easing {
    RuleFamily family = RuleFamily::locks;
    double reach = 0;
};

struct LeastChangeAnswer {
    Obstacle obstacle = Obstacle::none;
    std::optional<OddsNote> note;
    struct Conflict {
        std::uint32_t lower = 0; ///< Unit index: may not go below a price ...
        std::uint32_t upper = 0; ///< ... that this unit, which must not be asked for less, may not go above.
    } conflict;
    Price wantedTotal;                   ///< Unless free.
    Price leastTotal, mostTotal;         ///< What order, bounds and rules allow (rounded inwards); set for Obstacle::total.
    std::optional<double> nearestTarget; ///< Obstacle::target: the smallest gap in minor units, or the greatest share of floorMet.
    /// Obstacle::total and Obstacle::target: which rules are in the way. Not worked out for a gap under the fitted range.
    std::vector<Easing> easings;
    std::size_t wantedAtFloor = 0, reachFloor = 0; ///< Obstacle::shareAtFloor, in units on offer.

    // The rest has a meaning where obstacle is none.
    std::vector<double> continuous;      ///< By unit index, minor units: the optimum without price points.
    std::vector<Price> prices;           ///< By unit index: on price points. Units that do not move have today's price.
    double leastCost = 0;                ///< Sum of weight times squared change of `continuous`: no ladder as wished costs less.
    double cost = 0;                     ///< The same of `prices`.
    double bound = 0;                    ///< See PricePointRepair: how far cost may be above leastCost.
    double rmsLeast = 0, rms = 0;        ///< Root of the mean squared change (unweighted) of the units of the ladder, minor units.
    std::optional<double> gapLeast, gap; ///< Of `continuous` and `prices`; of the fitted range for that model. Empty without odds or floor.
    std::optional<double> floorMet;      ///< Share of enquirers who meet the floor at `prices`; likewise.
    Price total;                         ///< Asking total of `prices`.
    Price totalMiss;                     ///< Less the total wished for (or the nearest end of what is allowed); 0 when met.
    bool targetMet = true;               ///< False when no ladder on the price points was found that meets the target.
    bool exact = true;                   ///< False under the fitted range, see LeastChange.
    std::size_t changed = 0;             ///< Units whose price differs from today's.
    double mu = 0, lambda = 0;           ///< The multipliers of total and expected cheapest.
};

/// Keeps its storage: solving again with as many units allocates nothing (a slider under the hand), but for the order of grades, the fitted
/// range and the explanation of an obstacle.
///
/// Minimises sum weight_i (x_i - today_i)^2 over ladders in the order kept, within every unit's room (roomOf()), with the total as wished
/// and within what the rules leave it, the least share of units on offer at the advertised floor (bounds on the lowest of them in the order
/// kept) and the target met. PriceRules::order is not looked at: the wish says which order. Changes count from Unit::asking; other
/// candidates play no part.
///
/// Models. Perceived, remainder, unit by unit, turnover and on hand give every place of the order kept odds that do not depend on prices,
/// so that the expected cheapest is linear in them and the problem is the one of ChainSolver, solved exactly. The floor met by a share q
/// asks for the fewest lowest rungs whose odds reach q to lie at or below the floor: bounds, no new constraint. The fitted range has no
/// odds on rungs; there the ladder is the least change under the perceived range's odds, for the largest target of theirs at which the
/// fitted gap meets the one wished for (by halving). It meets the target, but a smaller change may do so too: `exact` is false. Its floor
/// is met by no enquirer (it has no mass there), so that for this target the perceived range's odds stand in.
///
/// Price points: PricePointRepair. Rooms begin and end on allowed prices, so that the continuous optimum bounds what any allowed ladder
/// costs.
class LeastChange
{
public:
    const LeastChangeAnswer& solve(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish);
    /// The chain of the last solve, for those who want its places and odds.
    const LadderChain& chain() const { return m_chain; }

private:
    struct Goal {
        std::optional<Price> totalLeast, totalMost;
        std::optional<std::pair<Price, Price>> wished, ruled; ///< Whose intersection the two are.
        std::optional<double> expectedMost;
        std::size_t rungsAtFloor = 0;
    };

    Obstacle setGoal(const Tier& tier, const PriceRules& rules, const ChangeWish& wish);
    ChainProblem problemOf(const LadderChain& chain, std::optional<RuleFamily> without = {}) const;
    bool solveFitted(const Tier& tier);
    bool round(const PriceRules& rules);
    void roundFitted(const Tier& tier, const PriceRules& rules);
    void writeAnswer(const Tier& tier, const ModelSettings& model);
    std::optional<double> fittedGap(const Tier& tier, std::span<const double> byPlace);
    void explain(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish);
    void explainTotal(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish);
    void explainTarget(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish);
    void explainShare(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish);
    std::optional<double> bestTarget(const Tier& tier, const PriceRules& rules, const LadderChain& chain,
                                     std::optional<RuleFamily> without);

    Goal m_goal;
    double m_floor = 0;
    double m_fittedWanted = 0;             ///< The gap wished for, under the fitted range ...
    std::optional<double> m_fittedNearest; ///< ... and the smallest met on the way.
    LadderChain m_chain, m_eased, m_trial;
    ChainSolver m_solver;
    PricePointRepair m_repair;
    ChainAnswer m_optimum;
    RepairAnswer m_rounded;
    std::vector<Rung> m_sorted;
    LeastChangeAnswer m_answer;
};

} // namespace rungwright
