// SPDX-License-Identifier: GPL-3.0-or-later
// A candidate as a card: its ladder in small, name, gap, change of the asking total.
#pragma once

#include "workbench.h"

#include <QStyledItemDelegate>

namespace rungwright
{

class CandidateDelegate : public QStyledItemDelegate
{
    Q_OBJECT
public:
    CandidateDelegate(const Workbench& bench, QObject* parent);
    QSize cardSize() const;
    void paint(QPainter* painter, const QStyleOptionViewItem& option, const QModelIndex& index) const override;
    QSize sizeHint(const QStyleOptionViewItem& option, const QModelIndex& index) const override;

private:
    const Workbench& m_bench;
};

} // namespace rungwright
