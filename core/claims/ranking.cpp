// SPDX-License-Identifier: GPL-3.0-or-later
#include "claims/ranking.h"

#include <algorithm>
#include <cassert>

namespace rungwright
{

std::vector<std::optional<double>> weightedScores(std::span<const Criterion> criteria)
{
    double weights = 0;
    for (const Criterion& criterion : criteria)
        weights += criterion.weight;
    const std::size_t count = criteria.empty() ? 0 : criteria.front().values.size();
    std::vector<std::optional<double>> scores(count);
    if (!(weights > 0))
        return scores;
    scores.assign(count, 0.0);
    for (const Criterion& criterion : criteria) {
        assert(criterion.values.size() == count);
        if (!(criterion.weight > 0))
            continue;
        std::optional<double> least;
        std::optional<double> most;
        for (const auto& value : criterion.values) {
            if (!value)
                continue;
            least = std::min(least.value_or(*value), *value);
            most = std::max(most.value_or(*value), *value);
        }
        for (std::size_t i = 0; i < count; ++i) {
            const auto& value = criterion.values[i];
            if (!value) {
                scores[i].reset();
            } else if (scores[i]) {
                const double up = *most > *least ? (*value - *least) / (*most - *least) : 1.0;
                const double scaled = criterion.lowerIsBetter && *most > *least ? 1.0 - up : up;
                *scores[i] += criterion.weight / weights * scaled;
            }
        }
    }
    return scores;
}

std::vector<int> placesByScore(std::span<const std::optional<double>> scores)
{
    constexpr double same = 1e-12;
    std::vector<int> places;
    places.reserve(scores.size());
    for (const auto& score : scores) {
        const auto better = std::ranges::count_if(scores, [&](const auto& other) { return score && other && *other > *score + same; });
        places.push_back(score ? static_cast<int>(better) + 1 : 0);
    }
    return places;
}

} // namespace rungwright
