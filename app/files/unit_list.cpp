// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_list.h"

#include "csv_records.h"
#include "fast_unit_list.h"
#include "list_so_far.h"
#include "unit_rows.h"
#include "whole_file.h"
#include "words.h"

#include <QBuffer>
#include <QFile>
#include <QFileInfo>

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr qint64 kLargestPipe = qint64(256) << 20;

bool isBlank(std::span<const std::string_view> cells)
{
    return std::all_of(cells.begin(), cells.end(), [](std::string_view cell) { return trimmedText(cell).empty(); });
}

QString cancelled(const QString& fileName) { return Words::tr("%1: reading was cancelled; nothing was taken").arg(fileName); }

// What must be known before the first price can be read: the columns, and the currency, which a later row may name first.
struct FirstLook {
    std::optional<UnitListHeader> header;
    std::optional<Currency> currency;
    qint64 currencyLine = 0;
    qint64 rows = 0; ///< Below the header, as far as was looked.
    QString trouble;
};

FirstLook lookAhead(QIODevice& device, const QString& fileName, const Progress& progress)
{
    FirstLook look;
    const auto sink = [&](qint64 line, std::span<const std::string_view> cells) {
        if (isBlank(cells))
            return true;
        if (!look.header) {
            const Outcome<UnitListHeader> header = readUnitListHeader(cells);
            if (header.ok())
                look.header = header.value();
            else
                look.trouble = Words::tr("%1:%2: %3").arg(fileName, QString::number(line), QString::fromStdString(header.trouble()));
            return header.ok();
        }
        ++look.rows;
        const int place = look.header->at(Column::currency);
        if (place < 0)
            return false;
        if (static_cast<std::size_t>(place) >= cells.size())
            return true;
        Currency currency;
        const std::string_view text = trimmedText(cells[static_cast<std::size_t>(place)]);
        if (text.empty() || readCurrency(text, currency))
            return true;
        look.currency = currency;
        look.currencyLine = line;
        return false;
    };
    // Nearly always over with the first piece; a list whose currency cells are all empty is walked through, though.
    const CsvEnd end = readCsv(device, fileName, sink, [&progress](double) { return !progress || progress(0); });
    if (end.cancelled)
        look.trouble = cancelled(fileName);
    if (look.trouble.isEmpty() && !look.header)
        look.trouble = end.trouble;
    if (look.trouble.isEmpty() && !look.header)
        look.trouble = Words::tr("%1: the file is empty. Wanted is a header row and one row for each unit").arg(fileName);
    if (look.trouble.isEmpty() && look.rows == 0)
        look.trouble = end.trouble.isEmpty() ? Words::tr("%1: there is a header row but no unit below it").arg(fileName) : end.trouble;
    return look;
}

// The file's currency, else the asked one, else none; a quarrel of the two is settled by nobody but the user.
QString settleCurrency(const FirstLook& look, const QString& asked, const QString& fileName, Currency& out)
{
    if (!asked.isEmpty()) {
        if (const auto complaint = readCurrency(asked.trimmed().toStdString(), out))
            return Words::tr("'%1' is %2. Wanted: %3").arg(shownText(asked), complaint->wrong, complaint->wanted);
    }
    if (!look.currency)
        return {};
    if (!asked.isEmpty() && out != *look.currency)
        return Words::tr(
                   "%1:%2: the file's currency is %3, but %4 is wanted. Take a file in %4, or correct this one; a command can name %3 or "
                   "none")
            .arg(fileName, QString::number(look.currencyLine), QString::fromStdString(look.currency->code),
                 QString::fromStdString(out.code));
    out = *look.currency;
    return {};
}

