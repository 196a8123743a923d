// SPDX-License-Identifier: GPL-3.0-or-later
#include "commands.h"

#include "caution.h"
#include "fast_unit_list.h"
#include "file_kind.h"
#include "in_parallel.h"
#include "input.h"
#include "selection.h"
#include "streams.h"
#include "terminal_progress.h"
#include "worklist_csv.h"

#include <QFile>
#include <QFileInfo>

namespace rungwright
{

namespace
{

struct Scanned {
    WorklistCsv list;
    QStringList unknownColumns;
};

/// What is read only to be measured needs no names of units, and little memory. Nothing for a scenario, for a pipe, and for a list that
/// is not plainly fine: prepare() then finds the words for what is wrong with it.
std::optional<Scanned> scanPlainList(const Request& request, unsigned threads, TerminalProgress& progress)
{
    constexpr qint64 enoughToTell = 8192;
    QFile file(request.file);
    // A pipe is opened once only, by who reads it.
    if (!request.mapping.isEmpty() || !QFileInfo(request.file).isFile() || !file.open(QIODevice::ReadOnly) ||
        looksLikeScenario(file.peek(enoughToTell), request.file))
        return std::nullopt;
    FastUnitList list;
    const auto onRead = [&progress](double share) {
        progress.show("reading", share);
        return true;
    };
    FastSettings settings;
    settings.threads = threads;
    if (readFast(file, {request.currency, request.withoutBadRows}, KeepUnits::forFigures, settings, onRead, list) != FastEnd::done)
        return std::nullopt;

    struct Scratch {
        TierCase tierCase;
        std::vector<std::uint64_t> names;
    };
    std::vector<Scratch> scratch(threads);
    const auto ladderAt = [&](std::size_t place, unsigned thread) -> std::optional<ChosenLadder> {
        Scratch& mine = scratch[thread];
        if (!list.units.namesDiffer(place, mine.names))
            return std::nullopt;
        list.units.fill(place, mine.tierCase.tier);
        return ChosenLadder{&mine.tierCase, -1, {request.model.value_or(ModelKind::perceived), {}, {}}};
    };
    auto worklist =
        WorklistCsv::of(list.currency, list.units.tiers(), threads, ladderAt, [&](double share) { progress.show("measuring", share); });
    if (!worklist)
        return std::nullopt;
    return Scanned{*std::move(worklist), list.unknownColumns};
}

ExitStatus scanAnything(const Request& request, unsigned threads, TerminalProgress& progress, std::optional<WorklistCsv>& worklist)
{
    Scenario scenario;
    std::vector<ChosenLadder> ladders;
    if (const ExitStatus status = prepare(request, scenario, ladders); status != ExitStatus::done)
        return status;
    const auto ladderAt = [&ladders](std::size_t place, unsigned) { return std::optional(ladders[place]); };
    worklist =
        WorklistCsv::of(scenario.currency, ladders.size(), threads, ladderAt, [&](double share) { progress.show("measuring", share); });
    return ExitStatus::done;
}

} // namespace

ExitStatus scan(const Request& request)
{
    const unsigned threads = threadsFor(static_cast<unsigned>(request.threads.value_or(0)));
    std::optional<WorklistCsv> worklist;
    {
        TerminalProgress progress;
        if (std::optional<Scanned> scanned = scanPlainList(request, threads, progress)) {
            sayColumnsNotUsed(request.file, scanned->unknownColumns);
            if (const ExitStatus status = refuseToOverwriteInput(request); status != ExitStatus::done)
                return status;
            worklist = std::move(scanned->list);
        } else if (const ExitStatus status = scanAnything(request, threads, progress, worklist); status != ExitStatus::done) {
            return status;
        }
    }
    const WriteUndisturbed undisturbed(QFile::encodeName(request.out).toStdString());
    const auto written = request.out.isEmpty() ? writeToStandardOutput(worklist->pieces()) : writeOut(request.out, worklist->pieces());
    if (!written)
        return refuse(ExitStatus::cannotWrite, written.trouble());
    say(cautionText());
    return ExitStatus::done;
}

} // namespace rungwright
