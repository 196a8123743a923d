// SPDX-License-Identifier: GPL-3.0-or-later
// A line of text that gives way: cut at its end where there is no room, in full as a tool tip and for readers of the screen.
#pragma once

#include <QLabel>
#include <QPainter>
#include <QStyle>

namespace rungwright
{

/// Plain text only. Takes whatever width its layout has left.
class ElidedLabel : public QLabel
{
public:
    using QLabel::QLabel;

    QSize minimumSizeHint() const override { return {fontMetrics().averageCharWidth() * 8, QLabel::minimumSizeHint().height()}; }

protected:
    void paintEvent(QPaintEvent*) override
    {
        QPainter painter(this);
        const QRect room = contentsRect();
        style()->drawItemText(&painter, room, static_cast<int>(alignment()), palette(), isEnabled(),
                              fontMetrics().elidedText(text(), Qt::ElideRight, room.width()), foregroundRole());
    }
};

} // namespace rungwright
