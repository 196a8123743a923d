// SPDX-License-Identifier: GPL-3.0-or-later
// What a unit costs in an invented list of several sizes: scanned (read for its figures, measured, written as a worklist), opened whole as
// the desk does, and opened by the careful reader. The cost must not grow with the list. Prints JSON; times are the least of a few, in
// nanoseconds of the clock on the wall a unit, by two threads. `scan_speed write FILE UNITS` only writes such a list.
#include "fast_unit_list.h"
#include "invented_list.h"
#include "worklist_csv.h"

#include <QBuffer>

#include <algorithm>
#include <chrono>
#include <cstdio>
#include <cstdlib>
#include <string_view>

using namespace rungwright;

namespace
{

void require(bool holds, const char* what)
{
    if (!holds) {
        std::fprintf(stderr, "scan_speed: %s\n", what);
        std::exit(1);
    }
}

int writeList(const char* path, int units)
{
    std::FILE* file = std::fopen(path, "wb");
    require(file != nullptr, "the file cannot be opened");
    bool whole = true;
    benchmarks::inventedList(
        units, [&](std::string_view text) { whole = std::fwrite(text.data(), 1, text.size(), file) == text.size() && whole; });
    whole = std::fclose(file) == 0 && whole;
    require(whole, "the file cannot be written");
    return 0;
}

constexpr unsigned kThreads = 2;

/// What the command does between opening the list and writing; the bytes of the worklist.
qsizetype scanned(QByteArray& bytes)
{
    QBuffer buffer(&bytes);
    buffer.open(QIODevice::ReadOnly);
    FastUnitList list;
    FastSettings settings;
    settings.threads = kThreads;
    require(readFast(buffer, {}, KeepUnits::forFigures, settings, {}, list) == FastEnd::done, "the list was not read the fast way");
    std::vector<TierCase> tiers(kThreads);
    std::vector<std::vector<std::uint64_t>> names(kThreads);
    const auto ladderAt = [&](std::size_t place, unsigned thread) -> std::optional<ChosenLadder> {
        require(list.units.namesDiffer(place, names[thread]), "two units of one name");
        list.units.fill(place, tiers[thread].tier);
        return ChosenLadder{&tiers[thread], -1, {}};
    };
    const auto worklist = WorklistCsv::of(list.currency, list.units.tiers(), kThreads, ladderAt, {});
    qsizetype size = 0;
    const NextPiece next = worklist->pieces();
    for (QByteArrayView piece = next(); !piece.isEmpty(); piece = next())
        size += piece.size();
    return size;
}

template <class Work>
double nanosecondsAUnit(int rounds, int units, Work work)
{
    using Clock = std::chrono::steady_clock;
    double least = 0;
    for (int round = 0; round < rounds; ++round) {
        const auto start = Clock::now();
        work();
        const double took = std::chrono::duration<double, std::nano>(Clock::now() - start).count() / units;
        least = round == 0 ? took : std::min(least, took);
    }
    return least;
}

} // namespace

int main(int argc, char** argv)
{
    if (argc == 4 && std::string_view(argv[1]) == "write")
        return writeList(argv[2], std::atoi(argv[3]));
    const int rounds = argc > 1 ? std::clamp(std::atoi(argv[1]) / 10, 1, 5) : 5;
    const bool brief = argc > 1;
    std::printf("{\"benchmark\": \"scan_speed\", \"unit\": \"nanoseconds a unit\", \"results\": [\n");
    bool first = true;
    for (const int units : {10'000, 100'000, 1'000'000}) {
        if (brief && units > 100'000)
            break;
        QByteArray bytes;
        benchmarks::inventedList(units, [&](std::string_view text) { bytes.append(text.data(), qsizetype(text.size())); });
        // Small lists are over in a moment: they are taken more often.
        const int often = rounds * (units < 1'000'000 ? 10 : 1);
        qsizetype size = 0;
        const double scan = nanosecondsAUnit(often, units, [&] { size = scanned(bytes); });
        require(size > units, "the worklist is too short");
        UnitListResult fast;
        const double whole = nanosecondsAUnit(often, units, [&] { fast = readUnitList(bytes, QStringLiteral("F"), {}); });
        UnitListResult careful;
        const double carefully = nanosecondsAUnit(rounds, units, [&] { careful = readUnitListCarefully(bytes, QStringLiteral("F"), {}); });
        require(fast.tiers == careful.tiers && fast.rowsTaken == units, "the two ways differ");
        std::printf("%s{\"units\": %d, \"scan\": %.0f, \"whole\": %.0f, \"careful\": %.0f}", first ? "" : ",\n", units, scan, whole,
                    carefully);
        first = false;
    }
    std::printf("\n]}\n");
    return 0;
}
