// SPDX-License-Identifier: GPL-3.0-or-later
// How the portfolio picture is painted.
#include "portfolio_plot.h"
#include "wording.h"

#include <QPainter>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

/// Tiers a cell, from where on each shade begins; fewer are drawn one by one.
constexpr std::array<std::uint32_t, 5> kLevels{3, 6, 12, 25, 50};

constexpr double kShadeSide = 12;

std::size_t levelOf(std::uint32_t count)
{
    const auto above = std::upper_bound(kLevels.begin(), kLevels.end(), count);
    return static_cast<std::size_t>(above - kLevels.begin()) - 1;
}

QColor mixed(const QColor& a, const QColor& b, double share)
{
    const auto part = [share](float x, float y) { return static_cast<float>(x + (y - x) * share); };
    return QColor::fromRgbF(part(a.redF(), b.redF()), part(a.greenF(), b.greenF()), part(a.blueF(), b.blueF()));
}

QString levelText(std::size_t level)
{
    if (level + 1 == kLevels.size())
        return QLocale().toString(kLevels[level]) + QLatin1Char('+');
    return QStringLiteral("%1–%2").arg(kLevels[level]).arg(kLevels[level + 1] - 1);
}

} // namespace

QColor PortfolioPlot::shade(std::size_t level) const
{
    return mixed(look().paper, look().onOffer, 0.16 + 0.74 * static_cast<double>(level) / static_cast<double>(kLevels.size() - 1));
}

void PortfolioPlot::paintFrame(QPainter& painter)
{
    painter.save();
    const QFontMetricsF metrics(font());
    painter.setFont(font());
    painter.setPen(look().faintInk);
    const QRectF in = area();
    const double below = in.bottom() + 8 + metrics.height();
    // Where the whole sentence has no room, the axis's name has.
    const QString lean = tr("lean (g1): further left, more prices crowd near the top");
    painter.drawText(QRectF(in.left(), below, in.width(), metrics.height()), Qt::AlignRight | Qt::AlignTop,
                     metrics.horizontalAdvance(lean) <= in.width() ? lean : tr("lean (g1)"));
    const QString note = leftOutText();
    if (!note.isEmpty()) {
        painter.setPen(look().ink);
        painter.drawText(QRectF(8, below + metrics.height() + 4, viewport().width() - 16, noteHeight()), Qt::TextWordWrap, note);
    }
    paintLegend(painter);
    if (m_all.points.empty()) {
        painter.setPen(look().faintInk);
        painter.drawText(in, Qt::AlignCenter, m_list && m_list->measuring() ? tr("measuring …") : tr("no tier to show"));
    }
    painter.restore();
}

std::vector<PortfolioPlot::LegendPiece> PortfolioPlot::legend() const
{
    using Mark = LegendPiece::Mark;
    std::vector<LegendPiece> pieces{{Mark::none, 0, 0, shareTitle(), false},
                                    {Mark::filled, 5, 0, tr("leans left or wide gap"), false},
                                    {Mark::open, 5, 0, tr("neither"), false}};
    if (!dense()) {
        pieces.push_back({Mark::none, 0, 0, tr("units on offer:"), true});
        for (const int units : {1, 10, 50})
            pieces.push_back({Mark::open, radiusFor(units), 0, QString::number(units), false});
    } else {
        pieces.push_back({Mark::none, 0, 0, tr("tiers where many lie together:"), true});
        for (std::size_t level = 0; level < kLevels.size(); ++level)
            pieces.push_back({Mark::shade, 0, level, levelText(level), false});
    }
    const QFontMetricsF metrics(font());
    const double right = std::max(viewport().width() - 8.0, 80.0);
    double x = 8;
    double y = kHeadingTop;
    for (LegendPiece& piece : pieces) {
        const double mark = piece.mark == Mark::none ? 0 : piece.mark == Mark::shade ? kShadeSide + 4 : 2 * piece.size + 4;
        piece.said = metrics.elidedText(piece.said, Qt::ElideRight, right - 8 - mark);
        const double width = std::ceil(mark + metrics.horizontalAdvance(piece.said));
        if (piece.onNewLine || x + width > right) {
            x = 8;
            y += metrics.height() + kLegendGap;
        }
        piece.place = QRectF(x, y, width, metrics.height());
        x += width + (&piece == &pieces.front() ? 28 : 14);
    }
    return pieces;
}

int PortfolioPlot::legendLines() const
{
    return 1 + qRound((legend().back().place.top() - kHeadingTop) / (QFontMetricsF(font()).height() + kLegendGap));
}

