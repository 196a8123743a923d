// SPDX-License-Identifier: GPL-3.0-or-later
// What the worklist shows: its filter menu, its counts, its columns.
#include "pick_menu.h"
#include "ui_worklist_panel.h"
#include "worklist_panel.h"

#include <QDataStream>
#include <QHeaderView>

namespace rungwright
{

namespace
{

/// Tells the remembered columns of this version from those of others.
constexpr quint32 kColumnsMark = 0x574c0001;

} // namespace

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

void WorklistPanel::fitColumns()
{
    if (m_columnsChosen)
        return;
    QHeaderView* header = m_ui->worklistTable->horizontalHeader();
    const auto needs = [&](std::initializer_list<int> columns) {
        int room = fontMetrics().averageCharWidth() * (m_model.wish().grouped ? 23 : 20); // of the tier's name and its marks
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

} // namespace rungwright
