// SPDX-License-Identifier: GPL-3.0-or-later
// The open scenario: the one place prices live in while the desk is open. Every edit goes through the undo stack and is
// announced once, as one typed change; views do not know who made it.
#pragma once

#include "outcome.h"
#include "scenario.h"

#include <QObject>
#include <QString>
#include <QUndoStack>

#include <cstdint>
#include <span>
#include <vector>

namespace rungwright
{

struct RefreshPlan;

/// What an edit touched.
struct DocumentChange {
    enum class Kind {
        everything, ///< Another scenario.
        prices,     ///< Prices of one candidate.
        candidates, ///< A candidate came, went, was renamed, noted or chosen.
        units,      ///< Locks of the tier's units.
        model,      ///< The tier's availability model or its settings.
        rules,      ///< Price rules of the scenario, a site or a tier.
        notes,      ///< Notes of the scenario or of the tier.
        flags,      ///< The thresholds from where on the worklist flags.
        seen,       ///< The "seen" mark of the tier, or of several (tier -1).
        floor,      ///< The tier's advertised floor.
        signedOff,  ///< The last price sheet of the tier that was handed over.
        refreshed,  ///< Tiers came, went or changed anything about them: indices of tiers and units mean something else now.
    };
    Kind kind = Kind::everything;
    int tier = -1;      ///< Index into scenario().tiers, or -1 when all are touched.
    int candidate = -1; ///< Index of the candidate to look at next, or -1 (the current ladder, or no candidate in particular).
};

/// A unit's price before and after an edit.
struct PriceChange {
    std::uint32_t unit = 0;
    Price before;
    Price after;
};

/// The differences of two price lists of one tier, by unit index.
std::vector<PriceChange> priceChanges(std::span<const Price> before, std::span<const Price> after);

class Document : public QObject
{
    Q_OBJECT
public:
    explicit Document(QObject* parent = nullptr);

    const Scenario& scenario() const { return m_scenario; }
    bool empty() const { return m_scenario.tiers.empty(); }
    const TierCase* tier(int index) const;

    QUndoStack& undoStack() { return m_undo; }
    /// Where the scenario is kept; empty before the first save.
    const QString& path() const { return m_path; }
    /// The file's name, the scenario's title, or "Untitled".
    QString displayName() const;
    bool modified() const { return m_unsavedStart || !m_undo.isClean(); }

    /// Takes another scenario; forgets all undo steps. `saved` = it is what stands in `path`.
    void begin(Scenario scenario, const QString& path, bool saved);
    /// Writes whole or not at all; on trouble the document stays modified and the old file stands. Waits until it is written: for large
    /// scenarios on a desk, write a copy elsewhere and call writtenTo().
    Outcome<bool> saveTo(const QString& path);
    /// Changes with every edit, undone and redone ones too, and with every begin(): while it is the same, so is the scenario.
    std::uint64_t revision() const { return m_revision; }
    /// What the scenario was at `revision` now stands in `path`. What was edited since keeps the document modified.
    void writtenTo(const QString& path, std::uint64_t revision);

    // Edits, one undo step each. Indices are asserted. A call that would change nothing makes no step.

    /// Sets prices of a candidate; on the current ladder (candidate -1) it makes a candidate that holds them instead.
    /// Returns the candidate that holds the prices.
    int setPrices(int tier, int candidate, std::span<const PriceChange> changes, const QString& stepName);
    /// The same; `nudge` lets it join the step before it when that nudged the same units of the same candidate.
    int setPrices(int tier, int candidate, std::span<const PriceChange> changes, const QString& stepName, bool nudge);
    /// `candidate.name` is made unique in the tier. Returns its index.
    int addCandidate(int tier, Candidate candidate, const QString& stepName);
    int copyCandidate(int tier, int candidate);
    void discardCandidate(int tier, int candidate);
    /// False when the name is empty, taken, or kCurrentName.
    bool renameCandidate(int tier, int candidate, const QString& name);
    void setCandidateNote(int tier, int candidate, const QString& note);
    void chooseCandidate(int tier, std::optional<int> candidate);
    void setLocked(int tier, std::span<const std::uint32_t> units, bool locked);
    void setModel(int tier, const ModelSettings& model, const QString& stepName);
    void setRules(const PriceRules& rules) { setRules(RuleScope{}, rules); }
    void setRules(const RuleScope& scope, const PriceRules& rules);
    /// The site's or tier's own rules go: the next wider ones hold.
    void dropRules(const RuleScope& scope);
    void setTierNote(int tier, const QString& note);
    void setScenarioNote(const QString& note);
    void setFlagThresholds(const FlagThresholds& flags);
    /// Marks tiers as dealt with, or takes the mark away.
    void setSeen(std::span<const int> tiers, bool seen);
    void setSeen(int tier, bool seen) { setSeen(std::span(&tier, 1), seen); }
    /// A floor of 0 = none is known.
    void setFloor(int tier, Price floor);
    /// Keeps what was handed over; the one before is forgotten, and comes back with the undo.
    void recordSignedSheet(int tier, SignedSheet sheet);
    /// Takes the tiers of the plan, and its currency where the scenario names none; `listName` names the step: "Refresh from units.csv".
    /// False, and nothing done, when the scenario's tiers are no longer those the plan was worked out for.
    bool refresh(const RefreshPlan& plan, const QString& listName);

    /// "Candidate 1", "Candidate 2", ...: the first such name not taken, or `wanted` with a number behind it.
    std::string freeCandidateName(int tier, const QString& wanted = {}) const;

signals:
    void changed(const rungwright::DocumentChange& change);
    /// Path, name or modified() changed.
    void saveStateChanged();

private:
    friend class ScenarioStep;
    void announce(const DocumentChange& change);

    Scenario m_scenario;
    QString m_path;
    QUndoStack m_undo;
    std::uint64_t m_revision = 0;
    bool m_unsavedStart = false; ///< Not in any file, and no number of undo steps leads to what is: begun from an import or a recovered
                                 ///< copy, or edited while it was written.
};

} // namespace rungwright
