// SPDX-License-Identifier: GPL-3.0-or-later
#include "ledger.h"

#include "ledger_connection.h"

#include <QDir>
#include <QFileInfo>
#include <QUrl>
#include <QVariant>

#include <algorithm>
#include <cmath>
#include <unordered_map>
#include <unordered_set>

namespace rungwright
{

namespace
{

QVariant orNull(std::optional<double> value)
{
    return value && std::isfinite(*value) ? QVariant(*value) : QVariant(QMetaType(QMetaType::Double));
}

QVariant ledgerText(const std::string& utf8) { return QString::fromStdString(utf8); }

/// What only a mistake of the caller's, or a form half filled in, can bring.
std::optional<QString> refusedBecause(const SignOff& entry)
{
    if (!instantFromUtcText(entry.whenUtc))
        return LedgerWords::tr("the time of the sign-off is not one in UTC: %1").arg(QString::fromStdString(entry.whenUtc));
    if (entry.who.empty())
        return LedgerWords::tr("the name of who signs is missing");
    if (entry.tier.empty() || entry.candidate.empty())
        return LedgerWords::tr("the name of the tier or of the ladder is missing");
    if (entry.units.empty())
        return LedgerWords::tr("the tier has no unit");
    std::unordered_set<std::string_view> names;
    for (const LedgerUnit& unit : entry.units) {
        if (unit.unit.empty() || !names.insert(unit.unit).second)
            return LedgerWords::tr("a unit has no name, or two have the same: “%1”").arg(QString::fromStdString(unit.unit));
        if (unit.before.minor <= 0 || unit.after.minor <= 0)
            return LedgerWords::tr("the price of unit “%1” is not above zero").arg(QString::fromStdString(unit.unit));
    }
    return {};
}

} // namespace

QString ledgerPathFor(const QString& scenarioPath)
{
    if (scenarioPath.isEmpty() || scenarioPath.startsWith(QLatin1String(":/")))
        return {};
    const QFileInfo file(scenarioPath);
    QString name = file.fileName();
    for (const QLatin1String ending : {QLatin1String(".rungs.json"), QLatin1String(".json")}) {
        if (name.size() > ending.size() && name.endsWith(ending, Qt::CaseInsensitive)) {
            name.chop(ending.size());
            break;
        }
    }
    return file.dir().filePath(name + QStringLiteral(".ledger.sqlite"));
}

// Opening ------------------------------------------------------------------------------------------------------------

Ledger::Ledger(std::unique_ptr<Connection> connection) : m_connection(std::move(connection)) {}
Ledger::Ledger(Ledger&&) noexcept = default;
Ledger& Ledger::operator=(Ledger&&) noexcept = default;
Ledger::~Ledger() = default;

const QString& Ledger::path() const { return m_connection->path; }

Outcome<Ledger> Ledger::open(const QString& path, For use, int wait)
{
    auto connection = std::make_unique<Connection>();
    connection->path = path;
    const QFileInfo file(path);
    const auto say = [&path](const QString& what) { return Trouble{(path + QStringLiteral(": ") + what).toStdString()}; };
    if (file.isDir())
        return say(LedgerWords::tr("is a folder, not a price ledger. Move it aside, or save the scenario under another name"));
    if (!file.exists() && use == For::reading)
        return say(LedgerWords::tr("is not there. It comes with the first sign-off"));
    const QFileInfo folder(file.absolutePath());
    if (use == For::writing && (!folder.isDir() || !folder.isWritable() || (file.exists() && !file.isWritable())))
        return say(LedgerWords::tr("cannot be written: the file or its folder is missing or may only be read. Nothing was recorded. Make "
                                   "them writable, or save the scenario where you may write"));
    const QString patience = QStringLiteral("QSQLITE_BUSY_TIMEOUT=%1").arg(wait);
    bool connected = connection->connectTo(path, use == For::reading ? patience + QStringLiteral(";QSQLITE_OPEN_READONLY") : patience);
    Outcome<bool> known =
        connected ? connection->recognize() : Outcome<bool>(connection->trouble(connection->database.lastError(), LedgerAct::opening));
    // SQLite wants to write a little beside the file even to read it. Where that is not allowed, the file is read as it stands
    // at this moment: somebody with more rights may go on writing, and is not waited for.
    if (!known.ok() && use == For::reading && !folder.isWritable() && QFileInfo(path + QStringLiteral("-wal")).size() == 0) {
        const QString url = QString::fromLatin1(QUrl::fromLocalFile(file.absoluteFilePath()).toEncoded()) + QStringLiteral("?immutable=1");
        connected = connection->connectTo(url, QStringLiteral("QSQLITE_OPEN_READONLY;QSQLITE_OPEN_URI"));
        if (connected)
            known = connection->recognize();
    }
    if (!known.ok())
        return Trouble{known.trouble()};
    if (use == For::writing) {
        const Outcome<bool> ready = connection->prepareForWriting(wait);
        if (!ready.ok())
            return Trouble{ready.trouble()};
    }
    return Ledger(std::move(connection));
}

// Recording ----------------------------------------------------------------------------------------------------------

namespace
{

/// The statements of one transaction; the first that fails is kept, and the rest do nothing.
class LedgerWriter
{
public:
    explicit LedgerWriter(const QSqlDatabase& database) : m_query(database) {}
    bool prepare(const QString& statement)
    {
        if (!m_error && !m_query.prepare(statement))
            m_error = m_query.lastError();
        return !m_error;
    }
    bool run(const QVariantList& values)
    {
        if (m_error)
            return false;
        for (qsizetype i = 0; i < values.size(); ++i)
            m_query.bindValue(static_cast<int>(i), values[i]);
        if (!m_query.exec())
            m_error = m_query.lastError();
        return !m_error;
    }
    bool run(const QString& statement, const QVariantList& values) { return prepare(statement) && run(values); }
    QSqlQuery& query() { return m_query; }
    const std::optional<QSqlError>& error() const { return m_error; }

private:
    QSqlQuery m_query;
    std::optional<QSqlError> m_error;
};

qlonglong tierIdFor(LedgerWriter& writer, const SignOff& entry)
{
    const QVariantList names{ledgerText(entry.site), ledgerText(entry.tier)};
    writer.run(QStringLiteral("INSERT INTO tier(site, name) VALUES(?, ?) ON CONFLICT DO NOTHING"), names);
    if (!writer.run(QStringLiteral("SELECT id FROM tier WHERE site = ? AND name = ?"), names) || !writer.query().next())
        return -1;
    const qlonglong id = writer.query().value(0).toLongLong();
    writer.query().finish();
    return id;
}

std::vector<qlonglong> unitIdsFor(LedgerWriter& writer, qlonglong tier, const SignOff& entry)
{
    std::unordered_map<std::string, qlonglong> known;
    if (writer.run(QStringLiteral("SELECT name, id FROM unit WHERE tier = ?"), {tier})) {
        while (writer.query().next())
            known.emplace(writer.query().value(0).toString().toStdString(), writer.query().value(1).toLongLong());
    }
    std::vector<qlonglong> ids;
    ids.reserve(entry.units.size());
    writer.prepare(QStringLiteral("INSERT INTO unit(tier, name) VALUES(?, ?)"));
    for (const LedgerUnit& unit : entry.units) {
        const auto found = known.find(unit.unit);
        if (found == known.end() && writer.run({tier, ledgerText(unit.unit)}))
            ids.push_back(writer.query().lastInsertId().toLongLong());
        else
            ids.push_back(found == known.end() ? -1 : found->second);
    }
    return ids;
}

qlonglong writeEntry(LedgerWriter& writer, const SignOff& entry)
{
    const qlonglong tier = tierIdFor(writer, entry);
    const auto changed = std::ranges::count_if(entry.units, [](const LedgerUnit& unit) { return unit.before != unit.after; });
    const QVariant floor =
        entry.advertisedFloor ? QVariant(qlonglong{entry.advertisedFloor->minor}) : QVariant(QMetaType(QMetaType::LongLong));
    writer.run(QStringLiteral("INSERT INTO sign_off(instant, tier, who, note, candidate, currency, decimals, advertised_floor, units, "
                              "changed, model_words, model_stored, sheet_sha256) VALUES(?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)"),
               {qlonglong{instantFromUtcText(entry.whenUtc).value_or(0)}, tier, ledgerText(entry.who), ledgerText(entry.note),
                ledgerText(entry.candidate), ledgerText(entry.currency.code), entry.currency.decimals, floor,
                static_cast<qlonglong>(entry.units.size()), static_cast<qlonglong>(changed), ledgerText(entry.modelWords),
                ledgerText(entry.modelStored), ledgerText(entry.sheetSha256)});
    const qlonglong id = writer.query().lastInsertId().toLongLong();

    const std::vector<qlonglong> units = unitIdsFor(writer, tier, entry);
    writer.prepare(QStringLiteral("INSERT INTO unit_price(sign_off, unit, place, status, before, after) VALUES(?, ?, ?, ?, ?, ?)"));
    for (std::size_t i = 0; i < entry.units.size(); ++i) {
        const LedgerUnit& unit = entry.units[i];
        writer.run({id, units[i], static_cast<qlonglong>(i), QString::fromUtf8(statusWord(unit.status)), qlonglong{unit.before.minor},
                    qlonglong{unit.after.minor}});
    }
    writer.prepare(QStringLiteral("INSERT INTO figure(sign_off, key, place, before, after) VALUES(?, ?, ?, ?, ?)"));
    for (std::size_t i = 0; i < entry.figures.size(); ++i) {
        const LedgerFigure& figure = entry.figures[i];
        writer.run({id, ledgerText(figure.key), static_cast<qlonglong>(i), orNull(figure.before), orNull(figure.after)});
    }
    writer.prepare(QStringLiteral("INSERT INTO check_made(sign_off, place, name, outcome, why) VALUES(?, ?, ?, ?, ?)"));
    for (std::size_t i = 0; i < entry.checks.size(); ++i) {
        const LedgerCheck& check = entry.checks[i];
        writer.run({id, static_cast<qlonglong>(i), ledgerText(check.name), QString::fromLatin1(checkOutcomeWord(check.outcome)),
                    ledgerText(check.why)});
    }
    return id;
}

} // namespace

Outcome<std::int64_t> Ledger::record(const SignOff& entry)
{
    if (const auto why = refusedBecause(entry))
        return Trouble{LedgerWords::tr("%1: nothing was recorded: %2").arg(path(), *why).toStdString()};
    Connection& at = *m_connection;
    // At once the only writer: a transaction that began as a reader could find out in the middle that another one had written.
    if (const auto error = at.run(QStringLiteral("BEGIN IMMEDIATE")))
        return at.trouble(*error, LedgerAct::recording);
    qlonglong id = 0;
    std::optional<QSqlError> failed;
    {
        LedgerWriter writer(at.database);
        id = writeEntry(writer, entry);
        failed = writer.error();
    }
    if (!failed)
        failed = at.run(QStringLiteral("COMMIT"));
    if (failed) {
        at.run(QStringLiteral("ROLLBACK"));
        return at.trouble(*failed, LedgerAct::recording);
    }
    return std::int64_t{id};
}

Outcome<bool> Ledger::check() const
{
    QSqlQuery query(m_connection->database);
    query.setForwardOnly(true);
    for (const char* look : {"PRAGMA integrity_check", "PRAGMA foreign_key_check"}) {
        if (!query.exec(QString::fromLatin1(look)))
            return m_connection->trouble(query.lastError(), LedgerAct::reading);
        while (query.next()) {
            const QString said = query.value(0).toString();
            if (said != QStringLiteral("ok"))
                return Trouble{LedgerWords::tr("%1: is damaged: %2").arg(path(), said).toStdString()};
        }
        if (query.lastError().isValid())
            return m_connection->trouble(query.lastError(), LedgerAct::reading);
    }
    return true;
}

} // namespace rungwright
