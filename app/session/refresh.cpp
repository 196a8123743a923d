// SPDX-License-Identifier: GPL-3.0-or-later
#include "refresh.h"

#include "refresh_match.h"
#include "words.h"

#include <algorithm>
#include <optional>
#include <unordered_map>

namespace rungwright
{

namespace
{

/// Tiers between two calls of the progress function.
constexpr std::size_t kProgressEvery = 256;

/// Which of the columns that may be missing a list has.
struct Said {
    bool grade = false;
    bool area = false;
    bool chance = false;
};

Said saidBy(std::span<const TierCase> list)
{
    Said said;
    for (const TierCase& tierCase : list) {
        for (const Unit& unit : tierCase.tier.units) {
            said.grade = said.grade || unit.grade.has_value();
            said.area = said.area || unit.areaM2.has_value();
            said.chance = said.chance || unit.vacancyChance.has_value();
        }
    }
    return said;
}

std::optional<RefreshKind> statusChange(Status before, Status after)
{
    if (before == after)
        return {};
    const auto taken = [](Status status) { return status == Status::occupied || status == Status::reserved; };
    if (before == Status::vacant && taken(after))
        return RefreshKind::newlyLet;
    if (taken(before) && after == Status::vacant)
        return RefreshKind::newlyFree;
    return RefreshKind::otherStatus;
}

/// The fate of a candidate's price of a unit that stays; nothing when the candidate had not changed it.
std::optional<ChangeFate> fateOf(const Unit& before, Price wanted, const Unit& now)
{
    if (wanted == before.asking)
        return {};
    if (now.asking == wanted)
        return ChangeFate::nowAsked;
    const bool newlyLocked = now.locked && !before.locked;
    return now.asking == before.asking && !newlyLocked ? ChangeFate::kept : ChangeFate::clash;
}

class Planner
{
public:
    Planner(const TierList& before, std::vector<TierCase> list, const Progress& progress) :
        m_before(before), m_list(std::move(list)), m_progress(progress)
    {
    }

    /// False when it was told to stop.
    bool work()
    {
        m_plan.before = m_before;
        m_said = saidBy(m_list);
        const TierMatch match = matchTiers(m_before, m_list);
        m_made.resize(match.places.size());
        for (std::size_t at = 0; at < match.places.size(); ++at) {
            if (at % kProgressEvery == 0 && !goOn(0.9 * static_cast<double>(at) / static_cast<double>(match.places.size())))
                return false;
            if (match.places[at].before < 0)
                newTier(static_cast<int>(at), m_list[static_cast<std::size_t>(match.places[at].list)]);
            else
                stayingTier(match.places[at].before, static_cast<int>(at), m_list[static_cast<std::size_t>(match.places[at].list)]);
        }
        for (const int gone : match.gone)
            goneTier(gone);
        if (!goOn(0.9))
            return false;
        movesArrivalsAndLeavings();
        std::stable_sort(m_plan.candidates.begin(), m_plan.candidates.end(),
                         [](const CandidateOutcome& a, const CandidateOutcome& b) { return a.tierBefore < b.tierBefore; });
        join(match);
        return goOn(1.0);
    }

    RefreshPlan takePlan() { return std::move(m_plan); }

private:
    struct Place {
        int tier; ///< Before for one that left, after for one that came.
        int unit;
    };

    bool goOn(double share) const { return !m_progress || m_progress(share); }

    void add(RefreshKind kind, const RefreshLine& where)
    {
        const auto at = static_cast<std::size_t>(kind);
        ++m_plan.counts[at];
        m_tierTouched = true;
        if (m_plan.lines[at].size() < kRefreshLinesKept) {
            m_plan.lines[at].push_back(where);
            m_plan.lines[at].back().kind = kind;
        }
    }

    void add(ChangeFate fate, CandidateOutcome& outcome, CandidateChange change)
    {
        const auto at = static_cast<std::size_t>(fate);
        ++m_plan.changeCounts[at];
        ++outcome.changes[at];
        change.fate = fate;
        if (m_plan.changes[at].size() < kRefreshLinesKept)
            m_plan.changes[at].push_back(change);
    }

    /// What the list does not say stays as it was.
    void complete(Unit& unit, const Unit& before) const
    {
        if (!m_said.grade)
            unit.grade = before.grade;
        if (!m_said.area)
            unit.areaM2 = before.areaM2;
        if (!m_said.chance)
            unit.vacancyChance = before.vacancyChance;
        unit.locked = unit.locked || before.locked;
    }

