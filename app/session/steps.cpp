// SPDX-License-Identifier: GPL-3.0-or-later
#include "steps.h"

#include <algorithm>
#include <utility>

namespace rungwright
{

TakeRefresh::TakeRefresh(Document& document, const QString& name, TierList tiers, Currency currency) :
    ScenarioStep(document, name), m_tiers(std::move(tiers)), m_currency(std::move(currency))
{
}

void TakeRefresh::swap()
{
    std::swap(scenario().tiers, m_tiers);
    std::swap(scenario().currency, m_currency);
    announce({DocumentChange::Kind::refreshed, -1, -1});
}

EditPrices::EditPrices(Document& document, const QString& name, int tier, int candidate, std::vector<PriceChange> changes, bool mergeable) :
    ScenarioStep(document, name), m_tier(tier), m_candidate(candidate), m_changes(std::move(changes)), m_mergeable(mergeable)
{
}

void EditPrices::redo()
{
    auto& prices = tierCase(m_tier).candidates[static_cast<std::size_t>(m_candidate)].prices;
    for (const PriceChange& change : m_changes)
        prices[change.unit] = change.after;
    announce({DocumentChange::Kind::prices, m_tier, m_candidate});
}

void EditPrices::undo()
{
    auto& prices = tierCase(m_tier).candidates[static_cast<std::size_t>(m_candidate)].prices;
    for (const PriceChange& change : m_changes)
        prices[change.unit] = change.before;
    announce({DocumentChange::Kind::prices, m_tier, m_candidate});
}

bool EditPrices::mergeWith(const QUndoCommand* later)
{
    const auto* other = dynamic_cast<const EditPrices*>(later);
    if (!other || other->m_tier != m_tier || other->m_candidate != m_candidate || other->m_changes.size() != m_changes.size())
        return false;
    const auto sameUnit = [](const PriceChange& a, const PriceChange& b) { return a.unit == b.unit; };
    if (!std::equal(m_changes.begin(), m_changes.end(), other->m_changes.begin(), sameUnit))
        return false;
    for (std::size_t i = 0; i < m_changes.size(); ++i)
        m_changes[i].after = other->m_changes[i].after;
    setText(other->text());
    const auto unchanged = [](const PriceChange& change) { return change.before == change.after; };
    setObsolete(std::all_of(m_changes.begin(), m_changes.end(), unchanged));
    return true;
}

AddCandidate::AddCandidate(Document& document, const QString& name, int tier, Candidate candidate) :
    ScenarioStep(document, name), m_tier(tier), m_candidate(std::move(candidate))
{
}

void AddCandidate::redo()
{
    auto& candidates = tierCase(m_tier).candidates;
    candidates.push_back(m_candidate);
    announce({DocumentChange::Kind::candidates, m_tier, static_cast<int>(candidates.size()) - 1});
}

void AddCandidate::undo()
{
    auto& candidates = tierCase(m_tier).candidates;
    m_candidate = std::move(candidates.back());
    candidates.pop_back();
    announce({DocumentChange::Kind::candidates, m_tier, static_cast<int>(candidates.size()) - 1});
}

DiscardCandidate::DiscardCandidate(Document& document, const QString& name, int tier, int candidate) :
    ScenarioStep(document, name), m_tier(tier), m_index(candidate), m_candidate()
{
}

void DiscardCandidate::redo()
{
    TierCase& tc = tierCase(m_tier);
    const auto place = tc.candidates.begin() + m_index;
    m_candidate = std::move(*place);
    tc.candidates.erase(place);
    m_chosenBefore = tc.chosen;
    if (tc.chosen && *tc.chosen == m_index)
        tc.chosen.reset();
    else if (tc.chosen && *tc.chosen > m_index)
        --*tc.chosen;
    announce({DocumentChange::Kind::candidates, m_tier, std::min(m_index, static_cast<int>(tc.candidates.size()) - 1)});
}

void DiscardCandidate::undo()
{
    TierCase& tc = tierCase(m_tier);
    tc.candidates.insert(tc.candidates.begin() + m_index, std::move(m_candidate));
    tc.chosen = m_chosenBefore;
    announce({DocumentChange::Kind::candidates, m_tier, m_index});
}

SetRules::SetRules(Document& document, const QString& name, RuleScope scope, std::optional<PriceRules> rules) :
    ScenarioStep(document, name), m_scope(std::move(scope)), m_other(std::move(rules))
{
}

void SetRules::swap()
{
    const PriceRules* now = rulesOf(scenario(), m_scope);
    std::optional<PriceRules> before = now ? std::optional(*now) : std::nullopt;
    setRulesOf(scenario(), m_scope, std::exchange(m_other, std::move(before)));
    announce({DocumentChange::Kind::rules, -1, -1});
}

SetLocks::SetLocks(Document& document, const QString& name, int tier, std::vector<std::uint32_t> units, bool locked) :
    ScenarioStep(document, name), m_tier(tier), m_units(std::move(units)), m_locked(locked)
{
}

void SetLocks::apply(bool locked)
{
    auto& units = tierCase(m_tier).tier.units;
    for (const std::uint32_t unit : m_units)
        units[unit].locked = locked;
    announce({DocumentChange::Kind::units, m_tier, -1});
}

SetSeen::SetSeen(Document& document, const QString& name, std::vector<int> tiers, bool seen) :
    ScenarioStep(document, name), m_tiers(std::move(tiers)), m_seen(seen)
{
}

void SetSeen::apply(bool seen)
{
    for (const int tier : m_tiers)
        tierCase(tier).seen = seen;
    announce({DocumentChange::Kind::seen, m_tiers.size() == 1 ? m_tiers.front() : -1, -1});
}

} // namespace rungwright
