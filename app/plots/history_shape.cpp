// SPDX-License-Identifier: GPL-3.0-or-later
#include "history_shape.h"

#include <algorithm>
#include <cmath>
#include <utility>

namespace rungwright
{

StepLine stepLine(std::span<const HistoryPoint> points, double endX, const std::function<double(double)>& xOf,
                  const std::function<double(double)>& yOf)
{
    StepLine steps;
    bool open = false;
    double level = 0;
    const auto add = [&](double x, double y) {
        if (!std::exchange(open, true))
            steps.starts.push_back(steps.line.size());
        steps.line.append(QPointF(x, y));
    };
    for (std::size_t i = 0; i < points.size();) {
        const double x = xOf(static_cast<double>(points[i].instant));
        const double column = std::floor(x);
        double low = 0;
        double high = 0;
        bool any = false;
        bool ends = false;
        double last = 0;
        for (; i < points.size() && std::floor(xOf(static_cast<double>(points[i].instant))) <= column; ++i) {
            ends = std::isnan(points[i].value);
            if (ends)
                continue;
            last = yOf(points[i].value);
            low = any ? std::min(low, last) : last;
            high = any ? std::max(high, last) : last;
            any = true;
        }
        if (open)
            add(x, level);
        if (any) {
            add(x, low);
            if (high > low)
                add(x, high);
            if (high > low && last < high)
                add(x, last);
            level = last;
        }
        if (ends)
            open = false;
    }
    if (open)
        add(std::max(endX, steps.line.back().x()), level);
    return steps;
}

} // namespace rungwright
