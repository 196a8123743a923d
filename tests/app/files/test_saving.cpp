// SPDX-License-Identifier: GPL-3.0-or-later
// A save that is killed, or meets a full disk, leaves the old file or the new one whole, never neither.
#include "own_mounts.h"
#include "saved_versions.h"

#include <QDir>
#include <QFile>
#include <QProcess>
#include <QTemporaryDir>
#include <QtTest>

#include <csignal>
#include <random>
#include <sys/mount.h>
#include <thread>
#include <unistd.h>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

bool s_ownMountTable = false;

QByteArray bytesOf(const QString& path)
{
    QFile file(path);
    return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray("(cannot be read)");
}

// Stops the process where it is and looks whether it holds another file of the folder open: then the kill that follows falls
// between the first byte and the rename.
bool isMidSave(pid_t pid, const QString& path)
{
    kill(pid, SIGSTOP);
    const QString process = QStringLiteral("/proc/%1").arg(pid);
    for (int i = 0; i < 1000 && !bytesOf(process + QStringLiteral("/stat")).contains(") T "); ++i)
        std::this_thread::sleep_for(std::chrono::microseconds(100));
    for (const QFileInfo& open : QDir(process + QStringLiteral("/fd")).entryInfoList(QDir::Files | QDir::System)) {
        const QString target = open.symLinkTarget();
        if (target.startsWith(QFileInfo(path).path()) && target != path) // The file itself is open when a sheet is read again.
            return true;
    }
    return false;
}

QStringList filesIn(const QString& folder) { return QDir(folder).entryList(QDir::Files | QDir::Hidden | QDir::System, QDir::Name); }

} // namespace

class TestSaving : public QObject
{
    Q_OBJECT

private slots:
    void killedAtRandomMoments_data()
    {
        QTest::addColumn<QString>("kind");
        QTest::addColumn<int>("units");
        QTest::newRow("scenario") << "scenario" << 600;
        QTest::newRow("sheet") << "sheet" << 600;
        // Nothing but the writing itself, and much of it, so that most kills fall into the middle of a save.
        QTest::newRow("bytes") << "bytes" << 10'000;
    }

