// SPDX-License-Identifier: GPL-3.0-or-later
// Ten thousand sign-offs of one tier: recording, reading their history, drawing it. The answers are checked before anything is timed.
//   ledger_speed [SIGN-OFFS] [UNITS]
#include "history_plot.h"
#include "invented_entries.h"
#include "ledger.h"

#include <QApplication>
#include <QElapsedTimer>
#include <QFileInfo>
#include <QTemporaryDir>

#include <algorithm>
#include <cmath>
#include <cstdio>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

/// The middle one of five, in milliseconds.
template <class Work>
double middleOfFive(const Work& work)
{
    std::vector<double> times;
    for (int i = 0; i < 5; ++i) {
        QElapsedTimer timer;
        timer.start();
        work();
        times.push_back(static_cast<double>(timer.nsecsElapsed()) / 1e6);
    }
    std::ranges::sort(times);
    return times[2];
}

} // namespace

int main(int count, char** words)
{
    qputenv("QT_QPA_PLATFORM", "offscreen");
    const QApplication app(count, words);
    const QStringList args = QCoreApplication::arguments();
    const int signOffs = args.size() > 1 ? args[1].toInt() : 10'000;
    const int units = args.size() > 2 ? args[2].toInt() : 60;
    const QTemporaryDir folder;
    const QString path = folder.filePath(QStringLiteral("l.sqlite"));
    const SignOff first = inventedEntry(0, 1);
    {
        auto opened = Ledger::open(path, Ledger::For::writing);
        if (!opened.ok())
            return 1;
        Ledger ledger = std::move(opened).value();
        QElapsedTimer timer;
        timer.start();
        for (int i = 0; i < signOffs; ++i) {
            if (!ledger.record(inventedEntry(i, units)).ok())
                return 1;
        }
        std::printf("{\"sign_offs\": %d, \"units\": %d, \"record_ms\": %.2f, ", signOffs, units,
                    static_cast<double>(timer.elapsed()) / signOffs);
    }
    std::printf("\"file_mb\": %.1f, ", static_cast<double>(QFileInfo(path).size()) / 1e6);
    const auto opened = Ledger::open(path, Ledger::For::reading);
    if (!opened.ok())
        return 1;
    const Ledger& ledger = opened.value();

    const auto lines = ledger.history(first.site, first.tier).value();
    if (lines.size() != static_cast<std::size_t>(signOffs) || lines.back().gapAfter != 1'600.5 + signOffs - 1)
        return 2;
    PriorWindow window;
    window.until = lines.back().instant;
    const auto lowest = ledger.lowestAsked(first.site, first.tier, first.currency, window).value();
    if (!lowest.tier || lowest.units.size() != static_cast<std::size_t>(units))
        return 2;
    std::printf("\"tier_history_ms\": %.1f, ", middleOfFive([&] { (void)ledger.history(first.site, first.tier); }));
    std::printf("\"unit_history_ms\": %.1f, ", middleOfFive([&] { (void)ledger.unitHistory(first.site, first.tier, "U1"); }));
    std::printf("\"sign_offs_of_30_days\": %lld, \"lowest_30_days_ms\": %.1f, ", static_cast<long long>(lowest.signOffs),
                middleOfFive([&] { (void)ledger.lowestAsked(first.site, first.tier, first.currency, window); }));
    window.days = 3650;
    std::printf("\"lowest_ever_ms\": %.1f, ",
                middleOfFive([&] { (void)ledger.lowestAsked(first.site, first.tier, first.currency, window); }));
    std::printf("\"entry_ms\": %.1f, ", middleOfFive([&] {
                    const auto again = Ledger::open(path, Ledger::For::reading);
                    if (again.ok())
                        (void)again.value().entry(lines.back().id);
                }));

    HistoryPicture picture;
    picture.currency = first.currency;
    picture.until = lines.back().instant;
    HistorySeries floor{HistorySeries::Kind::floor, QStringLiteral("advertised floor"), {}};
    HistorySeries cheapest{HistorySeries::Kind::cheapest, QStringLiteral("expected cheapest"), {}};
    for (const SignOffLine& line : lines) {
        picture.marks.push_back({line.instant, line.id});
        floor.points.push_back({line.instant, inMinor(*line.advertisedFloor)});
        cheapest.points.push_back({line.instant, line.cheapestAfter.value_or(NAN) + 400 * (line.id % 5)});
    }
    picture.series = {floor, cheapest};
    HistoryPlot plot;
    plot.resize(1000, 300);
    std::printf("\"plot_ms\": %.1f, ", middleOfFive([&] {
                    plot.setPicture(picture);
                    plot.grab();
                }));
    std::printf("\"choose_ms\": %.1f}\n", middleOfFive([&] {
                    plot.choose(lines[lines.size() / 2].id);
                    plot.grab();
                }));
    return 0;
}
