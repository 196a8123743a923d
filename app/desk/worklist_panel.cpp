// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_panel.h"

#include "table_text.h"
#include "ui_worklist_panel.h"
#include "worklist_delegate.h"

#include <QHeaderView>
#include <QMenu>

namespace rungwright
{

void WorklistOrder::setWords(const QString& words)
{
    m_words = words.simplified().split(QLatin1Char(' '), Qt::SkipEmptyParts);
    invalidateFilter();
}

bool WorklistOrder::lessThan(const QModelIndex& left, const QModelIndex& right) const
{
    const QVariant a = left.data(WorklistModel::sortRole);
    const QVariant b = right.data(WorklistModel::sortRole);
    if (a.isValid() != b.isValid())
        return (sortOrder() == Qt::AscendingOrder) == a.isValid();
    if (a.typeId() == QMetaType::QString)
        return QString::localeAwareCompare(a.toString(), b.toString()) < 0;
    return a.toDouble() < b.toDouble();
}

bool WorklistOrder::filterAcceptsRow(int row, const QModelIndex& parent) const
{
    if (m_words.isEmpty())
        return true;
    const QString text = sourceModel()->index(row, 0, parent).data(WorklistModel::searchRole).toString();
    const auto inText = [&](const QString& word) { return text.contains(word, Qt::CaseInsensitive); };
    return std::all_of(m_words.begin(), m_words.end(), inText);
}

WorklistPanel::WorklistPanel(Workbench& bench, QWidget* parent) :
    QWidget(parent), m_bench(bench), m_model(bench.document()), m_ui(std::make_unique<Ui::WorklistPanel>())
{
    m_ui->setupUi(this);
    m_order.setSourceModel(&m_model);
    QTableView* table = m_ui->worklistTable;
    table->setModel(&m_order);
    table->setItemDelegate(new WorklistDelegate(table));
    table->sortByColumn(WorklistModel::gapColumn, Qt::DescendingOrder);
    table->verticalHeader()->setDefaultSectionSize(2 * fontMetrics().height() + 10);

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
    for (int column = 0; column < WorklistModel::columnCount_; ++column)
        m_columnWidths[static_cast<std::size_t>(column)] = header->sectionSize(column);
    setMinimumWidth(m_columnWidths[WorklistModel::onOfferColumn] + m_columnWidths[WorklistModel::floorColumn] +
                    m_columnWidths[WorklistModel::gapColumn] + fontMetrics().averageCharWidth() * 16);
    header->setContextMenuPolicy(Qt::CustomContextMenu);
    // The tier column tells site and flags on its second line; as columns of their own they serve for sorting.
    table->setColumnHidden(WorklistModel::siteColumn, true);
    table->setColumnHidden(WorklistModel::flagsColumn, true);

    connect(header, &QHeaderView::customContextMenuRequested, this, &WorklistPanel::showHeaderMenu);
    connect(m_ui->worklistFilter, &QLineEdit::textChanged, this, [this](const QString& words) {
        m_order.setWords(words);
        updateCount();
    });
    connect(m_ui->worklistFilter, &QLineEdit::returnPressed, this, [this] {
        if (m_order.rowCount() > 0)
            m_ui->worklistTable->selectRow(0);
    });
    connect(table->selectionModel(), &QItemSelectionModel::currentRowChanged, this, &WorklistPanel::onCurrentRow);
    connect(&m_bench, &Workbench::reset, this, &WorklistPanel::onBenchReset);
    connect(&m_model, &QAbstractItemModel::modelReset, this, &WorklistPanel::updateCount);
    connect(&m_model, &QAbstractItemModel::modelReset, this, &WorklistPanel::onBenchReset); // the row of the tier on the bench is another
    makeCopyable(*table);
    updateCount();
}

WorklistPanel::~WorklistPanel() = default;

void WorklistPanel::onBenchReset()
{
    const QModelIndex at = m_order.mapFromSource(m_model.index(m_bench.tier(), 0));
    if (!at.isValid() || at.row() == m_ui->worklistTable->currentIndex().row())
        return;
    m_followingBench = true;
    m_ui->worklistTable->setCurrentIndex(at);
    m_followingBench = false;
}

void WorklistPanel::onCurrentRow()
{
    const QModelIndex at = m_order.mapToSource(m_ui->worklistTable->currentIndex());
    if (m_followingBench || !at.isValid() || at.row() == m_bench.tier())
        return;
    const TierCase* tc = m_bench.document().tier(at.row());
    m_bench.showTier(at.row(), tc && tc->chosen ? *tc->chosen : -1);
}

void WorklistPanel::step(int by)
{
    const int rows = m_order.rowCount();
    if (rows == 0)
        return;
    const int row = m_ui->worklistTable->currentIndex().row();
    m_ui->worklistTable->selectRow(qBound(0, row + by, rows - 1));
}

void WorklistPanel::focusFilter()
{
    m_ui->worklistFilter->setFocus(Qt::ShortcutFocusReason);
    m_ui->worklistFilter->selectAll();
}

void WorklistPanel::updateCount()
{
    const int all = m_model.rowCount();
    const int shown = m_order.rowCount();
    if (all == 0)
        m_ui->worklistCount->setText(tr("No tiers yet"));
    else if (shown == all)
        m_ui->worklistCount->setText(all == 1 ? tr("1 tier") : tr("%1 tiers").arg(all));
    else
        m_ui->worklistCount->setText(tr("%1 of %2 tiers").arg(shown).arg(all));
}

void WorklistPanel::showHeaderMenu(const QPoint& at)
{
    QMenu menu(this);
    QHeaderView* header = m_ui->worklistTable->horizontalHeader();
    for (int column = WorklistModel::siteColumn; column < WorklistModel::columnCount_; ++column) {
        QAction* action = menu.addAction(m_model.headerData(column, Qt::Horizontal, Qt::DisplayRole).toString());
        action->setCheckable(true);
        action->setChecked(!header->isSectionHidden(column));
        connect(action, &QAction::toggled, this, [this, header, column](bool on) {
            m_columnsChosen = true;
            header->setSectionHidden(column, !on);
        });
    }
    menu.exec(header->mapToGlobal(at));
}

QByteArray WorklistPanel::saveColumns() const { return m_ui->worklistTable->horizontalHeader()->saveState(); }

void WorklistPanel::restoreColumns(const QByteArray& state) { m_ui->worklistTable->horizontalHeader()->restoreState(state); }

void WorklistPanel::fitColumns()
{
    if (m_columnsChosen)
        return;
    QHeaderView* header = m_ui->worklistTable->horizontalHeader();
    const auto needs = [&](std::initializer_list<int> columns) {
        int room = fontMetrics().averageCharWidth() * 16; // of the tier's name
        for (const int column : columns)
            room += m_columnWidths[static_cast<std::size_t>(column)];
        return room;
    };
    using M = WorklistModel;
    const int room = m_ui->worklistTable->viewport()->width();
    header->setSectionHidden(M::cheapestColumn,
                             room < needs({M::onOfferColumn, M::floorColumn, M::cheapestColumn, M::gapColumn, M::leanColumn}));
    header->setSectionHidden(M::leanColumn, room < needs({M::onOfferColumn, M::floorColumn, M::gapColumn, M::leanColumn}));
}

void WorklistPanel::resizeEvent(QResizeEvent* event)
{
    QWidget::resizeEvent(event);
    fitColumns();
}

} // namespace rungwright
