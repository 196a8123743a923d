// SPDX-License-Identifier: GPL-3.0-or-later
// The central abstraction: sorted ladder -> cheapest odds.
#pragma once

#include "cheapest/model.h"

#include <optional>
#include <span>
#include <string>
#include <vector>

namespace rungwright
{

/// Why a model has no odds, or what the user should know of them.
enum class OddsNote : unsigned char {
    nothingOnOffer,  ///< No unit on offer: what an enquirer finds is undefined.
    nothingRentable, ///< No rentable unit.
    tierFull,        ///< turnover: every rentable unit is taken, the load cannot be inferred.
    tierEmpty,       ///< turnover: no unit is taken, the load cannot be inferred.
    fitNotFeasible,  ///< fitted: variance >= mean (1 - mean) on the unit scale, or the prices do not lie in [floor, highest] with some
                     ///< spread.
    neverFree,       ///< unit: every chance is 0.
};

/// For each rung of a sorted ladder the probability that it is the cheapest unit found. perRung sums to 1 - none (to
/// rounding), is never negative, and belongs to places on the ladder: among tied prices only the block's sum has a meaning.
/// Empty perRung when undefined (see note).
struct CheapestOdds {
    std::vector<double> perRung;
    double none = 1.0;          ///< Probability that nothing is on offer.
    std::optional<int> left;    ///< The N or k used, where the model has one.
    std::optional<double> load; ///< The offered load used (turnover).
    std::optional<OddsNote> note;

    bool defined() const { return !perRung.empty(); }
};

/// Odds of `ladder`, the sorted units that modelUnits(settings.kind) names, in a tier of `units`. Reuses `out`'s storage.
///
///  perceived  w_i = ((m-i+1)/m)^N - ((m-i)/m)^N: independent draws from the ladder's empirical distribution.
///  remainder  w_1 = k/M, w_{i+1} = w_i (M-i-k+1)/(M-i): the ratio form of C(M-i, k-1)/C(M, k); each step one rounding, no factorial.
///  unit       w_i = a_i prod_{j<i} (1-a_j).
///  turnover   w_i = B(i-1, a) - B(i, a), Erlang B of the first i rungs; none = B(M, a). Cooper, Introduction to Queueing
///             Theory (2nd ed. 1981) on ordered hunting (from memory). The stay may have any distribution with a finite mean.
///  onHand     w_1 = 1.
///  fitted     has no odds of its own on rungs: gives those of `perceived`, which the curtain's steps show; the expected
///             cheapest of the fitted form comes from fitted.h.
void cheapestOdds(std::span<const Rung> ladder, std::span<const Unit> units, const ModelSettings& settings, CheapestOdds& out);

/// Each unit's own chance to be the cheapest found: a block of tied prices shares its odds evenly.
std::vector<double> sharedAmongTies(std::span<const Rung> ladder, const CheapestOdds& odds);

} // namespace rungwright
