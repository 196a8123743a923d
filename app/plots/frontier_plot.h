// SPDX-License-Identifier: GPL-3.0-or-later
// The trade-off: the smallest gap for an amount of change, with the ladders there are as named points.
#pragma once

#include "axis_ticks.h"
#include "ladder/currency.h"
#include "paper_plot.h"
#include "reshape/frontier.h"

#include <optional>
#include <vector>

namespace rungwright
{

/// What the plot draws, traced by whoever shows it. Amounts in minor units.
struct FrontierPicture {
    /// What the gap is shown against: change of prices a unit (root mean square), or change of the asking total.
    enum class Against { prices, total };

    /// A ladder there is already.
    struct Mark {
        QString name;
        int candidate = -1; ///< -1 = the current ladder.
        double gap = 0;
        double amount = 0;
    };

    Against against = Against::prices;
    Currency currency;
    Price floor;
    Price total;                      ///< Asking total of today.
    std::vector<FrontierPoint> curve; ///< Without undefined gaps.
    std::vector<Mark> marks;          ///< The current ladder first; without those whose gap is undefined.
    int worked = -1;                  ///< The candidate on the bench, drawn stronger.
    QString heading;
    QString note; ///< Why there is no curve, in a sentence.

    double amountOf(const FrontierPoint& point) const { return against == Against::prices ? point.rmsChange : point.totalChange; }
};

/// Pointing reads a point of the curve out, a click takes its ladder; pointing at a named ladder reads that one, a click puts it on the
/// bench. Keys: Left and Right walk along the curve, Page Up and Page Down by five, Home and End to its ends, Up and Down through the
/// named ladders; Enter takes.
class FrontierPlot : public PaperPlot
{
    Q_OBJECT
public:
    explicit FrontierPlot(QWidget* parent = nullptr);

    void show(FrontierPicture picture);
    using PaperPlot::show;
    const FrontierPicture& picture() const { return m_picture; }

    /// Where a point of the curve and a named ladder are, in widget pixels.
    QPointF placeOf(int point) const;
    QPointF placeOfMark(int mark) const;
    /// What is said of them when they are pointed at.
    QString pointText(int point) const;
    QString markText(int mark) const;

signals:
    /// The ladder of a point of the curve is wanted.
    void pointTaken(int point);
    /// A ladder there is already.
    void candidateChosen(int candidate);
    void copyTableWanted();
    void saveTableWanted();

protected:
    void paintFrame(QPainter& painter) override;
    void paintMarks(QPainter& painter) override;
    void paintAbove(QPainter& painter) override;
    void areaChanged() override;
    void lookChanged() override;
    void extendMenu(QMenu& menu) override;

    void mousePressEvent(QMouseEvent* event) override;
    void mouseMoveEvent(QMouseEvent* event) override;
    void mouseReleaseEvent(QMouseEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    void leaveEvent(QEvent* event) override;
    void focusInEvent(QFocusEvent* event) override;
    void focusOutEvent(QFocusEvent* event) override;

private:
    /// One thing that can be pointed at: a point of the curve or a named ladder.
    struct Spot {
        int point = -1;
        int mark = -1;
        bool none() const { return point < 0 && mark < 0; }
        bool operator==(const Spot&) const = default;
    };

    void fitRanges();
    void describe();
    Spot spotAt(QPointF at) const;
    void setSpot(Spot spot);
    void take(Spot spot);
    QString spotText(Spot spot) const;
    QString amountTitle() const;
    QString gapText(double gap) const;
    QPointF place(double amount, double gap) const { return {xAxis->coordToPixel(amount), yAxis->coordToPixel(gap)}; }
    int points() const { return static_cast<int>(m_picture.curve.size()); }
    int marks() const { return static_cast<int>(m_picture.marks.size()); }
    void paintCurveLine(QPainter& painter) const;
    void paintNamed(QPainter& painter) const;
    void paintSpot(QPainter& painter) const;

    FrontierPicture m_picture;
    QSharedPointer<MoneyTicks> m_amountTicks;
    QSharedPointer<MoneyTicks> m_gapTicks;
    Spot m_spot;    ///< What is read out.
    Spot m_pressed; ///< What the button went down on.
};

} // namespace rungwright
