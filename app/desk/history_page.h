// SPDX-License-Identifier: GPL-3.0-or-later
// The sign-offs of the tier on the bench: floor, expected cheapest and gap over time, who signed what, the lowest prices of the days
// before, and whether the last sheet is what is asked today.
#pragma once

#include "history_reading.h"
#include "history_tables.h"
#include "workbench.h"

#include <QFutureWatcher>
#include <QWidget>

#include <memory>

namespace Ui
{
class HistoryPage;
}

class QTableView;

namespace rungwright
{

class HistoryPlot;
class PaperPlot;
class Questions;

class HistoryPage : public QWidget
{
    Q_OBJECT
public:
    /// Both outlive the page.
    HistoryPage(Workbench& bench, Questions& questions, QWidget* parent = nullptr);
    ~HistoryPage() override;

    /// Reads the ledger anew, now or when the page is next seen.
    void reread();
    /// Chooses a sign-off, as a click on it would.
    void choose(std::int64_t id);

signals:
    /// A sentence for the status bar.
    void told(const QString& sentence);

protected:
    void showEvent(QShowEvent* event) override;
    void changeEvent(QEvent* event) override;

private:
    void prepareTables();
    void prepareWaysOut();
    void dress();
    HistoryAsk ask() const;
    void start();
    void onRead();
    void onEntryRead();
    void showEmpty(const QString& words, bool canReread);
    void showTitle();
    void showUnits();
    void showPlots();
    void showLowest();
    void showToday();
    void showEntry();
    void onSelected();
    void savePicture(PaperPlot* plot);
    void saveTable(const QAbstractItemModel& model, const QString& what);

    Workbench& m_bench;
    Questions& m_questions;
    HistoryRead m_read;
    EntryRead m_entry;
    SignOffModel m_signOffs;
    CellsModel m_changes;
    CellsModel m_checks;
    CellsModel m_lowest;
    CellsModel m_today;
    QFutureWatcher<HistoryRead> m_reading;
    QFutureWatcher<EntryRead> m_entryReading;
    bool m_filling = false; ///< The page changes its own widgets, nobody chose anything.
    std::unique_ptr<Ui::HistoryPage> m_ui;
};

} // namespace rungwright
