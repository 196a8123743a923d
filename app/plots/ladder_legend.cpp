// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder_legend.h"

#include <QCoreApplication>
#include <QFontMetricsF>
#include <QPainter>

#include <algorithm>
#include <array>

namespace rungwright
{

namespace
{

constexpr double kGlyph = 26; ///< Room for a rung or a stretch of ladder, and some air.
constexpr double kGap = 16;   ///< Between entries.
constexpr double kBetweenRows = 4;

QString tr(const char* text) { return QCoreApplication::translate("LadderLegend", text); }

/// A name may take this much of the row before it is cut.
double nameRoom(double available) { return 0.36 * available; }

void paintStaircase(QPainter& painter, double x, double y, const QPen& pen)
{
    const double w = (kGlyph - 5) / 3;
    const std::array<QPointF, 6> steps{QPointF(x, y + 4),     QPointF(x + w, y + 4),     QPointF(x + w, y),
                                       QPointF(x + 2 * w, y), QPointF(x + 2 * w, y - 4), QPointF(x + 3 * w, y - 4)};
    painter.setPen(pen);
    painter.drawPolyline(steps.data(), static_cast<int>(steps.size()));
}

} // namespace

void LadderLegend::setLadders(const QString& title, const QString& worked, const QString& behind)
{
    m_title = title;
    m_ladders.clear();
    m_ladders.push_back({Entry::Glyph::worked, worked, {}});
    if (!behind.isEmpty())
        m_ladders.push_back({Entry::Glyph::behind, behind, {}});
}

void LadderLegend::setKey(bool reserved, bool closed, bool locked)
{
    m_key.clear();
    m_key.push_back({Entry::Glyph::rung, tr("on offer"), {{}, Status::vacant, false, false}});
    m_key.push_back({Entry::Glyph::rung, tr("taken"), {{}, Status::occupied, false, false}});
    if (reserved)
        m_key.push_back({Entry::Glyph::rung, tr("reserved"), {{}, Status::reserved, false, false}});
    if (closed)
        m_key.push_back({Entry::Glyph::rung, tr("closed"), {{}, Status::closed, false, false}});
    if (locked)
        m_key.push_back({Entry::Glyph::rung, tr("locked"), {{}, Status::vacant, true, false}});
}

std::vector<LadderLegend::Placed> LadderLegend::flow(double width, const QFont& plain, const QFont& strong) const
{
    const auto textWidth = [&](const Entry& entry) {
        const bool worked = entry.glyph == Entry::Glyph::worked;
        const double text = QFontMetricsF(worked ? strong : plain).horizontalAdvance(entry.text) + 1;
        return worked ? std::min(text, nameRoom(width)) : text;
    };
    const double start = QFontMetricsF(plain).horizontalAdvance(m_title) + kGap;
    std::vector<Placed> placed;
    double x = start;
    for (const Entry& entry : m_ladders) {
        placed.push_back({&entry, x, 0, textWidth(entry)});
        x += kGlyph + placed.back().textWidth + kGap;
    }
    double key = 0;
    for (const Entry& entry : m_key)
        key += kGlyph + textWidth(entry) + kGap;
    key -= kGap;
    int row = 0;
    if (x + key > width) { // Under the ladders' words if it fits there, else from the very left, in as many rows as it takes.
        row = 1;
        x = start + key <= width ? start : 0;
    }
    for (const Entry& entry : m_key) {
        const double text = textWidth(entry);
        if (row > 0 && x > 0 && x + kGlyph + text > width) {
            ++row;
            x = 0;
        }
        placed.push_back({&entry, x, row, text});
        x += kGlyph + text + kGap;
    }
    return placed;
}

int LadderLegend::rows(double width, const QFont& plain, const QFont& strong) const
{
    const std::vector<Placed> placed = flow(width, plain, strong);
    return placed.empty() ? 1 : placed.back().row + 1;
}

double LadderLegend::height(int rows, const QFont& plain) { return rows * QFontMetricsF(plain).height() + (rows - 1) * kBetweenRows; }

void LadderLegend::paint(QPainter& painter, const QRectF& where, const QFont& plain, const QFont& strong, const Look& look) const
{
    const QFontMetricsF metrics(plain);
    painter.save();
    painter.setFont(plain);
    painter.setPen(look.faintInk);
    painter.drawText(where.topLeft() + QPointF(0, metrics.ascent()), m_title);
    RungPainter rungs;
    for (const Placed& p : flow(where.width(), plain, strong)) {
        const double x = where.left() + p.x;
        const double top = where.top() + p.row * (metrics.height() + kBetweenRows);
        const double middle = top + 0.5 * metrics.height();
        const bool worked = p.entry->glyph == Entry::Glyph::worked;
        painter.setRenderHint(QPainter::Antialiasing, true);
        if (p.entry->glyph == Entry::Glyph::rung) {
            RungMark mark = p.entry->mark;
            mark.at = QPointF(x + 0.5 * kGlyph - 3, middle);
            rungs.paint(painter, {mark}, RungSize::forColumn(19), look);
        } else {
            paintStaircase(painter, x, middle, worked ? QPen(look.onOffer, 2) : QPen(look.trace, 1.2));
        }
        const QFont& font = worked ? strong : plain;
        painter.setFont(font);
        painter.setPen(worked ? look.ink : look.faintInk);
        painter.drawText(QRectF(x + kGlyph, top, p.textWidth, metrics.height()), Qt::AlignLeft | Qt::AlignVCenter | Qt::TextSingleLine,
                         QFontMetricsF(font).elidedText(p.entry->text, Qt::ElideRight, p.textWidth));
    }
    painter.restore();
}

} // namespace rungwright
