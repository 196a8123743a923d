// SPDX-License-Identifier: GPL-3.0-or-later
#include "history_reading.h"

#include <QFileInfo>

namespace rungwright
{

namespace
{

/// False, and the trouble kept, when it is one.
template <class T>
bool keepRead(Outcome<T> outcome, T& into, std::string& trouble)
{
    if (!outcome.ok()) {
        trouble = outcome.trouble();
        return false;
    }
    into = std::move(outcome).value();
    return true;
}

} // namespace

HistoryRead readHistory(const HistoryAsk& ask)
{
    HistoryRead read;
    read.ask = ask;
    if (ask.path.isEmpty() || !QFileInfo::exists(ask.path))
        return read;
    read.there = true;
    const auto opened = Ledger::open(ask.path, Ledger::For::reading);
    if (!opened.ok()) {
        read.trouble = opened.trouble();
        return read;
    }
    const Ledger& ledger = opened.value();
    const bool done = keepRead(ledger.history(ask.site, ask.tier), read.lines, read.trouble) &&
                      keepRead(ledger.unitsOf(ask.site, ask.tier), read.units, read.trouble) &&
                      keepRead(ledger.lowestAsked(ask.site, ask.tier, ask.currency, ask.window), read.lowest, read.trouble) &&
                      keepRead(ledger.lastOf(ask.site, ask.tier), read.last, read.trouble);
    if (done && !ask.unit.empty())
        keepRead(ledger.unitHistory(ask.site, ask.tier, ask.unit), read.unit, read.trouble);
    return read;
}

EntryRead readEntry(const QString& path, std::int64_t id)
{
    EntryRead read;
    read.id = id;
    const auto opened = Ledger::open(path, Ledger::For::reading);
    if (!opened.ok())
        read.trouble = opened.trouble();
    else
        keepRead(opened.value().entry(id), read.entry, read.trouble);
    return read;
}

} // namespace rungwright
