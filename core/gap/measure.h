// SPDX-License-Identifier: GPL-3.0-or-later
// One ladder, measured: the figures that window, commands and reports all show.
#pragma once

#include "gap/gap_figures.h"
#include "gap/thinning.h"
#include "ladder/figures.h"

#include <vector>

namespace rungwright
{

/// Everything the tool says of one ladder under one model. Of a tier without a known floor everything that is counted from the floor is
/// undefined: width, standing, the gap figures but the expected cheapest, the thinning curve; belowFloor and atFloor are 0.
struct Measurement {
    std::size_t units = 0;
    std::size_t rentable = 0;
    std::size_t onOffer = 0;
    Price advertisedFloor;
    LadderFigures figures; ///< Of the units on offer.
    ModelKind model = ModelKind::perceived;
    std::vector<Rung> ladder; ///< The sorted units the model works on.
    CheapestOdds odds;
    /// Only for ModelKind::fitted, when feasible. When it is not, the odds are undefined and their note says so.
    std::optional<FittedRange> fit;
    GapFigures gap;
    std::vector<CurtainStep> curtain; ///< Steps; for ModelKind::fitted a polyline.
    std::vector<double> thinning;     ///< Gap for k = 1..size() left, minor units; NaN where undefined.
    std::size_t belowFloor = 0;       ///< Units on offer asked below the advertised floor.
    std::size_t atFloor = 0;          ///< Units on offer asked at or below the advertised floor.
};

enum class MeasureParts : unsigned char { figuresOnly, withCurves };

/// Keeps storage between calls, so that measuring the same tier again (a drag) allocates nothing.
class Measurer
{
public:
    /// `prices` by unit index. Fills and returns a measurement that lives until the next call; copy it to keep it.
    const Measurement& measure(const Tier& tier, std::span<const Price> prices, const ModelSettings& settings,
                               MeasureParts parts = MeasureParts::withCurves);

private:
    Measurement m_result;
    std::vector<Rung> m_onOffer;
    FiguresWorkspace m_figures;
    ThinningWorkspace m_thinning;
};

/// The same, once.
Measurement measured(const Tier& tier, std::span<const Price> prices, const ModelSettings& settings,
                     MeasureParts parts = MeasureParts::withCurves);

} // namespace rungwright
