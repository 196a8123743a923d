// SPDX-License-Identifier: GPL-3.0-or-later
// How the trade-off is painted.
#include "curve_paint.h"
#include "frontier_plot.h"
#include "label_layout.h"
#include "plot_words.h"

#include <QPainter>

#include <cmath>
#include <functional>

namespace rungwright
{

namespace
{

constexpr double kMarkRadius = 5.5;
/// Of this many points at most each has its dot.
constexpr int kDots = 80;

/// The current ladder is a square, candidates are circles.
void paintMarkShape(QPainter& painter, QPointF at, bool current, double r)
{
    if (current)
        painter.drawRect(QRectF(at.x() - r * 0.9, at.y() - r * 0.9, 1.8 * r, 1.8 * r));
    else
        painter.drawEllipse(at, r, r);
}

} // namespace

void FrontierPlot::paintFrame(QPainter& painter)
{
    painter.save();
    const QFontMetricsF metrics(font());
    painter.setFont(font());
    painter.setPen(look().faintInk);
    painter.drawText(QPointF(8, kHeadingTop + metrics.ascent()), gapAxisTitle(m_picture.currency));
    painter.drawText(QRectF(area().left(), area().bottom() + 8 + metrics.height(), area().width(), metrics.height()),
                     Qt::AlignRight | Qt::AlignTop, amountTitle());
    // The key, at the right of the first line.
    painter.setRenderHint(QPainter::Antialiasing, true);
    double x = viewport().width() - 16;
    const double middle = kHeadingTop + 0.5 * metrics.height();
    const auto key = [&](const QString& said, const std::function<void(QPointF)>& shape) {
        x -= metrics.horizontalAdvance(said);
        painter.setPen(look().faintInk);
        painter.drawText(QPointF(x, kHeadingTop + metrics.ascent()), said);
        x -= 14;
        shape(QPointF(x, middle));
        x -= 24;
    };
    key(tr("candidate"), [&](QPointF at) {
        painter.setPen(QPen(look().onOffer, 1.6));
        painter.setBrush(look().paper);
        paintMarkShape(painter, at, false, 4.5);
    });
    key(tr("current ladder"), [&](QPointF at) {
        painter.setPen(Qt::NoPen);
        painter.setBrush(look().ink);
        paintMarkShape(painter, at, true, 4.5);
    });
    key(m_picture.against == FrontierPicture::Against::prices ? tr("smallest gap for the change") : tr("smallest gap at the total"),
        [&](QPointF at) {
            painter.setPen(QPen(look().gapLine, 1.8));
            painter.drawLine(at - QPointF(12, 0), at + QPointF(6, 0));
            x -= 8;
        });
    if (points() == 0) {
        painter.setPen(look().faintInk);
        painter.drawText(area().adjusted(24, 0, -24, 0), Qt::AlignCenter | Qt::TextWordWrap,
                         m_picture.note.isEmpty() ? tr("no curve to show") : m_picture.note);
    }
    painter.restore();
}

void FrontierPlot::paintCurveLine(QPainter& painter) const
{
    QPolygonF line;
    for (int i = 0; i < points(); ++i)
        line << placeOf(i);
    if (line.size() > 1)
        paintCurve(painter, line.constData(), line.size(), QPen(look().gapLine, 1.8, Qt::SolidLine, Qt::FlatCap));
    if (points() > kDots)
        return;
    painter.setPen(Qt::NoPen);
    painter.setBrush(look().gapLine);
    for (const QPointF& at : line)
        painter.drawEllipse(at, 2.4, 2.4);
}

void FrontierPlot::paintNamed(QPainter& painter) const
{
    std::vector<QPointF> obstacles;
    obstacles.reserve(static_cast<std::size_t>(points() + marks()));
    for (int i = 0; i < points(); ++i)
        obstacles.push_back(placeOf(i));
    for (int i = 0; i < marks(); ++i)
        obstacles.push_back(placeOfMark(i));
    LabelRoom room(area().adjusted(0, -4, 0, 0), obstacles, kMarkRadius);
    for (int i = 0; i < marks(); ++i) {
        const FrontierPicture::Mark& mark = m_picture.marks[static_cast<std::size_t>(i)];
        const QPointF at = placeOfMark(i);
        const bool current = mark.candidate < 0;
        const bool strong = mark.candidate == m_picture.worked;
        painter.setPen(QPen(current ? look().paper : look().onOffer, strong ? 2.4 : 1.6));
        painter.setBrush(current ? look().ink : look().paper);
        paintMarkShape(painter, at, current, strong ? kMarkRadius + 1 : kMarkRadius);

        const QFont& face = strong ? strongFont() : font();
        const QFontMetricsF metrics(face);
        PlacedLabel label;
        label.text = metrics.elidedText(mark.name, Qt::ElideMiddle, 0.3 * area().width());
        label.strong = strong;
        label.backing = PlacedLabel::Backing::paper;
        const QSizeF size(std::ceil(metrics.horizontalAdvance(label.text)) + 6, std::ceil(metrics.height()));
        std::vector<QRectF> wanted;
        for (const double by : {0.0, -1.0, 1.0, -2.0, 2.0}) {
            wanted.emplace_back(QPointF(at.x() + kMarkRadius + 5, at.y() + (by - 0.5) * size.height()), size);
            wanted.emplace_back(QPointF(at.x() - kMarkRadius - 5 - size.width(), at.y() + (by - 0.5) * size.height()), size);
        }
        label.rect = room.choose(wanted);
        if (label.rect.isEmpty())
            continue; // Its shape stays, and pointing at it names it.
        room.take(label.rect);
        paintLabel(painter, label, font(), strongFont(), look());
    }
}

void FrontierPlot::paintMarks(QPainter& painter)
{
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    painter.setFont(font());
    // Nothing changed: where the trade-off begins.
    const double none = xAxis->coordToPixel(0);
    painter.setPen(QPen(look().grid, 1, Qt::DashLine));
    painter.drawLine(QPointF(none, area().top()), QPointF(none, area().bottom()));
    paintCurveLine(painter);
    paintNamed(painter);
    painter.restore();
}

void FrontierPlot::paintSpot(QPainter& painter) const
{
    const QPointF at = m_spot.mark >= 0 ? placeOfMark(m_spot.mark) : placeOf(m_spot.point);
    painter.setPen(QPen(look().faintInk, 1, Qt::DotLine));
    painter.drawLine(QPointF(area().left(), at.y()), at);
    painter.drawLine(QPointF(at.x(), area().bottom()), at);
    painter.setBrush(Qt::NoBrush);
    painter.setPen(QPen(look().focus, 2));
    painter.drawEllipse(at, kMarkRadius + 3, kMarkRadius + 3);

    QStringList lines = spotText(m_spot).split(QLatin1Char('\n'));
    lines << (m_spot.mark < 0 ? tr("click or Enter: take this ladder as a candidate") : tr("click or Enter: put it on the bench"));
    const QFontMetricsF metrics(font());
    const QFontMetricsF strong(strongFont());
    double width = 0;
    for (qsizetype i = 0; i < lines.size(); ++i)
        width = std::max(width, (i == 0 ? strong : metrics).horizontalAdvance(lines[i]));
    const double line = metrics.height();
    const QSizeF size(std::ceil(width) + 16, static_cast<double>(lines.size()) * line + 8);
    // Above and to the right, where a falling curve leaves room.
    QRectF box(QPointF(at.x() + 14, at.y() - 14 - size.height()), size);
    if (box.right() > area().right())
        box.moveRight(std::max(area().left() + size.width(), at.x() - 14));
    if (box.top() < area().top())
        box.moveTop(at.y() + 14);
    painter.setPen(QPen(look().faintInk, 1));
    painter.setBrush(look().paper);
    painter.drawRoundedRect(box.adjusted(0.5, 0.5, -0.5, -0.5), 3, 3);
    for (qsizetype i = 0; i < lines.size(); ++i) {
        painter.setFont(i == 0 ? strongFont() : font());
        painter.setPen(i + 1 == lines.size() ? look().faintInk : look().ink);
        painter.drawText(QRectF(box.left() + 8, box.top() + 4 + static_cast<double>(i) * line, size.width() - 16, line),
                         Qt::AlignLeft | Qt::AlignVCenter | Qt::TextSingleLine, lines[i]);
    }
}

void FrontierPlot::paintAbove(QPainter& painter)
{
    if (exporting())
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    if (!m_spot.none())
        paintSpot(painter);
    if (hasFocus()) {
        painter.setRenderHint(QPainter::Antialiasing, false);
        painter.setBrush(Qt::NoBrush);
        painter.setPen(QPen(look().focus, 1));
        painter.drawRect(area().adjusted(0, 0, -1, -1));
    }
    painter.restore();
}

} // namespace rungwright
