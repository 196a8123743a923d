// SPDX-License-Identifier: GPL-3.0-or-later
// Tracing the trade-off of one tier, apart from the window so that a large one can be traced off its thread.
#pragma once

#include "frontier_plot.h"
#include "scenario.h"

#include <QByteArray>

namespace rungwright
{

/// Holds copies: may be traced while the document changes.
struct FrontierAsk {
    Tier tier;
    ModelSettings model;
    PriceRules rules;
    ChangeWish wish; ///< Without weights.
    FrontierPicture::Against against = FrontierPicture::Against::prices;
};

struct FrontierTraced {
    std::vector<FrontierPoint> curve; ///< Without undefined gaps.
    LeastChangeAnswer why;            ///< Where the curve is empty: what is in the way of any ladder.
};

/// 50 points. Against the total: from 10 % below today's to 10 % above, as far as the rules reach.
FrontierTraced traceFrontier(const FrontierAsk& ask);
inline constexpr double kFrontierPercent = 10;

/// Where a ladder lies in the picture; nothing where its gap is undefined.
std::optional<FrontierPicture::Mark> frontierMark(const FrontierAsk& ask, const QString& name, int candidate,
                                                  std::span<const Price> prices);

/// Curve and named ladders: kind, name, gap, gap_share, typical_change, total_change, currency; RFC 4180, plain numbers in major units,
/// what the picture does not show is empty.
QByteArray frontierCsv(const FrontierPicture& picture);
/// The same with tabs and the locale's numbers, for a spreadsheet.
QString frontierTable(const FrontierPicture& picture);

} // namespace rungwright
