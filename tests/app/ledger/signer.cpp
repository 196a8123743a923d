// SPDX-License-Identifier: GPL-3.0-or-later
// A process that records sign-offs, to be killed, starved or run beside another.
//   signer loop PATH UNITS COUNTS FIRST   records numbers FIRST, FIRST + 1, ... for ever; COUNTS is a file of two 64-bit numbers, kept
//                                         up to date: sign-offs begun and sign-offs that were said to be done
//   signer many PATH UNITS COUNT FIRST    records COUNT of them; says how many were taken
//   signer once PATH UNITS LIMIT          records one; LIMIT > 0: no file may grow beyond so many bytes
#include "invented_entries.h"
#include "ledger.h"

#include <QCoreApplication>
#include <QFile>

#include <csignal>
#include <cstdio>
#include <sys/resource.h>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

int complain(const std::string& words)
{
    std::puts(words.c_str());
    return 4;
}

int loop(const QStringList& args)
{
    QFile counts(args[4]);
    if (!counts.open(QIODevice::ReadWrite))
        return 3;
    // Shared memory outlives a killed process.
    auto* count = reinterpret_cast<volatile std::int64_t*>(counts.map(0, 2 * sizeof(std::int64_t)));
    if (!count)
        return 3;
    std::puts("ready");
    std::fflush(stdout);
    auto ledger = Ledger::open(args[2], Ledger::For::writing);
    if (!ledger.ok())
        return complain(ledger.trouble());
    Ledger open = std::move(ledger).value();
    for (int number = args[5].toInt();; ++number) {
        const SignOff entry = inventedEntry(number, args[3].toInt());
        count[0] = count[0] + 1;
        const auto done = open.record(entry);
        if (!done.ok())
            return complain(done.trouble());
        count[1] = count[1] + 1;
    }
}

} // namespace

int main(int count, char** words)
{
    const QCoreApplication app(count, words);
    const QStringList args = QCoreApplication::arguments();
    if (args.size() < 5)
        return 2;
    if (args[1] == QStringLiteral("loop"))
        return loop(args);
    int many = args[4].toInt();
    if (args[1] == QStringLiteral("once")) {
        const auto limit = static_cast<rlim_t>(args[4].toLongLong());
        many = 1;
        std::signal(SIGXFSZ, SIG_IGN); // So that writing fails with a reason instead of killing the process.
        const rlimit both{limit, limit};
        if (limit > 0 && setrlimit(RLIMIT_FSIZE, &both) != 0)
            return 3;
    }
    auto ledger = Ledger::open(args[2], Ledger::For::writing);
    if (!ledger.ok())
        return complain(ledger.trouble());
    Ledger open = std::move(ledger).value();
    int taken = 0;
    for (int i = 0; i < many; ++i) {
        const auto done = open.record(inventedEntry(args.value(5).toInt() + i, args[3].toInt()));
        if (!done.ok())
            return complain(done.trouble());
        ++taken;
    }
    std::printf("%d\n", taken);
    return 0;
}