    void compare(const Unit& before, const Unit& after, const RefreshLine& where)
    {
        if (const auto change = statusChange(before.status, after.status))
            add(*change, where);
        if (after.asking > before.asking) {
            add(RefreshKind::raised, where);
            m_plan.raisedBy += after.asking - before.asking;
        } else if (after.asking < before.asking) {
            add(RefreshKind::lowered, where);
            m_plan.loweredBy += before.asking - after.asking;
        }
        if (before.grade != after.grade)
            add(RefreshKind::newGrade, where);
        if (before.areaM2 != after.areaM2)
            add(RefreshKind::newArea, where);
        if (before.vacancyChance != after.vacancyChance)
            add(RefreshKind::newChance, where);
        if (before.locked != after.locked)
            add(RefreshKind::locked, where);
    }

    void newTier(int at, TierCase& listed)
    {
        add(RefreshKind::newTier, {{}, -1, -1, at, -1});
        for (std::size_t u = 0; u < listed.tier.units.size(); ++u)
            m_came.push_back({at, static_cast<int>(u)});
        m_plan.unitsAfter += static_cast<std::int64_t>(listed.tier.units.size());
        m_made[static_cast<std::size_t>(at)] = std::move(listed);
    }

    void goneTier(int tier)
    {
        const TierCase& gone = m_before[static_cast<std::size_t>(tier)];
        add(RefreshKind::tierGone, {{}, tier, -1, -1, -1});
        for (std::size_t u = 0; u < gone.tier.units.size(); ++u)
            m_left.push_back({tier, static_cast<int>(u)});
        m_plan.unitsBefore += static_cast<std::int64_t>(gone.tier.units.size());
        for (std::size_t c = 0; c < gone.candidates.size(); ++c) {
            CandidateOutcome outcome{tier, static_cast<int>(c), -1, {}};
            for (std::size_t u = 0; u < gone.tier.units.size(); ++u) {
                if (gone.candidates[c].prices[u] != gone.tier.units[u].asking)
                    add(ChangeFate::tierDropped, outcome, {{}, tier, static_cast<int>(c), static_cast<int>(u), -1, -1});
            }
            m_plan.candidates.push_back(outcome);
        }
        if (gone.signedOff)
            m_plan.signedTiers.push_back({tier, -1, checkSigned(*gone.signedOff, nullptr)});
    }

    void stayingTier(int tier, int at, TierCase& listed)
    {
        const TierCase& was = m_before[static_cast<std::size_t>(tier)];
        m_tierTouched = false;
        m_units.match(was.tier.units, listed.tier.units);
        std::vector<Unit> units;
        units.reserve(listed.tier.units.size());
        m_cameFrom.clear();
        for (std::size_t u = 0; u < was.tier.units.size(); ++u) {
            const int inList = m_units.inList()[u];
            if (inList < 0) {
                m_left.push_back({tier, static_cast<int>(u)});
                continue;
            }
            Unit& unit = units.emplace_back(std::move(listed.tier.units[static_cast<std::size_t>(inList)]));
            complete(unit, was.tier.units[u]);
            compare(was.tier.units[u], unit, {{}, tier, static_cast<int>(u), at, static_cast<int>(units.size()) - 1});
            m_cameFrom.push_back(static_cast<int>(u));
        }
        m_tierTouched = m_tierTouched || units.size() != was.tier.units.size() || !m_units.fresh().empty();
        for (const int fresh : m_units.fresh()) {
            m_came.push_back({at, static_cast<int>(units.size())});
            units.push_back(std::move(listed.tier.units[static_cast<std::size_t>(fresh)]));
        }
        m_plan.unitsBefore += static_cast<std::int64_t>(was.tier.units.size());
        m_plan.unitsAfter += static_cast<std::int64_t>(units.size());

        const Price floor = listed.tier.hasFloor() ? listed.tier.advertisedFloor : was.tier.advertisedFloor;
        if (floor != was.tier.advertisedFloor)
            add(RefreshKind::floorChanged, {{}, tier, -1, at, -1});
        m_plan.tiersTouched += m_tierTouched ? 1 : 0;
        m_plan.seenCleared += was.seen ? 1 : 0;

        std::vector<Candidate> carried;
        for (std::size_t c = 0; c < was.candidates.size(); ++c)
            carried.push_back(carry(tier, at, static_cast<int>(c), units));
        if (m_tierTouched || was.seen)
            m_made[static_cast<std::size_t>(at)] = TierCase{Tier{was.tier.site, was.tier.name, floor, std::move(units)},
                                                            std::move(carried),
                                                            was.chosen,
                                                            was.model,
                                                            was.note,
                                                            false,
                                                            was.signedOff};
        if (was.signedOff) {
            const auto& made = m_made[static_cast<std::size_t>(at)];
            m_plan.signedTiers.push_back({tier, at, checkSigned(*was.signedOff, made ? &made->tier : &was.tier)});
        }
    }

