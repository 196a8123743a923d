// SPDX-License-Identifier: GPL-3.0-or-later
// The door of this room: what the program does without a window, and how it reads its command line.
#pragma once

#include <QString>
#include <QStringList>

#include <optional>

namespace rungwright
{

/// Puts the process in order before anything else runs: closed standard streams, and a locale that Qt would complain of.
void prepareProcess();

/// The arguments as text, the program's own name first.
QStringList argumentTexts(int argc, char** argv);

/// True when the line asks for a command, for help or for the version: nothing that needs a display.
bool asksForCommand(const QStringList& arguments);
/// Runs it; the exit status.
int runCommand(const QStringList& arguments, char** argv);

/// For the desk: the FILE to open (empty for none). When the line is wrong, says so on standard error and gives nothing: exit with 2.
std::optional<QString> deskFile(const QStringList& arguments);
/// True when there is no display to open a window on, and no other platform was asked for; says so, and what works without one.
bool displayIsMissing(const QStringList& arguments);

} // namespace rungwright
