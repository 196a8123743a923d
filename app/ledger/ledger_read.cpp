// SPDX-License-Identifier: GPL-3.0-or-later
// What the ledger tells.
#include "ledger_connection.h"

#include <QVariant>

#include <algorithm>

namespace rungwright
{

namespace
{

std::string readText(const QSqlQuery& query, int column) { return query.value(column).toString().toStdString(); }

Price readPrice(const QSqlQuery& query, int column) { return Price{query.value(column).toLongLong()}; }

std::optional<double> readDouble(const QSqlQuery& query, int column)
{
    return query.isNull(column) ? std::optional<double>() : query.value(column).toDouble();
}

std::optional<Price> readPriceOrNone(const QSqlQuery& query, int column)
{
    return query.isNull(column) ? std::optional<Price>() : readPrice(query, column);
}

CheckOutcome readOutcome(const QString& word)
{
    for (const CheckOutcome outcome : {CheckOutcome::holds, CheckOutcome::lookAtThis}) {
        if (word == QLatin1String(checkOutcomeWord(outcome)))
            return outcome;
    }
    return CheckOutcome::notChecked;
}

/// A query with its values, run and ready to be stepped through once.
struct LedgerQuery {
    QSqlQuery query;
    bool ok = false;

    LedgerQuery(const QSqlDatabase& database, const QString& statement, const QVariantList& values) : query(database)
    {
        query.setForwardOnly(true);
        ok = query.prepare(statement);
        for (qsizetype i = 0; ok && i < values.size(); ++i)
            query.bindValue(static_cast<int>(i), values[i]);
        ok = ok && query.exec();
    }
    bool next() { return ok && query.next(); }
    /// Stepping ends at the last row, or where the file cannot be read further.
    bool failed() const { return !ok || query.lastError().isValid(); }
};

QVariantList tierNames(const std::string& site, const std::string& tier)
{
    return {QString::fromStdString(site), QString::fromStdString(tier)};
}

const char* const kOfTier = "(SELECT id FROM tier WHERE site = ? AND name = ?)";

QString lineStatement(bool oneTier)
{
    return QStringLiteral("SELECT s.id, s.instant, s.who, s.note, t.site, t.name, s.candidate, s.currency, s.decimals, "
                          "s.advertised_floor, c.before, c.after, g.before, g.after, s.units, s.changed "
                          "FROM sign_off s JOIN tier t ON t.id = s.tier "
                          "LEFT JOIN figure c ON c.sign_off = s.id AND c.key = '%1' "
                          "LEFT JOIN figure g ON g.sign_off = s.id AND g.key = '%2' %3 ORDER BY s.instant, s.id")
        .arg(QString::fromLatin1(kLedgerCheapest), QString::fromLatin1(kLedgerGap),
             oneTier ? QStringLiteral("WHERE s.tier = ") + QString::fromLatin1(kOfTier) : QString());
}

std::vector<SignOffLine> readLines(LedgerQuery& rows)
{
    std::vector<SignOffLine> lines;
    const QSqlQuery& q = rows.query;
    while (rows.next()) {
        SignOffLine line;
        line.id = q.value(0).toLongLong();
        line.instant = q.value(1).toLongLong();
        line.who = readText(q, 2);
        line.note = readText(q, 3);
        line.site = readText(q, 4);
        line.tier = readText(q, 5);
        line.candidate = readText(q, 6);
        line.currency = {readText(q, 7), q.value(8).toInt()};
        line.advertisedFloor = readPriceOrNone(q, 9);
        line.cheapestBefore = readDouble(q, 10);
        line.cheapestAfter = readDouble(q, 11);
        line.gapBefore = readDouble(q, 12);
        line.gapAfter = readDouble(q, 13);
        line.units = q.value(14).toLongLong();
        line.changed = q.value(15).toLongLong();
        lines.push_back(std::move(line));
    }
    return lines;
}

} // namespace

Outcome<std::vector<SignOffLine>> Ledger::listing() const
{
    if (m_connection->empty)
        return std::vector<SignOffLine>{};
    LedgerQuery rows(m_connection->database, lineStatement(false), {});
    std::vector<SignOffLine> lines = readLines(rows);
    if (rows.failed())
        return m_connection->trouble(rows.query.lastError(), LedgerAct::reading);
    return lines;
}

Outcome<std::vector<SignOffLine>> Ledger::history(const std::string& site, const std::string& tier) const
{
    if (m_connection->empty)
        return std::vector<SignOffLine>{};
    LedgerQuery rows(m_connection->database, lineStatement(true), tierNames(site, tier));
    std::vector<SignOffLine> lines = readLines(rows);
    if (rows.failed())
        return m_connection->trouble(rows.query.lastError(), LedgerAct::reading);
    return lines;
}

Outcome<std::vector<std::string>> Ledger::unitsOf(const std::string& site, const std::string& tier) const
{
    std::vector<std::string> names;
    if (m_connection->empty)
        return names;
    LedgerQuery rows(m_connection->database,
                     QStringLiteral("SELECT name FROM unit WHERE tier = %1 ORDER BY name").arg(QString::fromLatin1(kOfTier)),
                     tierNames(site, tier));
    while (rows.next())
        names.push_back(readText(rows.query, 0));
    if (rows.failed())
        return m_connection->trouble(rows.query.lastError(), LedgerAct::reading);
    return names;
}

Outcome<std::vector<UnitLine>> Ledger::unitHistory(const std::string& site, const std::string& tier, const std::string& unit) const
{
    std::vector<UnitLine> lines;
    if (m_connection->empty)
        return lines;
    LedgerQuery rows(m_connection->database,
                     QStringLiteral("SELECT s.id, s.instant, s.currency, s.decimals, p.status, p.before, p.after "
                                    "FROM unit_price p JOIN sign_off s ON s.id = p.sign_off "
                                    "WHERE p.unit = (SELECT id FROM unit WHERE tier = %1 AND name = ?) ORDER BY s.instant, s.id")
                         .arg(QString::fromLatin1(kOfTier)),
                     tierNames(site, tier) << QString::fromStdString(unit));
    const QSqlQuery& q = rows.query;
    while (rows.next())
        lines.push_back({q.value(0).toLongLong(),
                         q.value(1).toLongLong(),
                         {readText(q, 2), q.value(3).toInt()},
                         statusFromWord(readText(q, 4)).value_or(Status::vacant),
                         readPrice(q, 5),
                         readPrice(q, 6)});
    if (rows.failed())
        return m_connection->trouble(q.lastError(), LedgerAct::reading);
    return lines;
}

Outcome<std::optional<SignOff>> Ledger::entry(std::int64_t id) const
{
    if (m_connection->empty)
        return std::optional<SignOff>();
    const QSqlDatabase& database = m_connection->database;
    LedgerQuery head(database,
                     QStringLiteral("SELECT s.instant, s.who, s.note, t.site, t.name, s.candidate, s.currency, s.decimals, "
                                    "s.advertised_floor, s.model_words, s.model_stored, s.sheet_sha256 "
                                    "FROM sign_off s JOIN tier t ON t.id = s.tier WHERE s.id = ?"),
                     {qlonglong{id}});
    if (!head.next()) {
        if (head.failed())
            return m_connection->trouble(head.query.lastError(), LedgerAct::reading);
        return std::optional<SignOff>();
    }
    SignOff whole;
    const QSqlQuery& h = head.query;
    whole.whenUtc = utcText(h.value(0).toLongLong());
    whole.who = readText(h, 1);
    whole.note = readText(h, 2);
    whole.site = readText(h, 3);
    whole.tier = readText(h, 4);
    whole.candidate = readText(h, 5);
    whole.currency = {readText(h, 6), h.value(7).toInt()};
    whole.advertisedFloor = readPriceOrNone(h, 8);
    whole.modelWords = readText(h, 9);
    whole.modelStored = readText(h, 10);
    whole.sheetSha256 = readText(h, 11);

    LedgerQuery units(database,
                      QStringLiteral("SELECT u.name, p.status, p.before, p.after FROM unit_price p JOIN unit u ON u.id = p.unit "
                                     "WHERE p.sign_off = ? ORDER BY p.place"),
                      {qlonglong{id}});
    while (units.next())
        whole.units.push_back({readText(units.query, 0), statusFromWord(readText(units.query, 1)).value_or(Status::vacant),
                               readPrice(units.query, 2), readPrice(units.query, 3)});
    LedgerQuery figures(database, QStringLiteral("SELECT key, before, after FROM figure WHERE sign_off = ? ORDER BY place"),
                        {qlonglong{id}});
    while (figures.next())
        whole.figures.push_back({readText(figures.query, 0), readDouble(figures.query, 1), readDouble(figures.query, 2)});
    LedgerQuery checks(database, QStringLiteral("SELECT name, outcome, why FROM check_made WHERE sign_off = ? ORDER BY place"),
                       {qlonglong{id}});
    while (checks.next())
        whole.checks.push_back({readText(checks.query, 0), readOutcome(checks.query.value(1).toString()), readText(checks.query, 2)});
    for (const LedgerQuery* rows : {&units, &figures, &checks}) {
        if (rows->failed())
            return m_connection->trouble(rows->query.lastError(), LedgerAct::reading);
    }
    return std::optional<SignOff>(std::move(whole));
}

Outcome<std::optional<SignOff>> Ledger::lastOf(const std::string& site, const std::string& tier) const
{
    if (m_connection->empty)
        return std::optional<SignOff>();
    LedgerQuery rows(
        m_connection->database,
        QStringLiteral("SELECT id FROM sign_off WHERE tier = %1 ORDER BY instant DESC, id DESC LIMIT 1").arg(QString::fromLatin1(kOfTier)),
        tierNames(site, tier));
    if (rows.next())
        return entry(rows.query.value(0).toLongLong());
    if (rows.failed())
        return m_connection->trouble(rows.query.lastError(), LedgerAct::reading);
    return std::optional<SignOff>();
}

// Prior prices -------------------------------------------------------------------------------------------------------

namespace
{

// `held` are the sign-offs that say something of the window, and what they say: the last one at or before its start (part 0), those inside
// (part 1), those at its end (part 2). min() of an aggregate takes the other columns of its row from the row that has the least value.
const char* const kHeld = R"(
WITH given(tier, start, until, currency, decimals) AS (SELECT id, ?, ?, ?, ? FROM tier WHERE site = ? AND name = ?),
held(id, part) AS (
    SELECT * FROM (SELECT s.id, 0 FROM sign_off s JOIN given ON s.tier = given.tier AND s.instant <= start
                   ORDER BY s.instant DESC, s.id DESC LIMIT 1)
    UNION ALL SELECT s.id, 1 FROM sign_off s JOIN given ON s.tier = given.tier AND s.instant > start AND s.instant < until
    UNION ALL SELECT s.id, 2 FROM sign_off s JOIN given ON s.tier = given.tier AND s.instant = until)
)";

const char* const kCounted = R"(
SELECT count(*) FILTER (WHERE s.currency = given.currency AND s.decimals = given.decimals),
       count(*) FILTER (WHERE s.currency <> given.currency OR s.decimals <> given.decimals)
FROM held JOIN sign_off s ON s.id = held.id, given
)";

