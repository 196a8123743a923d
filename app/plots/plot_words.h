// SPDX-License-Identifier: GPL-3.0-or-later
// What plots say: titles, tool tips, and the descriptions that stand for the picture where it cannot be seen.
#pragma once

#include "gap/measure.h"
#include "ladder/currency.h"

#include <QString>

namespace rungwright
{

class Workbench;

/// A name from the user's data, kept from turning the reading direction of the text around it.
QString isolated(const QString& name);
QString isolated(const std::string& utf8);

/// "asking price, EUR"; without a code where the currency was not said.
QString priceAxisTitle(const Currency& currency);
QString gapAxisTitle(const Currency& currency);
QString statusText(Status status);

/// "Harbour Street · Room 14-16 · Lower the low end".
QString benchHeading(const Workbench& bench);
/// Name, price, status, grade, area, and the unit's chance of being the cheapest found.
QString unitToolTip(const Workbench& bench, std::uint32_t unit);

QString ladderDescription(const Workbench& bench);
QString curtainDescription(const Workbench& bench);
QString thinningDescription(const Workbench& bench);

/// The number left that the thinning marker stands at: the model's own, or the number on offer for models without one; 0 for none.
int numberLeft(const Measurement& m);

} // namespace rungwright
