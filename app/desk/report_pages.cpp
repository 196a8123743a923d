// SPDX-License-Identifier: GPL-3.0-or-later
#include "report_pages.h"

#include "look.h"
#include "wording.h"

#include <QApplication>

namespace rungwright
{

namespace
{

constexpr double kPaperMargin = 56;
constexpr double kCellGap = 8;
constexpr double kPoints = 9;

class PageWords
{
    Q_DECLARE_TR_FUNCTIONS(rungwright::ReportPages)
};

} // namespace

ReportPages::ReportPages(QPdfWriter& writer, const QString& running, const QString& caution, int total) :
    m_writer(writer), m_running(running), m_caution(caution), m_font(QApplication::font()), m_total(total)
{
    m_font.setPointSizeF(kPoints);
    // Widths as they are printed, not as a screen's pixels would have them.
    m_font.setHintingPreference(QFont::PreferNoHinting);
    m_paints = m_painter.begin(&writer);
    m_painter.setMode(QCPPainter::pmNoCaching);
    m_paper = QRectF(0, 0, writer.width(), writer.height());
    const QRectF inside = m_paper.adjusted(kPaperMargin, kPaperMargin, -kPaperMargin, -kPaperMargin);
    const double cautionHeight = QFontMetricsF(font(Weight::faint), &m_writer).boundingRect(inside, Qt::TextWordWrap, m_caution).height();
    m_body = inside.adjusted(0, 0, 0, -(cautionHeight + lineHeight(Weight::faint) + 16));
    m_y = m_body.top();
}

QFont ReportPages::font(Weight weight, double scale) const
{
    QFont font = m_font;
    font.setPointSizeF(kPoints * scale * (weight == Weight::small || weight == Weight::faint ? 0.89 : 1.0));
    if (weight == Weight::strong)
        font.setWeight(QFont::DemiBold);
    return font;
}

double ReportPages::lineHeight(Weight weight, double scale) const { return QFontMetricsF(font(weight, scale), &m_writer).lineSpacing(); }

int ReportPages::finish()
{
    foot();
    m_painter.end();
    return m_page;
}

void ReportPages::foot()
{
    const Look& look = Look::light();
    m_painter.setFont(font(Weight::faint));
    m_painter.setPen(look.faintInk);
    const double top = m_body.bottom() + 12;
    const QRectF below(m_body.left(), top, m_body.width(), m_paper.bottom() - kPaperMargin - top + 8);
    QRectF used;
    m_painter.drawText(below, Qt::TextWordWrap, m_caution, &used);
    const QString number = m_total > 0 ? PageWords::tr("page %1 of %2").arg(m_page).arg(m_total) : PageWords::tr("page %1").arg(m_page);
    const QFontMetricsF metrics(m_painter.font(), &m_writer);
    const QRectF line(m_body.left(), used.bottom() + 4, m_body.width(), metrics.height());
    const double numberWidth = metrics.horizontalAdvance(number);
    m_painter.drawText(line, Qt::AlignRight, number);
    m_painter.drawText(line, Qt::AlignLeft, metrics.elidedText(m_running, Qt::ElideRight, line.width() - numberWidth - 24));
}

void ReportPages::newPage()
{
    foot();
    m_writer.newPage();
    ++m_page;
    m_y = m_body.top();
}

void ReportPages::paragraph(const QString& text, Weight weight, double scale)
{
    if (text.isEmpty())
        return;
    const QFont with = font(weight, scale);
    const double height = QFontMetricsF(with, &m_writer).boundingRect(QRectF(0, 0, m_body.width(), 1e5), Qt::TextWordWrap, text).height();
    if (height > roomLeft() && m_y > m_body.top())
        newPage();
    m_painter.setFont(with);
    m_painter.setPen(weight == Weight::faint ? Look::light().faintInk : Look::light().ink);
    m_painter.drawText(QRectF(m_body.left(), m_y, m_body.width(), height + 2), Qt::TextWordWrap, text);
    m_y += height;
}

void ReportPages::heading(const QString& text, double following)
{
    const double height = lineHeight(Weight::strong, 1.2);
    if (height + following > roomLeft())
        newPage();
    paragraph(text, Weight::strong, 1.2);
    gap(4);
}

double ReportPages::rowHeight(const std::vector<ReportCell>& cells, Weight weight) const
{
    const QFontMetricsF metrics(font(weight), &m_writer);
    double height = metrics.height();
    for (const ReportCell& cell : cells) {
        if (cell.wraps)
            height = std::max(height, metrics.boundingRect(QRectF(0, 0, cell.width, 1e5), Qt::TextWordWrap, cell.text).height());
    }
    return height + 2;
}

void ReportPages::row(const std::vector<ReportCell>& cells, Weight weight)
{
    const double height = rowHeight(cells, weight);
    if (height > roomLeft())
        newPage();
    const QFont with = font(weight);
    const QFontMetricsF metrics(with, &m_writer);
    m_painter.setFont(with);
    m_painter.setPen(weight == Weight::faint ? Look::light().faintInk : Look::light().ink);
    double x = m_body.left();
    for (const ReportCell& cell : cells) {
        const QRectF where(x, m_y, cell.width, height);
        // Left is left whatever way a name reads: a column has one edge.
        const int flags = static_cast<int>(Qt::AlignAbsolute | Qt::AlignTop | (cell.right ? Qt::AlignRight : Qt::AlignLeft)) |
                          (cell.wraps ? static_cast<int>(Qt::TextWordWrap) : static_cast<int>(Qt::TextSingleLine));
        m_painter.drawText(where, flags, cell.wraps ? cell.text : metrics.elidedText(cell.text, Qt::ElideMiddle, cell.width));
        x += cell.width + kCellGap;
    }
    m_y += height;
}

void ReportPages::rule()
{
    m_painter.setPen(QPen(Look::light().grid, 0.75));
    m_painter.drawLine(QPointF(m_body.left(), m_y + 1), QPointF(m_body.right(), m_y + 1));
    m_y += 3;
}

QRectF ReportPages::take(double height)
{
    const QRectF where(m_body.left(), m_y, m_body.width(), height);
    m_y += height;
    return where;
}

} // namespace rungwright