    /// The candidate's prices of `units`, of which the first come from m_cameFrom.
    Candidate carry(int tier, int at, int index, const std::vector<Unit>& units)
    {
        const TierCase& was = m_before[static_cast<std::size_t>(tier)];
        const Candidate& candidate = was.candidates[static_cast<std::size_t>(index)];
        CandidateOutcome outcome{tier, index, at, {}};
        Candidate carried{candidate.name, candidate.note, askingPrices(units)};
        for (std::size_t u = 0; u < m_cameFrom.size(); ++u) {
            const auto from = static_cast<std::size_t>(m_cameFrom[u]);
            const Price wanted = candidate.prices[from];
            const auto fate = fateOf(was.tier.units[from], wanted, units[u]);
            if (!fate)
                continue;
            carried.prices[u] = wanted;
            add(*fate, outcome, {{}, tier, index, m_cameFrom[u], at, static_cast<int>(u)});
        }
        m_outcomeAt.try_emplace(tier, m_plan.candidates.size());
        m_plan.candidates.push_back(outcome);
        return carried;
    }

    /// Of the units that left a tier and those that came to one: which are the same?
    void movesArrivalsAndLeavings()
    {
        struct Meeting {
            int left = 0;
            int came = 0;
            Place from{-1, -1};
            Place to{-1, -1};
            /// With two of the name on either side nobody can tell which is which.
            bool isMove() const { return left == 1 && came == 1; }
        };
        std::unordered_map<NamePair, Meeting, NamePairHash> meetings;
        std::vector<Meeting*> ofLeft; // the map's elements stay where they are
        std::vector<Meeting*> ofCame;
        if (!m_came.empty()) {
            meetings.reserve(m_left.size());
            ofLeft.reserve(m_left.size());
            for (const Place& left : m_left) {
                ofLeft.push_back(&meetings[nameBefore(left)]);
                ++ofLeft.back()->left;
                ofLeft.back()->from = left;
            }
        }
        ofCame.reserve(m_came.size());
        for (const Place& came : m_came) {
            const auto found = meetings.empty() ? meetings.end() : meetings.find(nameAfter(came));
            ofCame.push_back(found == meetings.end() ? nullptr : &found->second);
            if (ofCame.back()) {
                ++ofCame.back()->came;
                ofCame.back()->to = came;
            }
        }
        for (std::size_t i = 0; i < m_came.size(); ++i) {
            if (ofCame[i] && ofCame[i]->isMove())
                moved(ofCame[i]->from, m_came[i]);
            else
                add(RefreshKind::newUnit, {{}, -1, -1, m_came[i].tier, m_came[i].unit});
        }
        for (std::size_t i = 0; i < m_left.size(); ++i) {
            const bool isMove = !ofLeft.empty() && ofLeft[i]->isMove();
            if (!isMove)
                add(RefreshKind::unitGone, {{}, m_left[i].tier, m_left[i].unit, -1, -1});
            dropFromCandidates(m_left[i], isMove ? ofLeft[i]->to : Place{-1, -1});
        }
    }

    void moved(const Place& from, const Place& to)
    {
        const RefreshLine where{{}, from.tier, from.unit, to.tier, to.unit};
        Unit& unit = m_made[static_cast<std::size_t>(to.tier)]->tier.units[static_cast<std::size_t>(to.unit)];
        const Unit& was = m_before[static_cast<std::size_t>(from.tier)].tier.units[static_cast<std::size_t>(from.unit)];
        complete(unit, was);
        add(RefreshKind::movedTier, where);
        compare(was, unit, where);
    }

