// SPDX-License-Identifier: GPL-3.0-or-later
// Ledgers that are locked, read-only, damaged, newer, of another program, or on a full disk: a clear message, and nothing lost.
#include "invented_entries.h"
#include "ledger.h"
#include "own_mounts.h"

#include <QProcess>
#include <QSqlDatabase>
#include <QSqlQuery>
#include <QTemporaryDir>
#include <QtTest>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

bool s_mountsAllowed = false;

QByteArray bytesIn(const QString& path)
{
    QFile file(path);
    return file.open(QIODevice::ReadOnly) ? file.readAll() : QByteArray("(cannot be read)");
}

bool writeBytes(const QString& path, const QByteArray& bytes)
{
    QFile file(path);
    return file.open(QIODevice::WriteOnly) && file.write(bytes) == bytes.size();
}

/// A connection past the ledger's own code.
class Raw
{
public:
    explicit Raw(const QString& path) : m_database(QSqlDatabase::addDatabase(QStringLiteral("QSQLITE"), QStringLiteral("raw")))
    {
        m_database.setDatabaseName(path);
        m_database.open();
    }
    Raw(const Raw&) = delete;
    Raw& operator=(const Raw&) = delete;
    ~Raw()
    {
        m_database.close();
        m_database = {};
        QSqlDatabase::removeDatabase(QStringLiteral("raw"));
    }
    bool run(const QString& statement) const { return QSqlQuery(m_database).exec(statement); }

private:
    QSqlDatabase m_database;
};

} // namespace

class TestLedgerRefusals : public QObject
{
    Q_OBJECT

    static QString madeIn(const QTemporaryDir& folder, int entries = 3)
    {
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        auto opened = Ledger::open(path, Ledger::For::writing);
        if (!opened.ok())
            qFatal("%s", opened.trouble().c_str());
        Ledger ledger = std::move(opened).value();
        for (int i = 0; i < entries; ++i) {
            if (!ledger.record(inventedEntry(i, 40)).ok())
                qFatal("not recorded");
        }
        return path;
    }

    static void refuses(const QString& path, const char* says, const char* remedy)
    {
        for (const Ledger::For use : {Ledger::For::reading, Ledger::For::writing}) {
            const QByteArray before = bytesIn(path);
            const auto opened = Ledger::open(path, use, 50);
            QVERIFY(!opened.ok());
            const QString words = QString::fromStdString(opened.trouble());
            QVERIFY2(words.startsWith(path + QStringLiteral(": ")), qPrintable(words));
            QVERIFY2(words.contains(QLatin1String(says)), qPrintable(words));
            QVERIFY2(words.contains(QLatin1String(remedy)), qPrintable(words));
            QVERIFY2(words.contains(QStringLiteral("Nothing was changed")), qPrintable(words));
            QVERIFY(bytesIn(path) == before);
        }
    }

private slots:
    void newer()
    {
        const QTemporaryDir folder;
        const QString path = madeIn(folder);
        {
            const Raw raw(path);
            QVERIFY(raw.run(QStringLiteral("PRAGMA user_version = 99")));
        }
        refuses(path, "newer Rungwright (form 99; this one knows up to 1)", "update this one");
    }

    void ofNoForm()
    {
        for (const int form : {-1, 0}) {
            const QTemporaryDir folder;
            const QString path = madeIn(folder);
            {
                const Raw raw(path);
                QVERIFY(raw.run(QStringLiteral("PRAGMA user_version = %1").arg(form)));
            }
            refuses(path, "is damaged: there is no form", "Move it aside");
        }
    }

