// SPDX-License-Identifier: GPL-3.0-or-later
// What the user should have seen before a price sheet leaves the tool, in plain words.
#pragma once

#include "gap/measure.h"
#include "scenario.h"

#include <QStringList>

#include <span>

namespace rungwright
{

/// One sentence each, none when there is nothing to remark: the advertised floor is not on sale, units asked below it, inversions of grade,
/// new prices beyond the rules. Reminders, not verdicts. `sheet` is the measurement of `prices` (one a unit, by unit index). Rules bind
/// changes only; a lock is no breach here, as a unit may have been locked at its new price.
QStringList sheetRemarks(const Tier& tier, std::span<const Price> prices, const Measurement& sheet, const PriceRules& rules,
                         const Currency& currency);

} // namespace rungwright
