// SPDX-License-Identifier: GPL-3.0-or-later
// Unit lists from disk: a million rows, little memory, progress, cancelling, and files that cannot be opened.
#include "file_helpers.h"

#include <QElapsedTimer>
#include <QFile>
#include <QTemporaryDir>
#include <QtTest>

#include <malloc.h>
#include <sys/stat.h>
#include <thread>

using namespace rungwright;
using namespace rungwright::tests;

#if defined(__SANITIZE_ADDRESS__)
#define RUNGWRIGHT_SANITIZED 1
#elif defined(__has_feature)
#if __has_feature(address_sanitizer)
#define RUNGWRIGHT_SANITIZED 1
#endif
#endif

namespace
{

// One figure of /proc/self/status in kB ("VmHWM", "VmRSS"); -1 where there is no such file.
qint64 memoryKb(const char* key)
{
    QFile status(QStringLiteral("/proc/self/status"));
    if (!status.open(QIODevice::ReadOnly))
        return -1;
    for (const QByteArray& line : status.readAll().split('\n')) {
        if (line.startsWith(key))
            return line.mid(qsizetype(qstrlen(key)) + 1).trimmed().split(' ').first().toLongLong();
    }
    return -1;
}

} // namespace

class TestLargeLists : public QObject
{
    Q_OBJECT

private:
    QTemporaryDir m_folder;

    QString write(const QString& name, int rows, const char* price)
    {
        QFile file(m_folder.filePath(name));
        if (!file.open(QIODevice::WriteOnly))
            return {};
        QByteArray text = kNeededHeader + ",currency\n";
        for (int i = 0; i < rows; ++i) {
            text += "Site " + QByteArray::number(i / 50'000) + ",Tier " + QByteArray::number(i / 5'000 % 10) + ",U-" +
                    QByteArray::number(i) + ',' + price + ",vacant,60.00,EUR\n";
            if (text.size() > 1'000'000) {
                file.write(text);
                text.clear();
            }
        }
        file.write(text);
        return file.fileName();
    }

private slots:
    void initTestCase() { QVERIFY(m_folder.isValid()); }

