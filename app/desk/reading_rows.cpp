// SPDX-License-Identifier: GPL-3.0-or-later
#include "reading_rows.h"

#include "wording.h"
#include "worklist_delegate.h"
#include "worklist_model.h"

#include <QEvent>
#include <QHeaderView>
#include <QLabel>
#include <QTableView>
#include <QVBoxLayout>

#include <algorithm>
#include <utility>

namespace rungwright
{

namespace
{

QString countText(std::size_t count) { return numberText(static_cast<double>(count), 0); }

} // namespace

// The rows -----------------------------------------------------------------------------------------------------------

int ReadingModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_list.first.size()); }

int ReadingModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : columnCount_; }

void ReadingModel::take(ListSoFar list)
{
    const int before = rowCount();
    const int now = static_cast<int>(list.first.size());
    if (now < before)
        clear(); // of another list
    const int kept = std::min(rowCount(), now);
    if (now > kept)
        beginInsertRows({}, kept, now - 1);
    m_list = std::move(list);
    if (now > kept)
        endInsertRows();
    if (kept > 0)
        emit dataChanged(index(0, 0), index(kept - 1, columnCount_ - 1));
}

void ReadingModel::clear()
{
    beginResetModel();
    m_list = {};
    endResetModel();
}

QString ReadingModel::text(const TierSoFar& tier, int column) const
{
    switch (column) {
    case tierColumn:
        return QString::fromStdString(tier.name);
    case unitsColumn:
        return countText(tier.units);
    case floorColumn:
        return tier.floor.minor > 0 ? floorText(tier.floor, m_list.currency) : undefinedText();
    default:
        return {};
    }
}

QVariant ReadingModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid() || index.row() >= rowCount())
        return {};
    const TierSoFar& tier = m_list.first[static_cast<std::size_t>(index.row())];
    switch (role) {
    case Qt::DisplayRole:
        return text(tier, index.column());
    case Qt::TextAlignmentRole:
        return int(Qt::AlignVCenter) | int(index.column() == tierColumn ? Qt::AlignLeft : Qt::AlignRight);
    case Qt::AccessibleDescriptionRole:
        return tr("%1, %2: %3 units read so far")
            .arg(QString::fromStdString(tier.site), QString::fromStdString(tier.name), countText(tier.units));
    case WorklistModel::secondLineRole:
        return QString::fromStdString(tier.site);
    default:
        return {};
    }
}

QVariant ReadingModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    static const char* const kNames[] = {QT_TR_NOOP("Tier"), QT_TR_NOOP("Units so far"), QT_TR_NOOP("Floor")};
    if (orientation != Qt::Horizontal)
        return QAbstractTableModel::headerData(section, orientation, role);
    if (role == Qt::DisplayRole)
        return tr(kNames[section]);
    if (role == Qt::TextAlignmentRole)
        return int(Qt::AlignVCenter) | int(section == tierColumn ? Qt::AlignLeft : Qt::AlignRight);
    return {};
}

// In the worklist's place --------------------------------------------------------------------------------------------

ReadingRows::ReadingRows(QWidget& over) : QWidget(&over), m_said(new QLabel), m_table(new QTableView)
{
    setObjectName(QStringLiteral("readingRows"));
    setAccessibleName(tr("List being read"));
    setAutoFillBackground(true);
    setFocusPolicy(Qt::NoFocus);
    hide();
    m_said->setObjectName(QStringLiteral("readingSaid"));
    m_said->setAccessibleDescription(tr("How much has been read"));
    m_said->setTextFormat(Qt::PlainText);
    m_said->setWordWrap(true);
    m_table->setObjectName(QStringLiteral("readingTable"));
    m_table->setAccessibleName(tr("First tiers of the list being read"));
    m_table->setFocusPolicy(Qt::NoFocus);
    m_table->setFrameShape(QFrame::NoFrame);
    m_table->setSelectionMode(QAbstractItemView::NoSelection);
    m_table->setShowGrid(false);
    m_table->setWordWrap(false);
    m_table->setModel(&m_model);
    m_table->setItemDelegate(new WorklistDelegate(m_table));
    m_table->verticalHeader()->hide();
    m_table->verticalHeader()->setSectionResizeMode(QHeaderView::Fixed);
    m_table->verticalHeader()->setDefaultSectionSize(2 * fontMetrics().height() + 10);
    QHeaderView* header = m_table->horizontalHeader();
    header->setHighlightSections(false);
    header->setSectionResizeMode(ReadingModel::tierColumn, QHeaderView::Stretch);
    header->resizeSection(ReadingModel::unitsColumn, fontMetrics().horizontalAdvance(tr("Units so far")) + 16);
    header->resizeSection(ReadingModel::floorColumn, fontMetrics().horizontalAdvance(QStringLiteral("1,888.00")) + 14);
    auto* layout = new QVBoxLayout(this);
    layout->setContentsMargins(8, 4, 0, 0);
    layout->setSpacing(8);
    layout->addWidget(m_said);
    layout->addWidget(m_table, 1);
    over.installEventFilter(this);
}

void ReadingRows::showRows(const QString& name, const ListSoFar& list)
{
    m_said->setText(tr("Reading %1: %2 units in %3 tiers so far. Its first tiers, before anything is measured:")
                        .arg(name, countText(list.units), countText(list.tiers)));
    m_model.take(list);
    if (isVisible())
        return;
    setGeometry(parentWidget()->rect());
    m_table->scrollToTop();
    raise();
    show();
}

void ReadingRows::end()
{
    if (isHidden())
        return;
    hide();
    m_model.clear();
}

bool ReadingRows::eventFilter(QObject* watched, QEvent* event)
{
    if (watched == parentWidget() && event->type() == QEvent::Resize)
        setGeometry(parentWidget()->rect());
    return QWidget::eventFilter(watched, event);
}

} // namespace rungwright
