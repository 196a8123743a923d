// SPDX-License-Identifier: GPL-3.0-or-later
// How worklist cells are drawn: two lines for the tier, a bar behind the gap.
#pragma once

#include <QStyledItemDelegate>

namespace rungwright
{

class WorklistDelegate : public QStyledItemDelegate
{
    Q_OBJECT
public:
    using QStyledItemDelegate::QStyledItemDelegate;
    void paint(QPainter* painter, const QStyleOptionViewItem& option, const QModelIndex& index) const override;
};

} // namespace rungwright
