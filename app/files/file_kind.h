// SPDX-License-Identifier: GPL-3.0-or-later
// Scenario or unit list? The two kinds of file that can be opened, told apart by what is in them.
#pragma once

#include <QByteArray>
#include <QString>

namespace rungwright
{

/// True for a scenario, false for a unit list. JSON begins with a brace or a bracket, after any byte order mark and blanks, whatever the
/// file is called. A file that begins otherwise is a unit list, unless it is called `*.json` and its first line has no comma: then it is a
/// damaged scenario, and the scenario reader has the better words for it.
bool looksLikeScenario(const QByteArray& bytes, const QString& fileName);

} // namespace rungwright
