// SPDX-License-Identifier: GPL-3.0-or-later
// The unit list: CSV in.
#pragma once

#include "outcome.h"
#include "scenario.h"

#include <QByteArray>
#include <QString>
#include <QStringList>

#include <atomic>
#include <functional>
#include <vector>

namespace rungwright
{

/// Why a row (or a tier) was not taken.
struct RefusedRow {
    qint64 line = 0;    ///< Physical line of the file on which the record starts, from 1.
    int column = 0;     ///< Field number in the record, from 1; 0 when the row as a whole is meant.
    QString columnName; ///< The header's name for it, or empty.
    QString wrong;      ///< What is wrong.
    QString found;      ///< What was found (long texts cut in the middle to 60 characters).
    QString wanted;     ///< What is wanted: the remedy.

    /// "file:line: column 'asking_price': not a price; found 'abc'; wanted a positive number ..."
    QString text(const QString& fileName) const;
};

struct UnitListOptions {
    QString currencyCode;        ///< The --currency option; empty = take the file's, else XXX.
    bool withoutBadRows = false; ///< Go on without the refused rows. A tier that is left without floor or units is refused whole.
};

struct UnitListResult {
    Currency currency;
    std::vector<TierCase> tiers; ///< In order of first appearance; units in file order. Empty when refused (unless withoutBadRows).
    qint64 rowsTaken = 0;
    qint64 rowsFine = 0;             ///< Rows that were taken, or would be without the refused ones. 0 with a fileTrouble.
    std::vector<RefusedRow> refused; ///< The first kRefusedRowsKept.
    qint64 refusedCount = 0;         ///< All of them; a tier that is refused whole counts once.
    QStringList unknownColumns;      ///< Kept aside, reported once.
    QString encoding;                ///< "UTF-8", "UTF-8 with BOM", "UTF-16LE", "UTF-16BE".
    QString fileTrouble; ///< Not empty: the file as a whole could not be read (encoding, header, quotes, empty, cancelled); names the file
                         ///< and line.

    bool clean() const { return fileTrouble.isEmpty() && refusedCount == 0; }
};

inline constexpr std::size_t kRefusedRowsKept = 1000;

/// Called now and then with the share done (0 to 1); return false to cancel.
using Progress = std::function<bool(double)>;

/// Reads a unit list from memory. `fileName` is for messages only.
/// One entry of `refused` stands for one row, whatever is wrong in it; the other columns in trouble are named in its `wrong`. Only rows
/// that are taken count when another is compared with them: a refused row neither makes a later one a duplicate nor fixes its tier's floor.
/// Rows in which every cell is empty are passed over (spreadsheets leave them). The file's currency and options.currencyCode must not
/// differ.
UnitListResult readUnitList(const QByteArray& bytes, const QString& fileName, const UnitListOptions& options,
                            const Progress& progress = {});
/// The same result by the one way that knows of every trouble. The others try a faster way first, which reads only what is plainly fine.
UnitListResult readUnitListCarefully(const QByteArray& bytes, const QString& fileName, const UnitListOptions& options,
                                     const Progress& progress = {});
UnitListResult loadUnitList(const QString& path, const UnitListOptions& options, const Progress& progress = {});

} // namespace rungwright
