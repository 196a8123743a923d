// SPDX-License-Identifier: GPL-3.0-or-later
#include "terminal_progress.h"

#include <array>
#include <csignal>
#include <cstdio>
#include <string_view>
#include <sys/stat.h>
#include <unistd.h>

namespace rungwright
{

namespace
{

// Over what stands there with blanks: every terminal knows how to do that.
constexpr std::string_view kWiped = "\r                        \r";

void wipe()
{
    // Where it cannot be written there is nothing to wipe.
    [[maybe_unused]] const ssize_t written = ::write(STDERR_FILENO, kWiped.data(), kWiped.size());
}

/// Only what a signal handler may do.
void wipeAndEnd(int signal)
{
    wipe();
    std::signal(signal, SIG_DFL);
    std::raise(signal);
}

sigset_t endings()
{
    sigset_t set;
    sigemptyset(&set);
    for (const int signal : {SIGINT, SIGTERM, SIGHUP})
        sigaddset(&set, signal);
    return set;
}

} // namespace

TerminalProgress::TerminalProgress() : m_terminal(::isatty(STDERR_FILENO) == 1)
{
    m_sinceShown.start();
    if (!m_terminal)
        return;
    // A caller that had Ctrl-C ignored wants it so.
    const auto before = std::signal(SIGINT, wipeAndEnd);
    m_caught = before == SIG_DFL;
    if (!m_caught)
        std::signal(SIGINT, before);
}

TerminalProgress::~TerminalProgress()
{
    if (m_terminal)
        wipe();
    if (m_caught)
        std::signal(SIGINT, SIG_DFL);
}

void TerminalProgress::show(const char* what, double share)
{
    constexpr qint64 patience = 100; // Milliseconds: what is over sooner needs no line, and no eye reads faster.
    if (!m_terminal || m_sinceShown.elapsed() < patience)
        return;
    m_sinceShown.start();
    std::array<char, 64> line{};
    const int length = std::snprintf(line.data(), line.size(), "\r%-10s %3d %%", what, static_cast<int>(100 * share));
    [[maybe_unused]] const ssize_t written = ::write(STDERR_FILENO, line.data(), static_cast<std::size_t>(length));
}

WriteUndisturbed::WriteUndisturbed(const std::string& out)
{
    struct stat there {
    };
    if (out.empty())
        m_held = ::fstat(STDOUT_FILENO, &there) == 0 && S_ISREG(there.st_mode);
    else
        m_held = ::stat(out.c_str(), &there) != 0 || S_ISREG(there.st_mode);
    const sigset_t set = endings();
    if (m_held)
        pthread_sigmask(SIG_BLOCK, &set, nullptr);
}

WriteUndisturbed::~WriteUndisturbed()
{
    const sigset_t set = endings();
    if (m_held)
        pthread_sigmask(SIG_UNBLOCK, &set, nullptr);
}

} // namespace rungwright
