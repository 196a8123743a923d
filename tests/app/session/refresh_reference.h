// SPDX-License-Identifier: GPL-3.0-or-later
// What a refresh must give, found the slow way: every name is looked for in every place, one unit at a time. Shares nothing with the
// refresh but the types.
#pragma once

#include "refresh.h"

#include <algorithm>
#include <map>

namespace rungwright::reference
{

inline const TierCase* tierOf(const std::vector<TierCase>& tiers, const Tier& like)
{
    for (const TierCase& one : tiers) {
        if (one.tier.site == like.site && one.tier.name == like.name)
            return &one;
    }
    return nullptr;
}

inline const Unit* unitOf(const TierCase* tierCase, const std::string& name)
{
    if (!tierCase)
        return nullptr;
    for (const Unit& unit : tierCase->tier.units) {
        if (unit.name == name)
            return &unit;
    }
    return nullptr;
}

struct Refreshed {
    std::vector<TierCase> tiers;
    std::map<RefreshKind, std::int64_t> counts;
    std::map<ChangeFate, std::int64_t> fates;
    std::int64_t raisedBy = 0;
    std::int64_t loweredBy = 0;
};

class Slowly
{
public:
    Slowly(std::vector<TierCase> before, std::vector<TierCase> list) : m_before(std::move(before)), m_list(std::move(list)) {}

    Refreshed work()
    {
        for (const TierCase& was : m_before) {
            if (const TierCase* listed = tierOf(m_list, was.tier))
                m_result.tiers.push_back(staying(was, *listed));
            else
                leaving(was);
        }
        for (const TierCase& listed : m_list) {
            if (tierOf(m_before, listed.tier))
                continue;
            ++m_result.counts[RefreshKind::newTier];
            TierCase made = listed;
            for (Unit& unit : made.tier.units)
                arriving(made.tier, unit);
            m_result.tiers.push_back(made);
        }
        return m_result;
    }

private:
    /// Units of that site and name which are in a tier of `in` and not in the tier of those names in `notIn`.
    static std::vector<std::pair<const TierCase*, const Unit*>> strays(const std::vector<TierCase>& in, const std::vector<TierCase>& notIn,
                                                                       const std::string& site, const std::string& name)
    {
        std::vector<std::pair<const TierCase*, const Unit*>> found;
        for (const TierCase& one : in) {
            const Unit* unit = one.tier.site == site ? unitOf(&one, name) : nullptr;
            if (unit && !unitOf(tierOf(notIn, one.tier), name))
                found.push_back({&one, unit});
        }
        return found;
    }

    /// The unit it was before, when it moved here.
    const Unit* movedFrom(const std::string& site, const std::string& name) const
    {
        const auto left = strays(m_before, m_list, site, name);
        const auto came = strays(m_list, m_before, site, name);
        return left.size() == 1 && came.size() == 1 ? left[0].second : nullptr;
    }

    bool listHas(bool (*has)(const Unit&)) const
    {
        for (const TierCase& one : m_list) {
            if (std::any_of(one.tier.units.begin(), one.tier.units.end(), has))
                return true;
        }
        return false;
    }

    Unit completed(Unit unit, const Unit& was) const
    {
        if (!listHas([](const Unit& u) { return u.grade.has_value(); }))
            unit.grade = was.grade;
        if (!listHas([](const Unit& u) { return u.areaM2.has_value(); }))
            unit.areaM2 = was.areaM2;
        if (!listHas([](const Unit& u) { return u.vacancyChance.has_value(); }))
            unit.vacancyChance = was.vacancyChance;
        if (was.locked)
            unit.locked = true;
        return unit;
    }

