// SPDX-License-Identifier: GPL-3.0-or-later
#include "history_tables.h"

#include "sheet_cells.h"
#include "table_text.h"
#include "wording.h"

#include <QLocale>

#include <algorithm>

namespace rungwright
{

QString localTime(std::int64_t instant)
{
    return QLocale().toString(QDateTime::fromMSecsSinceEpoch(instant).toLocalTime(), QLocale::ShortFormat);
}

QString localTimeInFull(std::int64_t instant)
{
    const QDateTime local = QDateTime::fromMSecsSinceEpoch(instant).toLocalTime();
    return SignOffModel::tr("%1 %2 (%3)")
        .arg(QLocale().toString(local, QLocale::ShortFormat), local.timeZoneAbbreviation(), QString::fromStdString(utcText(instant)));
}

// Sign-offs ----------------------------------------------------------------------------------------------------------

void SignOffModel::show(std::vector<SignOffLine> lines)
{
    beginResetModel();
    m_lines = std::move(lines);
    endResetModel();
}

int SignOffModel::rowOf(std::int64_t id) const
{
    const auto found = std::ranges::find(m_lines, id, &SignOffLine::id);
    return found == m_lines.end() ? -1 : static_cast<int>(m_lines.end() - found) - 1;
}

int SignOffModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_lines.size()); }

int SignOffModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : columns; }

QString SignOffModel::shown(const SignOffLine& line, int column)
{
    const auto money = [&](std::optional<double> minor) { return minor ? moneyText(*minor, line.currency) : undefinedText(); };
    switch (column) {
    case whenColumn:
        return localTime(line.instant);
    case whoColumn:
        return QString::fromStdString(line.who);
    case candidateColumn:
        return QString::fromStdString(line.candidate);
    case changedColumn:
        return tr("%1 of %2").arg(QLocale().toString(qlonglong{line.changed}), QLocale().toString(qlonglong{line.units}));
    case floorColumn:
        return floorText(line.advertisedFloor.value_or(Price{}), line.currency);
    case gapBeforeColumn:
        return money(line.gapBefore);
    case gapAfterColumn:
        return money(line.gapAfter);
    case noteColumn:
        return QString::fromStdString(line.note).simplified();
    default:
        return {};
    }
}

QString SignOffModel::plain(const SignOffLine& line, int column)
{
    const auto money = [&](std::optional<double> minor) {
        return minor ? QString::number(line.currency.major(*minor), 'f', line.currency.decimals) : QString();
    };
    switch (column) {
    case whenColumn:
        return QString::fromStdString(utcText(line.instant));
    case changedColumn:
        return QString::number(line.changed);
    case floorColumn:
        return line.advertisedFloor ? QString::fromStdString(plainText(*line.advertisedFloor, line.currency)) : QString();
    case gapBeforeColumn:
        return money(line.gapBefore);
    case gapAfterColumn:
        return money(line.gapAfter);
    case noteColumn:
        return QString::fromStdString(line.note);
    default:
        return shown(line, column);
    }
}

QVariant SignOffModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const SignOffLine& one = line(index.row());
    const int column = index.column();
    const bool number = column >= changedColumn && column <= gapAfterColumn;
    switch (role) {
    case Qt::DisplayRole:
        return shown(one, column);
    case Qt::ToolTipRole:
        return (column == whenColumn ? localTimeInFull(one.instant) : shown(one, column)).toHtmlEscaped();
    case Qt::TextAlignmentRole:
        return QVariant((number ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    case kValueRole:
        return number ? QVariant(1.0) : QVariant(QString());
    case kPlainRole:
        return plain(one, column);
    default:
        return {};
    }
}

QVariant SignOffModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal)
        return {};
    const QString headings[columns] = {tr("Signed"), tr("By"),  tr("Ladder"),  tr("Changed"),
                                       tr("Floor"),  tr("Gap"), tr("→ after"), tr("Note")};
    const QString plainHeadings[columns] = {tr("Signed, UTC"), tr("By"),         tr("Ladder"),    tr("Units changed"),
                                            tr("Floor"),       tr("Gap before"), tr("Gap after"), tr("Note")};
    if (role == Qt::DisplayRole)
        return headings[section];
    if (role == kPlainRole || role == Qt::ToolTipRole)
        return plainHeadings[section];
    if (role == Qt::TextAlignmentRole && section >= changedColumn && section <= gapAfterColumn)
        return QVariant(Qt::AlignRight | Qt::AlignVCenter);
    return {};
}

// Cells --------------------------------------------------------------------------------------------------------------

void CellsModel::show(const QStringList& headings, std::vector<std::vector<Cell>> rows)
{
    beginResetModel();
    m_headings = headings;
    m_rows = std::move(rows);
    endResetModel();
}

int CellsModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_rows.size()); }

int CellsModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_headings.size()); }

QVariant CellsModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const Cell& cell = m_rows[static_cast<std::size_t>(index.row())][static_cast<std::size_t>(index.column())];
    switch (role) {
    case Qt::DisplayRole:
        return cell.text;
    case Qt::ToolTipRole:
        return cell.text.toHtmlEscaped();
    case Qt::TextAlignmentRole:
        return QVariant((cell.number ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    case kValueRole:
        return cell.number ? QVariant(1.0) : QVariant(QString());
    case kPlainRole:
        return cell.plain.isNull() ? cell.text : cell.plain;
    default:
        return {};
    }
}

QVariant CellsModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal)
        return {};
    if (role == Qt::DisplayRole)
        return m_headings.value(section);
    // Over numbers as the numbers.
    if (role == Qt::TextAlignmentRole && !m_rows.empty() && m_rows.front()[static_cast<std::size_t>(section)].number)
        return QVariant(Qt::AlignRight | Qt::AlignVCenter);
    return {};
}

QByteArray tableCsv(const QAbstractItemModel& model)
{
    const auto cell = [](const QVariant& text, bool number) {
        return csvCell(number ? text.toString().toStdString() : guarded(text.toString().toStdString()));
    };
    std::string out;
    for (int column = 0; column < model.columnCount(); ++column) {
        const QVariant plain = model.headerData(column, Qt::Horizontal, kPlainRole);
        out += (column ? "," : "") + cell(plain.isValid() ? plain : model.headerData(column, Qt::Horizontal), false);
    }
    out += "\r\n";
    for (int row = 0; row < model.rowCount(); ++row) {
        for (int column = 0; column < model.columnCount(); ++column) {
            const QModelIndex index = model.index(row, column);
            out += (column ? "," : "") + cell(index.data(kPlainRole), index.data(kValueRole).typeId() == QMetaType::Double);
        }
        out += "\r\n";
    }
    return QByteArray::fromStdString(out);
}

} // namespace rungwright
