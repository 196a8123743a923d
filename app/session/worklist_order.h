// SPDX-License-Identifier: GPL-3.0-or-later
// Which rows of the worklist are shown, and in which order.
#pragma once

#include "worklist.h"

#include <QSet>
#include <QStringList>

#include <cstdint>
#include <optional>
#include <vector>

namespace rungwright
{

enum class WorklistKey { tier, site, onOffer, floor, cheapest, gap, lean, flags, seen, note };

/// What is to be shown.
struct WorklistWish {
    WorklistKey key = WorklistKey::gap; ///< gap sorts by share: a gap of 10 on 30 is worse than one of 12 on 120.
    bool descending = true;             ///< What is undefined comes last either way; equal rows keep the document's order.
    QStringList words;                  ///< Case folded. Each must be in the site, the name, a flag's word or the note.
    FlagSet anyFlag;                    ///< When not empty: at least one of these.
    bool unseenOnly = false;
    bool pickedOnly = false;
    bool grouped = false; ///< By site: sites in the order of their own figures, and their tiers below them.
    QSet<QString> folded; ///< Sites whose tiers are folded away, when grouped.

    void setWords(const QString& typed);
    bool filters() const { return !words.isEmpty() || !anyFlag.empty() || unseenOnly || pickedOnly; }
};

/// A site's row: of its tiers that pass the filter.
struct SiteSummary {
    int tiers = 0;
    int flagged = 0;
    int unseen = 0;
    std::uint64_t onOffer = 0;
    std::uint64_t rentable = 0;
    std::optional<double> worstShare;
};

/// A tier, or (tier < 0) a site.
struct ShownRow {
    int tier = -1;
    int site = -1;
    bool isSite() const { return tier < 0; }
    bool operator==(const ShownRow&) const = default;
};

struct WorklistArrangement {
    std::vector<ShownRow> rows;
    std::vector<int> tiers;         ///< All tiers that pass the filter in the order shown, folded ones too.
    std::vector<SiteSummary> sites; ///< By index into WorklistNames::sites; only when grouped.
};

/// A number to sort a tier by; nothing when undefined.
std::optional<double> sortNumber(const Worklist& list, int tier, WorklistKey key);

WorklistArrangement arranged(const Worklist& list, const WorklistWish& wish);

} // namespace rungwright
