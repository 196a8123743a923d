// SPDX-License-Identifier: GPL-3.0-or-later
#include "gap/thinning.h"

#include <Eigen/Core>

#include <algorithm>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

using Column = Eigen::Map<Eigen::ArrayXd>;

// Below this a term cannot be seen beside any gap, and dropping it keeps the arithmetic out of the slow subnormal range.
constexpr double kNegligible = 1e-200;

Column sized(std::vector<double>& storage, std::size_t size)
{
    storage.resize(size);
    return {storage.data(), static_cast<Eigen::Index>(size)};
}

/// Distance from rung i to rung i + 1 (counted from 0).
double riseAfter(std::span<const Rung> ladder, std::size_t i) { return inMinor(ladder[i + 1].price - ladder[i].price); }

/// E = p(1) + sum_i ((m-i)/m)^N (p(i+1) - p(i)): the powers of all distinct prices are carried from one N to the next.
void perceivedCurve(std::span<const Rung> ladder, double claim, std::size_t count, ThinningWorkspace& work, std::vector<double>& gap)
{
    Column beyond = sized(work.a, ladder.size());
    Column power = sized(work.b, ladder.size());
    Column rise = sized(work.c, ladder.size());
    Eigen::Index active = 0;
    const auto m = static_cast<double>(ladder.size());
    for (std::size_t i = 0; i + 1 < ladder.size(); ++i) {
        if (const double step = riseAfter(ladder, i); step > 0) {
            beyond[active] = (m - static_cast<double>(i) - 1) / m;
            rise[active] = step;
            ++active;
        }
    }
    power.head(active).setOnes();
    gap.resize(count);
    for (double& at : gap) {
        power.head(active) *= beyond.head(active);
        at = claim + (power.head(active) * rise.head(active)).sum();
        while (active > 0 && power[active - 1] < kNegligible)
            --active;
    }
}

/// P(the i cheapest are all gone | k left) = prod_{j<=i} (M-j+1-k)/(M-j+1), carried from one rung to the next for all k at once.
void remainderCurve(std::span<const Rung> ladder, double claim, ThinningWorkspace& work, std::vector<double>& gap)
{
    const std::size_t units = ladder.size();
    Column gone = sized(work.a, units);
    Column left = sized(work.b, units);
    Column curve = sized(gap, units);
    gone.setOnes();
    left.setLinSpaced(1.0, static_cast<double>(units));
    curve.setConstant(claim);
    auto active = static_cast<Eigen::Index>(units);
    for (std::size_t i = 0; i + 1 < units && active > 0; ++i) {
        const auto there = static_cast<double>(units - i); // Units not yet passed, this rung's among them.
        active = std::min(active, static_cast<Eigen::Index>(units - i) - 1);
        gone.head(active) *= (there - left.head(active)) * (1 / there);
        curve.head(active) += riseAfter(ladder, i) * gone.head(active);
        while (active > 0 && gone[active - 1] < kNegligible)
            --active;
    }
}

/// Backwards over the rungs. With o = a / (1 - a), e_j the elementary symmetric sums of o over the rungs from here up and r_j = e_j /
/// e_{j-1}: given that j of them are free, this rung is free with chance pi_j = o / (r_j + o) (r taken beyond this rung), and r_j becomes
/// (r_j + o) (1 - pi_{j-1}). Ratios of sums of positive terms only: nothing cancels or overflows. Units that are free for certain are
/// counted apart.
void unitCurve(std::span<const Rung> ladder, std::span<const Unit> units, double share, double claim, ThinningWorkspace& work,
               std::vector<double>& gap)
{
    const std::size_t size = ladder.size() + 1;
    Column ratio = sized(work.a, size); // r_j at j
    Column above = sized(work.b, size); // expected cheapest above p(1), given j (uncertain ones) free
    Column kept = sized(work.c, size);  // 1 - pi_j
    ratio.setZero();
    above.setZero();
    Eigen::Index uncertain = 0;
    Eigen::Index certain = 0;
    for (std::size_t i = ladder.size(); i-- > 0;) {
        const double chance = units[ladder[i].unit].vacancyChance.value_or(share);
        const double price = inMinor(ladder[i].price - ladder.front().price);
        if (chance <= 0)
            continue;
        if (chance >= 1) {
            ++certain;
            above.head(uncertain + 1).setConstant(price);
            continue;
        }
        const double o = chance / (1 - chance);
        ++uncertain;
        auto r = ratio.segment(1, uncertain);
        auto k = kept.segment(1, uncertain);
        k = r / (r + o);
        above.segment(1, uncertain) = k * above.segment(1, uncertain) + (o / (r + o)) * price;
        r += o;
        ratio.segment(2, uncertain - 1) *= kept.segment(1, uncertain - 1);
    }
    gap.assign(ladder.size(), std::numeric_limits<double>::quiet_NaN());
    for (Eigen::Index j = certain > 0 ? 0 : 1; j <= uncertain; ++j)
        gap[static_cast<std::size_t>(certain + j - 1)] = claim + above[j];
}

