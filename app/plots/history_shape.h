// SPDX-License-Identifier: GPL-3.0-or-later
// A history as a line of steps, in pixels.
#pragma once

#include <QPolygonF>

#include <cstdint>
#include <functional>
#include <span>
#include <vector>

namespace rungwright
{

/// From `instant` (milliseconds since 1970-01-01T00:00:00Z) on the value holds, until the next point. NaN = undefined from here on.
struct HistoryPoint {
    std::int64_t instant = 0;
    double value = 0;
};

/// A line of steps, as stretches between what is undefined: stretch i goes from line[starts[i]] to where the next one starts.
struct StepLine {
    QPolygonF line;
    std::vector<qsizetype> starts;
};

/// The steps of `points` (by time) up to `endX`. Where several points fall into one column of pixels the line goes there from the least
/// of them to the greatest and on from the last: nothing that would be seen is left out, however many points there are.
StepLine stepLine(std::span<const HistoryPoint> points, double endX, const std::function<double(double)>& xOf,
                  const std::function<double(double)>& yOf);

} // namespace rungwright
