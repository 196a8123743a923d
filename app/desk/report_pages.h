// SPDX-License-Identifier: GPL-3.0-or-later
// Paper under a pen: pages with a heading and a foot, and text that goes from the top to the bottom.
#pragma once

#include <QFont>
#include <QFontMetricsF>
#include <QPdfWriter>
#include <QString>

#include <qcustomplot.h>

#include <vector>

namespace rungwright
{

/// One cell of a line of a table.
struct ReportCell {
    QString text;
    double width = 0; ///< Pixels.
    bool right = false;
    bool wraps = false; ///< Else cut with an ellipsis.
};

/// Counts in pixels, 96 an inch, as plots do. `total` is the number of pages the foot speaks of: 0 while it is not known, in a first run
/// that only counts.
class ReportPages
{
public:
    static constexpr int kPerInch = 96;
    enum class Weight { plain, strong, small, faint };

    ReportPages(QPdfWriter& writer, const QString& running, const QString& caution, int total);
    bool paints() const { return m_paints; }
    /// Ends the last page and the file.
    int finish();

    QCPPainter& painter() { return m_painter; }
    double width() const { return m_body.width(); }
    double left() const { return m_body.left(); }
    double y() const { return m_y; }
    double roomLeft() const { return m_body.bottom() - m_y; }
    int page() const { return m_page; }

    QFont font(Weight weight, double scale = 1.0) const;
    double lineHeight(Weight weight = Weight::plain, double scale = 1.0) const;

    void newPage();
    void gap(double pixels) { m_y += pixels; }
    /// A paragraph over the whole width, on the next page where this one has no room.
    void paragraph(const QString& text, Weight weight = Weight::plain, double scale = 1.0);
    /// A heading, kept with at least `following` pixels below it.
    void heading(const QString& text, double following);
    /// Cells one beside the other, from the left edge, 8 pixels apart; as high as the highest that wraps.
    double rowHeight(const std::vector<ReportCell>& cells, Weight weight) const;
    void row(const std::vector<ReportCell>& cells, Weight weight = Weight::plain);
    void rule();
    /// Room for a picture; the pen goes below it.
    QRectF take(double height);

private:
    void foot();

    QPdfWriter& m_writer;
    QCPPainter m_painter;
    QString m_running;
    QString m_caution;
    QFont m_font;
    QRectF m_paper;
    QRectF m_body;
    double m_y = 0;
    int m_total = 0;
    int m_page = 1;
    bool m_paints = false;
};

} // namespace rungwright
