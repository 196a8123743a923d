// SPDX-License-Identifier: GPL-3.0-or-later
// Amounts over time, as the sign-offs of a tier left them.
#pragma once

#include "axis_ticks.h"
#include "history_shape.h"
#include "paper_plot.h"

#include <optional>
#include <vector>

namespace rungwright
{

/// One amount over time, in minor units. Told apart by line style and by the shape of its marks, not by colour alone.
struct HistorySeries {
    enum class Kind {
        floor,    ///< Dashed, squares.
        cheapest, ///< Solid, discs.
        gap,      ///< Solid over a filled area, triangles.
        unit,     ///< Dotted, diamonds.
    };
    Kind kind = Kind::floor;
    QString name;
    std::vector<HistoryPoint> points;
};

/// A sign-off on the time axis.
struct HistoryMark {
    std::int64_t instant = 0;
    std::int64_t id = 0;
};

struct HistoryPicture {
    std::vector<HistorySeries> series;
    std::vector<HistoryMark> marks; ///< By time.
    Currency currency;
    std::int64_t until = 0; ///< Where the lines end: now.
    bool fromZero = false;  ///< The axis of amounts begins at zero.
    QString title;          ///< Of the axis of amounts.
};

/// x = time (shown as local time), y = amount. A stroke at the foot for every sign-off; a mark on each line where they do not crowd. A
/// click chooses the nearest sign-off, Left and Right the one before and the next, Home and End the first and the last.
class HistoryPlot : public PaperPlot
{
    Q_OBJECT
public:
    explicit HistoryPlot(QWidget* parent = nullptr);

    void setPicture(HistoryPicture picture);
    const HistoryPicture& picture() const { return m_picture; }
    /// Rings the sign-off; none for an id that is not there.
    void choose(std::int64_t id);
    std::optional<std::int64_t> chosen() const;
    /// Pixels the numbers of the axis want, and how many they get: plots over each other share one time axis.
    int numbersWidth() const;
    void setNumbersWidth(int pixels);
    /// Where an instant is, in widget pixels.
    double xOf(std::int64_t instant) const { return xAxis->coordToPixel(static_cast<double>(instant) / 1000.0); }
    /// What is drawn of a series.
    const std::vector<StepLine>& lines() const { return m_lines; }

signals:
    void signOffChosen(qint64 id);

protected:
    void paintFrame(QPainter& painter) override;
    void paintMarks(QPainter& painter) override;
    void paintAbove(QPainter& painter) override;
    void areaChanged() override;
    void lookChanged() override;
    bool event(QEvent* event) override;
    void mousePressEvent(QMouseEvent* event) override;
    void keyPressEvent(QKeyEvent* event) override;
    void focusInEvent(QFocusEvent* event) override;
    void focusOutEvent(QFocusEvent* event) override;

private:
    void fitMargins();
    void fitRange();
    void describe();
    int nearest(double x) const;
    void take(int mark);
    QPen penOf(HistorySeries::Kind kind) const;
    QString markText(int mark) const;
    void paintShape(QPainter& painter, HistorySeries::Kind kind, QPointF at, double size) const;
    int paintLegend(QPainter& painter, double right) const;
    std::optional<double> valueAt(const HistorySeries& series, std::int64_t instant) const;

    HistoryPicture m_picture;
    std::vector<StepLine> m_lines; ///< By series.
    QSharedPointer<MoneyTicks> m_amounts;
    QSharedPointer<QCPAxisTickerDateTime> m_times;
    int m_numbers = 40;
    int m_chosen = -1; ///< Index into marks.
};

} // namespace rungwright
