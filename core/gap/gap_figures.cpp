// SPDX-License-Identifier: GPL-3.0-or-later
#include "gap/gap_figures.h"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

/// The least rung price whose cumulated odds reach p, out of odds that add up to `found`.
double quantile(std::span<const Rung> ladder, std::span<const double> odds, double found, double p)
{
    const double roundings = (static_cast<double>(odds.size()) + 8) * std::numeric_limits<double>::epsilon();
    const double wanted = found * (p - roundings);
    double reached = 0;
    std::size_t last = 0;
    for (std::size_t i = 0; i < odds.size(); ++i) {
        reached += odds[i];
        if (odds[i] > 0)
            last = i;
        if (odds[i] > 0 && reached >= wanted)
            return inMinor(ladder[i].price);
    }
    return inMinor(ladder[last].price);
}

void fill(GapFigures& figures, double aboveLowest, Price lowest, Price advertisedFloor)
{
    figures.expectedCheapest = inMinor(lowest) + aboveLowest;
    figures.claimPart = inMinor(lowest - advertisedFloor);
    figures.shapePart = aboveLowest;
    figures.gap = *figures.claimPart + aboveLowest;
    if (advertisedFloor.minor > 0)
        figures.gapShare = *figures.gap / inMinor(advertisedFloor);
}

} // namespace

GapFigures gapFigures(std::span<const Rung> ladder, const CheapestOdds& odds, Price advertisedFloor)
{
    GapFigures figures;
    if (!odds.defined())
        return figures;
    assert(odds.perRung.size() == ladder.size());
    // From the lowest price up, so that a small gap between large prices loses nothing. The odds' own sum is 1 - none without the
    // cancellation that would have where nearly nothing is ever on offer.
    const Price lowest = ladder.front().price;
    double found = 0;
    double above = 0;
    double met = 0;
    for (std::size_t i = 0; i < ladder.size(); ++i) {
        found += odds.perRung[i];
        above += odds.perRung[i] * inMinor(ladder[i].price - lowest);
        if (ladder[i].price <= advertisedFloor)
            met += odds.perRung[i];
    }
    if (!(found > 0))
        return figures;
    fill(figures, above / found, lowest, advertisedFloor);
    figures.chanceFloorMet = met / found;
    figures.gapMedian = quantile(ladder, odds.perRung, found, 0.5) - inMinor(advertisedFloor);
    figures.gapP90 = quantile(ladder, odds.perRung, found, 0.9) - inMinor(advertisedFloor);
    return figures;
}

GapFigures gapFigures(const FittedRange& fit, double n, Price lowest, Price advertisedFloor)
{
    GapFigures figures;
    fill(figures, expectedCheapest(fit, n) - inMinor(lowest), lowest, advertisedFloor);
    figures.chanceFloorMet = 1 - std::pow(fit.survival(inMinor(advertisedFloor)), n);
    figures.gapMedian = cheapestQuantile(fit, n, 0.5) - inMinor(advertisedFloor);
    figures.gapP90 = cheapestQuantile(fit, n, 0.9) - inMinor(advertisedFloor);
    return figures;
}

void curtainSteps(std::span<const Rung> ladder, const CheapestOdds& odds, std::vector<CurtainStep>& out)
{
    out.clear();
    if (!odds.defined())
        return;
    assert(odds.perRung.size() == ladder.size());
    out.reserve(ladder.size()); // However many are tied this time.
    for (std::size_t i = 0; i < ladder.size(); ++i) {
        if (i == 0 || ladder[i].price != ladder[i - 1].price)
            out.push_back({inMinor(ladder[i].price), 0});
        out.back().chance += odds.perRung[i];
    }
    while (!out.empty() && out.back().chance <= 0)
        out.pop_back();
    // Tails are summed from the far end: they never increase, and the first is the whole exactly.
    double tail = 0;
    for (auto step = out.rbegin(); step != out.rend(); ++step)
        step->chance = tail += step->chance;
    for (CurtainStep& step : out)
        step.chance /= tail;
}

void curtainCurve(const FittedRange& fit, double n, int smoothPoints, std::vector<CurtainStep>& out)
{
    out.clear();
    assert(smoothPoints >= 4);
    // The fall may be a small part of the range: all points but the two ends go between its first and last thousandth.
    const double from = cheapestQuantile(fit, n, 0.001);
    const double to = cheapestQuantile(fit, n, 0.999);
    out.push_back({fit.floor, 1});
    const int inner = smoothPoints - 2;
    for (int i = 0; i < inner; ++i) {
        const double price = from + (to - from) * i / (inner - 1);
        out.push_back({price, std::min(out.back().chance, std::pow(fit.survival(price), n))});
    }
    out.push_back({fit.highest, 0});
}

} // namespace rungwright
