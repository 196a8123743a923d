// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist: figures and flags of every tier of the document, kept up to date; what worklist and portfolio picture both show.
#pragma once

#include "document.h"
#include "worklist_names.h"
#include "worklist_rows.h"

#include <QObject>

#include <atomic>
#include <memory>
#include <set>
#include <thread>
#include <vector>

namespace rungwright
{

/// Rows are in the document's order. Few tiers are measured at once; many in the background, and then their rows are there from the start
/// and their figures come in piece by piece. To be made before whatever else listens to the document, so that others find its rows right.
class Worklist : public QObject
{
    Q_OBJECT
public:
    explicit Worklist(Document& document, QObject* parent = nullptr);
    ~Worklist() override;

    Document& document() { return m_document; }
    const Document& document() const { return m_document; }
    int count() const { return static_cast<int>(m_rows.size()); }
    const TierCase& tierCase(int tier) const { return m_document.scenario().tiers[static_cast<std::size_t>(tier)]; }
    const WorklistRow& row(int tier) const { return m_rows[static_cast<std::size_t>(tier)]; }
    FlagSet flags(int tier) const { return m_flags[static_cast<std::size_t>(tier)]; }
    const FlagThresholds& thresholds() const { return m_document.scenario().flags; }
    const WorklistNames& names() const { return m_names; }
    /// In the order of the list until they are known.
    const NameRanks& ranks() const { return m_ranks; }
    /// Site and name, case folded.
    QString searchText(int tier) const
    {
        const auto at = static_cast<std::size_t>(tier);
        return at < m_search.size() ? m_search[at] : rungwright::searchText(tierCase(tier).tier);
    }

    /// Figures are still coming in; how many are there.
    bool measuring() const { return m_measured < m_rows.size(); }
    int measuredCount() const { return static_cast<int>(m_measured); }
    double greatestShare() const { return m_greatestShare; }
    /// The tier with the greatest gap share; -1 when there is none with a gap, or no tier.
    int worstTier() const;

    /// A choice of tiers made elsewhere (in the portfolio picture), to look at only these for a while. Not part of the scenario.
    void pick(const std::vector<int>& tiers);
    void clearPick() { pick({}); }
    int pickedCount() const { return m_pickedCount; }
    bool isPicked(int tier) const { return m_pickedCount > 0 && m_picked[static_cast<std::size_t>(tier)]; }

signals:
    /// Other tiers, or the same in another order.
    void reset();
    /// Figures or flags of tiers `first` to `last`.
    void rowsChanged(int first, int last);
    /// Seen marks or notes of tiers `first` to `last`.
    void marksChanged(int first, int last);
    /// The last figure has come in.
    void measured();
    void pickChanged();

private:
    void onChanged(const DocumentChange& change);
    void takeTiers();
    void measureNow();
    void measureInBackground();
    void takeRows(int round, std::size_t first, const std::vector<WorklistRow>& rows);
    void remeasure(int tier);
    void reflag();
    void findGreatest();
    void stop();

    Document& m_document;
    Measurer m_measurer;
    std::vector<WorklistRow> m_rows;
    std::vector<FlagSet> m_flags;
    WorklistNames m_names;
    NameRanks m_ranks;
    std::vector<QString> m_search; ///< By tier; empty until made.
    std::size_t m_measured = 0;
    double m_greatestShare = 0;
    std::vector<bool> m_picked;
    int m_pickedCount = 0;

    int m_round = 0;                 ///< Of measuring: what an earlier one hands over late is dropped.
    std::set<std::size_t> m_fresher; ///< Tiers edited since the background began to measure an older copy of them.
    std::shared_ptr<std::atomic<bool>> m_cancel;
    std::jthread m_worker;
};

} // namespace rungwright
