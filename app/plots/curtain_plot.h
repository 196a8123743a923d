// SPDX-License-Identifier: GPL-3.0-or-later
// The curtain: the chance that nothing on offer costs less than a price. The area above the floor is the gap.
#pragma once

#include "curtain_shape.h"
#include "paper_plot.h"
#include "workbench.h"

#include <QPointer>

namespace rungwright
{

/// x = chance, 0 to 1; y = the ladder's price axis, whose range it is given. Numbers of the price axis stand at the ladder.
class CurtainPlot : public PaperPlot
{
    Q_OBJECT
public:
    explicit CurtainPlot(QWidget* parent = nullptr);

    void setWorkbench(Workbench* bench);
    void setPriceRange(const QCPRange& range);
    /// Where the words for the area stand; null when there is no area.
    QRectF areaLabel() const { return m_label; }

protected:
    void paintFrame(QPainter& painter) override;
    void paintBelow(QPainter& painter) override;
    void paintAbove(QPainter& painter) override;
    void areaChanged() override;
    void lookChanged() override;

private:
    bool shows() const { return m_bench && m_bench->tierCase(); }
    CurtainFrame frame() const;
    void onReset();
    void onMoving();
    void placeLabel();

    QPointer<Workbench> m_bench;
    QSharedPointer<QCPAxisTicker> m_priceTicks;
    CurtainShape m_worked;
    CurtainShape m_current;
    QRectF m_label;
    QString m_labelText;
};

} // namespace rungwright
