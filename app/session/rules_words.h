// SPDX-License-Identifier: GPL-3.0-or-later
// Price rules put into words: what one of them forbids, and whose they are.
#pragma once

#include "ladder/currency.h"
#include "scenario.h"

#include <QLocale>
#include <QString>

namespace rungwright
{

/// The rule that binds, with its figure: "greatest change 10 %", "ceiling 95.00", "the unit is locked".
QString boundWords(Bound bound, const PriceRules& rules, const Currency& currency, const QLocale& locale = QLocale());

/// Whose rules: "the whole scenario", "Quillmere Dock", "Small at Quillmere Dock".
QString scopeWords(const RuleScope& scope);

} // namespace rungwright