    void killedAtRandomMoments()
    {
        QFETCH(QString, kind);
        QFETCH(int, units);
        const Kind which = kind == QStringLiteral("sheet") ? Kind::sheet : Kind::scenario;
        const QByteArray versions[]{savedBytes(which, 1, units), savedBytes(which, 2, units)};
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("file"));
        std::mt19937 engine(200);
        int seen[]{0, 0};
        int midSave = 0;
        for (int round = 0; round < 200; ++round) {
            QProcess saver;
            saver.start(QStringLiteral(RUNGWRIGHT_SAVER), {QStringLiteral("loop"), kind, path, QString::number(units)});
            QVERIFY(saver.waitForReadyRead(30'000));
            // Somewhere in the next four saves, however long one takes on this machine and in this build.
            const long long oneSave = saver.readAll().trimmed().toLongLong();
            QVERIFY(oneSave > 0);
            std::this_thread::sleep_for(std::chrono::microseconds(engine() % static_cast<unsigned long>(4 * oneSave)));
            const auto pid = static_cast<pid_t>(saver.processId());
            midSave += isMidSave(pid, path) ? 1 : 0;
            saver.kill(); // SIGKILL
            QVERIFY(saver.waitForFinished(30'000));
            QCOMPARE(saver.exitStatus(), QProcess::CrashExit); // It was still at work.
            const QByteArray left = bytesOf(path);
            QVERIFY2(left == versions[0] || left == versions[1],
                     qPrintable(QStringLiteral("round %1: %2 bytes").arg(round).arg(left.size())));
            ++seen[left == versions[0] ? 0 : 1];
            for (const QString& name : filesIn(folder.path())) {
                if (name == QStringLiteral("file"))
                    continue;
                // The file being written beside it, where the file system cannot write one without a name.
                QVERIFY(QFile::remove(folder.filePath(name)));
            }
        }
        qInfo("200 kills: version 1 stood %d times, version 2 %d times; %d kills fell into the middle of a save", seen[0], seen[1],
              midSave);
        // Both versions were met, so the test can tell a file that never changes from one that does.
        QVERIFY(seen[0] > 0 && seen[1] > 0);
        if (kind == QStringLiteral("bytes"))
            QVERIFY(midSave > 0); // Else the kills never tried what this test is for.
    }

    void fullDisk_data() { starved_data(); }

    void fullDisk()
    {
        QFETCH(QString, kind);
        if (!s_ownMountTable)
            QSKIP("mounting is not allowed here; noRoomForTheFile tries the same with a limit on file size");
        const QTemporaryDir folder;
        // Room for the old file, and not for old and new.
        QCOMPARE(mount("tmpfs", folder.path().toLocal8Bit().constData(), "tmpfs", 0, "size=64k"), 0);
        starve(kind, folder.path(), 0, "No space left on device");
        QCOMPARE(umount(folder.path().toLocal8Bit().constData()), 0);
    }

    void noRoomForTheFile_data() { starved_data(); }

    void noRoomForTheFile()
    {
        QFETCH(QString, kind);
        const QTemporaryDir folder;
        starve(kind, folder.path(), 50'000, "File too large");
    }

    void readOnlyDisk()
    {
        if (!s_ownMountTable)
            QSKIP("mounting is not allowed here");
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("file"));
        const QByteArray where = folder.path().toLocal8Bit();
        QCOMPARE(mount("tmpfs", where.constData(), "tmpfs", 0, "size=64k"), 0);
        QVERIFY(save(Kind::scenario, 1, 10, path).ok());
        QCOMPARE(mount("tmpfs", where.constData(), "tmpfs", MS_REMOUNT | MS_RDONLY, "size=64k"), 0);
        const Outcome<bool> saved = save(Kind::scenario, 2, 10, path);
        QVERIFY(!saved.ok());
        QVERIFY2(saved.trouble().find("is not writable. The file that was there is unchanged") != std::string::npos,
                 saved.trouble().c_str());
        QCOMPARE(bytesOf(path), savedBytes(Kind::scenario, 1, 10));
        const Outcome<bool> fresh = save(Kind::scenario, 2, 10, path + QStringLiteral("2"));
        QVERIFY(!fresh.ok());
        QVERIFY2(fresh.trouble().find("Read-only file system") != std::string::npos, fresh.trouble().c_str());
        QCOMPARE(umount(where.constData()), 0);
    }

private:
    static void starved_data()
    {
        QTest::addColumn<QString>("kind");
        QTest::newRow("scenario") << "scenario";
        QTest::newRow("sheet") << "sheet";
    }

    static void starve(const QString& kind, const QString& folder, int limit, const char* reason)
    {
        const Kind which = kind == QStringLiteral("scenario") ? Kind::scenario : Kind::sheet;
        const QString path = folder + QStringLiteral("/file");
        QVERIFY(save(which, 1, 200, path).ok());
        const QByteArray old = savedBytes(which, 1, 200);
        QCOMPARE(bytesOf(path), old);
        for (const bool oldThere : {true, false}) {
            if (!oldThere)
                QVERIFY(QFile::remove(path));
            QProcess saver;
            saver.start(QStringLiteral(RUNGWRIGHT_SAVER),
                        {QStringLiteral("once"), kind, path, QStringLiteral("2000"), QString::number(limit)});
            QVERIFY(saver.waitForFinished(30'000));
            const QByteArray said = saver.readAll();
            QCOMPARE(saver.exitStatus(), QProcess::NormalExit);
            QCOMPARE(saver.exitCode(), 4);
            QVERIFY2(said.startsWith(path.toUtf8() + ": cannot be written: "), said);
            QVERIFY2(said.contains(reason), said);
            QVERIFY2(said.contains(oldThere ? "The file that was there is unchanged" : "Nothing was left behind"), said);
            QCOMPARE(filesIn(folder), oldThere ? QStringList{QStringLiteral("file")} : QStringList{});
            if (oldThere)
                QCOMPARE(bytesOf(path), old);
        }
    }
};

int main(int count, char** words)
{
    s_ownMountTable = ownMountTable();
    const QCoreApplication app(count, words);
    TestSaving test;
    return QTest::qExec(&test, count, words);
}

#include "test_saving.moc"
