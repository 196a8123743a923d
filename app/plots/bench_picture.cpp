// SPDX-License-Identifier: GPL-3.0-or-later
#include "bench_picture.h"

#include "bench_plots.h"
#include "picture_file.h"
#include "picture_page.h"
#include "plot_words.h"
#include "wording.h"

#include <QCoreApplication>
#include <QPalette>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("BenchPicture", text); }

constexpr int kSide = 12;
constexpr QSize kLeast(600, 520);

/// The reading line: the gap large, the sentence below. Returns its height.
int paintReading(QPainter& painter, const QRect& where, const Reading& r, const QFont& font, const Look& look)
{
    QFont large = font;
    large.setPointSizeF(font.pointSizeF() * 1.7);
    large.setWeight(QFont::DemiBold);
    QFont medium = font;
    medium.setPointSizeF(font.pointSizeF() * 1.35);
    const QFontMetrics big(large);
    painter.setFont(large);
    painter.setPen(look.ink);
    const int base = where.top() + big.ascent();
    painter.drawText(QPoint(where.left(), base), r.headline);
    if (!r.share.isEmpty()) {
        painter.setFont(medium);
        painter.setPen(look.faintInk);
        painter.drawText(QPoint(where.left() + big.horizontalAdvance(r.headline) + 12, base),
                         QLatin1Char('(') + r.share + QLatin1Char(')'));
    }
    painter.setFont(font);
    painter.setPen(look.ink);
    QRect used;
    painter.drawText(QRect(where.left(), where.top() + big.height() + 2, where.width(), 1000), Qt::TextWordWrap, r.sentence, &used);
    return big.height() + 2 + used.height();
}

} // namespace

Outcome<bool> renderBench(const Document& document, int tier, int candidate, const QString& path, const QSize& size)
{
    if (!document.tier(tier))
        return Trouble{tr("There is no such tier to draw.").toStdString()};
    if (size.width() < kLeast.width() || size.height() < kLeast.height()) {
        return Trouble{tr("A picture of %1 by %2 pixels is too small for its words; the least is %3 by %4.")
                           .arg(size.width())
                           .arg(size.height())
                           .arg(kLeast.width())
                           .arg(kLeast.height())
                           .toStdString()};
    }
    // The workbench wants a document of its own to work on; the caller's stays untouched.
    Document copy;
    copy.begin(document.scenario(), document.path(), true);
    Workbench bench(copy);
    bench.showTier(tier, candidate);
    BenchPlots plots;
    QPalette paper = plots.palette();
    paper.setColor(QPalette::Window, Look::light().paper); // Pictures go on paper, whatever the screen looks like.
    plots.setPalette(paper);
    plots.resize(size);
    plots.setWorkbench(&bench);

    const QString heading = benchHeading(bench);
    const Reading r = reading(bench.worked(), bench.currency());
    const QFont font = plots.font();
    const Look& look = Look::light();
    return savePicture(path, size, heading, [&](QCPPainter& painter) {
        paintPicturePage(painter, size, font, look, heading, [&](const QRect& where) {
            const int used = paintReading(painter, where.adjusted(kSide, 0, -kSide, 0), r, font, look) + 8;
            plots.paintInto(painter, where.adjusted(0, used, 0, 0));
        });
    });
}

} // namespace rungwright
