// SPDX-License-Identifier: GPL-3.0-or-later
#include "label_layout.h"

#include <QFont>
#include <QPainter>

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

constexpr double kAir = 4;      ///< Around a label's text, left and right.
constexpr double kEdge = 8;     ///< From the area's right edge.
constexpr double kBracket = 12; ///< The gap's bracket from the right edge.

QSizeF sizeOf(const QString& text, const QFontMetricsF& metrics)
{
    return {std::ceil(metrics.horizontalAdvance(text)) + 2 * kAir, std::ceil(metrics.height())};
}

/// Rectangles on one side of a horizontal line, from the right to the left, close ones first.
template <std::size_t N>
std::size_t addBeside(std::array<QRectF, N>& into, std::size_t used, double y, double direction, QSizeF size, const QRectF& area)
{
    const double right = area.right() - kEdge - size.width();
    const double left = area.left() + kEdge;
    for (const double x : {right, 0.5 * (left + right), left}) {
        for (const double off : {3.0, 9.0, 16.0, size.height() + 5.0}) {
            const double top = direction < 0 ? y - off - size.height() : y + off;
            into[used++] = QRectF(QPointF(x, top), size);
        }
    }
    return used;
}

/// A label on the side of its line that faces away from the band, or where there is room.
void placeAtLine(const QString& text, double y, double away, PlacedLabel::Tone tone, const QFontMetricsF& metrics, LabelRoom& room,
                 std::vector<PlacedLabel>& labels)
{
    if (text.isEmpty() || y < room.area().top() || y > room.area().bottom())
        return;
    const QSizeF size = sizeOf(text, metrics);
    std::array<QRectF, 12> wanted;
    std::size_t used = addBeside(wanted, 0, y, away, size, room.area());
    QRectF rect = room.choose({wanted.data(), used});
    if (rect.isNull()) {
        used = addBeside(wanted, 0, y, -away, size, room.area());
        rect = room.choose({wanted.data(), used});
    }
    if (rect.isNull())
        return;
    room.take(rect);
    labels.push_back({text, rect, tone, true, room.rungsUnder(rect) > 0 ? PlacedLabel::Backing::paper : PlacedLabel::Backing::none});
}

/// The label of a part of the band between y1 and y2, its right end at `right`; none where it would cover rungs.
void placePart(const QString& text, double y1, double y2, double right, const QFontMetricsF& metrics, LabelRoom& room,
               std::vector<PlacedLabel>& labels)
{
    const QSizeF size = sizeOf(text, metrics);
    if (text.isEmpty() || std::abs(y2 - y1) < size.height() + 2)
        return;
    const QRectF rect(QPointF(right - size.width(), 0.5 * (y1 + y2 - size.height())), size);
    if (!room.fits(rect) || room.rungsUnder(rect) > 0)
        return;
    room.take(rect);
    labels.push_back({text, rect, PlacedLabel::Tone::ink, false, PlacedLabel::Backing::fill});
}

/// The whole gap's label, beside its bracket at half height if no rung is there.
bool placeGap(const QString& text, const QRectF& band, double right, const QFontMetricsF& metrics, LabelRoom& room,
              std::vector<PlacedLabel>& labels)
{
    const QSizeF size = sizeOf(text, metrics);
    const double highest = band.top() + 2;
    const double lowest = band.bottom() - 2 - size.height();
    const double left = band.left() + kEdge;
    std::array<QRectF, 10> wanted;
    std::size_t used = 0;
    for (const double x : {right - size.width(), left}) {
        for (const double share : {0.5, 0.75, 0.25, 1.0, 0.0})
            wanted[used++] = QRectF(QPointF(x, highest + share * (lowest - highest)), size);
    }
    const QRectF rect = room.choose(wanted);
    if (text.isEmpty() || rect.isNull())
        return false;
    room.take(rect);
    labels.push_back({text, rect, PlacedLabel::Tone::ink, true, PlacedLabel::Backing::fill});
    return true;
}

} // namespace

LabelRoom::LabelRoom(const QRectF& area, std::span<const QPointF> rungs, double reach) : m_area(area), m_rungs(rungs), m_reach(reach)
{
    m_taken.reserve(8);
}

bool LabelRoom::fits(const QRectF& rect) const
{
    return m_area.contains(rect) && std::none_of(m_taken.begin(), m_taken.end(), [&](const QRectF& t) { return t.intersects(rect); });
}

int LabelRoom::rungsUnder(const QRectF& rect) const
{
    const QRectF near = rect.adjusted(-m_reach, -m_reach, m_reach, m_reach);
    return static_cast<int>(std::count_if(m_rungs.begin(), m_rungs.end(), [&](QPointF p) { return near.contains(p); }));
}

QRectF LabelRoom::choose(std::span<const QRectF> wanted) const
{
    QRectF best;
    int fewest = std::numeric_limits<int>::max();
    for (const QRectF& rect : wanted) {
        if (!fits(rect))
            continue;
        const int under = rungsUnder(rect);
        if (under < fewest) {
            best = rect;
            fewest = under;
        }
        if (under == 0)
            break;
    }
    return best;
}

