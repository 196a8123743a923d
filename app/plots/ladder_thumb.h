// SPDX-License-Identifier: GPL-3.0-or-later
// A ladder as a small picture: shape, floor and gap at a glance, no words.
#pragma once

#include "ladder/ladder.h"
#include "look.h"

#include <QRectF>

#include <optional>
#include <span>

class QPainter;

namespace rungwright
{

struct ThumbLadder {
    std::span<const Unit> units;
    std::span<const Price> prices; ///< By unit index.
    Price advertisedFloor;
    std::optional<double> expectedCheapest; ///< Minor units.
    /// The price range to show, minor units, so that thumbs side by side compare; nothing = this ladder's own.
    std::optional<double> low;
    std::optional<double> high;
};

/// The rentable units as dots in order of price (on offer strong, the rest faint), the floor dashed, the gap as a band. `where` is filled
/// to its edges but its background is left as it is.
void paintLadderThumb(QPainter& painter, const QRectF& where, const ThumbLadder& ladder, const Look& look);

} // namespace rungwright
