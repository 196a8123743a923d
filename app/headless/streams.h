// SPDX-License-Identifier: GPL-3.0-or-later
// Standard streams and whole files, with every error noticed.
#pragma once

#include "outcome.h"
#include "request.h"
#include "whole_file.h"

#include <QByteArray>
#include <QString>

namespace rungwright
{

/// Keeps a file that is opened later from taking the place of a standard stream that the caller had closed; writing to such a
/// stream still fails. Call before anything is opened.
void guardStandardStreams();

/// Writes a message to standard error, with a newline behind it; control characters of names in it become blanks. Where that cannot be
/// written nothing can be told.
void say(const QString& message);
/// The same, for a command that ends there.
ExitStatus refuse(ExitStatus status, const std::string& message);

/// Writes all of it, or says why not.
Outcome<bool> writeToStandardOutput(const QByteArray& bytes);
Outcome<bool> writeToStandardOutput(const NextPiece& next);

/// Writes a file whole or not at all. What is there and is no regular file (a pipe, a terminal, a device) is written to, not replaced.
Outcome<bool> writeOut(const QString& path, const QByteArray& bytes);
Outcome<bool> writeOut(const QString& path, const NextPiece& next);

/// True when both name the same existing file, by whatever way.
bool sameFile(const QString& a, const QString& b);

} // namespace rungwright
