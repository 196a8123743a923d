// SPDX-License-Identifier: GPL-3.0-or-later
// A CSV table, read by the same strict reader that takes unit lists.
#pragma once

#include "csv_records.h"

#include <QBuffer>
#include <QStringList>

#include <vector>

namespace rungwright
{

inline std::vector<QStringList> readTable(const QByteArray& csv)
{
    std::vector<QStringList> lines;
    QBuffer buffer;
    buffer.setData(csv);
    buffer.open(QIODevice::ReadOnly);
    const CsvEnd end = readCsv(buffer, QStringLiteral("table"), [&](qint64, std::span<const std::string_view> cells) {
        QStringList line;
        for (const std::string_view cell : cells)
            line << QString::fromUtf8(cell.data(), qsizetype(cell.size()));
        lines.push_back(line);
        return true;
    });
    if (!end.trouble.isEmpty())
        qFatal("%s", qPrintable(end.trouble));
    return lines;
}

} // namespace rungwright
