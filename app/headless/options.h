// SPDX-License-Identifier: GPL-3.0-or-later
// The option parser all commands share.
#pragma once

#include "commands.h"
#include "outcome.h"

#include <QString>
#include <QStringList>

namespace rungwright
{

/// `arguments` as the program got them: its own name first, then the command's word.
/// The trouble says what is wrong with the line and how to get help. A line that asks for help needs nothing else.
Outcome<Request> readRequest(const Command& command, const QStringList& arguments);

/// Help on one command, and on the program. Both end with a newline.
QString helpText(const Command& command);
QString helpText();

} // namespace rungwright