void PortfolioPlot::paintLegend(QPainter& painter)
{
    using Mark = LegendPiece::Mark;
    const QFontMetricsF metrics(font());
    painter.setRenderHint(QPainter::Antialiasing, true);
    for (const LegendPiece& piece : legend()) {
        const double middle = piece.place.center().y();
        double x = piece.place.left();
        if (piece.mark == Mark::shade) {
            painter.fillRect(QRectF(x, middle - kShadeSide / 2, kShadeSide, kShadeSide), shade(piece.level));
            x += kShadeSide + 4;
        } else if (piece.mark != Mark::none) {
            const bool filled = piece.mark == Mark::filled;
            painter.setPen(QPen(filled ? look().paper : look().onOffer, 1.2));
            painter.setBrush(filled ? QBrush(look().gapLine) : QBrush(Qt::NoBrush));
            painter.drawEllipse(QPointF(x + piece.size, middle), piece.size, piece.size);
            x += 2 * piece.size + 4;
        }
        painter.setPen(look().faintInk);
        painter.drawText(QPointF(x, piece.place.top() + metrics.ascent()), piece.said);
    }
}

void PortfolioPlot::paintThresholds(QPainter& painter)
{
    if (!m_list)
        return;
    const FlagThresholds& t = m_list->thresholds();
    const QRectF in = area();
    const double x = std::round(xAxis->coordToPixel(t.leansLeft)) + 0.5;
    const double y = std::round(yAxis->coordToPixel(t.gapShare)) + 0.5;
    painter.setPen(QPen(look().ink, 1, Qt::DashLine));
    painter.drawLine(QPointF(x, in.top()), QPointF(x, in.bottom()));
    painter.drawLine(QPointF(in.left(), y), QPointF(in.right(), y));
    const QFontMetricsF metrics(font());
    painter.setFont(font());
    const auto label = [&](QRectF rect, int alignment, const QString& said) {
        const QRectF text = metrics.boundingRect(rect, alignment, said).adjusted(-3, 0, 3, 0);
        QColor back = look().paper;
        back.setAlphaF(0.85F);
        painter.fillRect(text, back);
        painter.setPen(look().ink);
        painter.drawText(rect, alignment, said);
    };
    // Above the area, over its line: no points lie there.
    // Where the name and the number have no room, the number has: what it is of stands in the legend.
    const auto fitted = [&](const QString& said, const QString& number) {
        return metrics.horizontalAdvance(said) <= in.width() - 8 ? said : number;
    };
    const QString from = numberText(t.leansLeft);
    const QString left = fitted(tr("leans left: below %1").arg(from), tr("below %1").arg(from));
    const double width = metrics.horizontalAdvance(left) + 8;
    const double start = std::clamp(x - width / 2, in.left(), std::max(in.left(), in.right() - width));
    label(QRectF(start, in.top() - metrics.height() - 1, width, metrics.height()), Qt::AlignCenter, left);
    const QString share = percentText(t.gapShare, true);
    const QString wide = fitted(tr("wide gap: from %1").arg(share), tr("from %1").arg(share));
    const double wideWidth = metrics.horizontalAdvance(wide) + 8;
    label(QRectF(in.right() - wideWidth - 4, y - metrics.height() - 1, wideWidth, metrics.height()), Qt::AlignRight | Qt::AlignVCenter,
          wide);
}

void PortfolioPlot::paintDensity(QPainter& painter)
{
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, false);
    painter.setPen(Qt::NoPen);
    for (int row = 0; row < m_shape.rows(); ++row) {
        for (int column = 0; column < m_shape.columns(); ++column) {
            const std::uint32_t count = m_shape.count(column, row);
            if (count >= kLevels.front())
                painter.fillRect(m_shape.cell(column, row), shade(levelOf(count)));
        }
    }
    painter.restore();
}

void PortfolioPlot::paintPoint(QPainter& painter, int index, bool picked)
{
    const PortfolioPoint& p = point(index);
    const bool flagged = p.leansLeft || p.wideGap;
    const QPointF& at = m_shape.places()[static_cast<std::size_t>(index)];
    const double r = dense() ? std::min(radius(index), 3.5) : radius(index);
    QColor fill = look().gapLine;
    fill.setAlphaF(0.75F);
    painter.setPen(QPen(picked ? look().selection : flagged ? look().paper : look().onOffer, picked ? 1.6 : 1.0));
    painter.setBrush(flagged ? QBrush(fill) : QBrush(Qt::NoBrush));
    if (!m_shape.atEdge(index)) {
        painter.drawEllipse(at, r, r);
        return;
    }
    // What lies beyond the edge is a triangle on it, not a point among points.
    const double s = std::max(3.5, r);
    painter.drawPolygon(QPolygonF{at + QPointF(0, -s), at + QPointF(s, s * 0.8), at + QPointF(-s, s * 0.8)});
}