UnitListResult readDevice(QIODevice& device, const QString& fileName, const UnitListOptions& options, const Progress& progress)
{
    UnitListResult result;
    const FirstLook look = lookAhead(device, fileName, progress);
    result.fileTrouble = look.trouble;
    if (result.fileTrouble.isEmpty())
        result.fileTrouble = settleCurrency(look, options.currencyCode, fileName, result.currency);
    if (!result.fileTrouble.isEmpty())
        return result;
    if (!device.seek(0)) {
        result.fileTrouble = Words::tr("%1: cannot be read: %2").arg(fileName, device.errorString());
        return result;
    }
    result.unknownColumns = look.header->unknown;
    UnitRows rows(*look.header, result.currency, look.currencyLine, result);
    bool headerSeen = false;
    const CsvEnd end = readCsv(
        device, fileName,
        [&](qint64 line, std::span<const std::string_view> cells) {
            if (isBlank(cells))
                return true;
            if (headerSeen)
                rows.take(line, cells);
            headerSeen = true;
            return true;
        },
        progress);
    result.encoding = end.encoding;
    result.fileTrouble = end.cancelled ? cancelled(fileName) : end.trouble;
    if (result.fileTrouble.isEmpty())
        rows.finish();
    result.rowsFine = result.fileTrouble.isEmpty() ? result.rowsTaken : 0;
    if (!result.fileTrouble.isEmpty() || (result.refusedCount > 0 && !options.withoutBadRows)) {
        result.tiers.clear();
        result.rowsTaken = 0;
    }
    return result;
}

/// The fast way where it goes, else the careful one, which then starts anew. What progress tells never goes back.
UnitListResult readEitherWay(QIODevice& device, const QString& fileName, const UnitListOptions& options, const Progress& progress,
                             const TellSoFar& tell = {})
{
    double most = 0;
    const Progress forward = [&](double share) { return progress(most = std::max(most, share)); };
    UnitListResult result;
    FastSettings settings;
    settings.tell = tell;
    switch (readFastResult(device, options, settings, progress ? forward : Progress(), result)) {
    case FastEnd::done:
        return result;
    case FastEnd::cancelled:
        result.fileTrouble = cancelled(fileName);
        return result;
    case FastEnd::careful:
        break;
    }
    if (device.seek(0))
        return readDevice(device, fileName, options, progress ? forward : Progress());
    result.fileTrouble = Words::tr("%1: cannot be read: %2").arg(fileName, device.errorString());
    return result;
}

} // namespace

QString RefusedRow::text(const QString& fileName) const
{
    const QString place = QStringLiteral("%1:%2: ").arg(fileName, QString::number(line));
    const QString what = column > 0 ? Words::tr("column '%1': %2").arg(columnName, wrong) : wrong;
    const QString seen = found.isEmpty() ? Words::tr("found nothing") : Words::tr("found '%1'").arg(found);
    return Words::tr("%1%2; %3; wanted: %4").arg(place, what, seen, wanted);
}

UnitListResult readUnitList(const QByteArray& bytes, const QString& fileName, const UnitListOptions& options, const Progress& progress)
{
    QBuffer buffer;
    buffer.setData(bytes);
    buffer.open(QIODevice::ReadOnly);
    return readEitherWay(buffer, fileName, options, progress);
}

UnitListResult readUnitListCarefully(const QByteArray& bytes, const QString& fileName, const UnitListOptions& options,
                                     const Progress& progress)
{
    QBuffer buffer;
    buffer.setData(bytes);
    buffer.open(QIODevice::ReadOnly);
    return readDevice(buffer, fileName, options, progress);
}

UnitListResult loadUnitList(const QString& path, const UnitListOptions& options, const Progress& progress)
{
    return loadUnitList(path, options, progress, {});
}

UnitListResult loadUnitList(const QString& path, const UnitListOptions& options, const Progress& progress, const TellSoFar& tell)
{
    QFile file(path);
    if (QFileInfo(path).isDir() || !file.open(QIODevice::ReadOnly)) {
        UnitListResult result;
        result.fileTrouble = QFileInfo(path).isDir() ? Words::tr("%1: is a folder, not a file").arg(path)
                                                     : Words::tr("%1: cannot be opened: %2").arg(path, file.errorString());
        return result;
    }
    if (!file.isSequential())
        return readEitherWay(file, path, options, progress, tell);
    // A pipe cannot be read twice, so it is kept, and a device that never ends is not waited for.
    const Outcome<QByteArray> bytes = readRest(file, kLargestPipe);
    if (bytes.ok())
        return readUnitList(bytes.value(), path, options, progress);
    UnitListResult result;
    result.fileTrouble = QString::fromStdString(bytes.trouble());
    return result;
}

} // namespace rungwright
