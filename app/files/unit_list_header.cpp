// SPDX-License-Identifier: GPL-3.0-or-later
#include "unit_list_header.h"

#include "cell_values.h"
#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

int columnIndex(const QString& name)
{
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        if (name.compare(QLatin1String(kColumnNames[i].data(), qsizetype(kColumnNames[i].size())), Qt::CaseInsensitive) == 0)
            return static_cast<int>(i);
    }
    return -1;
}

QString neededColumns()
{
    QStringList names;
    for (std::size_t i = 0; i < kColumnsNeeded; ++i)
        names << QString::fromUtf8(kColumnNames[i].data(), qsizetype(kColumnNames[i].size()));
    return names.join(QStringLiteral(", "));
}

// A list that a spreadsheet wrote with another separator has its whole header in one cell.
QString separatorHint(std::span<const std::string_view> cells)
{
    if (cells.size() != 1)
        return {};
    if (cells[0].find(';') != std::string_view::npos)
        return Words::tr(" The cells seem to be separated by semicolons: save the file with commas.");
    if (cells[0].find('\t') != std::string_view::npos)
        return Words::tr(" The cells seem to be separated by tabs: save the file with commas.");
    return {};
}

} // namespace

Outcome<UnitListHeader> readUnitListHeader(std::span<const std::string_view> cells)
{
    UnitListHeader header;
    header.place.fill(-1);
    header.cells = cells.size();
    QStringList found;
    for (std::size_t i = 0; i < cells.size(); ++i) {
        const std::string_view trimmed = trimmedText(cells[i]);
        const QString name = QString::fromUtf8(trimmed.data(), qsizetype(trimmed.size()));
        found << shownText(name);
        const int column = columnIndex(name);
        if (column < 0) {
            header.unknown << (name.isEmpty() ? Words::tr("(column %1, without a name)").arg(qulonglong(i + 1)) : name);
            continue;
        }
        int& place = header.place[static_cast<std::size_t>(column)];
        if (place >= 0)
            return Trouble{Words::tr("the column '%1' is there twice, as columns %2 and %3. Remove or rename one of them")
                               .arg(name, QString::number(place + 1), QString::number(i + 1))
                               .toStdString()};
        place = static_cast<int>(i);
    }
    header.unknown.removeDuplicates();

    QStringList missing;
    for (std::size_t i = 0; i < kColumnsNeeded; ++i) {
        if (header.place[i] < 0)
            missing << QStringLiteral("'%1'").arg(QLatin1String(kColumnNames[i].data(), qsizetype(kColumnNames[i].size())));
    }
    if (missing.isEmpty())
        return header;
    return Trouble{Words::tr("the header row lacks %1; found: %2. Wanted is a first row with the columns %3, in any order.%4")
                       .arg(missing.join(QStringLiteral(", ")), shownText(found.join(QStringLiteral(", ")), 200), neededColumns(),
                            separatorHint(cells))
                       .toStdString()};
}

} // namespace rungwright
