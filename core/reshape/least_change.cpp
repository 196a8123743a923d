// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/least_change.h"

#include "cheapest/fitted.h"

#include <algorithm>
#include <cmath>
#include <functional>
#include <limits>

namespace rungwright
{

namespace
{

// Halvings of the perceived range's target under the fitted one: beyond a billionth of the way nothing shows.
constexpr int kHalvings = 30;
constexpr int kTightenings = 12;

using Limits = std::optional<std::pair<Price, Price>>;

/// What both allow; nothing is no limit. The first above the second when they exclude each other.
Limits within(const Limits& a, const Limits& b)
{
    if (!a || !b)
        return a ? a : b;
    return std::pair(std::max(a->first, b->first), std::min(a->second, b->second));
}

/// A wished total rounds to the nearest minor unit and a rule's room inwards: one unit between them is no contradiction.
Limits heldTo(const Limits& wished, const Limits& ruled)
{
    if (wished && ruled && wished->first == wished->second) {
        if (wished->first - ruled->second == Price{1})
            return std::pair(ruled->second, ruled->second);
        if (ruled->first - wished->first == Price{1})
            return std::pair(ruled->first, ruled->first);
    }
    return wished;
}

bool excluded(const Limits& limits) { return limits && limits->first > limits->second; }

} // namespace

std::optional<std::pair<Price, Price>> totalLimits(Price today, const TotalWish& wish)
{
    if (!wish.free) {
        const Price wanted{wish.changePercent == 0 ? today.minor : std::llround(inMinor(today) * (1 + wish.changePercent / 100))};
        return std::pair(wanted, wanted);
    }
    if (wish.greatestChange)
        return std::pair(today - *wish.greatestChange, today + *wish.greatestChange);
    return {};
}

std::optional<std::pair<Price, Price>> totalLimits(Price today, const TotalWish& wish, const PriceRules& rules)
{
    const auto room = totalRoomOf(today, rules);
    const Limits ruled = room ? Limits(std::pair(room->least, room->most)) : std::nullopt;
    return within(heldTo(totalLimits(today, wish), ruled), ruled);
}

Obstacle LeastChange::setGoal(const Tier& tier, const PriceRules& rules, const ChangeWish& wish)
{
    m_goal = {};
    m_floor = inMinor(tier.advertisedFloor);
    m_goal.wished = totalLimits(m_chain.total, wish.total);
    if (const auto room = totalRoomOf(m_chain.total, rules))
        m_goal.ruled = std::pair(room->least, room->most);
    m_goal.wished = heldTo(m_goal.wished, m_goal.ruled);
    if (const auto limits = within(m_goal.wished, m_goal.ruled)) {
        m_goal.totalLeast = limits->first;
        m_goal.totalMost = limits->second;
    }
    if (!wish.total.free)
        m_answer.wantedTotal = m_goal.wished->first;
    if (wish.target.kind == TargetKind::none)
        return Obstacle::none;
    if (!tier.hasFloor())
        return Obstacle::noFloor;
    if (m_chain.odds.empty()) {
        m_answer.note = m_chain.cheapest.note;
        return Obstacle::noOdds;
    }
    switch (wish.target.kind) {
    case TargetKind::none:
        break;
    case TargetKind::gap:
        m_goal.expectedMost = m_floor + wish.target.value;
        break;
    case TargetKind::gapShare:
        m_goal.expectedMost = m_floor * (1 + wish.target.value);
        break;
    case TargetKind::floorMet: {
        // Less a few roundings, as for quantiles, so that an exact share is met in floating point too.
        const double wanted = wish.target.value - (static_cast<double>(m_chain.odds.size()) + 8) * std::numeric_limits<double>::epsilon();
        double reached = 0;
        while (m_goal.rungsAtFloor < m_chain.odds.size() && reached < wanted)
            reached += m_chain.odds[m_goal.rungsAtFloor++];
        break;
    }
    }
    return Obstacle::none;
}

ChainProblem LeastChange::problemOf(const LadderChain& chain, std::optional<RuleFamily> without) const
{
    ChainProblem problem = chain.problem();
    const auto limits =
        within(without == RuleFamily::total ? Limits{} : m_goal.wished, without == RuleFamily::tierTotal ? Limits{} : m_goal.ruled);
    if (limits) {
        problem.totalLeast = inMinor(limits->first);
        problem.totalMost = inMinor(limits->second);
    }
    problem.expectedMost = m_goal.expectedMost;
    return problem;
}

const LeastChangeAnswer& LeastChange::solve(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish)
{
    m_chain.build(tier, model, rules, wish.order, wish.takenStay, wish.weights);
    // Everything but the vectors' storage begins anew.
    m_answer = [&] {
        LeastChangeAnswer fresh;
        fresh.easings = std::move(m_answer.easings);
        fresh.continuous = std::move(m_answer.continuous);
        fresh.prices = std::move(m_answer.prices);
        fresh.easings.clear();
        return fresh;
    }();
    m_answer.obstacle = setGoal(tier, rules, wish);
    if (m_answer.obstacle != Obstacle::none)
        return m_answer;

    bool solved = m_chain.reachFloor == m_chain.wantedAtFloor && !excluded(within(m_goal.wished, m_goal.ruled));
    if (solved && m_goal.rungsAtFloor > 0)
        solved = m_chain.holdAtFloor(m_goal.rungsAtFloor, tier.advertisedFloor, rules.points);
    const bool fitted = model.kind == ModelKind::fitted && m_goal.expectedMost;
    if (solved && fitted) {
        solved = solveFitted(tier);
    } else if (solved) {
        m_optimum = m_solver.solve(problemOf(m_chain));
        solved = m_optimum.status == ChainStatus::solved;
    }
    if (!solved) {
        explain(tier, model, rules, wish);
        return m_answer;
    }
    if (!round(rules)) {
        m_answer.obstacle = Obstacle::pricePoints;
        return m_answer;
    }
    if (fitted)
        roundFitted(tier, rules);
    writeAnswer(tier, model);
    return m_answer;
}

bool LeastChange::solveFitted(const Tier& tier)
{
    const double wanted = m_fittedWanted = *m_goal.expectedMost - m_floor;
    ChainProblem problem = problemOf(m_chain);
    problem.expectedMost.reset();
    m_answer.exact = false;
    m_fittedNearest.reset();
    m_optimum = m_solver.solve(problem);
    if (m_optimum.status != ChainStatus::solved)
        return false;
    const auto meets = [&] {
        const auto gap = fittedGap(tier, m_optimum.x);
        if (gap && (!m_fittedNearest || *gap < *m_fittedNearest))
            m_fittedNearest = gap;
        return gap && *gap <= wanted + 1e-9;
    };
    m_goal.expectedMost.reset(); // No target of the perceived range's own.
    if (meets()) {
        m_goal.expectedMost = m_optimum.expected;
        return true;
    }
    double above = m_optimum.expected;
    double below = *m_solver.leastExpected(problem).leastExpected;
    const auto solveAt = [&](double expected) {
        problem.expectedMost = expected;
        m_optimum = m_solver.solve(problem);
        return m_optimum.status == ChainStatus::solved && meets();
    };
    if (!solveAt(below))
        return false;
    for (int i = 0; i < kHalvings && above - below > 1e-9 * above; ++i) {
        const double middle = below + (above - below) / 2;
        (solveAt(middle) ? below : above) = middle;
    }
    m_goal.expectedMost = below;
    return solveAt(below);
}

bool LeastChange::round(const PriceRules& rules)
{
    RepairProblem problem = m_chain.repairProblem(rules.points);
    problem.wanted = m_optimum.x;
    problem.totalLeast = m_goal.totalLeast;
    problem.totalMost = m_goal.totalMost;
    problem.expectedMost = m_goal.expectedMost;
    problem.mu = m_optimum.mu;
    problem.lambda = m_optimum.lambda;
    m_rounded = m_repair.repair(problem);
    return m_rounded.possible;
}

/// Rounding moves the fitted gap a little: the perceived range's target is tightened until the rounded ladder meets the one wished for.
void LeastChange::roundFitted(const Tier& tier, const PriceRules& rules)
{
    std::vector<double> prices;
    const double wanted = m_fittedWanted;
    const auto gapOfRounded = [&] {
        prices.clear();
        for (const Price price : m_rounded.prices)
            prices.push_back(inMinor(price));
        return fittedGap(tier, prices);
    };
    const RepairAnswer first = m_rounded;
    auto gap = gapOfRounded();
    for (int i = 0; i < kTightenings && (!gap || *gap > wanted + 1e-6); ++i) {
        *m_goal.expectedMost -= std::max(gap ? 1.1 * (*gap - wanted) : 0.0, 0.02 * inMinor(rules.points.step));
        round(rules);
        gap = gapOfRounded();
    }
    m_rounded.expectedMet = gap && *gap <= wanted + 1e-6;
    if (!m_rounded.expectedMet) {
        m_rounded = first;
        m_rounded.expectedMet = false;
    }
}

std::optional<double> LeastChange::fittedGap(const Tier& tier, std::span<const double> byPlace)
{
    m_sorted.clear();
    for (std::size_t i = 0; i < byPlace.size(); ++i)
        m_sorted.push_back({Price{std::llround(byPlace[i])}, m_chain.places[i]});
    const auto fit = fitRange(m_sorted, tier.advertisedFloor);
    return fit ? std::optional(expectedCheapest(*fit, *m_chain.cheapest.left) - m_floor) : std::nullopt;
}

void LeastChange::writeAnswer(const Tier& tier, const ModelSettings& model)
{
    LeastChangeAnswer& answer = m_answer;
    answer.continuous.resize(tier.units.size());
    answer.prices.resize(tier.units.size());
    for (std::size_t i = 0; i < tier.units.size(); ++i) {
        answer.continuous[i] = inMinor(tier.units[i].asking);
        answer.prices[i] = tier.units[i].asking;
    }
    double squaresLeast = 0;
    double squares = 0;
    double met = 0;
    for (std::size_t i = 0; i < m_chain.places.size(); ++i) {
        const std::uint32_t unit = m_chain.places[i];
        answer.continuous[unit] = m_optimum.x[i];
        answer.prices[unit] = m_rounded.prices[i];
        squaresLeast += (m_optimum.x[i] - m_chain.today[i]) * (m_optimum.x[i] - m_chain.today[i]);
        const double change = inMinor(m_rounded.prices[i]) - m_chain.today[i];
        squares += change * change;
        answer.changed += change != 0 ? 1 : 0;
        if (!m_chain.odds.empty() && m_rounded.prices[i] <= tier.advertisedFloor)
            met += m_chain.odds[i];
    }
    const double count = std::max(1.0, static_cast<double>(m_chain.places.size()));
    answer.leastCost = m_optimum.cost;
    answer.cost = m_rounded.cost;
    answer.bound = m_rounded.bound;
    answer.rmsLeast = std::sqrt(squaresLeast / count);
    answer.rms = std::sqrt(squares / count);
    answer.total = m_rounded.total;
    answer.totalMiss = m_rounded.totalMiss;
    answer.targetMet = m_rounded.expectedMet;
    answer.mu = m_optimum.mu;
    answer.lambda = m_optimum.lambda;
    if (m_chain.odds.empty() || !tier.hasFloor())
        return;
    answer.floorMet = met;
    if (model.kind == ModelKind::fitted) {
        answer.gapLeast = fittedGap(tier, m_optimum.x);
        m_optimum.x.assign(m_rounded.prices.size(), 0); // Only its storage is wanted now.
        std::ranges::transform(m_rounded.prices, m_optimum.x.begin(), inMinor);
        answer.gap = fittedGap(tier, m_optimum.x);
    } else {
        answer.gapLeast = m_optimum.expected - m_floor;
        answer.gap = m_rounded.expected - m_floor;
    }
}

void LeastChange::explain(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish)
{
    const auto solveBounds = [&](std::optional<RuleFamily> without) -> const ChainAnswer& { // Neither total nor target.
        m_eased.build(tier, model, rules, wish.order, wish.takenStay, wish.weights, without);
        return m_solver.solve(m_eased.problem());
    };
    const ChainAnswer& bounds = solveBounds({});
    const bool tooFew = m_eased.reachFloor < m_eased.wantedAtFloor;
    if (tooFew || bounds.status == ChainStatus::boundsCross) {
        m_answer.obstacle = Obstacle::order;
        if (!tooFew)
            m_answer.conflict = {m_eased.places[bounds.conflict.lower], m_eased.places[bounds.conflict.upper]};
        if (m_eased.wantedAtFloor > 0 && solveBounds(RuleFamily::shareAtFloor).status == ChainStatus::solved)
            explainShare(tier, model, rules, wish);
        else if (tooFew)
            m_answer.conflict = {m_eased.places[bounds.conflict.lower], m_eased.places[bounds.conflict.upper]};
        return;
    }
    m_answer.leastTotal = Price{static_cast<std::int64_t>(std::ceil(bounds.leastTotal - 1e-6))};
    m_answer.mostTotal = Price{static_cast<std::int64_t>(std::floor(bounds.mostTotal + 1e-6))};
    ChainProblem problem = problemOf(m_eased);
    problem.expectedMost.reset();
    if (excluded(within(m_goal.wished, m_goal.ruled)) || m_solver.solve(problem).status == ChainStatus::totalOutOfReach) {
        m_answer.obstacle = Obstacle::total;
        explainTotal(tier, model, rules, wish);
        return;
    }
    m_answer.obstacle = Obstacle::target;
    explainTarget(tier, model, rules, wish);
}

void LeastChange::explainTotal(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish)
{
    // How far the totals that a family of rules leaves are from the ones wished for, and the nearest of them.
    struct Nearest {
        double miss = std::numeric_limits<double>::infinity();
        double total = 0;
    };
    const double today = inMinor(m_chain.total);
    const auto nearest = [&](double least, double most, bool ruled) {
        if (ruled && m_goal.ruled) {
            least = std::max(least, inMinor(m_goal.ruled->first));
            most = std::min(most, inMinor(m_goal.ruled->second));
        }
        if (least > most)
            return Nearest{};
        const double wanted =
            m_goal.wished ? std::clamp(std::clamp(today, least, most), inMinor(m_goal.wished->first), inMinor(m_goal.wished->second))
                          : std::clamp(today, least, most);
        const double total = std::clamp(wanted, least, most);
        return Nearest{std::abs(total - wanted), total};
    };
    const Nearest now = nearest(inMinor(m_answer.leastTotal), inMinor(m_answer.mostTotal), true);
    if (const auto left = within(std::pair(m_answer.leastTotal, m_answer.mostTotal), m_goal.ruled); !excluded(left)) {
        m_answer.leastTotal = left->first;
        m_answer.mostTotal = left->second;
    }
    std::vector<std::pair<double, Easing>> found;
    for (const RuleFamily family : {RuleFamily::locks, RuleFamily::changePercent, RuleFamily::changeMoney, RuleFamily::ceiling,
                                    RuleFamily::least, RuleFamily::pointLimits, RuleFamily::tierTotal, RuleFamily::shareAtFloor}) {
        m_eased.build(tier, model, rules, wish.order, wish.takenStay, wish.weights, family);
        ChainProblem problem = m_eased.problem();
        problem.odds = {};
        const ChainAnswer& eased = m_solver.solve(problem);
        if (eased.status != ChainStatus::solved)
            continue;
        const Nearest then = nearest(eased.leastTotal, eased.mostTotal, family != RuleFamily::tierTotal);
        if (then.miss < now.miss - 0.5)
            found.push_back({then.miss, {family, then.total}});
    }
    std::ranges::stable_sort(found, {}, [](const auto& one) { return one.first; });
    for (const auto& [miss, easing] : found)
        m_answer.easings.push_back(easing);
}

/// The units that can come down to the floor, one from the lowest on, with every family of rules set aside in turn.
void LeastChange::explainShare(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish)
{
    m_answer.obstacle = Obstacle::shareAtFloor;
    const auto onOffer = static_cast<double>(std::ranges::count_if(tier.units, &Unit::onOffer));
    PriceRules fewer = rules;
    const auto fits = [&](std::size_t units, std::optional<RuleFamily> without) {
        fewer.leastShareAtFloor = static_cast<double>(units) / onOffer;
        m_trial.build(tier, model, fewer, wish.order, wish.takenStay, wish.weights, without);
        return m_trial.reachFloor == m_trial.wantedAtFloor && m_solver.solve(m_trial.problem()).status == ChainStatus::solved;
    };
    const std::size_t wanted = m_chain.wantedAtFloor;
    const auto reach = [&](std::optional<RuleFamily> without) {
        std::size_t most = 0;
        for (std::size_t beyond = wanted + 1; beyond - most > 1;) {
            const std::size_t middle = most + (beyond - most) / 2;
            (fits(middle, without) ? most : beyond) = middle;
        }
        return most;
    };
    m_answer.wantedAtFloor = wanted;
    m_answer.reachFloor = reach({});
    for (const RuleFamily family : {RuleFamily::locks, RuleFamily::changePercent, RuleFamily::changeMoney, RuleFamily::ceiling,
                                    RuleFamily::least, RuleFamily::pointLimits})
        if (const std::size_t then = reach(family); then > m_answer.reachFloor)
            m_answer.easings.push_back({family, static_cast<double>(then)});
    std::ranges::stable_sort(m_answer.easings, std::greater{}, &Easing::reach);
}

/// The smallest gap, or the greatest share of enquirers who meet the floor, that `chain` allows.
std::optional<double> LeastChange::bestTarget(const Tier& tier, const PriceRules& rules, const LadderChain& chain,
                                              std::optional<RuleFamily> without)
{
    if (m_goal.rungsAtFloor == 0) {
        const ChainAnswer& answer = m_solver.leastExpected(problemOf(chain, without));
        return answer.leastExpected ? std::optional(*answer.leastExpected - m_floor) : std::nullopt;
    }
    const auto fits = [&](std::size_t rungs) {
        m_trial = chain;
        return m_trial.holdAtFloor(rungs, tier.advertisedFloor, rules.points) &&
               m_solver.solve(problemOf(m_trial, without)).status == ChainStatus::solved;
    };
    if (!fits(0))
        return {};
    std::size_t most = 0;
    for (std::size_t beyond = chain.odds.size() + 1; beyond - most > 1;) {
        const std::size_t middle = most + (beyond - most) / 2;
        (fits(middle) ? most : beyond) = middle;
    }
    double share = 0;
    for (std::size_t i = 0; i < most; ++i)
        share += chain.odds[i];
    return share;
}

void LeastChange::explainTarget(const Tier& tier, const ModelSettings& model, const PriceRules& rules, const ChangeWish& wish)
{
    const bool share = m_goal.rungsAtFloor > 0;
    if (model.kind == ModelKind::fitted && !share) {
        m_answer.nearestTarget = m_fittedNearest;
        return;
    }
    m_answer.nearestTarget = bestTarget(tier, rules, m_eased, {});
    if (!m_answer.nearestTarget)
        return;
    for (const RuleFamily family :
         {RuleFamily::locks, RuleFamily::changePercent, RuleFamily::changeMoney, RuleFamily::ceiling, RuleFamily::least,
          RuleFamily::pointLimits, RuleFamily::total, RuleFamily::tierTotal, RuleFamily::shareAtFloor}) {
        PriceRules eased = rules;
        if (family == RuleFamily::pointLimits)
            eased.points.least = eased.points.greatest = std::nullopt;
        m_eased.build(tier, model, rules, wish.order, wish.takenStay, wish.weights, family);
        const auto reach = bestTarget(tier, eased, m_eased, family);
        const double gain = reach ? (share ? *reach - *m_answer.nearestTarget : *m_answer.nearestTarget - *reach) : 0;
        if (gain > (share ? 1e-9 : 1e-3))
            m_answer.easings.push_back({family, *reach});
    }
    std::ranges::stable_sort(m_answer.easings, {}, [&](const Easing& easing) { return share ? -easing.reach : easing.reach; });
}

} // namespace rungwright
