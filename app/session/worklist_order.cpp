// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_order.h"

#include <algorithm>
#include <array>

namespace rungwright
{

namespace
{

struct Keyed {
    double key = 0;
    bool defined = false;
    int index = 0;
};

Keyed keyed(std::optional<double> key, int index) { return {key.value_or(0.0), key.has_value(), index}; }

void sortKeyed(std::vector<Keyed>& all, bool descending)
{
    const auto before = [descending](const Keyed& a, const Keyed& b) {
        if (a.defined != b.defined)
            return a.defined;
        return descending ? a.key > b.key : a.key < b.key;
    };
    std::stable_sort(all.begin(), all.end(), before);
}

/// The filter, with what it needs for every tier made ready.
class Filter
{
public:
    Filter(const Worklist& list, const WorklistWish& wish) : m_list(list), m_wish(wish) {}

    bool takes(int tier)
    {
        if (m_wish.pickedOnly && !m_list.isPicked(tier))
            return false;
        const TierCase& tierCase = m_list.tierCase(tier);
        if (m_wish.unseenOnly && tierCase.seen)
            return false;
        const FlagSet flags = m_list.flags(tier);
        if (!m_wish.anyFlag.empty() && !flags.meets(m_wish.anyFlag))
            return false;
        if (m_wish.words.isEmpty())
            return true;
        const QString names = m_list.searchText(tier);
        const QString& flagged = words(flags);
        const QString note = tierCase.note.empty() ? QString() : QString::fromStdString(tierCase.note).toCaseFolded();
        const auto there = [&](const QString& word) { return names.contains(word) || flagged.contains(word) || note.contains(word); };
        return std::all_of(m_wish.words.begin(), m_wish.words.end(), there);
    }

private:
    const QString& words(FlagSet flags)
    {
        QString& known = m_flagWords[flags.bits()];
        if (known.isEmpty() && !flags.empty())
            known = flagWords(flags).toCaseFolded();
        return known;
    }

    const Worklist& m_list;
    const WorklistWish& m_wish;
    std::array<QString, 256> m_flagWords;
};

/// What a site is sorted by: its worst, its sum or its number, whichever the column is about.
std::optional<double> siteNumber(const Worklist& list, int site, const SiteSummary& sum, WorklistKey key, std::optional<double> least)
{
    switch (key) {
    case WorklistKey::tier:
    case WorklistKey::site:
        return list.ranks().site[static_cast<std::size_t>(site)];
    case WorklistKey::onOffer:
        return static_cast<double>(sum.onOffer);
    case WorklistKey::gap:
        return sum.worstShare;
    case WorklistKey::flags:
        return sum.flagged;
    case WorklistKey::seen:
        return -sum.unseen;
    case WorklistKey::floor:
    case WorklistKey::cheapest:
    case WorklistKey::lean:
    case WorklistKey::note:
        return least;
    }
    return {};
}

void add(SiteSummary& sum, const Worklist& list, int tier)
{
    const WorklistRow& row = list.row(tier);
    ++sum.tiers;
    sum.flagged += list.flags(tier).empty() ? 0 : 1;
    sum.unseen += list.tierCase(tier).seen ? 0 : 1;
    sum.onOffer += row.onOffer;
    sum.rentable += row.rentable;
    if (row.share && (!sum.worstShare || *row.share > *sum.worstShare))
        sum.worstShare = row.share;
}

void group(const Worklist& list, const WorklistWish& wish, WorklistArrangement& made)
{
    const std::vector<std::uint32_t>& siteOf = list.names().site;
    const std::size_t sites = list.names().sites.size();
    made.sites.assign(sites, {});
    std::vector<std::vector<int>> members(sites);
    std::vector<std::optional<double>> least(sites);
    for (const int tier : made.tiers) {
        const std::size_t site = siteOf[static_cast<std::size_t>(tier)];
        add(made.sites[site], list, tier);
        members[site].push_back(tier);
        const auto key = sortNumber(list, tier, wish.key);
        if (key && (!least[site] || *key < *least[site]))
            least[site] = key;
    }
    std::vector<Keyed> order;
    for (std::size_t site = 0; site < sites; ++site) {
        if (!members[site].empty())
            order.push_back(
                keyed(siteNumber(list, static_cast<int>(site), made.sites[site], wish.key, least[site]), static_cast<int>(site)));
    }
    sortKeyed(order, wish.descending);
    made.tiers.clear();
    for (const Keyed& at : order) {
        const auto site = static_cast<std::size_t>(at.index);
        made.rows.push_back({-1, at.index});
        const bool folded = wish.folded.contains(list.names().sites[site]);
        for (const int tier : members[site]) {
            made.tiers.push_back(tier);
            if (!folded)
                made.rows.push_back({tier, at.index});
        }
    }
}

} // namespace

void WorklistWish::setWords(const QString& typed) { words = typed.toCaseFolded().simplified().split(QLatin1Char(' '), Qt::SkipEmptyParts); }

std::optional<double> sortNumber(const Worklist& list, int tier, WorklistKey key)
{
    const auto at = static_cast<std::size_t>(tier);
    const WorklistRow& row = list.row(tier);
    const TierCase& tierCase = list.tierCase(tier);
    switch (key) {
    case WorklistKey::tier:
        return list.ranks().tier[at];
    case WorklistKey::site:
        return list.ranks().site[list.names().site[at]];
    case WorklistKey::seen:
        return tierCase.seen ? 1.0 : 0.0;
    case WorklistKey::note:
        return tierCase.note.empty() ? 1.0 : 0.0;
    case WorklistKey::floor:
        return tierCase.tier.hasFloor() ? std::optional(static_cast<double>(tierCase.tier.advertisedFloor.minor)) : std::nullopt;
    case WorklistKey::onOffer:
        return row.measured ? std::optional<double>(row.onOffer) : std::nullopt;
    case WorklistKey::cheapest:
        return row.cheapest;
    case WorklistKey::gap:
        return row.share;
    case WorklistKey::lean:
        return row.lean;
    case WorklistKey::flags:
        return row.measured ? std::optional<double>(list.flags(tier).count()) : std::nullopt;
    }
    return {};
}

WorklistArrangement arranged(const Worklist& list, const WorklistWish& wish)
{
    Filter filter(list, wish);
    std::vector<Keyed> order;
    order.reserve(static_cast<std::size_t>(list.count()));
    for (int tier = 0; tier < list.count(); ++tier) {
        if (filter.takes(tier))
            order.push_back(keyed(sortNumber(list, tier, wish.key), tier));
    }
    sortKeyed(order, wish.descending);
    WorklistArrangement made;
    made.tiers.reserve(order.size());
    for (const Keyed& at : order)
        made.tiers.push_back(at.index);
    if (wish.grouped) {
        group(list, wish, made);
        return made;
    }
    made.rows.reserve(order.size());
    for (const int tier : made.tiers)
        made.rows.push_back({tier, static_cast<int>(list.names().site[static_cast<std::size_t>(tier)])});
    return made;
}

} // namespace rungwright
