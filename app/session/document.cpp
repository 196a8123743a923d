// SPDX-License-Identifier: GPL-3.0-or-later
#include "document.h"

#include "refresh.h"
#include "scenario_json.h"
#include "steps.h"

#include <QFileInfo>
#include <QThreadPool>

#include <algorithm>
#include <cassert>

namespace rungwright
{

namespace
{

QString fromUtf8(const std::string& text) { return QString::fromUtf8(text.data(), static_cast<qsizetype>(text.size())); }

} // namespace

std::vector<PriceChange> priceChanges(std::span<const Price> before, std::span<const Price> after)
{
    assert(before.size() == after.size());
    std::vector<PriceChange> changes;
    for (std::size_t i = 0; i < before.size(); ++i) {
        if (before[i] != after[i])
            changes.push_back({static_cast<std::uint32_t>(i), before[i], after[i]});
    }
    return changes;
}

Document::Document(QObject* parent) : QObject(parent) { connect(&m_undo, &QUndoStack::cleanChanged, this, &Document::saveStateChanged); }

const TierCase* Document::tier(int index) const
{
    if (index < 0 || index >= static_cast<int>(m_scenario.tiers.size()))
        return nullptr;
    return &m_scenario.tiers[static_cast<std::size_t>(index)];
}

QString Document::displayName() const
{
    if (!m_path.isEmpty())
        return QFileInfo(m_path).fileName();
    return m_scenario.title.empty() ? tr("Untitled") : fromUtf8(m_scenario.title);
}

void Document::begin(Scenario scenario, const QString& path, bool saved)
{
    std::swap(m_scenario, scenario);
    // A million units take a while to let go; nobody waits for that.
    QThreadPool::globalInstance()->start([former = std::move(scenario)]() mutable { former = {}; });
    m_path = path;
    m_unsavedStart = !saved;
    m_undo.clear();
    announce({DocumentChange::Kind::everything, -1, -1});
    emit saveStateChanged();
}

Outcome<bool> Document::saveTo(const QString& path)
{
    auto saved = saveScenario(m_scenario, path);
    if (saved.ok())
        writtenTo(path, m_revision);
    return saved;
}

void Document::writtenTo(const QString& path, std::uint64_t revision)
{
    m_path = path;
    m_unsavedStart = revision != m_revision;
    if (m_unsavedStart)
        m_undo.resetClean();
    else
        m_undo.setClean();
    emit saveStateChanged();
}

void Document::announce(const DocumentChange& change)
{
    ++m_revision;
    emit changed(change);
}

int Document::setPrices(int tierIndex, int candidate, std::span<const PriceChange> changes, const QString& stepName)
{
    return setPrices(tierIndex, candidate, changes, stepName, false);
}

int Document::setPrices(int tierIndex, int candidate, std::span<const PriceChange> changes, const QString& stepName, bool nudge)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc && candidate >= -1 && candidate < static_cast<int>(tc->candidates.size()));
    if (changes.empty())
        return candidate;
    if (candidate >= 0) {
        m_undo.push(new EditPrices(*this, stepName, tierIndex, candidate, {changes.begin(), changes.end()}, nudge));
        return candidate;
    }
    Candidate made;
    made.name = freeCandidateName(tierIndex);
    made.prices = askingPrices(tc->tier.units);
    for (const PriceChange& change : changes)
        made.prices[change.unit] = change.after;
    return addCandidate(tierIndex, std::move(made), stepName);
}

int Document::addCandidate(int tierIndex, Candidate candidate, const QString& stepName)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc && candidate.prices.size() == tc->tier.units.size());
    const int index = static_cast<int>(tc->candidates.size());
    candidate.name = freeCandidateName(tierIndex, fromUtf8(candidate.name));
    m_undo.push(new AddCandidate(*this, stepName, tierIndex, std::move(candidate)));
    return index;
}

int Document::copyCandidate(int tierIndex, int candidate)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    Candidate copy;
    if (candidate >= 0)
        copy = tc->candidates[static_cast<std::size_t>(candidate)];
    else
        copy.prices = askingPrices(tc->tier.units);
    const QString from = candidate >= 0 ? fromUtf8(copy.name) : tr("the current ladder");
    return addCandidate(tierIndex, std::move(copy), tr("Copy %1").arg(from));
}

