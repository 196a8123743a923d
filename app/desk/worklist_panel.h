// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist in its dock: filter box, table, count.
#pragma once

#include "workbench.h"
#include "worklist_model.h"

#include <QSortFilterProxyModel>
#include <QWidget>

#include <array>
#include <memory>

namespace Ui
{
class WorklistPanel;
}

namespace rungwright
{

/// Sorts by WorklistModel::sortRole with undefined figures last either way, and keeps rows that contain every word of the filter.
class WorklistOrder : public QSortFilterProxyModel
{
    Q_OBJECT
public:
    using QSortFilterProxyModel::QSortFilterProxyModel;
    void setWords(const QString& words);

protected:
    bool lessThan(const QModelIndex& left, const QModelIndex& right) const override;
    bool filterAcceptsRow(int row, const QModelIndex& parent) const override;

private:
    QStringList m_words;
};

class WorklistPanel : public QWidget
{
    Q_OBJECT
public:
    explicit WorklistPanel(Workbench& bench, QWidget* parent = nullptr);
    ~WorklistPanel() override;

    /// Puts the next worse (-1) or next better (+1) tier of the shown order on the bench.
    void step(int by);
    void focusFilter();
    WorklistModel& model() { return m_model; }
    QByteArray saveColumns() const;
    void restoreColumns(const QByteArray& state);

protected:
    void resizeEvent(QResizeEvent* event) override;

private:
    /// Leaves out what the Figures show too, where there is too little room for the tier's name.
    void fitColumns();
    void onBenchReset();
    void onCurrentRow();
    void updateCount();
    void showHeaderMenu(const QPoint& at);

    Workbench& m_bench;
    WorklistModel m_model;
    WorklistOrder m_order;
    std::unique_ptr<Ui::WorklistPanel> m_ui;
    bool m_followingBench = false;
    std::array<int, WorklistModel::columnCount_> m_columnWidths{}; ///< As the figures need them, in pixels.
    bool m_columnsChosen = false;                                  ///< The user has said which columns to show.
};

} // namespace rungwright
