// SPDX-License-Identifier: GPL-3.0-or-later
// Runs the real program, as a shell or cron would.
#pragma once

#include <QByteArray>
#include <QString>
#include <QStringList>

namespace rungwright
{

struct Ran {
    int status = -1;    ///< Exit status; -1 when it did not start, did not end, or was killed.
    QByteArray out;     ///< Standard output.
    QByteArray message; ///< Standard error.
};

/// Without a display: no DISPLAY, no WAYLAND_DISPLAY, no QT_QPA_PLATFORM. `standardOutput`: a file that standard output goes to instead.
Ran run(const QStringList& arguments, const QString& standardOutput = {});

/// The same from a shell, with the program as "$0": `script` is bash, `arguments` are "$@".
Ran runInShell(const QString& script, const QStringList& arguments);

/// What a command that hands figures or prices out says last, on standard error.
QByteArray caution();

/// The path of a sample.
QString sample(const char* name);

/// Writes a small file for a test; its path.
QString written(const QString& path, const QByteArray& bytes);

QByteArray contents(const QString& path);

} // namespace rungwright
