// SPDX-License-Identifier: GPL-3.0-or-later
// What can be said of a ladder without any model of who comes and what is left.
#pragma once

#include "ladder/ladder.h"
#include "ladder/skew.h"

#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Figures of a sorted ladder against its advertised floor. Amounts are in minor units (floating point only where a
/// mean is taken). Everything but `count`, `total` and `inversions` is undefined (empty) for an empty ladder.
struct LadderFigures {
    std::size_t count = 0;
    std::optional<Price> lowest;
    std::optional<Price> highest;
    std::optional<Price> width; ///< Highest minus advertised floor; negative when the floor lies above all.
    std::optional<double> mean;
    std::optional<double> median;       ///< The usual one: mean of the middle two when the count is even.
    Price total;                        ///< Asking total.
    std::optional<double> meanStanding; ///< (mean - s) / (highest - s); undefined unless highest > s.
    SkewFigures skew;
    std::size_t inversions = 0; ///< See countInversions().
};

/// Scratch storage, kept by a caller that measures again and again.
struct FiguresWorkspace {
    std::vector<double> values;
    std::vector<int> grades, merged;
    MedcoupleWorkspace medcouple;
};

/// `sorted` must be in order of price (asserted in debug builds). `units` gives the grades.
LadderFigures ladderFigures(std::span<const Rung> sorted, std::span<const Unit> units, Price advertisedFloor);
LadderFigures ladderFigures(std::span<const Rung> sorted, std::span<const Unit> units, Price advertisedFloor, FiguresWorkspace& work);

/// Inversions of grade: the number of pairs in which the unit of strictly higher grade is asked for strictly less.
/// Units without a grade take part in no pair. O(m log m).
std::size_t countInversions(std::span<const Rung> sorted, std::span<const Unit> units);
std::size_t countInversions(std::span<const Rung> sorted, std::span<const Unit> units, FiguresWorkspace& work);

} // namespace rungwright