void layOutBand(const BandInput& in, const QFontMetricsF& plain, const QFontMetricsF& strong, LabelRoom& room, BandLayout& out)
{
    const QRectF& area = room.area();
    out.labels.clear();
    out.band = out.hatched = QRectF();
    out.bracket = QLineF();
    if (std::isnan(in.expectedY)) {
        placeAtLine(in.floorText, in.floorY, 1.0, PlacedLabel::Tone::floor, strong, room, out.labels);
        return;
    }
    if (std::isnan(in.floorY)) {
        placeAtLine(in.expectedText, in.expectedY, -1.0, PlacedLabel::Tone::gap, strong, room, out.labels);
        return;
    }
    const auto inside = [&area](double y) { return std::clamp(y, area.top(), area.bottom()); };
    const double top = inside(std::min(in.floorY, in.expectedY));
    const double bottom = inside(std::max(in.floorY, in.expectedY));
    if (top < bottom)
        out.band = QRectF(QPointF(area.left(), top), QPointF(area.right(), bottom));
    if (!std::isnan(in.claimY) && in.claimY < in.floorY) {
        const double claimTop = std::max(inside(in.claimY), top);
        if (claimTop < bottom)
            out.hatched = QRectF(QPointF(area.left(), claimTop), QPointF(area.right(), bottom));
    }
    const bool thick = bottom - top >= strong.height() + 6;
    const double away = in.expectedY <= in.floorY ? -1.0 : 1.0;
    QString expectedText = in.expectedText;
    if (!thick && !in.gapText.isEmpty()) {
        const QString both = expectedText + QStringLiteral("  ·  ") + in.gapText;
        if (strong.horizontalAdvance(both) + 2 * kAir + 2 * kEdge <= area.width())
            expectedText = both;
    }
    placeAtLine(expectedText, in.expectedY, away, PlacedLabel::Tone::gap, strong, room, out.labels);
    placeAtLine(in.floorText, in.floorY, -away, PlacedLabel::Tone::floor, strong, room, out.labels);
    if (!thick) {
        if (expectedText == in.expectedText)
            placeAtLine(in.gapText, in.expectedY, away, PlacedLabel::Tone::ink, strong, room, out.labels);
        return;
    }
    const double x = area.right() - kBracket;
    out.bracket = QLineF(x, top, x, bottom);
    double right = x - 6;
    if (placeGap(in.gapText, out.band, right, strong, room, out.labels) && out.labels.back().rect.right() > area.center().x())
        right = out.labels.back().rect.left() - 12;
    const double split = out.hatched.isNull() ? bottom : out.hatched.top();
    placePart(in.shapeText, top, split, right, plain, room, out.labels);
    placePart(in.claimText, split, bottom, right, plain, room, out.labels);
}

QRectF placeBeside(QPointF at, QSizeF size, double distance, const LabelRoom& room)
{
    const double w = size.width();
    const double h = size.height();
    const double middle = at.y() - 0.5 * h;
    const QRectF& in = room.area();
    const double over = std::clamp(at.x() - 0.5 * w, in.left() + 2, std::max(in.left() + 2, in.right() - 2 - w));
    const std::array wanted{
        QRectF(QPointF(at.x() + distance, middle), size),
        QRectF(QPointF(at.x() - distance - w, middle), size),
        QRectF(QPointF(at.x() + distance, at.y() - distance - h), size),
        QRectF(QPointF(at.x() - distance - w, at.y() - distance - h), size),
        QRectF(QPointF(at.x() + distance, at.y() + distance), size),
        QRectF(QPointF(at.x() - distance - w, at.y() + distance), size),
        QRectF(QPointF(over, at.y() - distance - h), size),
        QRectF(QPointF(over, at.y() + distance), size),
        QRectF(QPointF(at.x() + distance, at.y() - 2 * distance - 2 * h), size),
        QRectF(QPointF(at.x() - distance - w, at.y() - 2 * distance - 2 * h), size),
        QRectF(QPointF(at.x() - distance - w, at.y() + 2 * distance + h), size),
        QRectF(QPointF(at.x() + distance, at.y() + 2 * distance + h), size),
    };
    return room.choose(wanted);
}

void paintLabel(QPainter& painter, const PlacedLabel& label, const QFont& plain, const QFont& strong, const Look& look)
{
    if (label.backing != PlacedLabel::Backing::none) {
        QColor back = label.backing == PlacedLabel::Backing::paper ? look.paper : look.gapFill;
        back.setAlphaF(0.9F);
        painter.fillRect(label.rect, back);
    }
    painter.setFont(label.strong ? strong : plain);
    painter.setPen(label.tone == PlacedLabel::Tone::gap ? look.gapLine : label.tone == PlacedLabel::Tone::floor ? look.floor : look.ink);
    painter.drawText(label.rect, Qt::AlignCenter | Qt::TextSingleLine, label.text);
}

} // namespace rungwright
