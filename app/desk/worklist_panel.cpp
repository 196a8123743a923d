// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_panel.h"

#include "caution.h"
#include "table_text.h"
#include "ui_worklist_panel.h"
#include "worklist_delegate.h"

#include <QClipboard>
#include <QGuiApplication>
#include <QHeaderView>
#include <QKeyEvent>
#include <QMenu>
#include <QMouseEvent>
#include <QScrollBar>

#include <algorithm>
#include <utility>

namespace rungwright
{

WorklistPanel::WorklistPanel(Workbench& bench, Worklist& list, QWidget* parent) :
    QWidget(parent), m_bench(bench), m_list(list), m_model(list), m_ui(std::make_unique<Ui::WorklistPanel>())
{
    m_ui->setupUi(this);
    prepareTable();
    prepareShowMenu();
    prepareCopying();
    m_ui->pickedChip->setText({});
    connect(m_ui->pickedChip, &QToolButton::clicked, this, [this] {
        m_list.clearPick();
        emit told(tr("The worklist shows all tiers again."));
    });
    connect(m_ui->worklistFilter, &QLineEdit::textChanged, this,
            [this](const QString& words) { changeWish([&](WorklistWish& wish) { wish.setWords(words); }); });
    connect(m_ui->worklistFilter, &QLineEdit::returnPressed, this, [this] {
        m_lastRow = -1;
        m_ui->worklistTable->selectionModel()->clearCurrentIndex();
        step(+1);
    });
    connect(&m_bench, &Workbench::reset, this, &WorklistPanel::onBenchReset);
    connect(&m_model, &QAbstractItemModel::modelAboutToBeReset, this, &WorklistPanel::remember);
    connect(&m_model, &QAbstractItemModel::modelReset, this, &WorklistPanel::restore);
    connect(&m_list, &Worklist::rowsChanged, this, &WorklistPanel::updateCount);
    connect(&m_list, &Worklist::pickChanged, this, &WorklistPanel::showWish);
    showWish();
    updateCount();
}

WorklistPanel::~WorklistPanel() = default;

QTableView& WorklistPanel::table() { return *m_ui->worklistTable; }

void WorklistPanel::prepareTable()
{
    QTableView* table = m_ui->worklistTable;
    table->setModel(&m_model);
    table->setItemDelegate(new WorklistDelegate(table));
    table->verticalHeader()->setSectionResizeMode(QHeaderView::Fixed);
    table->verticalHeader()->setDefaultSectionSize(2 * fontMetrics().height() + 10);
    table->viewport()->installEventFilter(this);
    table->installEventFilter(this);

    QHeaderView* header = table->horizontalHeader();
    header->setSectionResizeMode(QHeaderView::Interactive);
    header->setSectionResizeMode(WorklistModel::tierColumn, QHeaderView::Stretch);
    header->setMinimumSectionSize(fontMetrics().averageCharWidth() * 5);
    // As wide as usual figures need and no wider: what is over belongs to the tier's name.
    const auto wide = [&](const QString& heading, const QString& figure) {
        return qMax(fontMetrics().horizontalAdvance(heading) + 12, fontMetrics().horizontalAdvance(figure) + 14);
    };
    header->resizeSection(WorklistModel::onOfferColumn, wide(tr("On offer"), QStringLiteral("88 / 88")));
    header->resizeSection(WorklistModel::floorColumn, wide(tr("Floor"), QStringLiteral("188.00")));
    header->resizeSection(WorklistModel::cheapestColumn, wide(tr("Cheapest"), QStringLiteral("188.00")));
    header->resizeSection(WorklistModel::gapColumn, wide(tr("Gap") + QStringLiteral("   ▾"), QStringLiteral("888.88 ")));
    header->resizeSection(WorklistModel::leanColumn, wide(tr("Lean"), QStringLiteral("−0.88")));
    header->resizeSection(WorklistModel::seenColumn, wide(tr("Seen"), QStringLiteral("88 of 88 seen")));
    for (int column = 0; column < WorklistModel::columnCount_; ++column)
        m_columnWidths[static_cast<std::size_t>(column)] = header->sectionSize(column);
    setMinimumWidth(m_columnWidths[WorklistModel::onOfferColumn] + m_columnWidths[WorklistModel::floorColumn] +
                    m_columnWidths[WorklistModel::gapColumn] + fontMetrics().averageCharWidth() * 16);
    header->setContextMenuPolicy(Qt::CustomContextMenu);
    // The tier column tells site and flags on its second line, seen and noted by marks; columns of their own serve for sorting.
    for (const int column : {WorklistModel::siteColumn, WorklistModel::flagsColumn, WorklistModel::seenColumn, WorklistModel::noteColumn})
        table->setColumnHidden(column, true);

    connect(header, &QHeaderView::customContextMenuRequested, this, &WorklistPanel::showHeaderMenu);
    connect(header, &QHeaderView::sortIndicatorChanged, this, [this] { m_ui->worklistTable->scrollToTop(); });
    connect(table->selectionModel(), &QItemSelectionModel::currentRowChanged, this, &WorklistPanel::onCurrentRow);
    table->sortByColumn(WorklistModel::gapColumn, Qt::DescendingOrder);
}

// Rows and the bench -------------------------------------------------------------------------------------------------

void WorklistPanel::remember()
{
    m_kept = {};
    const QTableView* table = m_ui->worklistTable;
    m_kept.scrolled = table->verticalScrollBar()->value();
    m_kept.column = std::max(0, table->currentIndex().column());
    const int row = table->currentIndex().row();
    const int rows = m_model.rowCount();
    if (row >= 0 && row < rows)
        m_kept.current = m_model.shown(row);
    for (const QItemSelectionRange& range : table->selectionModel()->selection()) {
        for (int i = range.top(); i <= std::min(range.bottom(), rows - 1); ++i)
            m_kept.selected.push_back(m_model.shown(i));
    }
}

void WorklistPanel::restore()
{
    updateCount();
    showWish();
    QTableView* table = m_ui->worklistTable;
    if (!m_model.sameTiers()) {
        m_lastRow = 0;
        return; // the bench hears of other tiers later, and tells then: what it says now is an index among those that were
    }
    std::vector<int> rows;
    for (const ShownRow& what : m_kept.selected) {
        if (const int row = m_model.rowOf(what); row >= 0)
            rows.push_back(row);
    }
    std::sort(rows.begin(), rows.end());
    // Neighbours become one range: a selection of thousands of ranges would be slow to look up.
    QItemSelection selection;
    const int lastColumn = WorklistModel::columnCount_ - 1;
    for (std::size_t i = 0; i < rows.size();) {
        std::size_t end = i + 1;
        while (end < rows.size() && rows[end] <= rows[end - 1] + 1)
            ++end;
        selection.append(QItemSelectionRange(m_model.index(rows[i], 0), m_model.index(rows[end - 1], lastColumn)));
        i = end;
    }
    m_followingBench = true;
    table->selectionModel()->select(selection, QItemSelectionModel::ClearAndSelect);
    if (const int current = m_model.rowOf(m_kept.current); current >= 0) {
        m_lastRow = current;
        table->selectionModel()->setCurrentIndex(m_model.index(current, m_kept.column), QItemSelectionModel::NoUpdate);
    }
    m_followingBench = false;
    if (!table->currentIndex().isValid())
        onBenchReset(); // what was hidden may be shown again
    table->verticalScrollBar()->setValue(std::exchange(m_toTop, false) ? 0 : m_kept.scrolled);
}

void WorklistPanel::onBenchReset()
{
    const int before = std::exchange(m_benchTier, m_bench.tier());
    const int row = m_benchTier < 0 ? -1 : m_model.rowOf({m_benchTier, 0});
    QTableView* table = m_ui->worklistTable;
    if (row >= 0 ? row == table->currentIndex().row() : m_benchTier == before)
        return;
    m_followingBench = true;
    if (row >= 0) {
        goTo(row);
        m_lastRow = row;
    } else {
        // Hidden by the filter or folded away: no other tier is to look as if it were the one on the bench, or be marked in its stead.
        table->selectionModel()->clear();
    }
    m_followingBench = false;
}

void WorklistPanel::onCurrentRow()
{
    const QModelIndex current = m_ui->worklistTable->currentIndex();
    if (!current.isValid() || m_followingBench)
        return;
    m_lastRow = current.row();
    const int tier = m_model.tierAt(current.row());
    if (tier < 0 || tier == m_bench.tier())
        return;
    const TierCase* tc = m_bench.document().tier(tier);
    m_bench.showTier(tier, tc && tc->chosen ? *tc->chosen : -1);
}

void WorklistPanel::goTo(int row)
{
    // Not by the view's own selectRow(): with Shift or Ctrl held for a shortcut it would add to the selection.
    m_ui->worklistTable->selectionModel()->setCurrentIndex(m_model.index(row, 0),
                                                           QItemSelectionModel::ClearAndSelect | QItemSelectionModel::Rows);
}

void WorklistPanel::step(int by)
{
    const QModelIndex current = m_ui->worklistTable->currentIndex();
    // Without a current row the one that moved up into its place is next.
    int row = current.isValid() ? current.row() + by : (by > 0 ? m_lastRow : m_lastRow - 1);
    row = std::max(row, by > 0 ? 0 : row);
    while (row >= 0 && row < m_model.rowCount()) {
        if (m_model.tierAt(row) >= 0) {
            goTo(row);
            return;
        }
        row += by;
    }
}

void WorklistPanel::stepToUnseen()
{
    const int rows = m_model.rowCount();
    const QModelIndex current = m_ui->worklistTable->currentIndex();
    const int from = current.isValid() ? current.row() + 1 : std::max(0, m_lastRow);
    for (int i = 0; i < rows; ++i) {
        const int row = (from + i) % rows;
        const int tier = m_model.tierAt(row);
        if (tier >= 0 && !m_list.tierCase(tier).seen) {
            goTo(row);
            return;
        }
    }
    emit told(rows == 0 ? tr("No tier is shown.") : tr("Every tier shown here has been seen."));
}

std::vector<int> WorklistPanel::selectedTiers() const
{
    std::vector<bool> wanted(static_cast<std::size_t>(m_list.count()));
    QSet<int> sites;
    for (const QItemSelectionRange& range : m_ui->worklistTable->selectionModel()->selection()) {
        for (int row = range.top(); row <= range.bottom(); ++row) {
            const ShownRow what = m_model.shown(row);
            if (!what.isSite())
                wanted[static_cast<std::size_t>(what.tier)] = true;
            else if (m_model.wish().folded.contains(m_list.names().sites[static_cast<std::size_t>(what.site)]))
                sites.insert(what.site);
        }
    }
    std::vector<int> tiers;
    for (const int tier : m_model.arrangement().tiers) {
        const auto at = static_cast<std::size_t>(tier);
        if (wanted[at] || sites.contains(static_cast<int>(m_list.names().site[at])))
            tiers.push_back(tier);
    }
    return tiers;
}

void WorklistPanel::toggleSeen()
{
    std::vector<int> tiers = selectedTiers();
    if (tiers.empty() && m_bench.tier() >= 0)
        tiers.push_back(m_bench.tier()); // on the bench, hidden by the filter
    if (tiers.empty())
        return;
    const bool all = std::all_of(tiers.begin(), tiers.end(), [&](int tier) { return m_list.tierCase(tier).seen; });
    std::sort(tiers.begin(), tiers.end());
    m_bench.document().setSeen(tiers, !all);
}

// Filter, groups, columns --------------------------------------------------------------------------------------------

void WorklistPanel::changeWish(const std::function<void(WorklistWish&)>& change)
{
    WorklistWish wish = m_model.wish();
    change(wish);
    m_toTop = true;
    m_model.setWish(wish);
}

void WorklistPanel::setGrouped(bool grouped)
{
    if (m_model.wish().grouped == grouped)
        return;
    changeWish([grouped](WorklistWish& wish) { wish.grouped = grouped; });
    fitColumns();
    emit groupedChanged(grouped);
}

void WorklistPanel::foldAll(bool folded)
{
    m_toTop = true;
    m_model.foldAll(folded);
}

void WorklistPanel::toggleFold(int row)
{
    const ShownRow what = m_model.shown(row);
    m_model.fold(what.site, !m_model.wish().folded.contains(m_list.names().sites[static_cast<std::size_t>(what.site)]));
}

bool WorklistPanel::foldKey(int key)
{
    const int row = m_ui->worklistTable->currentIndex().row();
    if (row < 0 || row >= m_model.rowCount() || !m_model.wish().grouped)
        return false;
    const ShownRow what = m_model.shown(row);
    const bool folded = m_model.wish().folded.contains(m_list.names().sites[static_cast<std::size_t>(what.site)]);
    if (what.isSite() &&
        (key == Qt::Key_Return || key == Qt::Key_Enter || (key == Qt::Key_Left && !folded) || (key == Qt::Key_Right && folded))) {
        toggleFold(row);
        return true;
    }
    if (!what.isSite() && key == Qt::Key_Left) { // from a tier to its site, as in a tree
        goTo(m_model.rowOf({-1, what.site}));
        return true;
    }
    return false;
}

bool WorklistPanel::eventFilter(QObject* watched, QEvent* event)
{
    const QTableView* table = m_ui->worklistTable;
    if (watched == table && event->type() == QEvent::KeyPress) {
        const auto* key = static_cast<QKeyEvent*>(event);
        if (key->modifiers() == Qt::NoModifier && foldKey(key->key()))
            return true;
        if (key->key() == Qt::Key_Escape && m_list.pickedCount() > 0) {
            m_list.clearPick();
            return true;
        }
    }
    if (watched == table->viewport() && event->type() == QEvent::Resize) // a scroll bar came or went
        QMetaObject::invokeMethod(this, &WorklistPanel::fitColumns, Qt::QueuedConnection);
    const bool pressed = event->type() == QEvent::MouseButtonPress;
    if (watched == table->viewport() && (pressed || event->type() == QEvent::MouseButtonDblClick)) {
        const auto* mouse = static_cast<QMouseEvent*>(event);
        const QModelIndex at = table->indexAt(mouse->position().toPoint());
        const bool onSite = at.isValid() && m_model.shown(at.row()).isSite();
        // The triangle takes one click; elsewhere a click selects and a double click folds.
        const bool onMark = at.column() == WorklistModel::tierColumn && mouse->position().x() - table->visualRect(at).left() < 20;
        if (onSite && mouse->button() == Qt::LeftButton && (onMark == pressed)) {
            toggleFold(at.row());
            return true;
        }
    }
    return QWidget::eventFilter(watched, event);
}

void WorklistPanel::focusFilter()
{
    m_ui->worklistFilter->setFocus(Qt::ShortcutFocusReason);
    m_ui->worklistFilter->selectAll();
}

void WorklistPanel::prepareCopying()
{
    QTableView* table = m_ui->worklistTable;
    makeCopyable(*table);
    const auto copies = [&](const char* name, CopyPart part) {
        auto* action = table->findChild<QAction*>(QLatin1String(name));
        action->disconnect(table);
        connect(action, &QAction::triggered, this, [this, part] {
            const QString text = copiedText(*m_ui->worklistTable, part);
            if (text.isEmpty())
                return;
            // Below the rows, where it hinders no pasting; a single cell goes into a cell.
            const bool rows = text.contains(QLatin1Char('\n'));
            QString caution = cautionText();
            caution.replace(QLatin1Char('"'), QStringLiteral("\"\""));
            QGuiApplication::clipboard()->setText(rows ? text + QStringLiteral("\n\n\"%1\"").arg(caution) : text);
            emit told(tr("Copied. %1").arg(cautionText()));
        });
    };
    copies("copyAction", CopyPart::selection);
    copies("copyAllAction", CopyPart::everything);
}

void WorklistPanel::resizeEvent(QResizeEvent* event)
{
    QWidget::resizeEvent(event);
    fitColumns();
}

} // namespace rungwright
