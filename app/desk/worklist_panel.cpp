// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_panel.h"

#include "caution.h"
#include "pick_menu.h"
#include "table_text.h"
#include "ui_worklist_panel.h"
#include "worklist_delegate.h"

#include <QClipboard>
#include <QDataStream>
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

namespace
{

/// Tells the remembered columns of this version from those of others.
constexpr quint32 kColumnsMark = 0x574c0001;

} // namespace

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
        onBenchReset();
        return;
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
    const int row = m_bench.tier() < 0 ? -1 : m_model.rowOf({m_bench.tier(), 0});
    QTableView* table = m_ui->worklistTable;
    if (row < 0 || row == table->currentIndex().row())
        return;
    m_followingBench = true;
    goTo(row);
    m_lastRow = row;
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

void WorklistPanel::prepareShowMenu()
{
    m_showMenu = new PickMenu(m_ui->showButton);
    m_showMenu->setObjectName(QStringLiteral("worklistShowMenu"));
    m_showMenu->setToolTipsVisible(true);
    const auto check = [&](const QString& text, const QString& name, const std::function<void(bool)>& does) {
        QAction* action = m_showMenu->addAction(text);
        action->setObjectName(name);
        action->setCheckable(true);
        connect(action, &QAction::triggered, this, does);
        return action;
    };
    m_showMenu->addSection(tr("Only tiers with any of"));
    for (std::size_t i = 0; i < kFlags.size(); ++i) {
        m_flagActions[i] = check(flagWord(kFlags[i]), QStringLiteral("showFlag%1").arg(i),
                                 [this, i](bool on) { changeWish([&](WorklistWish& wish) { wish.anyFlag.set(kFlags[i], on); }); });
    }
    m_showMenu->addSection(tr("And only"));
    m_unseenAction = check(tr("not yet &seen"), QStringLiteral("showUnseen"),
                           [this](bool on) { changeWish([on](WorklistWish& wish) { wish.unseenOnly = on; }); });
    m_showMenu->addSeparator();
    QAction* everything = m_showMenu->addAction(tr("Show &everything"));
    everything->setObjectName(QStringLiteral("showEverything"));
    connect(everything, &QAction::triggered, this, [this] {
        m_list.clearPick();
        m_ui->worklistFilter->clear();
        changeWish([](WorklistWish& wish) {
            wish.anyFlag = {};
            wish.unseenOnly = false;
        });
    });
    m_showMenu->addSeparator();
    m_groupAction = check(tr("&Group by site"), QStringLiteral("groupBySite"), [this](bool on) { setGrouped(on); });
    QAction* thresholds = m_showMenu->addAction(tr("&Flag thresholds…"));
    connect(thresholds, &QAction::triggered, this, &WorklistPanel::thresholdsWanted);
    connect(m_showMenu, &QMenu::aboutToShow, this, &WorklistPanel::fillFlagCounts);
    m_ui->showButton->setMenu(m_showMenu);
}

void WorklistPanel::fillFlagCounts()
{
    std::array<int, kFlags.size()> counts{};
    for (int tier = 0; tier < m_list.count(); ++tier) {
        for (std::size_t i = 0; i < kFlags.size(); ++i)
            counts[i] += m_list.flags(tier).has(kFlags[i]) ? 1 : 0;
    }
    for (std::size_t i = 0; i < kFlags.size(); ++i)
        m_flagActions[i]->setText(tr("%1 (%2)").arg(flagWord(kFlags[i]), QLocale().toString(counts[i])));
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

void WorklistPanel::showWish()
{
    const WorklistWish& wish = m_model.wish();
    for (std::size_t i = 0; i < kFlags.size(); ++i)
        m_flagActions[i]->setChecked(wish.anyFlag.has(kFlags[i]));
    m_unseenAction->setChecked(wish.unseenOnly);
    m_groupAction->setChecked(wish.grouped);
    QStringList said;
    if (const int flags = wish.anyFlag.count(); flags > 0)
        said << (flags == 1 ? flagWords(wish.anyFlag) : tr("%1 flags").arg(flags));
    if (wish.unseenOnly)
        said << tr("not seen");
    m_ui->showButton->setText(said.isEmpty() ? tr("Show") : tr("Show: %1").arg(said.join(QStringLiteral(", "))));
    m_ui->showButton->setToolTip(flagWords(wish.anyFlag));
    const int picked = m_list.pickedCount();
    m_ui->pickedChip->setVisible(picked > 0);
    const QString which =
        picked == 1 ? tr("picked in the portfolio: 1 tier") : tr("picked in the portfolio: %1 tiers").arg(QLocale().toString(picked));
    m_ui->pickedChip->setText(which + QStringLiteral("  ✕"));
    m_ui->pickedChip->setAccessibleName(tr("%1; press to show all again").arg(which));
}

void WorklistPanel::updateCount()
{
    const auto number = [](int n) { return QLocale().toString(n); };
    const int all = m_list.count();
    const int shown = static_cast<int>(m_model.arrangement().tiers.size());
    QString said;
    if (all == 0)
        said = tr("No tiers yet");
    else if (shown == all)
        said = all == 1 ? tr("1 tier") : tr("%1 tiers").arg(number(all));
    else
        said = tr("%1 of %2 tiers").arg(number(shown), number(all));
    if (m_list.measuring() && all > 0)
        said += tr(", measuring: %1 %").arg(100 * qint64(m_list.measuredCount()) / all);
    m_ui->worklistCount->setText(said);
}

void WorklistPanel::showHeaderMenu(const QPoint& at)
{
    auto* menu = new QMenu(this);
    menu->setObjectName(QStringLiteral("worklistColumnsMenu"));
    menu->setAttribute(Qt::WA_DeleteOnClose);
    QHeaderView* header = m_ui->worklistTable->horizontalHeader();
    for (int column = WorklistModel::siteColumn; column < WorklistModel::columnCount_; ++column) {
        QAction* action = menu->addAction(m_model.headerData(column, Qt::Horizontal, Qt::DisplayRole).toString());
        action->setCheckable(true);
        action->setChecked(!header->isSectionHidden(column));
        connect(action, &QAction::toggled, this, [this, header, column](bool on) {
            m_columnsChosen = true;
            header->setSectionHidden(column, !on);
        });
    }
    menu->popup(header->mapToGlobal(at));
}

QByteArray WorklistPanel::saveColumns() const
{
    QByteArray state;
    QDataStream out(&state, QIODevice::WriteOnly);
    out << kColumnsMark << m_columnsChosen << m_model.wish().grouped << m_ui->worklistTable->horizontalHeader()->saveState();
    return state;
}

void WorklistPanel::restoreColumns(const QByteArray& state)
{
    QDataStream in(state);
    quint32 mark = 0;
    bool chosen = false;
    bool grouped = false;
    QByteArray header;
    in >> mark >> chosen >> grouped >> header;
    if (in.status() != QDataStream::Ok || mark != kColumnsMark)
        return;
    m_columnsChosen = m_ui->worklistTable->horizontalHeader()->restoreState(header) && chosen;
    m_ui->worklistTable->sortByColumn(WorklistModel::gapColumn, Qt::DescendingOrder);
    setGrouped(grouped);
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

void WorklistPanel::fitColumns()
{
    if (m_columnsChosen)
        return;
    QHeaderView* header = m_ui->worklistTable->horizontalHeader();
    const auto needs = [&](std::initializer_list<int> columns) {
        int room = fontMetrics().averageCharWidth() * (m_model.wish().grouped ? 19 : 16); // of the tier's name
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
