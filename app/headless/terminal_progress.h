// SPDX-License-Identifier: GPL-3.0-or-later
// How far a long command is, on one line of a terminal; and Ctrl-C, which leaves neither that line nor half a file.
#pragma once

#include <QElapsedTimer>

#include <string>

namespace rungwright
{

/// Rewrites one line of standard error in place when that is a terminal, and says nothing otherwise. The line is gone when this is, also
/// when Ctrl-C ends the program. One at a time.
class TerminalProgress
{
public:
    TerminalProgress();
    ~TerminalProgress();
    TerminalProgress(const TerminalProgress&) = delete;
    TerminalProgress& operator=(const TerminalProgress&) = delete;

    /// `what` is in the command's own words ("reading"); `share` from 0 to 1. Cheap to call often.
    void show(const char* what, double share);

private:
    bool m_terminal = false;
    bool m_caught = false; ///< Ctrl-C is ours to tidy up after.
    QElapsedTimer m_sinceShown;
};

/// Holds Ctrl-C and a termination back while a result is written to a file: the program ends when the file is whole. A reader at the
/// other end of a pipe, who may never read, is not waited for like that.
class WriteUndisturbed
{
public:
    /// `out` is where the result goes; empty for standard output, which may be a file or not.
    explicit WriteUndisturbed(const std::string& out);
    ~WriteUndisturbed();
    WriteUndisturbed(const WriteUndisturbed&) = delete;
    WriteUndisturbed& operator=(const WriteUndisturbed&) = delete;

private:
    bool m_held = false;
};

} // namespace rungwright
