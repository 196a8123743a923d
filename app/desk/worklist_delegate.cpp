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

/// How far a tier's names stand in below its site, and a site's behind its fold mark.
constexpr int kIndent = 16;

int indentOf(const QModelIndex& index) { return index.data(WorklistModel::groupedRole).toBool() ? kIndent : 0; }

/// A triangle: pointing down when the site's tiers are shown, to the right when they are folded away.
void paintFoldMark(QPainter& painter, const QRect& line, bool folded, const QColor& ink)
{
    const QPointF c(line.left() + 4.5, line.center().y() + 1.0);
    QPolygonF mark;
    if (folded)
        mark << c + QPointF(-2.5, -4.5) << c + QPointF(3.5, 0) << c + QPointF(-2.5, 4.5);
    else
        mark << c + QPointF(-4.5, -2.5) << c + QPointF(4.5, -2.5) << c + QPointF(0, 3.5);
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setPen(Qt::NoPen);
    painter.setBrush(ink);
    painter.drawPolygon(mark);
    painter.restore();
}

/// Marks behind a tier's name: a tick when it has been seen, a pen when it has a note. The words are in the row's description.
QString marksOf(const QModelIndex& index)
{
    QString marks;
    if (index.data(WorklistModel::seenRole).toBool())
        marks += QStringLiteral("✓");
    if (index.data(WorklistModel::notedRole).toBool())
        marks += marks.isEmpty() ? QStringLiteral("✎") : QStringLiteral(" ✎");
    return marks;
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

    const bool isSite = index.data(WorklistModel::siteRole).toBool();
    // The second line is one text over several cells: each cell draws its part of it. So is a site's name, which has no figures beside it.
    if (index.column() <= WorklistModel::cheapestColumn) {
        const QRect span = secondLineSpan(option, index).adjusted(kMargin + indentOf(index), 3, -kMargin, -4);
        const QRect line(span.left(), lower.top(), span.width(), lower.height());
        painter->setFont(option.font);
        painter->setPen(look.faintInk);
        const QString second = index.siblingAtColumn(WorklistModel::tierColumn).data(WorklistModel::secondLineRole).toString();
        painter->drawText(line, Qt::AlignLeft | Qt::AlignVCenter, elided(option.fontMetrics, second, line.width()));
        if (isSite) {
            const QString name = index.siblingAtColumn(WorklistModel::tierColumn).data().toString();
            painter->setFont(bold);
            painter->setPen(look.ink);
            painter->drawText(line.translated(0, -half), Qt::AlignLeft | Qt::AlignVCenter, elided(QFontMetrics(bold), name, line.width()));
        }
    }
    if (index.column() == WorklistModel::tierColumn) {
        const QRect names = upper.adjusted(indentOf(index), 0, 0, 0);
        const QString marks = marksOf(index);
        const int marksWidth = marks.isEmpty() ? 0 : option.fontMetrics.horizontalAdvance(marks) + kMargin;
        if (isSite)
            paintFoldMark(*painter, upper, index.data(WorklistModel::foldedRole).toBool(), look.ink);
        // What has been dealt with steps back.
        const bool seen = index.data(WorklistModel::seenRole).toBool();
        const QFont& font = seen ? option.font : bold;
        painter->setFont(font);
        painter->setPen(look.ink);
        if (!isSite)
            painter->drawText(names, Qt::AlignLeft | Qt::AlignVCenter, elided(QFontMetrics(font), text, names.width() - marksWidth));
        if (!marks.isEmpty()) {
            const int end = qMin(names.right() + 1, names.left() + QFontMetrics(font).horizontalAdvance(text) + marksWidth);
            painter->setFont(option.font);
            painter->setPen(look.faintInk);
            painter->drawText(QRect(end - marksWidth, names.top(), marksWidth, names.height()), Qt::AlignRight | Qt::AlignVCenter, marks);
        }
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
    } else if (!isSite || index.column() > WorklistModel::gapColumn) {
        painter->setFont(option.font);
        painter->setPen(look.ink);
        const auto alignment = Qt::Alignment(index.data(Qt::TextAlignmentRole).toInt());
        painter->drawText(upper, static_cast<int>(alignment), elided(option.fontMetrics, text, inner.width()));
    }
    painter->restore();
}

} // namespace rungwright
