// SPDX-License-Identifier: GPL-3.0-or-later
// Measured ladders as a person reads them in a terminal.
#pragma once

#include "ladder/currency.h"
#include "selection.h"

#include <QLocale>
#include <QString>

namespace rungwright
{

/// A table of one row a tier and each tier's reading in words; for a single ladder all figures as well.
/// Digits and signs are the locale's.
QString measurementsToText(const std::vector<MeasuredLadder>& all, const Currency& currency, const QLocale& locale);

} // namespace rungwright