    void ofAnotherProgram()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        {
            const Raw raw(path);
            QVERIFY(raw.run(QStringLiteral("CREATE TABLE recipe(name TEXT)")));
        }
        refuses(path, "database of another program", "Move it aside");
    }

    void noDatabase()
    {
        const QTemporaryDir folder;
        const QString path = folder.filePath(QStringLiteral("l.sqlite"));
        QVERIFY(writeBytes(path, QByteArray("unit,price,status\n").repeated(500)));
        refuses(path, "is not a price ledger", "latest backup");
    }

    void damaged_data()
    {
        QTest::addColumn<bool>("cut");
        QTest::newRow("overwritten") << false;
        QTest::newRow("cut short") << true;
    }

    void damaged()
    {
        QFETCH(bool, cut);
        const QTemporaryDir folder;
        const QString path = madeIn(folder);
        QByteArray bytes = bytesIn(path);
        QVERIFY(bytes.size() > 3 * 4096);
        if (cut)
            bytes.truncate(4096 + 100);
        else
            bytes.replace(4096, bytes.size() - 4096, QByteArray(bytes.size() - 4096, '\xa5'));
        QVERIFY(writeBytes(path, bytes));
        refuses(path, "is damaged", ".recover");
    }

    /// Damage that shows only when those pages are read.
    void damagedInTheMiddle()
    {
        const QTemporaryDir folder;
        const QString path = madeIn(folder, 150);
        QByteArray bytes = bytesIn(path);
        const qsizetype from = bytes.size() / 2 / 4096 * 4096; // Behind the pages that hold the tables' descriptions.
        bytes.replace(from, bytes.size() / 4, QByteArray(bytes.size() / 4, '\xa5'));
        QVERIFY(writeBytes(path, bytes));
        auto opened = Ledger::open(path, Ledger::For::reading);
        QVERIFY2(opened.ok(), opened.ok() ? "" : opened.trouble().c_str());
        int told = 0;
        for (std::int64_t id = 1; id <= 150; ++id) {
            const auto entry = opened.value().entry(id);
            if (entry.ok())
                continue;
            ++told;
            QVERIFY2(entry.trouble().find("is damaged") != std::string::npos, entry.trouble().c_str());
        }
        QVERIFY(told > 0);
        const auto sound = opened.value().check();
        QVERIFY(!sound.ok());
        QVERIFY2(sound.trouble().find("is damaged") != std::string::npos, sound.trouble().c_str());
        QVERIFY(bytesIn(path) == bytes);
    }

    void locked()
    {
        const QTemporaryDir folder;
        const QString path = madeIn(folder);
        auto opened = Ledger::open(path, Ledger::For::writing, 100);
        QVERIFY(opened.ok());
        Ledger ledger = std::move(opened).value();
        {
            const Raw other(path);
            QVERIFY(other.run(QStringLiteral("BEGIN IMMEDIATE")));
            QElapsedTimer timer;
            timer.start();
            const auto taken = ledger.record(inventedEntry(7, 40));
            QVERIFY(timer.elapsed() >= 90); // It did wait.
            QVERIFY(!taken.ok());
            const QString words = QString::fromStdString(taken.trouble());
            QVERIFY2(words.contains(QStringLiteral("another window or program is writing to it")), qPrintable(words));
            QVERIFY2(words.contains(QStringLiteral("Nothing was recorded")), qPrintable(words));
            QVERIFY2(words.contains(QStringLiteral("Try again")), qPrintable(words));
            // Readers and openers are not held up.
            const auto reader = Ledger::open(path, Ledger::For::reading, 100);
            QVERIFY(reader.ok());
            QCOMPARE(reader.value().listing().value().size(), std::size_t{3});
            QVERIFY(Ledger::open(path, Ledger::For::writing, 100).ok());
            QVERIFY(other.run(QStringLiteral("ROLLBACK")));
        }
        QVERIFY(ledger.record(inventedEntry(7, 40)).ok());
        QCOMPARE(ledger.listing().value().size(), std::size_t{4});
    }

    void folderOrNowhere()
    {
        const QTemporaryDir folder;
        const auto asFolder = Ledger::open(folder.path(), Ledger::For::writing);
        QVERIFY(!asFolder.ok() && asFolder.trouble().find("is a folder") != std::string::npos);
        const auto nowhere = Ledger::open(folder.filePath(QStringLiteral("gone/l.sqlite")), Ledger::For::writing);
        QVERIFY(!nowhere.ok());
        QVERIFY2(nowhere.trouble().find("folder is missing") != std::string::npos, nowhere.trouble().c_str());
        QVERIFY(!QFileInfo::exists(folder.filePath(QStringLiteral("gone"))));
    }

    void noRoomForTheFile()
    {
        const QTemporaryDir folder;
        const QString path = madeIn(folder);
        QProcess signer;
        signer.start(QStringLiteral(RUNGWRIGHT_SIGNER), {QStringLiteral("once"), path, QStringLiteral("4000"), QStringLiteral("150000")});
        QVERIFY(signer.waitForFinished(30'000));
        const QByteArray said = signer.readAll();
        QCOMPARE(signer.exitStatus(), QProcess::NormalExit);
        QVERIFY2(signer.exitCode() == 4, said);
        QVERIFY2(said.contains("the disk"), said);
        QVERIFY2(said.contains("Nothing was recorded, and what was there is unchanged"), said);
        stillThree(path);
    }

    void fullDisk()
    {
        if (!s_mountsAllowed)
            QSKIP("mounting is not allowed here; noRoomForTheFile tries the same with a limit on file size");
        const QTemporaryDir folder;
        const QByteArray where = folder.path().toLocal8Bit();
        QCOMPARE(mount("tmpfs", where.constData(), "tmpfs", 0, "size=400k"), 0);
        const QString path = madeIn(folder);
        {
            auto opened = Ledger::open(path, Ledger::For::writing);
            QVERIFY2(opened.ok(), opened.ok() ? "" : opened.trouble().c_str());
            Ledger ledger = std::move(opened).value();
            const auto taken = ledger.record(inventedEntry(7, 10'000));
            QVERIFY(!taken.ok());
            QVERIFY2(taken.trouble().find("the disk is full. Nothing was recorded") != std::string::npos, taken.trouble().c_str());
            QVERIFY(ledger.record(inventedEntry(2, 1)).ok()); // A small one still fits.
            QCOMPARE(ledger.listing().value().size(), std::size_t{4});
            QVERIFY(ledger.check().ok());
        }
        QCOMPARE(umount(where.constData()), 0);
    }

    void readOnlyDisk()
    {
        if (!s_mountsAllowed)
            QSKIP("mounting is not allowed here");
        const QTemporaryDir folder;
        const QByteArray where = folder.path().toLocal8Bit();
        QCOMPARE(mount("tmpfs", where.constData(), "tmpfs", 0, "size=2m"), 0);
        const QString path = madeIn(folder);
        QCOMPARE(mount("tmpfs", where.constData(), "tmpfs", MS_REMOUNT | MS_RDONLY, "size=2m"), 0);
        const auto writer = Ledger::open(path, Ledger::For::writing);
        QVERIFY(!writer.ok());
        QVERIFY2(writer.trouble().find("may only be read. Nothing was recorded. Make them writable") != std::string::npos,
                 writer.trouble().c_str());
        stillThree(path); // What is there can be looked at all the same.
        QCOMPARE(umount(where.constData()), 0);
    }

private:
    static void stillThree(const QString& path)
    {
        const auto opened = Ledger::open(path, Ledger::For::reading);
        QVERIFY2(opened.ok(), opened.ok() ? "" : opened.trouble().c_str());
        QVERIFY(opened.value().check().ok());
        const auto lines = opened.value().listing();
        QVERIFY2(lines.ok(), lines.ok() ? "" : lines.trouble().c_str());
        QCOMPARE(lines.value().size(), std::size_t{3});
        for (int i = 0; i < 3; ++i)
            QVERIFY(opened.value().entry(lines.value()[static_cast<std::size_t>(i)].id).value() == inventedEntry(i, 40));
    }
};

int main(int count, char** words)
{
    s_mountsAllowed = ownMountTable(); // While there is one thread.
    const QCoreApplication app(count, words);
    TestLedgerRefusals test;
    return QTest::qExec(&test, count, words);
}

#include "test_ledger_refusals.moc"
