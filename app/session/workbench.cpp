// SPDX-License-Identifier: GPL-3.0-or-later
#include "workbench.h"

#include "rules_words.h"
#include "wording.h"

#include <algorithm>
#include <cassert>
#include <cmath>
#include <utility>

namespace rungwright
{

namespace
{

const Measurement kNothing{};

} // namespace

Workbench::Workbench(Document& document, QObject* parent) : QObject(parent), m_document(document), m_current(&kNothing), m_worked(&kNothing)
{
    connect(&document, &Document::changed, this, &Workbench::onDocumentChanged);
}

QString Workbench::candidateName() const
{
    const TierCase* tc = tierCase();
    if (!tc || m_candidate < 0)
        return tr("current");
    return QString::fromStdString(tc->candidates[static_cast<std::size_t>(m_candidate)].name);
}

void Workbench::showTier(int tier, int candidate)
{
    if (tier != m_tier)
        m_gone.reset();
    show(tier, candidate);
}

void Workbench::show(int tier, int candidate)
{
    giveUpGesture();
    const TierCase* tc = m_document.tier(tier);
    if (m_tier != tier)
        m_selection.clear();
    m_tier = tc ? tier : -1;
    m_candidate = tc ? std::clamp(candidate, -1, static_cast<int>(tc->candidates.size()) - 1) : -1;
    m_site = tc ? tc->tier.site : std::string();
    m_tierName = tc ? tc->tier.name : std::string();
    m_settings = tc ? tc->model : ModelSettings{};
    remeasure();
    emit reset();
    emit selectionChanged();
}

void Workbench::workOn(int candidate)
{
    if (candidate != m_candidate)
        showTier(m_tier, candidate);
}

const PriceRules& Workbench::rules() const
{
    const TierCase* tc = tierCase();
    return tc ? rulesFor(m_document.scenario(), tc->tier) : m_document.scenario().rules;
}

QString Workbench::boundText() const
{
    return bound() == Bound::none ? QString() : tr("held: %1").arg(boundWords(bound(), m_rules, currency()));
}

bool Workbench::isSelected(std::uint32_t unit) const { return std::binary_search(m_selection.begin(), m_selection.end(), unit); }

void Workbench::select(std::vector<std::uint32_t> units)
{
    std::sort(units.begin(), units.end());
    units.erase(std::unique(units.begin(), units.end()), units.end());
    const std::size_t there = tierCase() ? tierCase()->tier.units.size() : 0;
    std::erase_if(units, [there](std::uint32_t unit) { return unit >= there; });
    if (units == m_selection)
        return;
    m_selection = std::move(units);
    emit selectionChanged();
}

void Workbench::setHoldTotal(bool on)
{
    if (m_holdTotal == on)
        return;
    if (m_gesture == Gesture::none)
        m_holdTotal = on; // not in the middle of a gesture, which began under the other rule
    emit reset();         // whoever asked shows what holds
}

// Measuring ----------------------------------------------------------------------------------------------------------

void Workbench::remeasure()
{
    const TierCase* tc = tierCase();
    m_onOffer.clear();
    if (!tc) {
        m_currentPrices.clear();
        m_workedPrices.clear();
        m_columns.clear();
        m_current = m_worked = &kNothing;
        return;
    }
    m_currentPrices = askingPrices(tc->tier.units);
    m_workedPrices = pricesOf(*tc, m_candidate);
    for (std::uint32_t i = 0; i < tc->tier.units.size(); ++i) {
        if (tc->tier.units[i].onOffer())
            m_onOffer.push_back(i);
    }
    m_columns.clear();
    for (const Rung& rung : sortedLadder(tc->tier.units, m_workedPrices, Among::all))
        m_columns.push_back(rung.unit);
    m_current = &m_measureCurrent.measure(tc->tier, m_currentPrices, m_settings);
    remeasureWorked();
}

void Workbench::remeasureWorked() { m_worked = &m_measureWorked.measure(tierCase()->tier, m_workedPrices, m_settings); }

void Workbench::onDocumentChanged(const DocumentChange& change)
{
    using Kind = DocumentChange::Kind;
    if (change.kind == Kind::notes || change.kind == Kind::flags || change.kind == Kind::seen || change.kind == Kind::signedOff)
        return; // nothing here is measured from these
    // A gesture that was going on ends here without a look back: the candidate it worked on may be gone.
    const bool interrupted = std::exchange(m_gesture, Gesture::none) != Gesture::none;
    if (change.kind == Kind::everything) {
        m_selection.clear();
        m_tier = -1;
        m_gone.reset();
        show(m_document.empty() ? -1 : 0, -1);
        if (interrupted)
            emit gestureChanged();
        return;
    }
    if (change.kind == Kind::refreshed) {
        onRefreshed();
        if (interrupted)
            emit gestureChanged();
        return;
    }
    // An undo may reach back to another tier or candidate: show where it happened.
    const int tier = change.tier < 0 ? m_tier : change.tier;
    const bool namesCandidate = change.kind == Kind::prices || change.kind == Kind::candidates;
    show(tier, namesCandidate || tier != m_tier ? change.candidate : m_candidate);
    if (interrupted)
        emit gestureChanged();
}

void Workbench::onRefreshed()
{
    const Scenario& scenario = m_document.scenario();
    const TierCase* same = m_gone ? findTier(scenario, m_gone->site, m_gone->name) : nullptr;
    int candidate = -1;
    if (same) { // it is back
        candidate = m_gone->candidate;
        m_gone.reset();
    } else if ((same = findTier(scenario, m_site, m_tierName))) {
        candidate = m_candidate;
    } else if (!m_gone && m_tier >= 0) {
        m_gone = {m_site, m_tierName, m_candidate};
    }
    int tier = m_document.empty() ? -1 : 0;
    for (int i = 0; same && i < static_cast<int>(scenario.tiers.size()); ++i) {
        if (m_document.tier(i) == same)
            tier = i;
    }
    m_selection.clear(); // its units may stand elsewhere now
    m_tier = -1;
    show(tier, candidate);
}

// Gestures -----------------------------------------------------------------------------------------------------------

bool Workbench::startGesture(Gesture gesture, std::vector<std::uint32_t> units)
{
    giveUpGesture();
    m_moved = std::move(units);
    m_startPrices.assign(m_workedPrices.begin(), m_workedPrices.end());
    m_reshaped = Reshaped{m_startPrices, Bound::none, Price{}};
    m_rules = rules();
    m_limits = tierLimitsOf(tierCase()->tier, m_rules);
    m_gesture = gesture;
    emit gestureChanged();
    return true;
}

bool Workbench::beginMove(std::vector<std::uint32_t> units)
{
    const TierCase* tc = tierCase();
    if (!tc || units.empty())
        return false;
    const auto locked = [&](std::uint32_t unit) { return tc->tier.units[unit].locked; };
    const bool alone = units.size() == 1;
    std::erase_if(units, locked);
    if (units.empty()) {
        emit told(alone ? tr("The unit is locked. Press L to unlock it.") : tr("All of these units are locked."));
        return false;
    }
    std::sort(units.begin(), units.end());
    return startGesture(Gesture::move, std::move(units));
}

void Workbench::moveBy(Price by)
{
    if (m_gesture != Gesture::move)
        return;
    const Tier& tier = tierCase()->tier;
    const auto move = [&](std::int64_t part) {
        moveUnits(tier.units, m_startPrices, m_moved, Price{part}, m_rules, m_reshaped);
        holdTotalIfAsked();
    };
    makeWithin(tier, m_limits, m_startPrices, by.minor, move, m_reshaped);
    reshaped();
}

bool Workbench::beginBend()
{
    const TierCase* tc = tierCase();
    if (!tc)
        return false;
    std::vector<std::uint32_t> units;
    if (m_selection.size() >= 3) {
        units = m_selection;
    } else {
        for (std::uint32_t i = 0; i < tc->tier.units.size(); ++i) {
            if (tc->tier.units[i].rentable())
                units.push_back(i);
        }
    }
    if (units.size() < 3) {
        emit told(tr("A bend needs at least three units: its ends stay where they are."));
        return false;
    }
    m_bendExponent = 1.0;
    return startGesture(Gesture::bend, std::move(units));
}

void Workbench::bendTo(double exponent)
{
    if (m_gesture != Gesture::bend)
        return;
    // Beyond this every rung but the ends lies on one of them: nothing more to see.
    const double wanted = std::clamp(exponent, 0.05, 20.0);
    // Parts of a bend, when a rule holds it back: finer than a price point shows.
    constexpr std::int64_t parts = 4096;
    const Tier& tier = tierCase()->tier;
    const auto bend = [&](std::int64_t part) {
        m_bendExponent = part == parts ? wanted : std::pow(wanted, static_cast<double>(part) / static_cast<double>(parts));
        bendUnits(tier.units, m_startPrices, m_moved, m_bendExponent, m_rules, m_reshaped);
        holdTotalIfAsked();
    };
    makeWithin(tier, m_limits, m_startPrices, parts, bend, m_reshaped);
    reshaped();
}

bool Workbench::beginLeft()
{
    if (!tierCase() || !takesLeft(m_settings.kind) || m_worked->thinning.empty())
        return false;
    return startGesture(Gesture::left, {});
}

void Workbench::leftTo(int left)
{
    if (m_gesture != Gesture::left)
        return;
    left = std::clamp(left, 1, std::max(1, static_cast<int>(m_worked->rentable)));
    if (m_settings.left == left)
        return;
    m_settings.left = left;
    m_current = &m_measureCurrent.measure(tierCase()->tier, m_currentPrices, m_settings);
    remeasureWorked();
    emit moving();
}

bool Workbench::beginTrial(const QString& name)
{
    if (!tierCase() || (m_gesture != Gesture::none && m_gesture != Gesture::trial))
        return false;
    m_trialName = name;
    return m_gesture == Gesture::trial || startGesture(Gesture::trial, {});
}

void Workbench::tryPrices(std::span<const Price> prices)
{
    if (m_gesture != Gesture::trial)
        return;
    assert(prices.size() == m_startPrices.size());
    m_reshaped.prices.assign(prices.begin(), prices.end());
    reshaped();
}

void Workbench::holdTotalIfAsked()
{
    if (m_holdTotal)
        holdTotal(tierCase()->tier.units, m_startPrices, m_onOffer, m_moved, m_rules, m_reshaped);
    else
        m_reshaped.leftOver = Price{};
}

void Workbench::reshaped()
{
    if (m_reshaped.prices == m_workedPrices)
        return;
    m_workedPrices.assign(m_reshaped.prices.begin(), m_reshaped.prices.end());
    remeasureWorked();
    emit moving();
}

void Workbench::finishGesture()
{
    const Gesture done = m_gesture;
    if (done == Gesture::none)
        return;
    if (done == Gesture::left) {
        m_gesture = Gesture::none;
        emit gestureChanged();
        if (m_settings.left)
            m_document.setModel(m_tier, m_settings, *m_settings.left == 1 ? tr("1 unit left") : tr("%1 units left").arg(*m_settings.left));
        return;
    }
    if (done == Gesture::trial) {
        keepTrial();
        return;
    }
    const QString name = gestureName();
    m_gesture = Gesture::none;
    emit gestureChanged();
    if (m_reshaped.leftOver != Price{}) {
        emit told(tr("There is no room left to hold the asking total: it changes by %1.")
                      .arg(signedMoneyText(static_cast<double>(m_reshaped.leftOver.minor), currency())));
    }
    commit(name, false);
}

void Workbench::keepTrial()
{
    m_gesture = Gesture::none;
    emit gestureChanged();
    if (m_reshaped.prices == m_currentPrices) {
        emit told(tr("Nothing to keep: these are today's prices."));
        remeasure();
        emit reset();
        return;
    }
    Candidate kept;
    kept.name = m_trialName.toStdString();
    kept.prices = m_reshaped.prices;
    const QString name = m_trialName;
    m_document.addCandidate(m_tier, std::move(kept), name);
    emit told(name);
}

void Workbench::giveUpGesture()
{
    if (m_gesture == Gesture::none)
        return;
    m_gesture = Gesture::none;
    m_settings = tierCase()->model;
    remeasure();
    emit gestureChanged();
    emit reset();
}

void Workbench::commit(const QString& name, bool nudge)
{
    const std::vector<PriceChange> changes = priceChanges(m_startPrices, m_reshaped.prices);
    if (changes.empty()) {
        remeasure();
        emit reset();
        return;
    }
    m_document.setPrices(m_tier, m_candidate, changes, name, nudge);
    emit told(name);
}

QString Workbench::unitName(std::uint32_t unit) const { return QString::fromStdString(tierCase()->tier.units[unit].name); }

QString Workbench::gestureName() const
{
    if (m_gesture == Gesture::bend)
        return tr("Bend %1 by %2").arg(candidateName(), numberText(m_bendExponent));
    if (m_moved.size() == 1) {
        const std::uint32_t unit = m_moved.front();
        return tr("%1: %2 to %3")
            .arg(unitName(unit), moneyText(m_startPrices[unit], currency()), moneyText(m_reshaped.prices[unit], currency()));
    }
    Price greatest{};
    for (const std::uint32_t unit : m_moved) {
        const Price by = m_reshaped.prices[unit] - m_startPrices[unit];
        if (std::max(by, -by) > std::max(greatest, -greatest))
            greatest = by;
    }
    return tr("%1 units: by %2")
        .arg(static_cast<int>(m_moved.size()))
        .arg(signedMoneyText(static_cast<double>(greatest.minor), currency()));
}

void Workbench::nudge(int steps)
{
    if (m_gesture != Gesture::none || !beginMove(m_selection))
        return;
    const Tier& tier = tierCase()->tier;
    const auto go = [&](std::int64_t part) {
        nudgeUnits(tier.units, m_startPrices, m_moved, static_cast<int>(part), m_rules, m_reshaped);
        holdTotalIfAsked();
    };
    makeWithin(tier, m_limits, m_startPrices, steps, go, m_reshaped);
    if (m_reshaped.bound != Bound::none && m_reshaped.prices == m_startPrices) {
        const QString reason = boundWords(m_reshaped.bound, m_rules, currency());
        giveUpGesture();
        emit told(tr("No further: %1.").arg(reason));
        return;
    }
    const QString name = gestureName();
    m_gesture = Gesture::none;
    emit gestureChanged();
    commit(name, true);
}

void Workbench::setPrice(std::uint32_t unit, Price wanted)
{
    if (m_gesture != Gesture::none || !beginMove({unit}))
        return;
    moveBy(wanted - m_startPrices[unit]);
    if (m_reshaped.bound != Bound::none)
        emit told(
            tr("Held at %1: %2.").arg(moneyText(m_reshaped.prices[unit], currency()), boundWords(m_reshaped.bound, m_rules, currency())));
    finishGesture();
}

void Workbench::toggleLock()
{
    const TierCase* tc = tierCase();
    if (!tc || m_selection.empty() || m_gesture != Gesture::none)
        return;
    const auto locked = [&](std::uint32_t unit) { return tc->tier.units[unit].locked; };
    const bool lock = !std::all_of(m_selection.begin(), m_selection.end(), locked);
    m_document.setLocked(m_tier, m_selection, lock);
}

} // namespace rungwright
