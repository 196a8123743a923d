// SPDX-License-Identifier: GPL-3.0-or-later
// The tables of the history page.
#pragma once

#include "ledger.h"

#include <QAbstractTableModel>
#include <QByteArray>
#include <QDateTime>
#include <QStringList>
#include <QVariant>

#include <vector>

namespace rungwright
{

/// What a file takes of a cell: plain amounts with a point, times in UTC. Where a model has none, what is shown.
inline constexpr int kPlainRole = Qt::UserRole + 110;

/// An instant as local time, short, and with its place against UTC: at the end of summer an hour comes twice.
QString localTime(std::int64_t instant);
QString localTimeInFull(std::int64_t instant);

/// A sign-off a row, the latest first; texts are made as they are shown.
class SignOffModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column {
        whenColumn,
        whoColumn,
        candidateColumn,
        changedColumn,
        floorColumn,
        gapBeforeColumn,
        gapAfterColumn,
        noteColumn,
        columns
    };

    using QAbstractTableModel::QAbstractTableModel;
    /// By time, as the ledger gives them.
    void show(std::vector<SignOffLine> lines);
    const std::vector<SignOffLine>& lines() const { return m_lines; }
    const SignOffLine& line(int row) const { return m_lines[m_lines.size() - 1 - static_cast<std::size_t>(row)]; }
    int rowOf(std::int64_t id) const;

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    static QString shown(const SignOffLine& line, int column);
    static QString plain(const SignOffLine& line, int column);

    std::vector<SignOffLine> m_lines;
};

/// Cells made beforehand.
class CellsModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    struct Cell {
        QString text;
        QString plain; ///< For a file; null = the text.
        bool number = false;
    };
    using QAbstractTableModel::QAbstractTableModel;
    void show(const QStringList& headings, std::vector<std::vector<Cell>> rows);

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    QStringList m_headings;
    std::vector<std::vector<Cell>> m_rows;
};

/// RFC 4180 with headings, cells that a spreadsheet would take for a formula guarded.
QByteArray tableCsv(const QAbstractItemModel& model);

} // namespace rungwright
