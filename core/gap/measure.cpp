// SPDX-License-Identifier: GPL-3.0-or-later
#include "gap/measure.h"

#include <algorithm>

namespace rungwright
{

namespace
{

// Enough for a polyline that looks smooth across a wide screen.
constexpr int kSmoothPoints = 160;

void forgetWhatNeedsTheFloor(Measurement& result)
{
    result.figures.width.reset();
    result.figures.meanStanding.reset();
    result.belowFloor = result.atFloor = 0;
    const std::optional<double> cheapest = result.gap.expectedCheapest;
    result.gap = GapFigures{};
    result.gap.expectedCheapest = cheapest;
}

} // namespace

const Measurement& Measurer::measure(const Tier& tier, std::span<const Price> prices, const ModelSettings& settings, MeasureParts parts)
{
    Measurement& result = m_result;
    sortLadder(tier.units, prices, Among::onOffer, m_onOffer);
    result.units = tier.units.size();
    result.rentable = static_cast<std::size_t>(std::ranges::count_if(tier.units, &Unit::rentable));
    result.onOffer = m_onOffer.size();
    result.advertisedFloor = tier.advertisedFloor;
    result.figures = ladderFigures(m_onOffer, tier.units, tier.advertisedFloor, m_figures);
    result.belowFloor =
        static_cast<std::size_t>(std::ranges::lower_bound(m_onOffer, tier.advertisedFloor, {}, &Rung::price) - m_onOffer.begin());
    result.atFloor =
        static_cast<std::size_t>(std::ranges::upper_bound(m_onOffer, tier.advertisedFloor, {}, &Rung::price) - m_onOffer.begin());

    result.model = settings.kind;
    if (modelUnits(settings.kind) == Among::onOffer)
        result.ladder.assign(m_onOffer.begin(), m_onOffer.end());
    else
        sortLadder(tier.units, prices, modelUnits(settings.kind), result.ladder);
    cheapestOdds(result.ladder, tier.units, settings, result.odds);

    result.fit.reset();
    if (settings.kind == ModelKind::fitted && result.odds.defined()) {
        if (tier.hasFloor())
            result.fit = fitRange(result.ladder, tier.advertisedFloor);
        if (!result.fit) {
            result.odds.perRung.clear();
            result.odds.note = tier.hasFloor() ? OddsNote::fitNotFeasible : OddsNote::noFloor;
        }
    }
    result.gap = result.fit ? gapFigures(*result.fit, *result.odds.left, result.ladder.front().price, tier.advertisedFloor)
                            : gapFigures(result.ladder, result.odds, tier.advertisedFloor);

    if (!tier.hasFloor())
        forgetWhatNeedsTheFloor(result);

    result.curtain.clear();
    result.thinning.clear();
    if (parts == MeasureParts::withCurves && result.odds.defined()) {
        if (result.fit)
            curtainCurve(*result.fit, *result.odds.left, kSmoothPoints, result.curtain);
        else
            curtainSteps(result.ladder, result.odds, result.curtain);
        if (tier.hasFloor())
            thinningCurve(result.ladder, tier.units, settings, result.fit, tier.advertisedFloor, m_thinning, result.thinning);
    }
    return result;
}

Measurement measured(const Tier& tier, std::span<const Price> prices, const ModelSettings& settings, MeasureParts parts)
{
    Measurer measurer;
    return measurer.measure(tier, prices, settings, parts);
}

} // namespace rungwright