void Document::discardCandidate(int tierIndex, int candidate)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc && candidate >= 0 && candidate < static_cast<int>(tc->candidates.size()));
    const QString name = fromUtf8(tc->candidates[static_cast<std::size_t>(candidate)].name);
    m_undo.push(new DiscardCandidate(*this, tr("Discard %1").arg(name), tierIndex, candidate));
}

bool Document::renameCandidate(int tierIndex, int candidate, const QString& name)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc && candidate >= 0 && candidate < static_cast<int>(tc->candidates.size()));
    const std::string wanted = name.trimmed().toStdString();
    const auto index = static_cast<std::size_t>(candidate);
    if (wanted == tc->candidates[index].name)
        return true;
    const auto taken = [&](const Candidate& other) { return other.name == wanted; };
    if (wanted.empty() || wanted == kCurrentName || std::any_of(tc->candidates.begin(), tc->candidates.end(), taken))
        return false;
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(
        new ChangeValue<std::string>(*this, tr("Rename %1 to %2").arg(fromUtf8(tc->candidates[index].name), name.trimmed()),
                                     [tierAt, index](Scenario& s) -> std::string& { return s.tiers[tierAt].candidates[index].name; },
                                     wanted, {DocumentChange::Kind::candidates, tierIndex, candidate}));
    return true;
}

void Document::setCandidateNote(int tierIndex, int candidate, const QString& note)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc && candidate >= 0 && candidate < static_cast<int>(tc->candidates.size()));
    const auto index = static_cast<std::size_t>(candidate);
    const std::string wanted = note.toStdString();
    if (wanted == tc->candidates[index].note)
        return;
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(
        new ChangeValue<std::string>(*this, tr("Note on %1").arg(fromUtf8(tc->candidates[index].name)),
                                     [tierAt, index](Scenario& s) -> std::string& { return s.tiers[tierAt].candidates[index].note; },
                                     wanted, {DocumentChange::Kind::candidates, tierIndex, candidate}));
}

void Document::chooseCandidate(int tierIndex, std::optional<int> candidate)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    if (tc->chosen == candidate)
        return;
    const QString name =
        candidate ? tr("Choose %1").arg(fromUtf8(tc->candidates[static_cast<std::size_t>(*candidate)].name)) : tr("Choose none");
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(new ChangeValue<std::optional<int>>(*this, name,
                                                    [tierAt](Scenario& s) -> std::optional<int>& { return s.tiers[tierAt].chosen; },
                                                    candidate, {DocumentChange::Kind::candidates, tierIndex, candidate.value_or(-1)}));
}

void Document::setLocked(int tierIndex, std::span<const std::uint32_t> units, bool locked)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    std::vector<std::uint32_t> toSet;
    for (const std::uint32_t unit : units) {
        if (tc->tier.units[unit].locked != locked)
            toSet.push_back(unit);
    }
    if (toSet.empty())
        return;
    const QString what = toSet.size() == 1 ? fromUtf8(tc->tier.units[toSet.front()].name) : tr("%1 units").arg(toSet.size());
    m_undo.push(new SetLocks(*this, locked ? tr("Lock %1").arg(what) : tr("Unlock %1").arg(what), tierIndex, std::move(toSet), locked));
}

void Document::setModel(int tierIndex, const ModelSettings& model, const QString& stepName)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    if (tc->model == model)
        return;
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(new ChangeValue<ModelSettings>(*this, stepName, [tierAt](Scenario& s) -> ModelSettings& { return s.tiers[tierAt].model; },
                                               model, {DocumentChange::Kind::model, tierIndex, -1}));
}

void Document::setRules(const RuleScope& scope, const PriceRules& rules)
{
    if (const PriceRules* now = rulesOf(m_scenario, scope); now && *now == rules)
        return;
    QString name = tr("Change the price rules");
    if (!scope.site.empty())
        name = tr("Price rules of %1").arg(fromUtf8(scope.tier.empty() ? scope.site : scope.tier));
    m_undo.push(new SetRules(*this, name, scope, rules));
}

void Document::dropRules(const RuleScope& scope)
{
    assert(scope != RuleScope{});
    if (rulesOf(m_scenario, scope))
        m_undo.push(new SetRules(*this, tr("Drop the price rules of %1").arg(fromUtf8(scope.tier.empty() ? scope.site : scope.tier)), scope,
                                 std::nullopt));
}

