// SPDX-License-Identifier: GPL-3.0-or-later
// A process that saves, to be killed or starved by test_saving.
//   saver loop scenario|sheet|bytes PATH UNITS       saves versions 1 and 2 in turn for ever; says how many microseconds the first took;
//                                                    bytes: the scenario's bytes made beforehand, so that it does nothing but write
//   saver once scenario|sheet PATH UNITS LIMIT       saves version 2 once; LIMIT > 0: no file may grow beyond so many bytes
#include "saved_versions.h"
#include "whole_file.h"

#include <QCoreApplication>
#include <QElapsedTimer>

#include <csignal>
#include <cstdio>
#include <sys/resource.h>

using namespace rungwright::tests;

int main(int count, char** words)
{
    const QCoreApplication app(count, words);
    const QStringList args = QCoreApplication::arguments();
    if (args.size() < 5)
        return 2;
    const Kind kind = args[2] == QStringLiteral("sheet") ? Kind::sheet : Kind::scenario;
    const int units = args[4].toInt();
    if (args[1] == QStringLiteral("once")) {
        const auto limit = static_cast<rlim_t>(args.value(5).toLongLong());
        if (limit > 0) {
            std::signal(SIGXFSZ, SIG_IGN); // So that writing fails with a reason instead of killing the process.
            const rlimit both{limit, limit};
            if (setrlimit(RLIMIT_FSIZE, &both) != 0)
                return 3;
        }
        const auto saved = save(kind, 2, units, args[3]);
        if (!saved.ok())
            std::puts(saved.trouble().c_str());
        return saved.ok() ? 0 : 4;
    }
    const bool bytesOnly = args[2] == QStringLiteral("bytes");
    QByteArray versions[2];
    for (int i = 0; bytesOnly && i < 2; ++i)
        versions[i] = savedBytes(Kind::scenario, 1 + i, units);
    for (int turn = 0;; ++turn) {
        QElapsedTimer timer;
        timer.start();
        const auto saved = bytesOnly ? rungwright::writeWhole(args[3], versions[turn % 2]) : save(kind, 1 + turn % 2, units, args[3]);
        if (!saved.ok()) {
            std::puts(saved.trouble().c_str());
            return 4;
        }
        if (turn == 0) {
            std::printf("%lld\n", static_cast<long long>(timer.nsecsElapsed() / 1000));
            std::fflush(stdout);
        }
    }
}
