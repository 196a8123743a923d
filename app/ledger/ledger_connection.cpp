// SPDX-License-Identifier: GPL-3.0-or-later
#include "ledger_connection.h"

#include "ledger_schema.h"

#include <QElapsedTimer>
#include <QFileInfo>
#include <QThread>

#include <atomic>

namespace rungwright
{

namespace
{

// Primary result codes of SQLite: https://www.sqlite.org/rescode.html (from memory; the tests meet each but ioerr's kin).
enum SqliteCode { busy = 5, locked = 6, readOnly = 8, ioError = 10, corrupt = 11, full = 13, cannotOpen = 14, notADatabase = 26 };

QString unchangedWords(LedgerAct act)
{
    switch (act) {
    case LedgerAct::recording:
        return LedgerWords::tr("Nothing was recorded, and what was there is unchanged.");
    case LedgerAct::opening:
        return LedgerWords::tr("Nothing was changed.");
    case LedgerAct::reading:
        break;
    }
    return LedgerWords::tr("Nothing was changed by reading it.");
}

} // namespace

int sqliteCode(const QSqlError& error) { return error.nativeErrorCode().toInt() & 0xff; }

Ledger::Connection::~Connection() { disconnect(); }

bool Ledger::Connection::connectTo(const QString& file, const QString& options)
{
    static std::atomic<std::uint64_t> count{0};
    disconnect();
    name = QStringLiteral("rungwright-ledger-%1").arg(++count);
    database = QSqlDatabase::addDatabase(QStringLiteral("QSQLITE"), name);
    database.setConnectOptions(options);
    database.setDatabaseName(file);
    return database.open();
}

void Ledger::Connection::disconnect()
{
    if (name.isEmpty())
        return;
    database.close();
    database = {};
    QSqlDatabase::removeDatabase(name);
    name.clear();
}

std::optional<QSqlError> Ledger::Connection::run(const QString& statement)
{
    QSqlQuery query(database);
    if (query.exec(statement))
        return {};
    return query.lastError();
}

std::optional<QSqlError> Ledger::Connection::runPatiently(const QString& statement, int wait)
{
    QElapsedTimer timer;
    timer.start();
    for (;;) {
        auto error = run(statement);
        const int code = error ? sqliteCode(*error) : 0;
        if ((code != busy && code != locked) || timer.elapsed() >= wait)
            return error;
        QThread::msleep(10);
    }
}

Outcome<std::int64_t> Ledger::Connection::number(const QString& statement, LedgerAct act)
{
    QSqlQuery query(database);
    if (!query.exec(statement) || !query.next())
        return trouble(query.lastError(), act);
    return std::int64_t{query.value(0).toLongLong()};
}

Trouble Ledger::Connection::trouble(const QSqlError& error, LedgerAct act) const
{
    QString what;
    switch (sqliteCode(error)) {
    case busy:
    case locked:
        what = LedgerWords::tr("another window or program is writing to it and did not finish in time. %1 Try again; if it stays so, close "
                               "the other program");
        break;
    case readOnly:
        what = LedgerWords::tr("may only be read. %1 Make the file and its folder writable, or save the scenario where you may write");
        break;
    case corrupt:
        what = LedgerWords::tr("is damaged. %1 Move it aside with the files of the same name ending in -wal and -shm, and put your latest "
                               "backup in its place; what can be saved of it the sqlite3 tool's .recover gets out");
        break;
    case notADatabase:
        what = LedgerWords::tr("is not a price ledger, or its beginning is damaged. %1 Move it aside, and put your latest backup in its "
                               "place");
        break;
    case full:
        what = LedgerWords::tr("the disk is full. %1 Make room and try again");
        break;
    case cannotOpen:
        what = LedgerWords::tr("cannot be opened. %1 See that its folder is there and that you may read and write it");
        break;
    case ioError:
        what = LedgerWords::tr("the disk did not do what was asked: it may be full, gone or failing. %1 See to the disk and try again");
        break;
    default:
        what = LedgerWords::tr("was not taken by the database. %1");
    }
    const QString reason = error.databaseText().isEmpty() ? error.driverText() : error.databaseText();
    // Nothing of the reason or the path may be taken for a place to fill in.
    const QString said = path + QStringLiteral(": ") + what.arg(unchangedWords(act));
    return Trouble{(reason.isEmpty() ? said : said + QStringLiteral(" (SQLite: ") + reason + QLatin1Char(')')).toStdString()};
}

Outcome<bool> Ledger::Connection::recognize()
{
    const auto say = [this](const QString& what) { return Trouble{(path + QStringLiteral(": ") + what).toStdString()}; };
    const auto application = number(QStringLiteral("PRAGMA application_id"), LedgerAct::opening);
    if (!application.ok())
        return Trouble{application.trouble()};
    const auto form = number(QStringLiteral("PRAGMA user_version"), LedgerAct::opening);
    if (!form.ok())
        return Trouble{form.trouble()};
    const auto tables = number(QStringLiteral("SELECT count(*) FROM sqlite_schema"), LedgerAct::opening);
    if (!tables.ok())
        return Trouble{tables.trouble()};
    empty = application.value() == 0 && form.value() == 0 && tables.value() == 0;
    if (empty)
        return true;
    if (application.value() != kLedgerApplication)
        return say(LedgerWords::tr("is a database of another program, not a price ledger. Nothing was changed. Move it aside, or save the "
                                   "scenario under another name"));
    if (form.value() < 1)
        return say(LedgerWords::tr("is damaged: there is no form %1 of a ledger. Nothing was changed. Move it aside, and put your latest "
                                   "backup in its place")
                       .arg(form.value()));
    if (form.value() > newestLedgerForm())
        return say(LedgerWords::tr("was written by a newer Rungwright (form %1; this one knows up to %2). Nothing was changed. Open it "
                                   "with the newer one, or update this one")
                       .arg(form.value())
                       .arg(newestLedgerForm()));
    return true;
}

Outcome<bool> Ledger::Connection::prepareForWriting(int wait)
{
    // For as long as the transaction's result must outlive a power cut: FULL writes the log through at every commit.
    for (const char* setting : {"PRAGMA journal_mode = WAL", "PRAGMA synchronous = FULL", "PRAGMA foreign_keys = ON"}) {
        if (const auto error = runPatiently(QString::fromLatin1(setting), wait))
            return trouble(*error, LedgerAct::opening);
    }
    return migrate(wait);
}

Outcome<bool> Ledger::Connection::migrate(int wait)
{
    const auto now = number(QStringLiteral("PRAGMA user_version"), LedgerAct::opening);
    if (!now.ok())
        return Trouble{now.trouble()};
    if (now.value() == newestLedgerForm())
        return true; // Without waiting for whoever writes.
    if (const auto error = runPatiently(QStringLiteral("BEGIN IMMEDIATE"), wait))
        return trouble(*error, LedgerAct::opening);
    const auto giveUp = [this](const std::string& words) {
        run(QStringLiteral("ROLLBACK"));
        return Trouble{words};
    };
    // Looked at again inside the transaction: another window may have been first.
    const Outcome<bool> known = recognize();
    if (!known.ok())
        return giveUp(known.trouble());
    const auto form = number(QStringLiteral("PRAGMA user_version"), LedgerAct::opening);
    if (!form.ok())
        return giveUp(form.trouble());
    QStringList statements;
    for (int next = static_cast<int>(form.value()); next < newestLedgerForm(); ++next) {
        for (const char* statement : ledgerForms()[static_cast<std::size_t>(next)])
            statements << QString::fromLatin1(statement);
        statements << QStringLiteral("PRAGMA application_id = %1").arg(kLedgerApplication)
                   << QStringLiteral("PRAGMA user_version = %1").arg(next + 1);
    }
    for (const QString& statement : statements) {
        if (const auto error = run(statement))
            return giveUp(trouble(*error, LedgerAct::opening).message);
    }
    if (const auto error = run(QStringLiteral("COMMIT")))
        return giveUp(trouble(*error, LedgerAct::opening).message);
    empty = false;
    return true;
}

} // namespace rungwright
