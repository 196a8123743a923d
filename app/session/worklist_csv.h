// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist as a table for other programs.
#pragma once

#include "worklist.h"

#include <QByteArray>

#include <span>

namespace rungwright
{

/// RFC 4180, CRLF, UTF-8; header site,tier,on_offer,rentable,advertised_floor,expected_cheapest,gap,gap_share,skew_moment,flags,seen,note,
/// currency. The given tiers in their order. Figures have the fewest digits that read back as the same number (money in major units, at
/// least the currency's decimals where it is a price), a decimal point and no grouping, whatever the locale; undefined ones are empty
/// cells. flags: words with "; " between; seen: "yes" or "no". Texts are guarded as in a price sheet. Of a tier not measured yet everything
/// that is measured is empty.
QByteArray worklistCsv(const Worklist& list, std::span<const int> tiers);

} // namespace rungwright