void Document::setTierNote(int tierIndex, const QString& note)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    const std::string wanted = note.toStdString();
    if (tc->note == wanted)
        return;
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(new ChangeValue<std::string>(*this, tr("Note on %1").arg(fromUtf8(tc->tier.name)),
                                             [tierAt](Scenario& s) -> std::string& { return s.tiers[tierAt].note; }, wanted,
                                             {DocumentChange::Kind::notes, tierIndex, -1}));
}

void Document::setScenarioNote(const QString& note)
{
    const std::string wanted = note.toStdString();
    if (m_scenario.note == wanted)
        return;
    m_undo.push(new ChangeValue<std::string>(*this, tr("Note on the scenario"), [](Scenario& s) -> std::string& { return s.note; }, wanted,
                                             {DocumentChange::Kind::notes, -1, -1}));
}

void Document::setFlagThresholds(const FlagThresholds& flags)
{
    assert(flags.lastUnits >= 0 && flags.gapShare >= 0);
    if (m_scenario.flags == flags)
        return;
    m_undo.push(new ChangeValue<FlagThresholds>(*this, tr("Change when tiers are flagged"),
                                                [](Scenario& s) -> FlagThresholds& { return s.flags; }, flags,
                                                {DocumentChange::Kind::flags, -1, -1}));
}

void Document::setSeen(std::span<const int> tiers, bool seen)
{
    std::vector<int> toSet;
    for (const int index : tiers) {
        const TierCase* tc = tier(index);
        assert(tc);
        if (tc->seen != seen)
            toSet.push_back(index);
    }
    if (toSet.empty())
        return;
    std::sort(toSet.begin(), toSet.end());
    toSet.erase(std::unique(toSet.begin(), toSet.end()), toSet.end());
    const QString what = toSet.size() == 1 ? fromUtf8(tier(toSet.front())->tier.name) : tr("%1 tiers").arg(toSet.size());
    m_undo.push(new SetSeen(*this, seen ? tr("Mark %1 as seen").arg(what) : tr("Mark %1 as not seen").arg(what), std::move(toSet), seen));
}

void Document::setFloor(int tierIndex, Price floor)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc && floor.minor >= 0);
    if (tc->tier.advertisedFloor == floor)
        return;
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(new ChangeValue<Price>(*this, tr("Advertised floor of %1").arg(fromUtf8(tc->tier.name)),
                                       [tierAt](Scenario& s) -> Price& { return s.tiers[tierAt].tier.advertisedFloor; }, floor,
                                       {DocumentChange::Kind::floor, tierIndex, -1}));
}

void Document::recordSignedSheet(int tierIndex, SignedSheet sheet)
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    if (tc->signedOff == sheet)
        return;
    const QString name = sheet.candidate == kCurrentName ? tr("the current ladder") : fromUtf8(sheet.candidate);
    const auto tierAt = static_cast<std::size_t>(tierIndex);
    m_undo.push(new ChangeValue<std::optional<SignedSheet>>(
        *this, tr("Hand over the price sheet of %1").arg(name),
        [tierAt](Scenario& s) -> std::optional<SignedSheet>& { return s.tiers[tierAt].signedOff; }, std::move(sheet),
        {DocumentChange::Kind::signedOff, tierIndex, -1}));
}

bool Document::refresh(const RefreshPlan& plan, const QString& listName)
{
    if (!(plan.before == m_scenario.tiers) || !(plan.takesCurrency || plan.currency == m_scenario.currency))
        return false;
    if (!(plan.after == m_scenario.tiers) || plan.takesCurrency)
        m_undo.push(new TakeRefresh(*this, tr("Refresh from %1").arg(listName), plan.after, plan.currency));
    return true;
}

std::string Document::freeCandidateName(int tierIndex, const QString& wanted) const
{
    const TierCase* tc = tier(tierIndex);
    assert(tc);
    const auto taken = [&](const std::string& name) {
        const auto same = [&](const Candidate& other) { return other.name == name; };
        return name == kCurrentName || std::any_of(tc->candidates.begin(), tc->candidates.end(), same);
    };
    if (!wanted.isEmpty() && !taken(wanted.toStdString()))
        return wanted.toStdString();
    const QString stem = wanted.isEmpty() ? tr("Candidate") : wanted;
    for (int n = wanted.isEmpty() ? 1 : 2;; ++n) {
        std::string name = (stem + QLatin1Char(' ') + QString::number(n)).toStdString();
        if (!taken(name))
            return name;
    }
}

} // namespace rungwright
