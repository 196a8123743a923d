// SPDX-License-Identifier: GPL-3.0-or-later
// Scenario files, `*.rungs.json`.
#pragma once

#include "outcome.h"
#include "scenario.h"

#include <QByteArray>
#include <QString>

namespace rungwright
{

inline constexpr int kScenarioVersion = 3;

/// UTF-8 JSON, two-space indented, one unit a line, keys in a fixed order, prices as decimal strings ("69.00"): two writings
/// of equal scenarios are byte-identical, and differences read well. Ends with a newline.
QByteArray scenarioToJson(const Scenario& scenario);

/// Reads what scenarioToJson writes, of this or an older version. Messages start with `fileName`, and name line and column for malformed
/// JSON, or the place ("tiers[2].units[5].price") for a wrong value, what was found and what is wanted. A newer version is refused.
Outcome<Scenario> scenarioFromJson(const QByteArray& json, const QString& fileName);

Outcome<Scenario> loadScenario(const QString& path);
/// Whole or not at all (QSaveFile): on any error, a full disk included, the old file stands and the message says why. What is to be written
/// is read first: a scenario that could not be opened again as it is (a text that is not UTF-8, a price of 0) is not written.
Outcome<bool> saveScenario(const Scenario& scenario, const QString& path);

} // namespace rungwright
