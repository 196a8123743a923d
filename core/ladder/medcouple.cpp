// SPDX-License-Identifier: GPL-3.0-or-later
// The median of the medcouple's kernel without writing the kernel out.
#include "ladder/skew.h"

#include <algorithm>
#include <functional>
#include <numeric>

namespace rungwright
{

namespace
{

/// The kernel as a matrix that never increases along a row or down a column: rows are the values from the greatest down to the
/// median, columns those from the median down to the least.
class Kernel
{
public:
    explicit Kernel(std::span<const double> sorted) : m_sorted(sorted)
    {
        const std::size_t half = sorted.size() / 2;
        m_median = sorted.size() % 2 == 1 ? sorted[half] : sorted[half - 1] + (sorted[half] - sorted[half - 1]) / 2;
        const auto notBelow = std::ranges::lower_bound(sorted, m_median);
        const auto above = std::ranges::upper_bound(sorted, m_median);
        m_rows = static_cast<std::size_t>(sorted.end() - notBelow);
        m_columns = static_cast<std::size_t>(above - sorted.begin());
        m_tied = static_cast<std::size_t>(above - notBelow);
    }

    std::size_t rows() const { return m_rows; }
    std::size_t columns() const { return m_columns; }

    double operator()(std::size_t row, std::size_t column) const
    {
        const double a = m_sorted[m_sorted.size() - 1 - row] - m_median;
        const double b = m_sorted[m_columns - 1 - column] - m_median;
        if (a == 0 && b == 0) {
            // Both tied at the median: 1, 0 or -1 above, on and below the antidiagonal of the tied block.
            const std::size_t place = row - (m_rows - m_tied) + column + 1;
            return place < m_tied ? 1.0 : place == m_tied ? 0.0 : -1.0;
        }
        return (a + b) / (a - b);
    }

private:
    std::span<const double> m_sorted;
    double m_median = 0;
    std::size_t m_rows = 0;
    std::size_t m_columns = 0;
    std::size_t m_tied = 0;
};

/// The value at which the weights, taken from the greatest value down, first reach half of their sum. Reorders `items`.
double weightedMedian(std::span<MedcoupleWorkspace::Weighted> items)
{
    using Weighted = MedcoupleWorkspace::Weighted;
    const auto add = [](double sum, const Weighted& item) { return sum + item.weight; };
    double wanted = std::accumulate(items.begin(), items.end(), 0.0, add) / 2;
    while (items.size() > 1) {
        const std::size_t half = items.size() / 2;
        const auto middle = items.begin() + static_cast<std::ptrdiff_t>(half);
        std::nth_element(items.begin(), middle, items.end(), [](const Weighted& a, const Weighted& b) { return a.value > b.value; });
        const double before = std::accumulate(items.begin(), middle, 0.0, add);
        if (before >= wanted) {
            items = items.first(half);
        } else {
            wanted -= before;
            items = items.subspan(half);
        }
    }
    return items.front().value;
}

/// Counts by row of the entries that `over` holds for, a staircase walked once from the last row (which has the fewest) up.
template <class Over>
std::size_t countStaircase(const Kernel& kernel, std::vector<std::uint32_t>& counts, Over over)
{
    std::size_t column = 0;
    std::size_t sum = 0;
    for (std::size_t row = kernel.rows(); row-- > 0;) {
        while (column < kernel.columns() && over(kernel(row, column)))
            ++column;
        counts[row] = static_cast<std::uint32_t>(column);
        sum += column;
    }
    return sum;
}

/// Mean of the two entries of ranks `upper` and `lower` (counted from the greatest, lower = upper or upper + 1) once it is known that they
/// are the pivot or its neighbours.
double aroundPivot(const Kernel& kernel, const MedcoupleWorkspace& work, double pivot, std::size_t sumAbove, std::size_t sumNotBelow,
                   std::size_t upper, std::size_t lower)
{
    double upperValue = pivot;
    double lowerValue = pivot;
    if (upper < sumAbove) {
        upperValue = 1;
        for (std::size_t row = 0; row < kernel.rows(); ++row)
            if (work.above[row] > 0)
                upperValue = std::min(upperValue, kernel(row, work.above[row] - 1));
    }
    if (lower >= sumNotBelow) {
        lowerValue = -1;
        for (std::size_t row = 0; row < kernel.rows(); ++row)
            if (work.notBelow[row] < kernel.columns())
                lowerValue = std::max(lowerValue, kernel(row, work.notBelow[row]));
    }
    return (upperValue + lowerValue) / 2;
}

/// So few candidates a row are left to plain selection.
constexpr std::size_t kCandidatesToSort = 4;

double kernelMedian(const Kernel& kernel, std::size_t values, MedcoupleWorkspace& work)
{
    const std::size_t rows = kernel.rows();
    const std::size_t total = rows * kernel.columns();
    const std::size_t upper = (total - 1) / 2;
    const std::size_t lower = total / 2;
    // How many rows there are and how many candidates stay depends on the values; room for the most there can be is asked for at once, so
    // that the same number of values never needs more.
    for (auto* byRow : {&work.first, &work.last, &work.above, &work.notBelow})
        byRow->reserve(values);
    work.rowMedians.reserve(values);
    work.rest.reserve(kCandidatesToSort * values);
    work.first.assign(rows, 0);
    work.last.assign(rows, static_cast<std::uint32_t>(kernel.columns())); // One past the last candidate.
    work.above.resize(rows);
    work.notBelow.resize(rows);

    // Every pass drops at least a quarter of the candidates left, so that few passes over the rows are needed.
    std::size_t dropped = 0; // Candidates known to be greater than both wanted ones.
    std::size_t kept = total;
    while (kept > kCandidatesToSort * rows) {
        work.rowMedians.clear();
        for (std::size_t row = 0; row < rows; ++row)
            if (work.first[row] < work.last[row])
                work.rowMedians.push_back(
                    {kernel(row, (work.first[row] + work.last[row] - 1) / 2), static_cast<double>(work.last[row] - work.first[row])});
        const double pivot = weightedMedian(work.rowMedians);
        const std::size_t sumAbove = countStaircase(kernel, work.above, [pivot](double h) { return h > pivot; });
        const std::size_t sumNotBelow = countStaircase(kernel, work.notBelow, [pivot](double h) { return h >= pivot; });
        if (lower < sumAbove) {
            work.last.swap(work.above);
            kept = sumAbove - dropped;
        } else if (upper >= sumNotBelow) {
            work.first.swap(work.notBelow);
            kept -= sumNotBelow - dropped;
            dropped = sumNotBelow;
        } else {
            return aroundPivot(kernel, work, pivot, sumAbove, sumNotBelow, upper, lower);
        }
    }

    work.rest.clear();
    for (std::size_t row = 0; row < rows; ++row)
        for (std::size_t column = work.first[row]; column < work.last[row]; ++column)
            work.rest.push_back(kernel(row, column));
    const auto at = work.rest.begin() + static_cast<std::ptrdiff_t>(lower - dropped);
    std::nth_element(work.rest.begin(), at, work.rest.end(), std::greater<>());
    const double lowerValue = *at;
    const double upperValue = upper == lower ? lowerValue : *std::min_element(work.rest.begin(), at);
    return (upperValue + lowerValue) / 2;
}

} // namespace

std::optional<double> medcouple(std::span<const double> sorted)
{
    MedcoupleWorkspace work;
    return medcouple(sorted, work);
}

std::optional<double> medcouple(std::span<const double> sorted, MedcoupleWorkspace& work)
{
    if (sorted.size() < 3 || !(sorted.front() < sorted.back()))
        return std::nullopt;
    return kernelMedian(Kernel(sorted), sorted.size(), work);
}

} // namespace rungwright