    // Every row is refused, so the result is small: what memory grows by is the reading's own.
    void memoryDoesNotGrowWithTheFile()
    {
#ifdef RUNGWRIGHT_SANITIZED
        QSKIP("the address sanitizer keeps freed memory, so that peak memory says nothing here; the plain build checks it");
#endif
        const QString path = write(QStringLiteral("refused.csv"), 1'000'000, "dear");
        QFile reset(QStringLiteral("/proc/self/clear_refs"));
        if (!reset.open(QIODevice::WriteOnly) || reset.write("5") != 1 || !reset.flush())
            QSKIP("this system does not let the peak memory be reset");
        malloc_trim(0); // What was freed before must not hide what is taken now.
        const qint64 before = memoryKb("VmRSS");
        const UnitListResult read = loadUnitList(path, {});
        QCOMPARE(read.refusedCount, qint64(1'000'000));
        const qint64 grown = memoryKb("VmHWM") - before;
        qInfo("%lld MB read with %lld kB more at the peak", QFileInfo(path).size() >> 20, grown);
        // A piece, its text and 1,000 messages come to about 2 MB; 16 MB leaves room for the allocator and is far below the file's 50.
        QVERIFY2(grown < 16'384, qPrintable(QString::number(grown)));
    }

    void aMillionRows()
    {
        const QString path = write(QStringLiteral("million.csv"), 1'000'000, "82.50");
        QElapsedTimer timer;
        timer.start();
        std::vector<double> shares;
        const UnitListResult read = loadUnitList(path, {}, [&shares](double share) {
            shares.push_back(share);
            return true;
        });
        const qint64 took = timer.elapsed();
        qInfo("1,000,000 rows (%lld MB) in %lld ms", QFileInfo(path).size() >> 20, took);
        QVERIFY2(read.clean(), qPrintable(read.fileTrouble));
        QCOMPARE(read.rowsTaken, qint64(1'000'000));
        QCOMPARE(read.tiers.size(), std::size_t(200));
        for (const TierCase& tierCase : read.tiers)
            QCOMPARE(tierCase.tier.units.size(), std::size_t(5'000));
        // A few seconds are meant; 60 s leaves room for sanitizers on a busy machine and still fails on anything quadratic.
        QVERIFY(took < 60'000);
        QVERIFY(shares.size() > 100);
        QVERIFY(std::is_sorted(shares.begin(), shares.end()));
        QVERIFY(shares.front() > 0);
        QCOMPARE(shares.back(), 1.0);
    }

    void cancel()
    {
        const QString path = write(QStringLiteral("cancel.csv"), 100'000, "82.50");
        int calls = 0;
        const UnitListResult read = loadUnitList(path, {{}, true}, [&calls](double) { return ++calls < 3; });
        QCOMPARE(calls, 3);
        QVERIFY(read.fileTrouble.contains(QStringLiteral("cancelled")));
        QVERIFY(read.tiers.empty());
        QCOMPARE(read.rowsTaken, qint64(0));
    }

    void badByteFarInside()
    {
        const QString path = write(QStringLiteral("far.csv"), 50'000, "82.50");
        QFile file(path);
        QVERIFY(file.open(QIODevice::Append));
        file.write("Q,T,Caf\xE9,7,vacant,6,EUR\n");
        const qint64 byte = QFileInfo(path).size() + 8;
        file.close();
        const QString trouble = loadUnitList(path, {}).fileTrouble;
        QVERIFY2(trouble.startsWith(QStringLiteral("%1:50002: byte %2 of the file: ").arg(path, QString::number(byte))),
                 qPrintable(trouble));
    }

    void cannotBeOpened()
    {
        const QString missing = m_folder.filePath(QStringLiteral("missing.csv"));
        QCOMPARE(loadUnitList(missing, {}).fileTrouble, missing + QStringLiteral(": cannot be opened: No such file or directory"));
        QCOMPARE(loadUnitList(m_folder.path(), {}).fileTrouble, m_folder.path() + QStringLiteral(": is a folder, not a file"));
    }

    // Shells hand over pipes (<(...)), which can be read once only.
    void pipe()
    {
        const QByteArray path = m_folder.filePath(QStringLiteral("pipe")).toLocal8Bit();
        QCOMPARE(mkfifo(path.constData(), 0600), 0);
        std::thread writer([&path] {
            QFile out(QString::fromLocal8Bit(path));
            if (out.open(QIODevice::WriteOnly))
                out.write(unitList({"Q,T,U,7,vacant,6"}));
        });
        const UnitListResult read = loadUnitList(QString::fromLocal8Bit(path), {});
        writer.join();
        QVERIFY2(read.clean(), qPrintable(read.fileTrouble));
        QCOMPARE(read.rowsTaken, qint64(1));
    }

    void endlessDevice()
    {
        const QString trouble = loadUnitList(QStringLiteral("/dev/zero"), {}).fileTrouble;
        QVERIFY2(trouble.contains(QStringLiteral("larger than 256 MB")), qPrintable(trouble));
    }

    // The currency is named nowhere although there is a column for it: the look ahead goes through the whole file, and can be cancelled
    // too.
    void cancelWhileLookingForTheCurrency()
    {
        QByteArray text = kNeededHeader + ",currency\n";
        for (int i = 0; i < 100'000; ++i)
            text += "Q,T,U" + QByteArray::number(i) + ",7,vacant,6,\n";
        int calls = 0;
        const UnitListResult read = readUnitList(text, QStringLiteral("F"), {}, [&calls](double) { return ++calls < 2; });
        QCOMPARE(calls, 2);
        QVERIFY(read.fileTrouble.contains(QStringLiteral("cancelled")));
        QCOMPARE(readList(text).rowsTaken, qint64(100'000));
    }

    // Bytes thrown at the reader, from a fixed seed: whatever they are, it comes back, and what it takes holds together.
    void damagedLists()
    {
        Dice dice(20261201);
        const QByteArray good = unitList({"Q,T,U,7,vacant,6", "\"Q, x\",T,\"V \"\"w\"\"\",7.50,occupied,6", "Q,T,倉,8,closed,"});
        for (int round = 0; round < 4000; ++round) {
            QByteArray bytes = good;
            for (int i = dice.whole(1, 6); i > 0; --i) {
                const int at = dice.whole(0, int(bytes.size()) - 1);
                switch (dice.whole(0, 3)) {
                case 0:
                    bytes[at] = char(dice.whole(0, 255));
                    break;
                case 1:
                    bytes.insert(at, "\",\n\r\0\xFF"[dice.whole(0, 5)]);
                    break;
                case 2:
                    bytes.remove(at, dice.whole(1, 8));
                    break;
                default:
                    bytes.truncate(std::max(1, at));
                }
                if (bytes.isEmpty())
                    bytes = "x";
            }
            const UnitListResult read = readList(bytes, true);
            QVERIFY(read.fileTrouble.isEmpty() || read.tiers.empty());
            qint64 units = 0;
            for (const TierCase& tierCase : read.tiers) {
                units += qint64(tierCase.tier.units.size());
                QVERIFY(tierCase.tier.advertisedFloor.minor > 0);
            }
            QCOMPARE(units, read.rowsTaken);
        }
    }
};

QTEST_GUILESS_MAIN(TestLargeLists)
#include "test_large_lists.moc"
