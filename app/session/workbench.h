// SPDX-License-Identifier: GPL-3.0-or-later
// The tier on the bench: its current and its worked-on ladder, measured, and the gesture in progress.
#pragma once

#include "document.h"
#include "gap/measure.h"
#include "reshape/by_hand.h"
#include "reshape/tier_limits.h"

#include <QObject>

#include <cstdint>
#include <optional>
#include <span>
#include <string>
#include <vector>

namespace rungwright
{

/// Views read prices and figures from here and keep none of their own. While a gesture is going on, worked() and workedPrices() show what
/// it would give; the document is untouched until finishGesture(), which makes one undo step. Nothing is allocated between
/// two moves of one gesture once the first has been made.
class Workbench : public QObject
{
    Q_OBJECT
public:
    explicit Workbench(Document& document, QObject* parent = nullptr);

    Document& document() { return m_document; }
    const Document& document() const { return m_document; }
    const Currency& currency() const { return m_document.scenario().currency; }

    /// Index of the tier on the bench, -1 for none; its case, or nullptr.
    int tier() const { return m_tier; }
    const TierCase* tierCase() const { return m_document.tier(m_tier); }
    /// The candidate worked on; -1 = the current ladder is on the bench.
    int candidate() const { return m_candidate; }
    /// "current" or the candidate's name.
    QString candidateName() const;

    /// The tier the user wants to see. Where an edit, an undo or a refresh leads, the bench goes by itself: when its tier leaves by a
    /// refresh it shows the first, and goes back when the tier is there again, unless the user has chosen another meanwhile.
    void showTier(int tier, int candidate = -1);
    void workOn(int candidate);

    /// The current ladder and the one worked on, measured under the settings shown (equal when candidate() is -1 and no gesture goes on).
    const Measurement& current() const { return *m_current; }
    const Measurement& worked() const { return *m_worked; }
    std::span<const Price> currentPrices() const { return m_currentPrices; }
    std::span<const Price> workedPrices() const { return m_workedPrices; }
    /// The price rules in force for the tier.
    const PriceRules& rules() const;
    /// Model settings in force, a marker being dragged included.
    const ModelSettings& settings() const { return m_settings; }

    /// All units of the tier, taken and closed too, in ladder order of the worked prices: columns()[place] = unit index. Does not change
    /// during a gesture: a rung keeps its column while it is dragged past its neighbours.
    std::span<const std::uint32_t> columns() const { return m_columns; }

    // Selection, as unit indices in ascending order.
    std::span<const std::uint32_t> selection() const { return m_selection; }
    bool isSelected(std::uint32_t unit) const;
    void select(std::vector<std::uint32_t> units);

    /// Hold the asking total: of the units on offer, as the Figures show it.
    bool holdsTotal() const { return m_holdTotal; }
    void setHoldTotal(bool on);

    // Gestures.
    enum class Gesture { none, move, bend, left, trial };
    Gesture gesture() const { return m_gesture; }
    /// Starts to drag `units` (ascending unit indices; locked ones do not follow). False when nothing can move.
    bool beginMove(std::vector<std::uint32_t> units);
    void moveBy(Price by);
    /// Starts to bend the selected units, when three or more are selected, or else all rentable ones.
    bool beginBend();
    void bendTo(double exponent);
    double bendExponent() const { return m_bendExponent; }
    /// Starts to drag the number left. False for models without one.
    bool beginLeft();
    void leftTo(int left);
    /// Starts to try whole ladders (a solver's while its slider moves): worked() shows each, whatever ladder was on the bench. `name` is
    /// what the ladder is kept under; a trial that is going on goes on under the new name. False without a tier.
    bool beginTrial(const QString& name);
    /// One price per unit, by unit index.
    void tryPrices(std::span<const Price> prices);
    const QString& trialName() const { return m_trialName; }
    /// A trial becomes a candidate of its own, unless it is the current ladder.
    void finishGesture();
    void giveUpGesture();
    /// The units the gesture moves (not those that only give way to hold the total), and their prices at its start, by unit index.
    std::span<const std::uint32_t> moved() const { return m_moved; }
    std::span<const Price> startPrices() const { return m_startPrices; }
    /// What stopped the gesture short, if anything; what could not be spread when the total is held.
    Bound bound() const { return m_reshaped.bound; }
    /// The same in words, with the rule's figure: "held: greatest change 10 %". Empty when nothing did.
    QString boundText() const;
    Price leftOver() const { return m_reshaped.leftOver; }

    // Whole gestures in one call.
    /// Selected units go `steps` price points up or down; repeated nudges of the same selection are one undo step.
    void nudge(int steps);
    /// One unit to a typed price (snapped, held inside the rules).
    void setPrice(std::uint32_t unit, Price wanted);
    void toggleLock();

signals:
    /// Another tier, candidate, rule, lock or committed price: everything may have moved.
    void reset();
    /// The gesture moved: worked(), workedPrices() and, for Gesture::left, settings() changed; columns() and current() did not (except
    /// current() for Gesture::left).
    void moving();
    void gestureChanged();
    void selectionChanged();
    /// A sentence for the status bar.
    void told(const QString& sentence);

private:
    void onDocumentChanged(const DocumentChange& change);
    void onRefreshed();
    void show(int tier, int candidate);
    void remeasure();
    void remeasureWorked();
    bool startGesture(Gesture gesture, std::vector<std::uint32_t> units);
    void reshaped();
    void holdTotalIfAsked();
    void commit(const QString& name, bool nudge);
    QString gestureName() const;
    QString unitName(std::uint32_t unit) const;
    void keepTrial();

    Document& m_document;
    int m_tier = -1;
    int m_candidate = -1;
    std::string m_site; ///< Of the tier shown: after a refresh it is found again by its names.
    std::string m_tierName;
    /// A tier that left the bench by a refresh.
    struct Gone {
        std::string site;
        std::string name;
        int candidate = -1;
    };
    std::optional<Gone> m_gone;
    ModelSettings m_settings;
    Measurer m_measureCurrent;
    Measurer m_measureWorked;
    const Measurement* m_current; ///< The measurers' results; an empty measurement while no tier is shown.
    const Measurement* m_worked;
    std::vector<Price> m_currentPrices;
    std::vector<Price> m_workedPrices;
    std::vector<Price> m_startPrices;
    std::vector<std::uint32_t> m_columns;
    std::vector<std::uint32_t> m_selection;
    std::vector<std::uint32_t> m_moved;
    std::vector<std::uint32_t> m_onOffer;
    Reshaped m_reshaped;
    PriceRules m_rules; ///< In force during the gesture.
    TierLimits m_limits;
    Gesture m_gesture = Gesture::none;
    double m_bendExponent = 1.0;
    QString m_trialName;
    bool m_holdTotal = false;
};

} // namespace rungwright
