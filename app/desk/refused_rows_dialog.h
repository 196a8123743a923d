// SPDX-License-Identifier: GPL-3.0-or-later
// What a unit list holds that cannot be taken, and whether to go on without it.
#pragma once

#include "unit_list.h"

#include <QAbstractTableModel>
#include <QDialog>

#include <memory>
#include <vector>

namespace Ui
{
class RefusedRowsDialog;
}

namespace rungwright
{

class RefusedRowsModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column { lineColumn, columnColumn, wrongColumn, foundColumn, wantedColumn, columnCount_ };

    explicit RefusedRowsModel(std::vector<RefusedRow> rows, QObject* parent = nullptr);

    const RefusedRow& row(int row) const { return m_rows[static_cast<std::size_t>(row)]; }

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role = Qt::DisplayRole) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role = Qt::DisplayRole) const override;

private:
    std::vector<RefusedRow> m_rows;
};

/// Accepted = go on without the refused rows, which waits for at least one row that is fine.
class RefusedRowsDialog : public QDialog
{
    Q_OBJECT
public:
    /// Result beside QDialog's own: the user wants to say how the columns are to be read.
    static constexpr int mapColumns = 2;

    /// `fileName` with or without its folder.
    RefusedRowsDialog(const UnitListResult& result, const QString& fileName, QWidget* parent = nullptr);
    ~RefusedRowsDialog() override;
    /// Shows a button of that text, which ends the dialog with mapColumns.
    void offerMapping(const QString& text);

protected:
    void changeEvent(QEvent* event) override;

private:
    void showDetail(int row);
    void dress();

    QString m_fileName; ///< Without its folder, cut if long.
    RefusedRowsModel m_model;
    std::unique_ptr<Ui::RefusedRowsDialog> m_ui;
};

} // namespace rungwright