const char* const kLowest = R"(
SELECT u.name, seen.price, seen.id, seen.whole FROM (
    SELECT p.unit, min(CASE held.part WHEN 0 THEN p.after WHEN 1 THEN min(p.before, p.after) ELSE p.before END) AS price,
           held.id AS id, sum(held.part = 0) AS whole
    FROM held JOIN sign_off s ON s.id = held.id JOIN given ON s.currency = given.currency AND s.decimals = given.decimals
         JOIN unit_price p ON p.sign_off = held.id
    GROUP BY p.unit) AS seen
JOIN unit u ON u.id = seen.unit ORDER BY u.name
)";

} // namespace

Outcome<LowestOfTier> Ledger::lowestAsked(const std::string& site, const std::string& tier, const Currency& currency,
                                          const PriorWindow& window) const
{
    LowestOfTier lowest;
    if (m_connection->empty)
        return lowest;
    const QVariantList values =
        QVariantList{qlonglong{window.from()}, qlonglong{window.until}, QString::fromStdString(currency.code), currency.decimals}
        << tierNames(site, tier);
    LedgerQuery counted(m_connection->database, QString::fromLatin1(kHeld) + QString::fromLatin1(kCounted), values);
    if (counted.next()) {
        lowest.signOffs = counted.query.value(0).toLongLong();
        lowest.otherCurrency = counted.query.value(1).toLongLong();
    }
    LedgerQuery rows(m_connection->database, QString::fromLatin1(kHeld) + QString::fromLatin1(kLowest), values);
    while (rows.next())
        lowest.units.push_back(
            {readText(rows.query, 0), readPrice(rows.query, 1), rows.query.value(2).toLongLong(), rows.query.value(3).toLongLong() != 0});
    for (const LedgerQuery* query : {&counted, &rows}) {
        if (query->failed())
            return m_connection->trouble(query->query.lastError(), LedgerAct::reading);
    }
    for (const LowestAsked& unit : lowest.units) {
        if (!lowest.tier || unit.lowest < lowest.tier->lowest)
            lowest.tier = unit;
    }
    return lowest;
}

} // namespace rungwright
