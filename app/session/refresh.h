// SPDX-License-Identifier: GPL-3.0-or-later
// A new unit list brought into an open scenario: what it would change, told before anything changes.
//
// Tiers are matched by site and name, units by name within their tier.
// - Tiers and units that are still there keep their places; new ones follow behind in the list's order. A list that says the same in
//   another order changes nothing.
// - Tiers and units that the list no longer names leave, with whatever hangs on them (a tier with its candidates and its note).
// - The list's price, status, grade, area and vacancy chance replace ours. What it does not say stays: the floor of a tier without one in
//   the list; grades, areas or chances when no unit of the whole list has any (the column is missing).
// - Locks add up: a unit is locked when the list or the desk locked it. A list says nothing that would unlock.
// - A unit that leaves one tier and comes up in exactly one other of its site, under the same name, has moved. What the list does not say
//   of it moves along; changes of candidates do not, for a candidate is a ladder of one tier.
// - A candidate keeps its price of a unit where that differs from what was asked; elsewhere it follows what is asked now. A new unit
//   stands in it at its asking price.
// - Rules stay, those of sites and tiers that the list no longer names too: they hold again when these come back.
// - Notes, models, the candidate chosen and the last sheet handed over stay. "Seen" marks are taken away: it is another week.
#pragma once

#include "outcome.h"
#include "signed_check.h"
#include "unit_list.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <numeric>
#include <vector>

namespace rungwright
{

enum class RefreshKind : unsigned char {
    newTier,
    tierGone,
    newUnit,      ///< Units of new tiers included, moved ones not.
    unitGone,     ///< Units of tiers that leave included, moved ones not.
    movedTier,    ///< The same unit in another tier of its site.
    newlyLet,     ///< Was on offer, is occupied or reserved.
    newlyFree,    ///< Was occupied or reserved, is on offer.
    otherStatus,  ///< Every other change of status: closed, opened, reserved to occupied and back.
    raised,       ///< A higher asking price.
    lowered,      ///< A lower one.
    floorChanged, ///< Of a tier; a floor where none was known included.
    newGrade,
    newArea,
    newChance, ///< Vacancy chance.
    locked,    ///< By the list.
};
inline constexpr std::size_t kRefreshKinds = static_cast<std::size_t>(RefreshKind::locked) + 1;

/// One change, by indices into the plan's lists; -1 = not there, or the tier as a whole is meant.
struct RefreshLine {
    RefreshKind kind = RefreshKind::newUnit;
    int tierBefore = -1;
    int unitBefore = -1;
    int tierAfter = -1;
    int unitAfter = -1;
};

/// What becomes of a price that a candidate had changed.
enum class ChangeFate : unsigned char {
    kept,        ///< The list asks what was asked before.
    clash,       ///< The list asks something else by now, and not what the candidate wants, or it newly locks the unit. The candidate's
                 ///< price is kept.
    nowAsked,    ///< The list asks what the candidate wants.
    unitGone,    ///< Dropped.
    unitMoved,   ///< Dropped: the unit is in another tier now.
    tierDropped, ///< Dropped with the whole candidate.
};
inline constexpr std::size_t kChangeFates = static_cast<std::size_t>(ChangeFate::tierDropped) + 1;

/// A price that a candidate had changed. In plan.before: what was asked, and the candidate's price; in plan.after: what is asked now.
struct CandidateChange {
    ChangeFate fate = ChangeFate::kept;
    int tierBefore = -1;
    int candidate = -1;
    int unitBefore = -1;
    int tierAfter = -1; ///< -1 with unitGone and tierDropped; of a moved unit: where it is now.
    int unitAfter = -1;
};

/// A candidate as a whole.
struct CandidateOutcome {
    int tierBefore = -1;
    int candidate = -1;
    int tierAfter = -1; ///< -1 = it leaves with its tier.
    std::array<std::int64_t, kChangeFates> changes{};

    std::int64_t of(ChangeFate fate) const { return changes[static_cast<std::size_t>(fate)]; }
    std::int64_t dropped() const { return of(ChangeFate::unitGone) + of(ChangeFate::unitMoved) + of(ChangeFate::tierDropped); }
};

/// A tier from which a sheet had been handed over.
struct SignedTier {
    int tierBefore = -1;
    int tierAfter = -1; ///< -1 = gone.
    SignedCheck check;
};

/// So many lines of one kind, and changes of one fate, are kept to be looked at; all are counted.
inline constexpr std::size_t kRefreshLinesKept = 100'000;

/// A refresh, worked out and not yet done: Document::refresh() does it.
struct RefreshPlan {
    Currency currency;          ///< The scenario's from then on.
    bool takesCurrency = false; ///< The scenario names none so far; its amounts have as many decimals.
    TierList before;            ///< The scenario's tiers it was worked out for.
    TierList after;             ///< What they become. Tiers in which nothing changes are one and the same element in both.

    std::array<std::int64_t, kRefreshKinds> counts{};
    std::array<std::vector<RefreshLine>, kRefreshKinds> lines; ///< By kind; tier by tier.
    Price raisedBy;                                            ///< Sum of all rises of an asking price.
    Price loweredBy;                                           ///< Sum of all falls, > 0.
    std::int64_t unitsBefore = 0;
    std::int64_t unitsAfter = 0;
    std::int64_t tiersTouched = 0; ///< Of the tiers that stay: those with at least one line.
    std::int64_t seenCleared = 0;  ///< "Seen" marks taken away from tiers that stay.

    std::vector<CandidateOutcome> candidates; ///< In the order of the tiers.
    std::array<std::int64_t, kChangeFates> changeCounts{};
    std::array<std::vector<CandidateChange>, kChangeFates> changes;

    std::vector<SignedTier> signedTiers;

    std::int64_t count(RefreshKind kind) const { return counts[static_cast<std::size_t>(kind)]; }
    std::int64_t count(ChangeFate fate) const { return changeCounts[static_cast<std::size_t>(fate)]; }
    /// The list says what the scenario says ("seen" marks apart).
    bool changesNothing() const { return !takesCurrency && changesInAll() == 0; }
    std::int64_t changesInAll() const { return std::accumulate(counts.begin(), counts.end(), std::int64_t{0}); }
};

/// Works out what `list` (of that currency, tiers and units each once, as the readers give it) makes of the scenario. For a thread of its
/// own. A scenario that names no currency takes the list's when their decimals agree. Trouble: another currency, an empty list, or
/// `progress` said to stop.
Outcome<RefreshPlan> planRefresh(const Scenario& now, const Currency& currency, std::vector<TierCase> list, const Progress& progress = {});

/// The same comparison without a refresh: every tier from which a sheet had been handed over, against what its scenario asks now.
std::vector<SignedTier> checkSigned(const TierList& tiers);

} // namespace rungwright
