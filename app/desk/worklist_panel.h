// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist in its dock: filter, table, count.
#pragma once

#include "workbench.h"
#include "worklist_model.h"

#include <QWidget>

#include <array>
#include <memory>
#include <vector>

class QAction;
class QMenu;
class QTableView;

namespace Ui
{
class WorklistPanel;
}

namespace rungwright
{

class WorklistPanel : public QWidget
{
    Q_OBJECT
public:
    /// Both outlive the panel.
    WorklistPanel(Workbench& bench, Worklist& list, QWidget* parent = nullptr);
    ~WorklistPanel() override;

    /// Puts the next worse (-1) or next better (+1) tier of the shown order on the bench; sites and what is folded are passed over.
    void step(int by);
    /// Puts the next tier below that has not been seen on the bench, from the top again when there is none.
    void stepToUnseen();
    /// Marks the selected tiers as seen, or as not seen when all of them are. One undo step.
    void toggleSeen();
    void focusFilter();
    void setGrouped(bool grouped);
    void foldAll(bool folded);
    /// The selected tiers in the order shown; those of a selected site too, when it is folded.
    std::vector<int> selectedTiers() const;

    WorklistModel& model() { return m_model; }
    QTableView& table();
    /// Which columns, how wide, in which order, and whether grouped.
    QByteArray saveColumns() const;
    /// What saveColumns() of an earlier run gave; anything else is left alone. The order always begins with the worst.
    void restoreColumns(const QByteArray& state);

signals:
    /// A sentence for the status bar.
    void told(const QString& sentence);
    void groupedChanged(bool grouped);
    void thresholdsWanted();

protected:
    void resizeEvent(QResizeEvent* event) override;
    bool eventFilter(QObject* watched, QEvent* event) override;

private:
    void prepareTable();
    void prepareShowMenu();
    void prepareCopying();
    /// Leaves out what the Figures show too, where there is too little room for the tier's name.
    void fitColumns();
    void onBenchReset();
    void onCurrentRow();
    void remember();
    void restore();
    void goTo(int row);
    void showWish();
    void fillFlagCounts();
    void updateCount();
    void showHeaderMenu(const QPoint& at);
    void toggleFold(int row);
    bool foldKey(int key);
    void changeWish(const std::function<void(WorklistWish&)>& change);

    /// What was selected before the rows were rearranged.
    struct Kept {
        std::vector<ShownRow> selected;
        ShownRow current;
        int column = 0;
        int scrolled = 0;
    };

    Workbench& m_bench;
    Worklist& m_list;
    WorklistModel m_model;
    std::unique_ptr<Ui::WorklistPanel> m_ui;
    QMenu* m_showMenu = nullptr;
    std::array<QAction*, kFlags.size()> m_flagActions{};
    QAction* m_unseenAction = nullptr;
    QAction* m_groupAction = nullptr;
    Kept m_kept;
    int m_benchTier = -1; ///< On the bench when it last told of itself.
    int m_lastRow = 0;    ///< Where the current row was when it had last one.
    bool m_toTop = false; ///< The next rearrangement is of another order or filter: it is read from the top.
    bool m_followingBench = false;
    std::array<int, WorklistModel::columnCount_> m_columnWidths{}; ///< As the figures need them, in pixels.
    bool m_columnsChosen = false;                                  ///< The user has said which columns to show.
};

} // namespace rungwright