    void dropFromCandidates(const Place& left, const Place& to)
    {
        const auto first = m_outcomeAt.find(left.tier);
        if (first == m_outcomeAt.end())
            return; // no candidate, or the whole tier leaves
        const TierCase& was = m_before[static_cast<std::size_t>(left.tier)];
        const auto unit = static_cast<std::size_t>(left.unit);
        for (std::size_t c = 0; c < was.candidates.size(); ++c) {
            if (was.candidates[c].prices[unit] != was.tier.units[unit].asking)
                add(to.tier < 0 ? ChangeFate::unitGone : ChangeFate::unitMoved, m_plan.candidates[first->second + c],
                    {{}, left.tier, static_cast<int>(c), left.unit, to.tier, to.unit});
        }
    }

    NamePair nameBefore(const Place& place) const
    {
        const Tier& tier = m_before[static_cast<std::size_t>(place.tier)].tier;
        return {tier.site, tier.units[static_cast<std::size_t>(place.unit)].name};
    }

    NamePair nameAfter(const Place& place) const
    {
        const Tier& tier = m_made[static_cast<std::size_t>(place.tier)]->tier;
        return {tier.site, tier.units[static_cast<std::size_t>(place.unit)].name};
    }

    void join(const TierMatch& match)
    {
        m_plan.after.reserve(m_made.size());
        for (std::size_t at = 0; at < m_made.size(); ++at) {
            if (m_made[at])
                m_plan.after.push_back(std::move(*m_made[at]));
            else
                m_plan.after.pushShared(m_before, static_cast<std::size_t>(match.places[at].before));
        }
    }

    const TierList& m_before;
    std::vector<TierCase> m_list;
    const Progress& m_progress;
    Said m_said;
    RefreshPlan m_plan;
    std::vector<std::optional<TierCase>> m_made; ///< By place; nothing where the tier stays as it is.
    std::vector<Place> m_left;
    std::vector<Place> m_came;
    std::unordered_map<int, std::size_t> m_outcomeAt; ///< Tier before -> its first candidate in the plan.
    UnitMatcher m_units;
    std::vector<int> m_cameFrom; ///< Of the tier in work: the place before of its first units.
    bool m_tierTouched = false;
};

QString otherCurrency(const Currency& has, const Currency& listed)
{
    const auto code = [](const Currency& currency) { return QString::fromStdString(currency.code); };
    const auto decimals = [](const Currency& currency) { return QString::number(currency.decimals); };
    if (has.code == "XXX")
        return Words::tr("The scenario names no currency and its amounts have %1 decimals; the list is in %2, whose amounts have %3. "
                         "Import the list as a scenario of its own.")
            .arg(decimals(has), code(listed), decimals(listed));
    if (listed.code == "XXX")
        return Words::tr("The scenario is in %1; the list names no currency. Say in the list or its mapping that it is in %1.")
            .arg(code(has));
    return Words::tr("The scenario is in %1, the list in %2. Import the list as a scenario of its own.").arg(code(has), code(listed));
}

} // namespace

Outcome<RefreshPlan> planRefresh(const Scenario& now, const Currency& currency, std::vector<TierCase> list, const Progress& progress)
{
    const auto refused = [](const QString& message) { return Trouble{message.toStdString()}; };
    const bool takesCurrency = now.currency.code == "XXX" && currency.code != "XXX" && currency.decimals == now.currency.decimals;
    if (!(currency == now.currency) && !takesCurrency)
        return refused(otherCurrency(now.currency, currency));
    if (list.empty())
        return refused(Words::tr("The list holds no unit. A refresh from it would empty the scenario."));
    Planner planner(now.tiers, std::move(list), progress);
    if (!planner.work())
        return refused(Words::tr("The refresh was cancelled; nothing has changed."));
    RefreshPlan plan = planner.takePlan();
    plan.currency = currency;
    plan.takesCurrency = takesCurrency;
    return plan;
}

std::vector<SignedTier> checkSigned(const TierList& tiers)
{
    std::vector<SignedTier> checks;
    for (std::size_t i = 0; i < tiers.size(); ++i) {
        if (tiers[i].signedOff)
            checks.push_back({static_cast<int>(i), static_cast<int>(i), checkSigned(*tiers[i].signedOff, &tiers[i].tier)});
    }
    return checks;
}

} // namespace rungwright
