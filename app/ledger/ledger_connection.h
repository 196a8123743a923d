// SPDX-License-Identifier: GPL-3.0-or-later
// One connection to a ledger file, and what its errors mean to the person at the desk.
#pragma once

#include "ledger.h"

#include <QCoreApplication>
#include <QSqlDatabase>
#include <QSqlError>
#include <QSqlQuery>

namespace rungwright
{

class LedgerWords
{
    Q_DECLARE_TR_FUNCTIONS(rungwright::LedgerWords)
};

/// What was being done when something went wrong: decides what the message says about what was lost (nothing).
enum class LedgerAct { opening, recording, reading };

struct Ledger::Connection {
    QString path;
    QString name;
    QSqlDatabase database;
    bool empty = false; ///< Opened for reading, and nothing was ever written into it.

    Connection() = default;
    Connection(const Connection&) = delete;
    Connection& operator=(const Connection&) = delete;
    ~Connection();

    /// Connects under a name of its own. False on trouble, told by the database's last error.
    bool connectTo(const QString& file, const QString& options);
    void disconnect();
    /// Runs one statement without values.
    std::optional<QSqlError> run(const QString& statement);
    /// The single number a statement gives.
    Outcome<std::int64_t> number(const QString& statement, LedgerAct act);
    /// For a statement that may run again while another one waits for the same lock.
    std::optional<QSqlError> runPatiently(const QString& statement, int wait);
    Trouble trouble(const QSqlError& error, LedgerAct act) const;

    /// Application, form of the tables: is it a ledger that this version knows?
    Outcome<bool> recognize();
    Outcome<bool> prepareForWriting(int wait);
    Outcome<bool> migrate(int wait);
};

/// SQLite's primary result code of an error, 0 when there is none.
int sqliteCode(const QSqlError& error);

} // namespace rungwright
