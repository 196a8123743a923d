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
    noFloor,         ///< fitted: the range begins at the advertised floor, and none is known.
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

/// What a model works with once everything that was not set is inferred from the tier; `note` says why it cannot be.
struct Settled {
    std::optional<int> left;    ///< perceived, fitted, remainder; >= 1.
    std::optional<double> load; ///< turnover; > 0.
    double share = 0;           ///< unit: the tier's share on offer, for units without a chance of their own.
    std::optional<OddsNote> note;
};

/// `ladder` as for cheapestOdds.
///  perceived, fitted  need a unit on offer.
///  remainder          needs a rentable unit, and one on offer unless `left` is set.
///  unit               needs a rentable unit with a chance above 0.
///  turnover           needs a rentable unit and, unless `load` is set, at least one taken and one on offer.
///  onHand             needs a unit on offer.
Settled settled(std::span<const Rung> ladder, std::span<const Unit> units, const ModelSettings& settings);

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

/// By place on the ladder, each unit's own chance to be the cheapest found: a block of tied prices shares its odds evenly. Empty when
/// the odds are undefined.
std::vector<double> sharedAmongTies(std::span<const Rung> ladder, const CheapestOdds& odds);

} // namespace rungwright
