// SPDX-License-Identifier: GPL-3.0-or-later
// Ladders ranked by what the user says matters.
#pragma once

#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// One thing that matters, for all that are ranked.
struct Criterion {
    std::vector<std::optional<double>> values; ///< One for each; nothing where it is undefined.
    double weight = 0;                         ///< >= 0; 0 = does not matter.
    bool lowerIsBetter = true;
};

/// Points from 0 to 1. Each criterion is scaled between its least and its greatest value among those ranked, so that the best gets 1 and
/// the worst 0 (min-max scaling; where all are equal, each gets 1), and the scaled values are averaged by weight. The points belong to
/// this comparison: with another ladder in it they change, and even the order may. Nothing for one that lacks a value that matters, and
/// for all when nothing matters. All criteria hold as many values.
std::vector<std::optional<double>> weightedScores(std::span<const Criterion> criteria);

/// 1 = most points; equal points (to twelve digits) share a place. 0 for those without.
std::vector<int> placesByScore(std::span<const std::optional<double>> scores);

} // namespace rungwright