    void count(const Unit& was, const Unit& is)
    {
        const bool wasTaken = was.status == Status::occupied || was.status == Status::reserved;
        const bool isTaken = is.status == Status::occupied || is.status == Status::reserved;
        if (was.status == Status::vacant && isTaken)
            ++m_result.counts[RefreshKind::newlyLet];
        else if (wasTaken && is.status == Status::vacant)
            ++m_result.counts[RefreshKind::newlyFree];
        else if (was.status != is.status)
            ++m_result.counts[RefreshKind::otherStatus];
        if (is.asking.minor > was.asking.minor) {
            ++m_result.counts[RefreshKind::raised];
            m_result.raisedBy += is.asking.minor - was.asking.minor;
        }
        if (is.asking.minor < was.asking.minor) {
            ++m_result.counts[RefreshKind::lowered];
            m_result.loweredBy += was.asking.minor - is.asking.minor;
        }
        m_result.counts[RefreshKind::newGrade] += was.grade != is.grade;
        m_result.counts[RefreshKind::newArea] += was.areaM2 != is.areaM2;
        m_result.counts[RefreshKind::newChance] += was.vacancyChance != is.vacancyChance;
        m_result.counts[RefreshKind::locked] += was.locked != is.locked;
    }

    void arriving(const Tier& tier, Unit& unit)
    {
        const Unit* was = movedFrom(tier.site, unit.name);
        ++m_result.counts[was ? RefreshKind::movedTier : RefreshKind::newUnit];
        if (was) {
            unit = completed(unit, *was);
            count(*was, unit);
        }
    }

    TierCase staying(const TierCase& was, const TierCase& listed)
    {
        TierCase made = was;
        made.seen = false;
        if (listed.tier.advertisedFloor.minor != 0) {
            m_result.counts[RefreshKind::floorChanged] += made.tier.advertisedFloor != listed.tier.advertisedFloor;
            made.tier.advertisedFloor = listed.tier.advertisedFloor;
        }
        made.tier.units.clear();
        for (Candidate& candidate : made.candidates)
            candidate.prices.clear();
        for (std::size_t u = 0; u < was.tier.units.size(); ++u) {
            const Unit& unit = was.tier.units[u];
            const Unit* now = unitOf(&listed, unit.name);
            for (std::size_t c = 0; c < was.candidates.size(); ++c) {
                const Price wanted = was.candidates[c].prices[u];
                const bool changed = wanted != unit.asking;
                if (now)
                    made.candidates[c].prices.push_back(changed ? wanted : now->asking);
                if (!changed)
                    continue;
                if (!now)
                    ++m_result.fates[movedFrom(was.tier.site, unit.name) ? ChangeFate::unitMoved : ChangeFate::unitGone];
                else if (now->asking == wanted)
                    ++m_result.fates[ChangeFate::nowAsked];
                else if (now->asking != unit.asking || (now->locked && !unit.locked))
                    ++m_result.fates[ChangeFate::clash];
                else
                    ++m_result.fates[ChangeFate::kept];
            }
            if (now) {
                made.tier.units.push_back(completed(*now, unit));
                count(unit, made.tier.units.back());
            } else {
                m_result.counts[RefreshKind::unitGone] += movedFrom(was.tier.site, unit.name) == nullptr;
            }
        }
        for (const Unit& unit : listed.tier.units) {
            if (unitOf(&was, unit.name))
                continue;
            made.tier.units.push_back(unit);
            arriving(made.tier, made.tier.units.back());
            for (Candidate& candidate : made.candidates)
                candidate.prices.push_back(unit.asking);
        }
        return made;
    }

    void leaving(const TierCase& was)
    {
        ++m_result.counts[RefreshKind::tierGone];
        for (const Unit& unit : was.tier.units)
            m_result.counts[RefreshKind::unitGone] += movedFrom(was.tier.site, unit.name) == nullptr;
        for (const Candidate& candidate : was.candidates) {
            for (std::size_t u = 0; u < was.tier.units.size(); ++u)
                m_result.fates[ChangeFate::tierDropped] += candidate.prices[u] != was.tier.units[u].asking;
        }
    }

    std::vector<TierCase> m_before;
    std::vector<TierCase> m_list;
    Refreshed m_result;
};

} // namespace rungwright::reference
