// SPDX-License-Identifier: GPL-3.0-or-later
// The names along the edges of the comparison's table.
#pragma once

#include <QHeaderView>
#include <QPainter>
#include <QStyleOptionHeader>

namespace rungwright
{

/// The rows' names as quiet text on the table's own paper, in place of a column of raised buttons.
class RowNames : public QHeaderView
{
public:
    explicit RowNames(QWidget* parent = nullptr) : QHeaderView(Qt::Vertical, parent)
    {
        setSectionResizeMode(QHeaderView::Fixed);
        setHighlightSections(false);
    }

protected:
    void paintSection(QPainter* painter, const QRect& rect, int section) const override
    {
        painter->fillRect(rect, palette().base());
        painter->setPen(palette().color(QPalette::Text));
        painter->setFont(font());
        const QRect room = rect.adjusted(kPadding, 0, -kPadding, 0);
        const QString name = model()->headerData(section, Qt::Vertical).toString();
        painter->drawText(QStyle::visualRect(layoutDirection(), rect, room), static_cast<int>(Qt::AlignVCenter | Qt::AlignLeading),
                          fontMetrics().elidedText(name, Qt::ElideRight, room.width()));
    }
    QSize sectionSizeFromContents(int section) const override
    {
        return QHeaderView::sectionSizeFromContents(section) + QSize(2 * kPadding, 0);
    }

private:
    static constexpr int kPadding = 4;
};

/// The columns' names, cut in the middle where there is no room: long names of candidates often differ at their ends.
class ColumnNames : public QHeaderView
{
public:
    explicit ColumnNames(QWidget* parent = nullptr) : QHeaderView(Qt::Horizontal, parent)
    {
        setSectionsMovable(true);
        setSectionsClickable(true);
        setHighlightSections(true);
        setSectionResizeMode(QHeaderView::Stretch);
    }

protected:
    void initStyleOptionForIndex(QStyleOptionHeader* option, int section) const override
    {
        QHeaderView::initStyleOptionForIndex(option, section);
        QFont selected = font(); // the style's way to mark the selected column
        selected.setBold(true);
        const int air = 4 * style()->pixelMetric(QStyle::PM_HeaderMargin, nullptr, this);
        option->text = QFontMetrics(selected).elidedText(option->text, Qt::ElideMiddle, sectionSize(section) - air);
    }
};

} // namespace rungwright
