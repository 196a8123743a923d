// SPDX-License-Identifier: GPL-3.0-or-later
// Sign-offs that are killed, and several at once: each is in the ledger whole or not at all.
#include "invented_entries.h"
#include "ledger.h"

#include <QElapsedTimer>
#include <QProcess>
#include <QTemporaryDir>
#include <QtTest>

#include <atomic>
#include <random>
#include <thread>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

constexpr int kUnits = 150;

std::pair<std::int64_t, std::int64_t> countsIn(const QString& path)
{
    QFile file(path);
    std::int64_t counts[2]{0, 0};
    if (file.open(QIODevice::ReadOnly))
        file.read(reinterpret_cast<char*>(counts), sizeof counts);
    return {counts[0], counts[1]};
}

} // namespace

class TestLedgerAtOnce : public QObject
{
    Q_OBJECT

private slots:
    void killedAtRandomMoments()
    {
        const QTemporaryDir folder;
        // How long one takes on this machine and in this build.
        QElapsedTimer timer;
        timer.start();
        {
            auto ledger = Ledger::open(folder.filePath(QStringLiteral("first.sqlite")), Ledger::For::writing);
            QVERIFY(ledger.ok());
            Ledger open = std::move(ledger).value();
            for (int i = 0; i < 2; ++i)
                QVERIFY(open.record(inventedEntry(i, kUnits)).ok());
        }
        const auto reach = std::max<qint64>(timer.nsecsElapsed() / 1000, 1);
        std::mt19937 dice(200);
        int midway = 0;
        int whole = 0;
        int nothing = 0;
        QString path;
        int there = 0;
        for (int round = 0; round < 200; ++round) {
            if (round % 10 == 0) { // A new ledger, so that its making is killed too.
                path = folder.filePath(QStringLiteral("%1.sqlite").arg(round));
                there = 0;
            }
            const QString counts = folder.filePath(QStringLiteral("counts"));
            QFile empty(counts);
            QVERIFY(empty.open(QIODevice::WriteOnly) && empty.write(QByteArray(16, '\0')) == 16);
            empty.close();
            QProcess signer;
            signer.start(QStringLiteral(RUNGWRIGHT_SIGNER),
                         {QStringLiteral("loop"), path, QString::number(kUnits), counts, QString::number(there)});
            QVERIFY(signer.waitForReadyRead(30'000));
            std::this_thread::sleep_for(std::chrono::microseconds(dice() % static_cast<unsigned long>(reach)));
            signer.kill(); // SIGKILL
            QVERIFY(signer.waitForFinished(30'000));
            QCOMPARE(signer.exitStatus(), QProcess::CrashExit); // It was still at work.
            const auto [begun, done] = countsIn(counts);
            midway += begun > done ? 1 : 0;

            auto opened = Ledger::open(path, Ledger::For::writing);
            QVERIFY2(opened.ok(), opened.ok() ? "" : opened.trouble().c_str());
            Ledger ledger = std::move(opened).value();
            const auto sound = ledger.check();
            QVERIFY2(sound.ok(), sound.ok() ? "" : sound.trouble().c_str());
            const auto lines = ledger.listing().value();
            const auto now = static_cast<int>(lines.size());
            // All that was said to be done is there; and of the one under way, all or nothing.
            QVERIFY2(now >= there + done && now <= there + begun, qPrintable(QStringLiteral("round %1: %2").arg(round).arg(now)));
            if (begun > done)
                ++(now == there + begun ? whole : nothing);
            for (int i = there; i < now; ++i)
                QVERIFY(ledger.entry(lines[static_cast<std::size_t>(i)].id).value() == inventedEntry(i, kUnits));
            there = now;
        }
        qInfo("200 kills: %d fell into a sign-off, of which %d then stood whole and %d not at all", midway, whole, nothing);
        QVERIFY(midway > 50); // Else the kills never tried what this test is for.
        QVERIFY(nothing > 0);
    }

    void manyProcesses()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        constexpr int processes = 4;
        constexpr int each = 30;
        QProcess signers[processes];
        for (int i = 0; i < processes; ++i) // Making the ledger at once, too.
            signers[i].start(QStringLiteral(RUNGWRIGHT_SIGNER),
                             {QStringLiteral("many"), path, QStringLiteral("50"), QString::number(each), QString::number(1000 * i)});
        for (QProcess& signer : signers) {
            QVERIFY(signer.waitForFinished(60'000));
            const QByteArray said = signer.readAll();
            QVERIFY2(signer.exitCode() == 0, said);
            QCOMPARE(said.trimmed().toInt(), each);
        }
        auto ledger = Ledger::open(path, Ledger::For::reading);
        QVERIFY(ledger.ok());
        QVERIFY(ledger.value().check().ok());
        const auto lines = ledger.value().listing().value();
        QCOMPARE(lines.size(), std::size_t{processes * each});
        for (const SignOffLine& line : lines) {
            const auto number = static_cast<int>((line.instant - kFirstInstant) / kHour);
            QVERIFY(ledger.value().entry(line.id).value() == inventedEntry(number, 50));
        }
    }

    // As two windows of one desk: each thread has a ledger of its own, others read meanwhile.
    void manyThreads()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        std::atomic<int> taken{0};
        std::atomic<int> badLooks{0};
        std::atomic<int> looks{0};
        std::atomic<bool> writing{true};
        {
            QVERIFY(Ledger::open(path, Ledger::For::writing).ok());
        }
        std::vector<std::thread> writers;
        for (int thread = 0; thread < 3; ++thread) {
            writers.emplace_back([&, thread] {
                auto opened = Ledger::open(path, Ledger::For::writing);
                if (!opened.ok())
                    return;
                Ledger ledger = std::move(opened).value();
                for (int i = 0; i < 25; ++i)
                    taken += ledger.record(inventedEntry(100 * thread + i, 40)).ok() ? 1 : 0;
            });
        }
        std::thread reader([&] {
            std::size_t most = 0;
            while (writing) {
                auto opened = Ledger::open(path, Ledger::For::reading);
                const auto lines = opened.ok() ? opened.value().listing() : Outcome<std::vector<SignOffLine>>(Trouble{opened.trouble()});
                ++looks;
                if (!lines.ok() || lines.value().size() < most)
                    ++badLooks;
                else
                    most = lines.value().size();
            }
        });
        for (std::thread& writer : writers)
            writer.join();
        writing = false;
        reader.join();
        QCOMPARE(taken.load(), 75);
        QCOMPARE(badLooks.load(), 0);
        QVERIFY(looks > 0);
        const auto ledger = Ledger::open(path, Ledger::For::reading);
        QVERIFY(ledger.ok());
        QCOMPARE(ledger.value().listing().value().size(), std::size_t{75});
    }
};

QTEST_GUILESS_MAIN(TestLedgerAtOnce)
#include "test_ledger_at_once.moc"
