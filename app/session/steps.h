// SPDX-License-Identifier: GPL-3.0-or-later
// The undo steps. They hold indices and values, never pointers into the scenario.
#pragma once

#include "document.h"

#include <QUndoCommand>

#include <functional>
#include <utility>

namespace rungwright
{

/// The base of all steps: the only door through which a scenario is changed.
class ScenarioStep : public QUndoCommand
{
public:
    ScenarioStep(Document& document, const QString& name) : QUndoCommand(name), m_document(document) {}

protected:
    Scenario& scenario() { return m_document.m_scenario; }
    TierCase& tierCase(int tier) { return scenario().tiers[static_cast<std::size_t>(tier)]; }
    void announce(const DocumentChange& change) { m_document.announce(change); }

private:
    Document& m_document;
};

/// Swaps one value for another: `place` finds it in the scenario.
template <class T>
class ChangeValue : public ScenarioStep
{
public:
    using Place = std::function<T&(Scenario&)>;

    ChangeValue(Document& document, const QString& name, Place place, T after, DocumentChange change) :
        ScenarioStep(document, name), m_place(std::move(place)), m_other(std::move(after)), m_change(change)
    {
    }
    void redo() override { swap(); }
    void undo() override { swap(); }

private:
    void swap()
    {
        std::swap(m_place(scenario()), m_other);
        announce(m_change);
    }

    Place m_place;
    T m_other;
    DocumentChange m_change;
};

/// The tiers that a list makes of a scenario's, and its currency where none was known.
class TakeRefresh : public ScenarioStep
{
public:
    TakeRefresh(Document& document, const QString& name, TierList tiers, Currency currency);
    void redo() override { swap(); }
    void undo() override { swap(); }

private:
    void swap();

    TierList m_tiers;
    Currency m_currency;
};

/// Prices of one candidate. Nudges of the same units in a row are one step, which drops itself when it ends where it began.
class EditPrices : public ScenarioStep
{
public:
    EditPrices(Document& document, const QString& name, int tier, int candidate, std::vector<PriceChange> changes, bool mergeable);
    void redo() override;
    void undo() override;
    int id() const override { return m_mergeable ? 1 : -1; }
    bool mergeWith(const QUndoCommand* later) override;

private:
    int m_tier;
    int m_candidate;
    std::vector<PriceChange> m_changes;
    bool m_mergeable;
};

/// A candidate comes.
class AddCandidate : public ScenarioStep
{
public:
    AddCandidate(Document& document, const QString& name, int tier, Candidate candidate);
    void redo() override;
    void undo() override;

private:
    int m_tier;
    Candidate m_candidate;
};

/// A candidate goes; it comes back to its place, chosen again if it was.
class DiscardCandidate : public ScenarioStep
{
public:
    DiscardCandidate(Document& document, const QString& name, int tier, int candidate);
    void redo() override;
    void undo() override;

private:
    int m_tier;
    int m_index;
    Candidate m_candidate;
    std::optional<int> m_chosenBefore;
};

/// Rules of a scope come, change or go.
class SetRules : public ScenarioStep
{
public:
    SetRules(Document& document, const QString& name, RuleScope scope, std::optional<PriceRules> rules);
    void redo() override { swap(); }
    void undo() override { swap(); }

private:
    void swap();

    RuleScope m_scope;
    std::optional<PriceRules> m_other;
};

/// Locks of some units.
class SetLocks : public ScenarioStep
{
public:
    SetLocks(Document& document, const QString& name, int tier, std::vector<std::uint32_t> units, bool locked);
    void redo() override { apply(m_locked); }
    void undo() override { apply(!m_locked); }

private:
    void apply(bool locked);

    int m_tier;
    std::vector<std::uint32_t> m_units;
    bool m_locked;
};

/// The "seen" mark of some tiers, none of which has it already.
class SetSeen : public ScenarioStep
{
public:
    SetSeen(Document& document, const QString& name, std::vector<int> tiers, bool seen);
    void redo() override { apply(m_seen); }
    void undo() override { apply(!m_seen); }

private:
    void apply(bool seen);

    std::vector<int> m_tiers;
    bool m_seen;
};

} // namespace rungwright
