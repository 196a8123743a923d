// SPDX-License-Identifier: GPL-3.0-or-later
#include "picture_page.h"

#include "caution.h"
#include "look.h"

#include <QFontMetrics>
#include <QPainter>

namespace rungwright
{

namespace
{

constexpr int kMargin = 12;
constexpr int kGap = 8;

int headingHeight(const QFont& font) { return QFontMetrics(font).height() + kGap; }

int cautionHeight(const QFont& font, int width)
{
    const QRect room(0, 0, width - 2 * kMargin, 10'000);
    return QFontMetrics(font).boundingRect(room, Qt::TextWordWrap, cautionText()).height() + kGap;
}

} // namespace

QSize pictureSizeFor(const QSize& plot, const QFont& font)
{
    return {plot.width(), plot.height() + headingHeight(font) + cautionHeight(font, plot.width()) + 2 * kMargin};
}

void paintPicturePage(QPainter& painter, const QSize& size, const QFont& font, const Look& look, const QString& heading,
                      const std::function<void(const QRect&)>& content)
{
    painter.fillRect(QRect(QPoint(0, 0), size), look.paper);
    QFont strong = font;
    strong.setWeight(QFont::DemiBold);
    painter.setFont(strong);
    painter.setPen(look.ink);
    const int top = kMargin + headingHeight(font);
    const int width = size.width() - 2 * kMargin;
    painter.drawText(QRect(kMargin, kMargin, width, headingHeight(font)), Qt::AlignLeft | Qt::AlignTop,
                     QFontMetrics(strong).elidedText(heading, Qt::ElideRight, width));
    const int bottom = size.height() - kMargin - cautionHeight(font, size.width());
    content(QRect(0, top, size.width(), bottom - top));
    painter.setFont(font);
    painter.setPen(look.faintInk);
    painter.drawText(QRect(kMargin, bottom + kGap, width, size.height() - bottom - kGap), Qt::TextWordWrap, cautionText());
}

} // namespace rungwright