void PortfolioPlot::paintMarks(QPainter& painter)
{
    if (!m_list)
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    const QRectF in = area();
    painter.setClipRect(in.adjusted(-9, -9, 9, 9));
    const bool many = dense();
    if (many)
        paintDensity(painter);
    const bool picked = m_list->pickedCount() > 0;
    const int count = static_cast<int>(m_all.points.size());
    for (int i = 0; i < count; ++i) {
        const bool scattered = !many || m_shape.countAround(i) < kLevels.front();
        if (scattered && !(picked && m_list->isPicked(point(i).tier)))
            paintPoint(painter, i, false);
    }
    for (int i = 0; picked && i < count; ++i) {
        if (m_list->isPicked(point(i).tier))
            paintPoint(painter, i, true);
    }
    painter.setClipping(false);
    painter.setRenderHint(QPainter::Antialiasing, false);
    paintThresholds(painter);
    paintBeyond(painter);
    painter.restore();
}

void PortfolioPlot::paintBeyond(QPainter& painter)
{
    const QRectF in = area().adjusted(4, 4, -4, -4);
    painter.setFont(font());
    const auto say = [&](int count, int alignment, const QString& said) {
        if (count == 0)
            return;
        const QString text = said.arg(QLocale().toString(count));
        const QRectF back = QFontMetricsF(font()).boundingRect(in, alignment, text).adjusted(-3, -1, 3, 1);
        painter.fillRect(back, look().paper);
        painter.setPen(look().ink);
        painter.drawText(in, alignment, text);
    };
    say(m_shape.beyondLeft(), Qt::AlignLeft | Qt::AlignVCenter, tr("◂ %1 further"));
    say(m_shape.beyondRight(), Qt::AlignRight | Qt::AlignVCenter, tr("%1 further ▸"));
    say(m_shape.beyondTop(), Qt::AlignHCenter | Qt::AlignTop, tr("▴ %1 further up"));
    say(m_shape.beyondBottom(), Qt::AlignHCenter | Qt::AlignBottom, tr("▾ %1 further down"));
}

void PortfolioPlot::paintRing(QPainter& painter, int index, const QColor& colour, double width)
{
    const QPointF& at = m_shape.places()[static_cast<std::size_t>(index)];
    const double r = radius(index) + 3;
    painter.setBrush(Qt::NoBrush);
    painter.setPen(QPen(look().paper, width + 2));
    painter.drawEllipse(at, r, r);
    painter.setPen(QPen(colour, width));
    painter.drawEllipse(at, r, r);
}

void PortfolioPlot::paintAbove(QPainter& painter)
{
    if (!m_list)
        return;
    painter.save();
    painter.setRenderHint(QPainter::Antialiasing, true);
    const int tier = m_bench ? m_bench->tier() : -1;
    const int onBench = tier >= 0 && tier < static_cast<int>(m_pointOf.size()) ? m_pointOf[static_cast<std::size_t>(tier)] : -1;
    if (onBench >= 0) {
        paintRing(painter, onBench, look().ink, 2);
        // A ring alone is lost in a crowd: lines to it from the sides, and its name.
        const QPointF& at = m_shape.places()[static_cast<std::size_t>(onBench)];
        const double r = radius(onBench) + 3;
        painter.setPen(QPen(look().ink, 1));
        painter.drawLine(at + QPointF(r, 0), at + QPointF(r + 10, 0));
        painter.drawLine(at - QPointF(r, 0), at - QPointF(r + 10, 0));
        painter.drawLine(at + QPointF(0, r), at + QPointF(0, r + 10));
        painter.drawLine(at - QPointF(0, r), at - QPointF(0, r + 10));
        const QFontMetricsF metrics(strongFont());
        const QString name = metrics.elidedText(tr("on the bench"), Qt::ElideRight, area().width() / 2);
        const QSizeF size(metrics.horizontalAdvance(name) + 8, metrics.height());
        const bool rightOf = at.x() + r + 14 + size.width() < area().right();
        const QRectF rect(QPointF(rightOf ? at.x() + r + 12 : at.x() - r - 12 - size.width(), at.y() - size.height() / 2), size);
        QColor back = look().paper;
        back.setAlphaF(0.9F);
        painter.fillRect(rect, back);
        painter.setFont(strongFont());
        painter.setPen(look().ink);
        painter.drawText(rect, Qt::AlignCenter, name);
    }
    if (!exporting()) {
        if (m_hover >= 0)
            paintRing(painter, m_hover, look().focus, 2);
        painter.setRenderHint(QPainter::Antialiasing, false);
        if (m_boxing) {
            QColor fill = look().selectionFill;
            fill.setAlphaF(0.4F);
            painter.setPen(QPen(look().selection, 1, Qt::DashLine));
            painter.setBrush(fill);
            painter.drawRect(QRectF(m_pressedAt, m_pointer).normalized());
        }
        if (hasFocus()) {
            painter.setBrush(Qt::NoBrush);
            painter.setPen(QPen(look().focus, 1));
            painter.drawRect(area().adjusted(0, 0, -1, -1));
        }
    }
    painter.restore();
}

} // namespace rungwright
