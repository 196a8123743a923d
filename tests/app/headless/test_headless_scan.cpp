// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist of a list of some size: the same bytes by any number of threads and by either way of reading, and whole or not at all.
#include "invented_list.h"
#include "program.h"

#include <QDir>
#include <QElapsedTimer>
#include <QProcess>
#include <QTemporaryDir>
#include <QTest>

#include <csignal>

using namespace rungwright;

class TestHeadlessScan : public QObject
{
    Q_OBJECT

private:
    QTemporaryDir m_folder;
    QString m_list;
    QByteArray m_wanted;

    QString at(const char* name) const { return m_folder.filePath(QString::fromLatin1(name)); }
    QByteArray scanned(const QString& file, const QStringList& options)
    {
        const Ran ran = run(QStringList{QStringLiteral("scan"), file} + options);
        return ran.status == 0 && ran.message == caution() ? ran.out : "status " + QByteArray::number(ran.status) + ": " + ran.message;
    }

private slots:
    void initTestCase()
    {
        QByteArray bytes;
        benchmarks::inventedList(20'000, [&bytes](std::string_view piece) { bytes.append(piece.data(), qsizetype(piece.size())); });
        m_list = written(at("list.csv"), bytes);
        m_wanted = scanned(m_list, {QStringLiteral("--threads"), QStringLiteral("1")});
        QCOMPARE(m_wanted.count('\n'), 401); // 50 units a tier, and the headings.
        QVERIFY(m_wanted.startsWith("site,tier,candidate,units,"));
    }

    void sameBytesForAnyNumberOfThreads()
    {
        QCOMPARE(scanned(m_list, {}), m_wanted);
        for (const char* threads : {"2", "7", "64"})
            QCOMPARE(scanned(m_list, {QStringLiteral("--threads"), QString::fromLatin1(threads)}), m_wanted);
    }

    // UTF-16 is read by the careful reader only, which keeps every unit whole.
    void sameBytesByTheCarefulReader()
    {
        const QString text = QString::fromUtf8(contents(m_list));
        QByteArray wide("\xFF\xFE", 2);
        for (const QChar c : text) {
            wide += char(c.unicode() & 0xFF);
            wide += char(c.unicode() >> 8);
        }
        const QString list = written(at("wide.csv"), wide);
        for (const char* threads : {"1", "2", "7"})
            QCOMPARE(scanned(list, {QStringLiteral("--threads"), QString::fromLatin1(threads)}), m_wanted);
        for (const char* model : {"fitted", "unit", "turnover"}) {
            const QStringList options{QStringLiteral("--model"), QString::fromLatin1(model)};
            QCOMPARE(scanned(list, options), scanned(m_list, options));
        }
    }

    // A pipe can be read once only.
    void sameBytesOutOfAPipe()
    {
        const Ran named =
            runInShell(QStringLiteral("mkfifo \"$2\" && { cat \"$1\" >\"$2\" & } && timeout 60 \"$0\" scan \"$2\""), {m_list, at("pipe")});
        QCOMPARE(named.message, caution());
        QCOMPARE(named.out, m_wanted);
        const Ran substituted = runInShell(QStringLiteral("timeout 60 \"$0\" scan <(cat \"$1\")"), {m_list});
        QCOMPARE(substituted.message, caution());
        QCOMPARE(substituted.out, m_wanted);
    }

    void worstFirst()
    {
        const QList<QByteArray> lines = m_wanted.split('\n');
        const qsizetype column = lines[0].split(',').indexOf("gap_share");
        QVERIFY(column > 0);
        double before = std::numeric_limits<double>::infinity();
        bool undefined = false;
        int defined = 0;
        for (const QByteArray& line : lines.mid(1, 400)) {
            const QByteArray cell = line.split(',')[column]; // No name in this list has a comma.
            QVERIFY(!undefined || cell.isEmpty());
            undefined = cell.isEmpty();
            if (undefined)
                continue;
            ++defined;
            QVERIFY(cell.toDouble() <= before);
            before = cell.toDouble();
        }
        QVERIFY(defined > 300);
    }

    void unitTwiceIsRefusedWithItsLines()
    {
        QByteArray bytes = contents(m_list);
        const qsizetype second = bytes.indexOf('\n') + 1;
        bytes += bytes.mid(second, bytes.indexOf('\n', second) - second + 1);
        const QString list = written(at("twice.csv"), bytes);
        const Ran ran = run({QStringLiteral("scan"), list});
        QCOMPARE(ran.status, 3);
        QVERIFY2(ran.message.contains(":20002: column 'unit': the unit is there already, on line 2"), ran.message.constData());
        QVERIFY(ran.out.isEmpty());
    }

    void columnsNotUsedAreTold()
    {
        const QString list = written(at("remark.csv"), "site,tier,unit,asking_price,status,advertised_floor,remark\nQ,T,U,7,vacant,6,x\n");
        const Ran ran = run({QStringLiteral("scan"), list});
        QCOMPARE(ran.status, 0);
        QCOMPARE(QString::fromUtf8(ran.message), list + QStringLiteral(": columns not used: remark\n") + QString::fromUtf8(caution()));
        const Ran over = run({QStringLiteral("scan"), list, QStringLiteral("--out"), list});
        QCOMPARE(over.status, 2);
        QVERIFY(contents(list).startsWith("site,"));
    }

    void threadsMustBeANumber()
    {
        for (const char* threads : {"0", "-1", "two", "1.5", "100000"}) {
            const Ran ran = run({QStringLiteral("scan"), m_list, QStringLiteral("--threads"), QString::fromLatin1(threads)});
            QCOMPARE(ran.status, 2);
            QVERIFY2(ran.message.contains("--threads wants a whole number from 1 to 1024"), ran.message.constData());
        }
    }

    // Ctrl-C at any moment: the worklist is there whole, or what stood there before, and nothing beside it.
    void interrupted()
    {
        QVERIFY(QDir(m_folder.path()).mkdir(QStringLiteral("out")));
        const QString out = at("out/worklist.csv");
        QElapsedTimer whole;
        whole.start();
        scanned(m_list, {});
        const qint64 usual = whole.nsecsElapsed() / 1000;
        int ended = 0;
        for (int round = 0; round < 24; ++round) {
            written(out, "before\n");
            QProcess process;
            process.start(QStringLiteral(RUNGWRIGHT_PROGRAM), {QStringLiteral("scan"), m_list, QStringLiteral("--out"), out});
            QVERIFY(process.waitForStarted());
            QTest::qSleep(int(usual * round / 20 / 1000)); // Not waiting for anything: the moment is what is tried.
            ::kill(pid_t(process.processId()), SIGINT);
            QVERIFY(process.waitForFinished(120'000));
            const QByteArray there = contents(out);
            QVERIFY2(there == "before\n" || there == m_wanted, there.left(200).constData());
            QCOMPARE(QDir(at("out")).entryList(QDir::AllEntries | QDir::Hidden | QDir::NoDotAndDotDot),
                     QStringList{QStringLiteral("worklist.csv")});
            ended += process.exitStatus() == QProcess::CrashExit;
        }
        QVERIFY(ended > 0);
    }
};

QTEST_GUILESS_MAIN(TestHeadlessScan)
#include "test_headless_scan.moc"
