// SPDX-License-Identifier: GPL-3.0-or-later
// The price sheet: CSV out, and back in to check it.
#pragma once

#include "outcome.h"
#include "scenario.h"

#include <QByteArray>
#include <QString>

#include <vector>

namespace rungwright
{

/// One row of a price sheet.
struct SheetRow {
    std::string site;
    std::string tier;
    std::string unit;
    Status status = Status::vacant;
    Price currentPrice;
    Price newPrice;
    std::string currency;
    std::string candidate;

    bool operator==(const SheetRow&) const = default;
};

/// One row a unit, all units of the tier (closed ones too), in ladder order of the new prices (ties in unit-list order). `candidate` -1 =
/// current.
std::vector<SheetRow> sheetRows(const Scenario& scenario, const TierCase& tierCase, int candidate);

/// RFC 4180, CRLF, header site,tier,unit,status,current_price,new_price,change,change_percent,currency,candidate. change_percent has two
/// decimals. Text cells a spreadsheet would take for a formula (first character = + - @ TAB CR, also LF) get a leading apostrophe; so does
/// a text that itself begins with apostrophes followed by one of these, so that reading back is exact.
QByteArray sheetToCsv(const std::vector<SheetRow>& rows, const Currency& currency);
Outcome<std::vector<SheetRow>> sheetFromCsv(const QByteArray& csv, const QString& fileName);

/// Writes whole or not at all, then re-reads the file and compares row by row; the message says what differs.
Outcome<bool> saveSheet(const std::vector<SheetRow>& rows, const Currency& currency, const QString& path);

} // namespace rungwright
