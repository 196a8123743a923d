// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder/skew.h"

#include <cmath>
#include <limits>
#include <numeric>

namespace rungwright
{

namespace
{

constexpr double kEpsilon = std::numeric_limits<double>::epsilon();

bool allEqual(std::span<const double> sorted) { return sorted.empty() || !(sorted.front() < sorted.back()); }

/// `sum` of terms whose magnitudes add up to `magnitude`, or 0 when it cannot be told from rounding.
double orNothing(double sum, double magnitude, std::size_t terms)
{
    return std::abs(sum) <= 4.0 * kEpsilon * static_cast<double>(terms) * magnitude ? 0.0 : sum;
}

/// The mean, taken from the first value on: large prices a few minor units apart lose nothing.
double meanOf(std::span<const double> values)
{
    const double origin = values.front();
    double sum = 0;
    for (double value : values)
        sum += value - origin;
    return origin + sum / static_cast<double>(values.size());
}

} // namespace

bool SkewFigures::signsDisagree() const
{
    bool left = false;
    bool right = false;
    for (const auto& coefficient : {moment, adjusted, medcouple, l}) {
        left = left || (coefficient && *coefficient < 0);
        right = right || (coefficient && *coefficient > 0);
    }
    return left && right;
}

std::optional<double> momentSkewness(std::span<const double> sorted)
{
    if (allEqual(sorted))
        return std::nullopt;
    const double mean = meanOf(sorted);
    double second = 0;
    double third = 0;
    double thirdMagnitude = 0;
    for (double value : sorted) {
        const double d = value - mean;
        second += d * d;
        third += d * d * d;
        thirdMagnitude += std::abs(d * d * d);
    }
    const auto count = static_cast<double>(sorted.size());
    return orNothing(third, thirdMagnitude, sorted.size()) / count / std::pow(second / count, 1.5);
}

std::optional<double> adjustedSkewness(std::span<const double> sorted)
{
    const auto moment = momentSkewness(sorted);
    if (!moment || sorted.size() < 3)
        return std::nullopt;
    const auto count = static_cast<double>(sorted.size());
    return *moment * std::sqrt(count * (count - 1)) / (count - 2);
}

std::optional<double> lSkewness(std::span<const double> sorted)
{
    if (allEqual(sorted) || sorted.size() < 3)
        return std::nullopt;
    // l2 and l3 do not see a shift, so the mean is taken off first and large prices lose nothing.
    const double mean = meanOf(sorted);
    const auto count = static_cast<double>(sorted.size());
    double second = 0;
    double third = 0;
    double thirdMagnitude = 0;
    for (std::size_t i = 0; i < sorted.size(); ++i) {
        const auto j = static_cast<double>(i);
        const double d = sorted[i] - mean;
        const double first = j / (count - 1);
        const double term = 6 * first * ((j - 1) / (count - 2) - 1) * d + d;
        second += (2 * first - 1) * d;
        third += term;
        thirdMagnitude += std::abs(term);
    }
    return orNothing(third, thirdMagnitude, sorted.size()) / second;
}

SkewFigures skewFigures(std::span<const double> sorted)
{
    MedcoupleWorkspace work;
    return skewFigures(sorted, work);
}

SkewFigures skewFigures(std::span<const double> sorted, MedcoupleWorkspace& work)
{
    return {momentSkewness(sorted), adjustedSkewness(sorted), medcouple(sorted, work), lSkewness(sorted)};
}

} // namespace rungwright
