// SPDX-License-Identifier: GPL-3.0-or-later
#include "bench_plots.h"

#include <QResizeEvent>
#include <QtMath>

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr int kUnder = 8;        ///< Between an axis's numbers and the widget's edge.
constexpr int kCurtainLeft = 16; ///< The curtain begins right beside the ladder.
constexpr int kRight = 22;       ///< Half of "100 %" reaches beyond the area.

} // namespace

BenchPlots::BenchPlots(QWidget* parent) :
    QWidget(parent), m_ladder(new LadderPlot(this)), m_curtain(new CurtainPlot(this)), m_thinning(new ThinningPlot(this))
{
    setObjectName(QStringLiteral("benchPlots"));
    setMinimumSize(600, 380);
    setSizePolicy(QSizePolicy::Expanding, QSizePolicy::Expanding);
    connect(m_ladder, &LadderPlot::priceRangeChanged, this, &BenchPlots::takePriceRange);
    setTabOrder(m_ladder, m_thinning);
    setFocusProxy(m_ladder);
    layOut();
}

void BenchPlots::setWorkbench(Workbench* bench)
{
    if (m_bench)
        m_bench->disconnect(this);
    m_bench = bench;
    m_ladder->setWorkbench(bench);
    m_curtain->setWorkbench(bench);
    m_curtain->setPriceRange(m_ladder->priceRange());
    m_thinning->setWorkbench(bench);
    // After the plots' own connections: their ranges are new by then.
    if (bench)
        connect(bench, &Workbench::reset, this, &BenchPlots::layOut);
    layOut();
}

BenchPlots::Places BenchPlots::placesIn(QSize size) const
{
    const int curtain = std::clamp(size.width() * 26 / 100, 190, 420);
    const int thinning = std::clamp(size.height() * 27 / 100, 112, 230);
    const int upper = size.height() - thinning;
    return {QRect(0, 0, size.width() - curtain, upper), QRect(size.width() - curtain, 0, curtain, upper),
            QRect(0, upper, size.width(), thinning)};
}

void BenchPlots::setMargins()
{
    const int line = QFontMetrics(font()).height();
    const int rows = m_ladder->headingRows(m_places.ladder.width() - 16);
    const int heading = kHeadingTop + qCeil(LadderLegend::height(rows, font())) + 8;
    const int under = line + 6 + kUnder;
    const int left = std::max(m_ladder->numbersWidth(), m_thinning->numbersWidth());
    m_ladder->setAreaMargins(QMargins(left, heading, 4, under));
    m_curtain->setAreaMargins(QMargins(kCurtainLeft, heading, kRight, under));
    m_thinning->setAreaMargins(QMargins(left, kHeadingTop + line + 4, kRight, under));
}

void BenchPlots::layOut()
{
    m_places = placesIn(size());
    setMargins();
    m_ladder->setGeometry(m_places.ladder);
    m_curtain->setGeometry(m_places.curtain);
    m_thinning->setGeometry(m_places.thinning);
    for (PaperPlot* plot : {static_cast<PaperPlot*>(m_ladder), static_cast<PaperPlot*>(m_curtain), static_cast<PaperPlot*>(m_thinning)})
        plot->redrawAll();
}

void BenchPlots::takePriceRange(const QCPRange& range)
{
    m_curtain->setPriceRange(range);
    // Finer or longer numbers may want more room.
    if (std::max(m_ladder->numbersWidth(), m_thinning->numbersWidth()) != m_ladder->areaMargins().left()) {
        setMargins();
        m_thinning->redrawAll();
    }
}

void BenchPlots::resizeEvent(QResizeEvent* event)
{
    QWidget::resizeEvent(event);
    layOut();
}

void BenchPlots::changeEvent(QEvent* event)
{
    QWidget::changeEvent(event);
    if (event->type() == QEvent::FontChange || event->type() == QEvent::StyleChange || event->type() == QEvent::LocaleChange)
        QMetaObject::invokeMethod(this, &BenchPlots::layOut, Qt::QueuedConnection); // The plots take the new font first.
}

void BenchPlots::paintInto(QCPPainter& painter, const QRect& where)
{
    m_places = placesIn(where.size());
    setMargins();
    const Places places = m_places;
    // The ladder first: it sets the price range for its height, which the curtain takes over.
    m_ladder->paintInto(painter, places.ladder.translated(where.topLeft()));
    m_curtain->paintInto(painter, places.curtain.translated(where.topLeft()));
    m_thinning->paintInto(painter, places.thinning.translated(where.topLeft()));
    layOut();
}

} // namespace rungwright
