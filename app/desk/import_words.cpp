// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_words.h"

#include "wording.h"

#include <QCoreApplication>

namespace rungwright
{

namespace
{

struct ImportText {
    Q_DECLARE_TR_FUNCTIONS(ImportText)
};

QString counted(qint64 count) { return numberText(static_cast<double>(count), 0); }

} // namespace

QString columnTitle(Column column)
{
    switch (column) {
    case Column::site:
        return ImportText::tr("Site");
    case Column::tier:
        return ImportText::tr("Tier");
    case Column::unit:
        return ImportText::tr("Unit");
    case Column::askingPrice:
        return ImportText::tr("Asking price");
    case Column::status:
        return ImportText::tr("Status");
    case Column::advertisedFloor:
        return ImportText::tr("Advertised floor");
    case Column::currency:
        return ImportText::tr("Currency");
    case Column::grade:
        return ImportText::tr("Grade");
    case Column::area:
        return ImportText::tr("Area, m²");
    case Column::vacancyChance:
        return ImportText::tr("Vacancy chance");
    case Column::locked:
        return ImportText::tr("Locked");
    }
    return {};
}

QString onScreen(QString text)
{
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        const QString name = QString::fromUtf8(kColumnNames[i].data(), qsizetype(kColumnNames[i].size()));
        const QString title = QStringLiteral("“%1”").arg(columnTitle(static_cast<Column>(i)));
        text.replace(QStringLiteral("'%1'").arg(name), title);
        if (text.startsWith(name + QLatin1Char(':')))
            text.replace(0, name.size(), title);
    }
    return text.left(1).toUpper() + text.mid(1);
}

qsizetype placeOf(const QStringList& headers, const TheirColumn& column)
{
    int met = 0;
    for (qsizetype at = 0; at < headers.size(); ++at) {
        if (headers[at] == column.header && ++met == column.occurrence)
            return at;
    }
    return -1;
}

TheirColumn columnAt(const QStringList& headers, qsizetype place)
{
    return {headers[place], static_cast<int>(headers.first(place + 1).count(headers[place]))};
}

QString headerText(const QStringList& headers, qsizetype place)
{
    const TheirColumn column = columnAt(headers, place);
    if (column.header.isEmpty())
        return ImportText::tr("column %1, without a header").arg(place + 1);
    return column.occurrence == 1 ? column.header : ImportText::tr("%1 (number %2 of that name)").arg(column.header).arg(column.occurrence);
}

QString marksText(const std::vector<NumberMark>& marks)
{
    QStringList parts;
    for (const NumberMark& mark : marks)
        parts << (mark.currency.isEmpty() ? mark.text : mark.text + QStringLiteral(" = ") + mark.currency);
    return parts.join(QStringLiteral("; "));
}

std::vector<NumberMark> marksFromText(const QString& text)
{
    std::vector<NumberMark> marks;
    for (const QString& part : text.split(QLatin1Char(';'), Qt::SkipEmptyParts)) {
        const QString sign = part.section(QLatin1Char('='), 0, 0).trimmed();
        if (!sign.isEmpty())
            marks.push_back({sign, part.section(QLatin1Char('='), 1).trimmed().toUpper()});
    }
    return marks;
}

QStringList wordsFromText(const QString& text)
{
    QStringList words;
    for (const QString& part : text.split(QLatin1Char(','))) {
        if (!part.trimmed().isEmpty())
            words << part.trimmed();
    }
    return words;
}

QString firstTrouble(const MappingPreview& preview)
{
    for (const PreviewRow& row : preview.rows) {
        if (row.passedOver)
            continue;
        if (!row.trouble.isEmpty())
            return ImportText::tr("Line %1: %2.").arg(row.line).arg(row.trouble);
        for (std::size_t i = 0; i < row.cells.size(); ++i) {
            if (!row.cells[i].trouble.isEmpty())
                return ImportText::tr("Line %1, %2: %3.")
                    .arg(row.line)
                    .arg(columnTitle(static_cast<Column>(i)).toLower(), row.cells[i].trouble);
        }
    }
    return {};
}

QString understoodText(const MappingPreview& preview, bool whole)
{
    if (!preview.trouble.isEmpty())
        return preview.trouble;
    if (!preview.missingColumns.isEmpty())
        return ImportText::tr("The list has no column “%1”.").arg(preview.missingColumns.join(QStringLiteral("”, “")));
    const qint64 rows = preview.rowsSeen - preview.rowsPassedOver;
    if (rows <= 0)
        return ImportText::tr("No row below the header.");
    QString text;
    if (preview.rowsInTrouble == 0)
        text = whole ? ImportText::tr("All %1 rows understood.").arg(counted(rows))
                     : ImportText::tr("The first %1 rows are all understood; the rest is read on import.").arg(counted(rows));
    else
        text = (whole ? ImportText::tr("%1 of %2 rows understood, %3 would be refused.")
                      : ImportText::tr("%1 of the first %2 rows understood, %3 would be refused."))
                   .arg(counted(rows - preview.rowsInTrouble), counted(rows), counted(preview.rowsInTrouble));
    if (preview.rowsPassedOver > 0)
        text +=
            QLatin1Char(' ') + (preview.rowsPassedOver == 1 ? ImportText::tr("1 row passed over.")
                                                            : ImportText::tr("%1 rows passed over.").arg(counted(preview.rowsPassedOver)));
    const QString first = firstTrouble(preview);
    return first.isEmpty() ? text : text + QLatin1Char(' ') + first;
}

} // namespace rungwright
