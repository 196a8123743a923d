// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder/figures.h"

#include <algorithm>
#include <cassert>
#include <functional>

namespace rungwright
{

namespace
{

/// Sorts `grades` downwards; returns in how many pairs the later one was greater.
std::size_t sortAndCount(std::span<int> grades, std::span<int> merged)
{
    if (grades.size() < 2)
        return 0;
    const std::size_t half = grades.size() / 2;
    std::size_t pairs = sortAndCount(grades.first(half), merged.first(half)) + sortAndCount(grades.subspan(half), merged.subspan(half));
    std::size_t left = 0;
    std::size_t right = half;
    for (int& next : merged) {
        const bool takeLeft = right == grades.size() || (left < half && grades[left] >= grades[right]);
        if (!takeLeft)
            pairs += half - left;
        next = takeLeft ? grades[left++] : grades[right++];
    }
    std::ranges::copy(merged, grades.begin());
    return pairs;
}

} // namespace

LadderFigures ladderFigures(std::span<const Rung> sorted, std::span<const Unit> units, Price advertisedFloor)
{
    FiguresWorkspace work;
    return ladderFigures(sorted, units, advertisedFloor, work);
}

LadderFigures ladderFigures(std::span<const Rung> sorted, std::span<const Unit> units, Price advertisedFloor, FiguresWorkspace& work)
{
    assert(std::ranges::is_sorted(sorted, {}, &Rung::price));
    LadderFigures figures;
    figures.count = sorted.size();
    if (sorted.empty())
        return figures;

    work.values.clear();
    for (const Rung& rung : sorted) {
        figures.total += rung.price;
        work.values.push_back(static_cast<double>(rung.price.minor));
    }
    const std::size_t half = sorted.size() / 2;
    const Price highest = sorted.back().price;
    const double mean = static_cast<double>(figures.total.minor) / static_cast<double>(sorted.size());
    figures.lowest = sorted.front().price;
    figures.highest = highest;
    figures.width = highest - advertisedFloor;
    figures.mean = mean;
    figures.median = sorted.size() % 2 == 1 ? work.values[half] : (work.values[half - 1] + work.values[half]) / 2;
    if (highest > advertisedFloor)
        figures.meanStanding = (mean - static_cast<double>(advertisedFloor.minor)) / static_cast<double>(figures.width->minor);
    figures.skew = skewFigures(work.values, work.medcouple);
    figures.inversions = countInversions(sorted, units, work);
    return figures;
}

std::size_t countInversions(std::span<const Rung> sorted, std::span<const Unit> units)
{
    FiguresWorkspace work;
    return countInversions(sorted, units, work);
}

std::size_t countInversions(std::span<const Rung> sorted, std::span<const Unit> units, FiguresWorkspace& work)
{
    // From the dearest rung down, higher grades should come first. Within one price the grades are put in that order, so that no pair of
    // equal prices counts; what is left to count is pairs out of order.
    work.grades.clear();
    auto blockStart = sorted.rbegin();
    std::size_t blockGrades = 0;
    const auto closeBlock = [&] {
        std::sort(work.grades.begin() + static_cast<std::ptrdiff_t>(blockGrades), work.grades.end(), std::greater<>());
    };
    for (auto rung = sorted.rbegin(); rung != sorted.rend(); ++rung) {
        if (rung->price != blockStart->price) {
            closeBlock();
            blockStart = rung;
            blockGrades = work.grades.size();
        }
        if (const auto& grade = units[rung->unit].grade)
            work.grades.push_back(*grade);
    }
    closeBlock();
    work.merged.resize(work.grades.size());
    return sortAndCount(work.grades, work.merged);
}

} // namespace rungwright
