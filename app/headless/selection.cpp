// SPDX-License-Identifier: GPL-3.0-or-later
#include "selection.h"

#include "input.h"
#include "streams.h"

#include <utility>

namespace rungwright
{

namespace
{

QString text(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

Trouble trouble(const QString& what) { return {QStringLiteral("rungwright: %1").arg(what).toStdString()}; }

/// The first few of many names, so that a message stays readable.
QString someOf(const QStringList& names)
{
    constexpr qsizetype kShown = 12;
    if (names.size() <= kShown)
        return names.join(QStringLiteral(", "));
    return names.mid(0, kShown).join(QStringLiteral(", ")) + QStringLiteral(" and %1 more").arg(names.size() - kShown);
}

QString place(const Tier& tier) { return QStringLiteral("'%1' / '%2'").arg(text(tier.site), text(tier.name)); }

/// The index of the candidate of that name; -1 for the current ladder; nothing when there is none.
std::optional<int> candidateNamed(const TierCase& tierCase, const QString& name)
{
    if (name == text(kCurrentName))
        return -1;
    for (std::size_t i = 0; i < tierCase.candidates.size(); ++i) {
        if (text(tierCase.candidates[i].name) == name)
            return int(i);
    }
    return std::nullopt;
}

Trouble noSuchTier(const Scenario& scenario, const Request& request)
{
    QStringList wanted;
    if (request.site)
        wanted += QStringLiteral("site '%1'").arg(*request.site);
    if (request.tier)
        wanted += QStringLiteral("tier '%1'").arg(*request.tier);
    QStringList there;
    for (const TierCase& tierCase : scenario.tiers)
        there += place(tierCase.tier);
    return trouble(QStringLiteral("%1 holds nothing of %2; its tiers (site / tier) are: %3")
                       .arg(request.file, wanted.join(QStringLiteral(", ")), someOf(there)));
}

Trouble noSuchCandidate(const TierCase& tierCase, const Request& request)
{
    QStringList there{text(kCurrentName)};
    for (const Candidate& candidate : tierCase.candidates)
        there += text(candidate.name);
    return trouble(QStringLiteral("%1 has no candidate '%2'; it has: %3").arg(place(tierCase.tier), *request.candidate, someOf(there)));
}

ModelSettings settingsFor(const TierCase& tierCase, const Request& request)
{
    ModelSettings settings = tierCase.model;
    if (request.model)
        settings.kind = *request.model;
    if (request.left)
        settings.left = request.left;
    if (request.load)
        settings.load = request.load;
    return settings;
}

QString uselessOption(const ModelSettings& settings, const Request& request)
{
    if (request.left && !takesLeft(settings.kind))
        return QStringLiteral("--left");
    if (request.load && settings.kind != ModelKind::turnover)
        return QStringLiteral("--load");
    return {};
}

} // namespace

std::string_view ChosenLadder::candidateName() const
{
    return candidate < 0 ? kCurrentName : std::string_view(tierCase->candidates[std::size_t(candidate)].name);
}

Outcome<std::vector<ChosenLadder>> chooseLadders(const Scenario& scenario, const Request& request)
{
    std::vector<ChosenLadder> chosen;
    for (const TierCase& tierCase : scenario.tiers) {
        if ((request.site && *request.site != text(tierCase.tier.site)) || (request.tier && *request.tier != text(tierCase.tier.name)))
            continue;
        const std::optional<int> candidate = candidateNamed(tierCase, request.candidate.value_or(text(kCurrentName)));
        if (!candidate)
            return noSuchCandidate(tierCase, request);
        const ModelSettings settings = settingsFor(tierCase, request);
        if (const QString option = uselessOption(settings, request); !option.isEmpty())
            return trouble(
                QStringLiteral("%1 has no meaning for model '%2' (%3)").arg(option, text(modelWord(settings.kind)), place(tierCase.tier)));
        chosen.push_back({&tierCase, *candidate, settings});
    }
    if (chosen.empty() && (request.site || request.tier))
        return noSuchTier(scenario, request);
    return chosen;
}

ExitStatus refuseToOverwriteInput(const Request& request)
{
    for (const auto& [input, name] :
         {std::pair{request.file, "FILE"}, {request.mapping, "the --mapping file"}, {request.floors, "the --floors file"}}) {
        if (!input.isEmpty() && sameFile(input, request.out))
            return refuse(ExitStatus::wrongUsage, std::string("rungwright: --out would overwrite ") + name);
    }
    return ExitStatus::done;
}

ExitStatus prepare(const Request& request, Scenario& scenario, std::vector<ChosenLadder>& ladders)
{
    Outcome<Scenario> opened = openInput(request);
    if (!opened)
        return refuse(ExitStatus::inputRefused, opened.trouble());
    scenario = std::move(opened).value();
    auto chosen = chooseLadders(scenario, request);
    if (!chosen)
        return refuse(ExitStatus::wrongUsage, chosen.trouble());
    ladders = std::move(chosen).value();
    return refuseToOverwriteInput(request);
}

std::vector<MeasuredLadder> measureAll(const std::vector<ChosenLadder>& ladders)
{
    Measurer measurer;
    std::vector<MeasuredLadder> all;
    all.reserve(ladders.size());
    for (const ChosenLadder& ladder : ladders) {
        const std::vector<Price> prices = pricesOf(*ladder.tierCase, ladder.candidate);
        all.push_back({ladder, measurer.measure(ladder.tierCase->tier, prices, ladder.settings, MeasureParts::figuresOnly)});
    }
    return all;
}

} // namespace rungwright
