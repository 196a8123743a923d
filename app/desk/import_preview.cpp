// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_preview.h"

#include "import_words.h"
#include "look.h"

#include <QPainter>

namespace rungwright
{

namespace
{

constexpr int kMargin = 6;
constexpr int kLongestCell = 28; ///< Characters; what is longer is cut, and stands in the tool tip.

QString oneLine(QString text) { return text.replace(QLatin1Char('\n'), QLatin1Char(' ')).replace(QLatin1Char('\r'), QLatin1Char(' ')); }

bool isNumber(int ours)
{
    switch (static_cast<Column>(ours)) {
    case Column::askingPrice:
    case Column::advertisedFloor:
    case Column::grade:
    case Column::area:
    case Column::vacancyChance:
        return true;
    default:
        return false;
    }
}

} // namespace

void ImportPreviewModel::show(MappingPreview preview, const ImportMapping& mapping)
{
    beginResetModel();
    m_preview = std::move(preview);
    m_columns.clear();
    std::vector<bool> used(static_cast<std::size_t>(m_preview.headers.size()), false);
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        const ColumnSource& source = mapping.sources[i];
        if (source.kind == ColumnSource::Kind::absent)
            continue;
        Shown shown{static_cast<int>(i), -1, tr("one value for all")};
        if (source.kind == ColumnSource::Kind::column) {
            shown.theirs = placeOf(m_preview.headers, source.column);
            shown.under = oneLine(source.column.header);
            if (shown.theirs >= 0)
                used[static_cast<std::size_t>(shown.theirs)] = true;
        }
        m_columns.push_back(shown);
    }
    for (qsizetype at = 0; at < m_preview.headers.size(); ++at) {
        if (!used[static_cast<std::size_t>(at)])
            m_columns.push_back({-1, at, oneLine(m_preview.headers[at])});
    }
    endResetModel();
}

QModelIndex ImportPreviewModel::cellOf(int row, Column column) const
{
    for (std::size_t at = 0; at < m_columns.size(); ++at) {
        if (m_columns[at].ours == static_cast<int>(column))
            return index(row, static_cast<int>(at));
    }
    return {};
}

int ImportPreviewModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_preview.rows.size()); }

int ImportPreviewModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_columns.size()); }

QString ImportPreviewModel::theirText(const PreviewRow& row, const Shown& shown) const
{
    return shown.theirs >= 0 && shown.theirs < row.raw.size() ? oneLine(row.raw[shown.theirs]) : QString();
}

QVariant ImportPreviewModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const PreviewRow& row = m_preview.rows[static_cast<std::size_t>(index.row())];
    const Shown& shown = m_columns[static_cast<std::size_t>(index.column())];
    const QString theirs = theirText(row, shown);
    const bool ours = shown.ours >= 0 && !row.passedOver;
    const PreviewCell cell = ours ? row.cells[static_cast<std::size_t>(shown.ours)] : PreviewCell();
    const QString trouble = cell.trouble.isEmpty() && index.column() == 0 ? row.trouble : cell.trouble;
    const QString passed = row.passedOver && index.column() == 0 ? tr("passed over") : QString();
    switch (role) {
    case Qt::DisplayRole:
        return !trouble.isEmpty() ? tr("✕ %1").arg(trouble) : ours ? oneLine(cell.text) : passed;
    case theirsRole:
        return theirs;
    case troubleRole:
        return trouble;
    case quietRole:
        return !ours;
    case Qt::TextAlignmentRole:
        return QVariant((isNumber(shown.ours) ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    case Qt::ToolTipRole:
        if (!trouble.isEmpty())
            return tr("Line %1: %2").arg(row.line).arg(trouble);
        return theirs.size() > kLongestCell ? theirs : QString();
    case Qt::AccessibleTextRole:
        if (!trouble.isEmpty())
            return tr("refused: %1; the file says “%2”").arg(trouble, theirs);
        if (!ours)
            return passed.isEmpty() ? theirs : tr("passed over: %1").arg(theirs);
        return shown.theirs < 0 ? cell.text : tr("%1, from “%2”").arg(cell.text, theirs);
    default:
        return {};
    }
}

QVariant ImportPreviewModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation == Qt::Vertical) {
        if (section < 0 || section >= rowCount())
            return {};
        if (role == Qt::DisplayRole)
            return QString::number(m_preview.rows[static_cast<std::size_t>(section)].line);
        return role == Qt::ToolTipRole ? QVariant(tr("Line of the file")) : QVariant();
    }
    if (section < 0 || section >= columnCount())
        return {};
    const Shown& shown = m_columns[static_cast<std::size_t>(section)];
    if (role == Qt::TextAlignmentRole)
        return QVariant((isNumber(shown.ours) ? Qt::AlignRight : Qt::AlignLeft) | Qt::AlignVCenter);
    const QString title = shown.ours >= 0 ? columnTitle(static_cast<Column>(shown.ours)) : tr("not used");
    if (role == Qt::DisplayRole)
        return title + QLatin1Char('\n') +
               (shown.under.size() > kLongestCell ? shown.under.left(kLongestCell - 1) + QStringLiteral("…") : shown.under);
    if (role == Qt::ToolTipRole || role == Qt::AccessibleTextRole)
        return shown.ours >= 0 ? tr("%1, from “%2”").arg(title, shown.under) : tr("“%1” is not used").arg(shown.under);
    return {};
}

