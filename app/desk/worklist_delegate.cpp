// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_delegate.h"

#include "look.h"
#include "wording.h"
#include "worklist_model.h"

#include <QPainter>
#include <QTableView>

namespace rungwright
{

namespace
{

constexpr int kMargin = 6;

QString elided(const QFontMetrics& metrics, const QString& text, int width) { return metrics.elidedText(text, Qt::ElideRight, width); }

/// Where the row's second line runs: below the tier's name and the figures behind it, up to the gap's bar.
QRect secondLineSpan(const QStyleOptionViewItem& option, const QModelIndex& index)
{
    const auto* table = qobject_cast<const QTableView*>(option.widget);
    if (!table)
        return option.rect;
    const QRect first = table->visualRect(index.siblingAtColumn(WorklistModel::tierColumn));
    const QRect end = table->visualRect(index.siblingAtColumn(WorklistModel::gapColumn));
    return end.left() > first.left() ? QRect(first.left(), first.top(), end.left() - first.left(), first.height()) : first;
}

} // namespace

void WorklistDelegate::paint(QPainter* painter, const QStyleOptionViewItem& option, const QModelIndex& index) const
{
    const Look& look = Look::of(option.widget);
    painter->save();
    painter->setClipRect(option.rect);
    const bool selected = option.state.testFlag(QStyle::State_Selected);
    painter->fillRect(option.rect, selected ? look.selectionFill : look.paper);
    painter->setPen(look.grid);
    painter->drawLine(option.rect.bottomLeft(), option.rect.bottomRight());

    const QRect inner = option.rect.adjusted(kMargin, 3, -kMargin, -4);
    const int half = inner.height() / 2;
    const QRect upper(inner.left(), inner.top(), inner.width(), half);
    const QRect lower(inner.left(), inner.top() + half, inner.width(), half);
    const QString text = index.data(Qt::DisplayRole).toString();
    QFont bold = option.font;
    bold.setWeight(QFont::DemiBold);

    // The second line is one text over several cells: each cell draws its part of it.
    if (index.column() <= WorklistModel::cheapestColumn) {
        const QRect span = secondLineSpan(option, index).adjusted(kMargin, 3, -kMargin, -4);
        const QRect line(span.left(), lower.top(), span.width(), lower.height());
        painter->setFont(option.font);
        painter->setPen(look.faintInk);
        const QString second = index.siblingAtColumn(WorklistModel::tierColumn).data(WorklistModel::secondLineRole).toString();
        painter->drawText(line, Qt::AlignLeft | Qt::AlignVCenter, elided(option.fontMetrics, second, line.width()));
    }
    if (index.column() == WorklistModel::tierColumn) {
        painter->setFont(bold);
        painter->setPen(look.ink);
        painter->drawText(upper, Qt::AlignLeft | Qt::AlignVCenter, elided(QFontMetrics(bold), text, inner.width()));
        if (selected) // the row's mark does not rest on colour alone
            painter->fillRect(QRect(option.rect.left(), option.rect.top(), 3, option.rect.height()), look.focus);
    } else if (index.column() == WorklistModel::gapColumn) {
        const QVariant share = index.data(WorklistModel::shareRole);
        const double greatest = index.data(WorklistModel::greatestShareRole).toDouble();
        painter->setFont(bold);
        painter->setPen(look.ink);
        painter->drawText(upper, Qt::AlignRight | Qt::AlignVCenter, text);
        if (share.isValid() && greatest > 0) {
            const int length = qRound(inner.width() * qBound(0.0, share.toDouble() / greatest, 1.0));
            const QRect track(lower.left(), lower.center().y() + 2, inner.width(), 5);
            painter->fillRect(track, look.grid);
            painter->fillRect(QRect(track.right() + 1 - length, track.top(), length, track.height()), look.gapLine);
        }
    } else {
        painter->setFont(option.font);
        painter->setPen(look.ink);
        const auto alignment = Qt::Alignment(index.data(Qt::TextAlignmentRole).toInt());
        painter->drawText(upper, static_cast<int>(alignment), elided(option.fontMetrics, text, inner.width()));
    }
    painter->restore();
}

} // namespace rungwright
