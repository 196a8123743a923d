// SPDX-License-Identifier: GPL-3.0-or-later
// Two to six ladders of the tier on the bench beside each other: pictures on one price axis, figures, the best of each marked.
#pragma once

#include "ladder_pick.h"
#include "side_by_side_model.h"
#include "unit_prices_model.h"
#include "workbench.h"

#include <QSettings>
#include <QWidget>

#include <map>
#include <memory>
#include <string>
#include <utility>

namespace Ui
{
class SideBySidePage;
}

namespace rungwright
{

class PickMenu;
class Questions;

class SideBySidePage : public QWidget
{
    Q_OBJECT
public:
    /// All outlive the page. The weights of the ranking are kept in the settings, when there are any.
    SideBySidePage(Workbench& bench, Questions& questions, QSettings* settings = nullptr, QWidget* parent = nullptr);
    ~SideBySidePage() override;

    /// Candidates in the order of the columns, -1 = the current ladder; empty while there is nothing to compare.
    std::vector<int> shownCandidates() const;
    /// The candidate of the selected column; -1 for the current ladder, and while there is nothing to compare.
    int selectedCandidate() const;

signals:
    /// The user settled on a candidate; the document knows already.
    void chosen(int candidate);
    /// A sentence for the status bar.
    void told(const QString& sentence);

protected:
    void showEvent(QShowEvent* event) override;
    void resizeEvent(QResizeEvent* event) override;
    void changeEvent(QEvent* event) override;

private:
    void prepareTable();
    void prepareExport();
    void prepareMoves();
    void prepareUnitPrices();
    void prepareWeights();
    void prepareAgainst();
    void showAgainst();
    RankingWeights weights() const;
    void dress();
    void refresh();
    void showPick(const QStringList& names);
    void pickLadder(int candidate, bool on);
    void showLadders(int selected);
    void straightenHeader();
    void showInPlot();
    void alignPlot();
    void showEmpty();
    void showTitle();
    void showChoice();
    void adoptHeaderOrder();
    void moveSelected(int by);
    void choose();
    /// Site and name: an index means another tier after a refresh.
    using TierKey = std::pair<std::string, std::string>;
    TierKey tierKey() const;
    LadderPick& pick() { return m_picks[tierKey()]; }
    QStringList candidateNames() const;

    Workbench& m_bench;
    Questions& m_questions;
    QSettings* m_settings;
    SideBySideModel m_model;
    UnitPricesModel m_unitPrices;
    std::optional<QString> m_against; ///< The candidate the figures are differences from, by name; empty = the current ladder.
    PickMenu* m_pickMenu = nullptr;
    std::map<TierKey, LadderPick> m_picks;
    TierKey m_shownTier;
    bool m_stale = true; ///< Something changed while the page was hidden.
    std::unique_ptr<Ui::SideBySidePage> m_ui;
};

} // namespace rungwright