void ImportPreviewDelegate::paint(QPainter* painter, const QStyleOptionViewItem& option, const QModelIndex& index) const
{
    const Look& look = Look::of(option.widget);
    const bool troubled = !index.data(ImportPreviewModel::troubleRole).toString().isEmpty();
    painter->save();
    painter->setClipRect(option.rect);
    painter->fillRect(option.rect, option.state.testFlag(QStyle::State_Selected) ? look.selectionFill : look.paper);
    painter->setPen(look.grid);
    painter->drawLine(option.rect.bottomLeft(), option.rect.bottomRight());
    const QRect inner = option.rect.adjusted(kMargin, 3, -kMargin, -4);
    const int half = inner.height() / 2;
    const auto side =
        static_cast<int>(troubled ? Qt::AlignLeft | Qt::AlignVCenter : Qt::Alignment(index.data(Qt::TextAlignmentRole).toInt()));
    QFont upper = option.font;
    if (troubled)
        upper.setWeight(QFont::DemiBold);
    painter->setFont(upper);
    painter->setPen(troubled ? look.gapLine : index.data(ImportPreviewModel::quietRole).toBool() ? look.faintInk : look.ink);
    painter->drawText(QRect(inner.left(), inner.top(), inner.width(), half), side,
                      QFontMetrics(upper).elidedText(index.data().toString(), Qt::ElideRight, inner.width()));
    painter->setFont(option.font);
    painter->setPen(look.faintInk);
    painter->drawText(QRect(inner.left(), inner.top() + half, inner.width(), half), side,
                      option.fontMetrics.elidedText(index.data(ImportPreviewModel::theirsRole).toString(), Qt::ElideRight, inner.width()));
    if (option.state.testFlag(QStyle::State_HasFocus)) {
        painter->setPen(look.focus);
        painter->drawRect(option.rect.adjusted(0, 0, -1, -1));
    }
    painter->restore();
}

QSize ImportPreviewDelegate::sizeHint(const QStyleOptionViewItem& option, const QModelIndex& index) const
{
    QFont bold = option.font;
    bold.setWeight(QFont::DemiBold);
    const int widest = QFontMetrics(bold).averageCharWidth() * kLongestCell;
    const int upper = QFontMetrics(bold).horizontalAdvance(index.data().toString());
    const int lower = option.fontMetrics.horizontalAdvance(index.data(ImportPreviewModel::theirsRole).toString());
    return {std::min(widest, std::max(upper, lower)) + 2 * kMargin + 2, 2 * option.fontMetrics.height() + 8};
}

} // namespace rungwright
