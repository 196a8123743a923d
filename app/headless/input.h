// SPDX-License-Identifier: GPL-3.0-or-later
// FILE, opened: a scenario or a unit list, told apart by what is in it.
#pragma once

#include "outcome.h"
#include "request.h"
#include "scenario.h"

#include <QStringList>

namespace rungwright
{

/// Reads request.file. Notes (unknown columns, rows left out) go to standard error. The trouble lists every refused row, one a line.
/// A scenario has its own currency: another one in --currency is refused, since its prices are in minor units of the first.
Outcome<Scenario> openInput(const Request& request);

/// Whether a regular file holds a scenario, told from its beginning.
bool isScenarioFile(const QString& path);

/// The note on columns that a unit list has and the tool has no use for; none when there are none.
void sayColumnsNotUsed(const QString& file, const QStringList& columns);

} // namespace rungwright
