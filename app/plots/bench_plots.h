// SPDX-License-Identifier: GPL-3.0-or-later
// The bench's three plots on one sheet: ladder and curtain side by side on one price axis, thinning below.
#pragma once

#include "curtain_plot.h"
#include "ladder_plot.h"
#include "thinning_plot.h"

#include <QWidget>

namespace rungwright
{

class BenchPlots : public QWidget
{
    Q_OBJECT
public:
    explicit BenchPlots(QWidget* parent = nullptr);

    void setWorkbench(Workbench* bench);
    LadderPlot* ladder() const { return m_ladder; }
    CurtainPlot* curtain() const { return m_curtain; }
    ThinningPlot* thinning() const { return m_thinning; }

    /// Draws the three, laid out for `where`.
    void paintInto(QCPPainter& painter, const QRect& where);
    QSize sizeHint() const override { return {860, 600}; }

protected:
    void resizeEvent(QResizeEvent* event) override;
    void changeEvent(QEvent* event) override;

private:
    struct Places {
        QRect ladder, curtain, thinning;
    };
    Places placesIn(QSize size) const;
    /// The same heading and numbers margins for plots that share an axis, from what is on them.
    void setMargins();
    void layOut();
    void takePriceRange(const QCPRange& range);

    Workbench* m_bench = nullptr;
    Places m_places;
    LadderPlot* m_ladder;
    CurtainPlot* m_curtain;
    ThinningPlot* m_thinning;
};

} // namespace rungwright
