// SPDX-License-Identifier: GPL-3.0-or-later
// The desk: the window and all that hangs on it.
#pragma once

#include <QString>

class QApplication;

namespace rungwright
{

/// Opens the window on `file` (a scenario or a unit list; empty: the start page) and runs until it is closed. Returns the exit status.
int runDesk(QApplication& application, const QString& file);

} // namespace rungwright
