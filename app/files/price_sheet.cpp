// SPDX-License-Identifier: GPL-3.0-or-later
#include "price_sheet.h"

#include "cell_values.h"
#include "csv_records.h"
#include "ladder/ladder.h"
#include "sheet_cells.h"
#include "whole_file.h"
#include "words.h"

#include <QBuffer>

#include <array>
#include <cassert>

namespace rungwright
{

namespace
{

constexpr std::array<std::string_view, 10> kSheetColumns{"site",      "tier",   "unit",           "status",   "current_price",
                                                         "new_price", "change", "change_percent", "currency", "candidate"};
constexpr qint64 kLargestSheet = qint64(1) << 30;

QString columnName(std::size_t i) { return QString::fromUtf8(kSheetColumns[i].data(), qsizetype(kSheetColumns[i].size())); }

// One row's cells to a SheetRow, or the complaint and the column it is about.
std::optional<Complaint> readRow(std::span<const std::string_view> cells, SheetRow& row, std::size_t& column)
{
    Currency currency;
    column = 8;
    if (auto complaint = readCurrency(cells[8], currency))
        return complaint;
    column = 3;
    if (auto complaint = readStatus(cells[3], row.status))
        return complaint;
    column = 4;
    if (auto complaint = readPrice(cells[4], currency, row.currentPrice))
        return complaint;
    column = 5;
    if (auto complaint = readPrice(cells[5], currency, row.newPrice))
        return complaint;
    column = 6;
    if (const std::string change = plainText(row.newPrice - row.currentPrice, currency); cells[6] != change)
        return Complaint{Words::tr("not the new price minus the current one"), QString::fromStdString(change)};
    column = 7;
    if (const std::string percent = changePercent(row.currentPrice, row.newPrice); cells[7] != percent)
        return Complaint{Words::tr("not the change in percent of the current price"), QString::fromStdString(percent)};
    row.site = unguarded(cells[0]);
    row.tier = unguarded(cells[1]);
    row.unit = unguarded(cells[2]);
    row.currency = currency.code;
    row.candidate = unguarded(cells[9]);
    return {};
}

} // namespace

std::vector<SheetRow> sheetRows(const Scenario& scenario, const TierCase& tierCase, int candidate)
{
    const std::vector<Unit>& units = tierCase.tier.units;
    const std::vector<Price> prices = pricesOf(tierCase, candidate);
    const std::string name(candidate < 0 ? kCurrentName : std::string_view(tierCase.candidates[static_cast<std::size_t>(candidate)].name));
    std::vector<SheetRow> rows;
    rows.reserve(units.size());
    for (const Rung& rung : sortedLadder(units, prices, Among::all)) {
        const Unit& unit = units[rung.unit];
        rows.push_back(
            {tierCase.tier.site, tierCase.tier.name, unit.name, unit.status, unit.asking, rung.price, scenario.currency.code, name});
    }
    return rows;
}

QByteArray sheetToCsv(const std::vector<SheetRow>& rows, const Currency& currency)
{
    std::string out;
    for (const std::string_view name : kSheetColumns) {
        out += out.empty() ? "" : ",";
        out += name;
    }
    out += "\r\n";
    const auto text = [](std::string_view cell) { return csvCell(guarded(cell)); };
    for (const SheetRow& row : rows) {
        out += text(row.site) + ',' + text(row.tier) + ',' + text(row.unit) + ',';
        out += statusWord(row.status);
        // Amounts are numbers to a spreadsheet, so the minus sign of a change is left alone.
        out += ',' + plainText(row.currentPrice, currency) + ',' + plainText(row.newPrice, currency);
        out += ',' + plainText(row.newPrice - row.currentPrice, currency) + ',' + changePercent(row.currentPrice, row.newPrice);
        out += ',' + text(row.currency) + ',' + text(row.candidate) + "\r\n";
    }
    return QByteArray::fromStdString(out);
}

Outcome<std::vector<SheetRow>> sheetFromCsv(const QByteArray& csv, const QString& fileName)
{
    QBuffer buffer;
    buffer.setData(csv);
    buffer.open(QIODevice::ReadOnly);
    std::vector<SheetRow> rows;
    QString trouble;
    bool headerSeen = false;
    const CsvEnd end = readCsv(buffer, fileName, [&](qint64 line, std::span<const std::string_view> cells) {
        const QString place = QStringLiteral("%1:%2: ").arg(fileName, QString::number(line));
        if (!headerSeen) {
            headerSeen = true;
            if (!std::equal(cells.begin(), cells.end(), kSheetColumns.begin(), kSheetColumns.end()))
                trouble = place + Words::tr("this is not the header of a price sheet");
            return trouble.isEmpty();
        }
        if (cells.size() != kSheetColumns.size()) {
            trouble = place + Words::tr("%1 cells instead of %2").arg(QString::number(cells.size()), QString::number(kSheetColumns.size()));
            return false;
        }
        SheetRow row;
        std::size_t column = 0;
        if (const auto complaint = readRow(cells, row, column)) {
            trouble = place + Words::tr("column '%1': %2; found '%3'; wanted: %4")
                                  .arg(columnName(column), complaint->wrong, shownText(cells[column]), complaint->wanted);
            return false;
        }
        rows.push_back(std::move(row));
        return true;
    });
    if (trouble.isEmpty())
        trouble = end.trouble;
    if (trouble.isEmpty() && !headerSeen)
        trouble = Words::tr("%1: the file is empty").arg(fileName);
    if (!trouble.isEmpty())
        return Trouble{trouble.toStdString()};
    return rows;
}

Outcome<bool> saveSheet(const std::vector<SheetRow>& rows, const Currency& currency, const QString& path)
{
    const Outcome<bool> written = writeWhole(path, sheetToCsv(rows, currency));
    if (!written.ok())
        return written;
    const Outcome<QByteArray> bytes = readWhole(path, kLargestSheet);
    if (!bytes.ok())
        return Trouble{
            Words::tr("the sheet was written but could not be read again: %1").arg(QString::fromStdString(bytes.trouble())).toStdString()};
    const Outcome<std::vector<SheetRow>> read = sheetFromCsv(bytes.value(), path);
    if (!read.ok())
        return Trouble{
            Words::tr("the sheet was written but reads differently: %1").arg(QString::fromStdString(read.trouble())).toStdString()};
    const std::vector<SheetRow>& seen = read.value();
    if (seen.size() != rows.size())
        return Trouble{Words::tr("%1: the sheet was written but reads differently: %2 rows instead of %3")
                           .arg(path, QString::number(seen.size()), QString::number(rows.size()))
                           .toStdString()};
    for (std::size_t i = 0; i < rows.size(); ++i) {
        if (!(seen[i] == rows[i]))
            return Trouble{Words::tr("%1: the sheet was written but row %2 (unit '%3') reads differently")
                               .arg(path, QString::number(i + 1), shownText(rows[i].unit))
                               .toStdString()};
    }
    return true;
}

} // namespace rungwright
