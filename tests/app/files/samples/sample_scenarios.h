// SPDX-License-Identifier: GPL-3.0-or-later
// The sample scenarios and unit lists, made anew: all invented, always the same.
#pragma once

#include "scenario.h"

#include <QByteArray>

namespace rungwright::samples
{

Scenario storageSample(); ///< Storage rooms, two sites, six tiers, EUR.
Scenario berthSample();   ///< Berths by boat length and season, JPY.
Scenario studioSample();  ///< Workshop studios, KWD.
Scenario edgeSample();    ///< Every odd tier we could think of.

/// The scenario's current ladders as a unit list (LF line ends). Tiers without units do not appear: a unit list cannot say them.
QByteArray unitListCsv(const Scenario& scenario);
/// 2,400 units of eight invented sites, for the import path; rows mixed over the sites as such lists come.
QByteArray longListCsv();
/// A short list in which eight rows are wrong, each in its own way.
QByteArray refusedListCsv();

} // namespace rungwright::samples