// Several loads walk up the servers together: the walk is one long chain of divisions, and side by side they overlap.
constexpr int kLanes = 16;
using Lanes = Eigen::Array<double, kLanes, 1>;

/// Loads at which k of `servers` are free on average, k = 1..servers-1, each as loadForCarried() finds them.
void batchLoads(int servers, std::vector<double>& loads)
{
    loads.resize(static_cast<std::size_t>(std::max(servers - 1, 0)));
    for (int first = 1; first < servers; first += kLanes) {
        // Lanes beyond the last k repeat it.
        const Lanes wanted = Lanes::LinSpaced(first, first + kLanes - 1).min(servers - 1.0);
        const Lanes least = servers - wanted;
        Lanes load = least + 1;
        for (int step = 0; step < 60; ++step) {
            Lanes loss = Lanes::Ones();
            Lanes free = Lanes::Zero();
            for (int i = 1; i <= servers; ++i) {
                const Lanes share = (i + load * loss).inverse();
                free = i * (free + 1) * share;
                loss *= load * share;
                loss = (loss < kNegligible).select(0.0, loss);
            }
            // Newton's method on wanted / F - 1, as in loadForCarried().
            const Lanes slope = wanted * (1 - loss * (1 + free)) / (free * free);
            const Lanes next = (load - (wanted / free - 1) / slope).max(least);
            // The next step would be some square of this one: far below what rounding leaves.
            const bool settledAll = ((next - load).abs() <= 1e-9 * next).all();
            load = next;
            if (settledAll)
                break;
        }
        for (int lane = 0; lane < kLanes && first + lane < servers; ++lane)
            loads[static_cast<std::size_t>(first + lane - 1)] = load[lane];
    }
}

void turnoverCurve(std::span<const Rung> ladder, double claim, ThinningWorkspace& work, std::vector<double>& gap)
{
    const auto servers = static_cast<int>(ladder.size());
    if (work.loadsFor != servers) {
        batchLoads(servers, work.loads);
        work.loadsFor = servers;
    }
    gap.assign(ladder.size(), claim); // k = M, the limit of no load, is the lowest price itself.
    for (int first = 1; first < servers; first += kLanes) {
        const int used = std::min(kLanes, servers - first);
        Lanes load = Lanes::Constant(work.loads[static_cast<std::size_t>(first - 1)]);
        load.head(used) = Eigen::Map<const Eigen::ArrayXd>(work.loads.data() + first - 1, used);
        Lanes loss = Lanes::Ones();
        Lanes free = Lanes::Zero();
        Lanes found = Lanes::Zero();
        Lanes above = Lanes::Zero();
        for (int i = 1; i <= servers; ++i) {
            // As the odds of one load, turnoverOdds().
            const Lanes share = (i + load * loss).inverse();
            const Lanes ratio = (free + 1) * share;
            const Lanes odds = loss * ratio;
            found += odds;
            above += odds * inMinor(ladder[static_cast<std::size_t>(i - 1)].price - ladder.front().price);
            free = i * ratio;
            loss *= load * share;
            if ((loss < kNegligible).all())
                break;
        }
        above /= found;
        Eigen::Map<Eigen::ArrayXd>(gap.data() + first - 1, used) += above.head(used);
    }
}

} // namespace

void thinningCurve(std::span<const Rung> ladder, std::span<const Unit> units, const ModelSettings& settings,
                   const std::optional<FittedRange>& fit, Price advertisedFloor, ThinningWorkspace& work, std::vector<double>& gap)
{
    gap.clear();
    const Settled inputs = settled(ladder, units, settings);
    if (inputs.note)
        return;
    const auto rentable = static_cast<std::size_t>(std::ranges::count_if(units, &Unit::rentable));
    const double claim = inMinor(ladder.front().price - advertisedFloor);
    switch (settings.kind) {
    case ModelKind::perceived:
        perceivedCurve(ladder, claim, rentable, work, gap);
        break;
    case ModelKind::fitted:
        if (fit) {
            expectedCheapestForAll(*fit, static_cast<int>(rentable), gap);
            for (double& at : gap)
                at -= inMinor(advertisedFloor);
        }
        break;
    case ModelKind::remainder:
        remainderCurve(ladder, claim, work, gap);
        break;
    case ModelKind::unit:
        unitCurve(ladder, units, inputs.share, claim, work, gap);
        break;
    case ModelKind::turnover:
        turnoverCurve(ladder, claim, work, gap);
        break;
    case ModelKind::onHand:
        for (std::size_t left = 1; left <= ladder.size(); ++left)
            gap.push_back(inMinor(ladder[ladder.size() - left].price - advertisedFloor));
        break;
    }
}

} // namespace rungwright
