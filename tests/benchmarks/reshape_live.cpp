// SPDX-License-Identifier: GPL-3.0-or-later
// A least change under the hand: from a move of its target to the painted frame of the bench, solving, rounding, measuring and painting
// included. Prints JSON, times in milliseconds: by the clock, and of the processor, which other programs do not lengthen. Fails only when
// what is shown is not what core says. An argument: how many moves are timed for each size. Growth and the frontier are told by
// least_change_speed.
#include "bench_plots.h"
#include "invented_tiers.h"
#include "reshape/least_change.h"

#include <QApplication>
#include <QElapsedTimer>

#include <algorithm>
#include <cstdio>
#include <cstdlib>
#include <ctime>
#include <vector>

using namespace rungwright;

namespace
{

struct LivePaints : QObject {
    explicit LivePaints(QWidget* widget) { widget->installEventFilter(this); }
    bool eventFilter(QObject*, QEvent* event) override
    {
        count += event->type() == QEvent::Paint;
        return false;
    }
    int count = 0;
};

double quantile(std::vector<double> times, double share)
{
    std::ranges::sort(times);
    return times.empty() ? 0 : times[static_cast<std::size_t>(share * static_cast<double>(times.size() - 1))];
}

} // namespace

int main(int argc, char** argv)
{
    if (qEnvironmentVariableIsEmpty("QT_QPA_PLATFORM"))
        qputenv("QT_QPA_PLATFORM", "offscreen");
    qputenv("QT_QPA_UPDATE_IDLE_TIME", "0"); // Frames are wanted at once, not after an idle time.
    QApplication app(argc, argv);
    const int moves = argc > 1 ? std::max(20, std::atoi(argv[1])) : 200;
    bool right = true;
    std::printf("{\"benchmark\": \"reshape_live\", \"unit\": \"milliseconds\", \"frame_of_60_hz\": 16.667, \"moves\": %d, \"runs\": [",
                moves);
    for (const int units : {60, 500, 1000}) {
        Tier tier = invented::leaningTier(units, Price{6900}, 6100);
        for (Unit& unit : tier.units)
            unit.status = Status::vacant;
        Document document;
        document.begin(invented::scenarioOf(std::move(tier)), {}, true);
        Workbench bench(document);
        bench.showTier(0);
        ModelSettings model;
        model.left = 12; // Whatever the size, so that the gap stays one worth narrowing.
        document.setModel(0, model, QStringLiteral("12 left"));
        BenchPlots plots;
        plots.resize(1920, 1080);
        plots.setWorkbench(&bench);
        plots.show();
        for (int i = 0; i < 20; ++i)
            QCoreApplication::processEvents();
        const LivePaints paints(plots.ladder());
        const double today = *bench.current().gap.gap;
        LeastChange solver;
        std::vector<double> wall;
        std::vector<double> cpu;
        std::vector<double> solving;
        for (int i = 0; i < moves; ++i) {
            ChangeWish wish;
            wish.target = {TargetKind::gap, today * (0.95 - 0.3 * ((i * 37) % moves) / moves)};
            const int before = paints.count;
            QElapsedTimer clock;
            const std::clock_t cpuStart = std::clock();
            clock.start();
            const LeastChangeAnswer& answer = solver.solve(bench.tierCase()->tier, bench.settings(), bench.rules(), wish);
            solving.push_back(static_cast<double>(clock.nsecsElapsed()) / 1e6);
            right = right && answer.obstacle == Obstacle::none && bench.beginTrial(QStringLiteral("Least change"));
            if (!right)
                break;
            bench.tryPrices(answer.prices);
            while (paints.count == before && clock.elapsed() < 1000)
                QCoreApplication::processEvents();
            wall.push_back(static_cast<double>(clock.nsecsElapsed()) / 1e6);
            cpu.push_back(1e3 * static_cast<double>(std::clock() - cpuStart) / CLOCKS_PER_SEC);
            right = right && paints.count > before && *bench.worked().gap.gap <= wish.target.value + 1e-6;
        }
        std::printf("%s{\"units\": %d, \"solve_p50\": %.3f, \"solve_p95\": %.3f, \"frame_p50\": %.3f, \"frame_p95\": %.3f, "
                    "\"frame_cpu_p50\": %.3f, \"frame_cpu_p95\": %.3f}",
                    units == 60 ? "" : ", ", units, quantile(solving, 0.5), quantile(solving, 0.95), quantile(wall, 0.5),
                    quantile(wall, 0.95), quantile(cpu, 0.5), quantile(cpu, 0.95));
    }
    std::printf("], \"shown_is_cores\": %s}\n", right ? "true" : "false");
    return right ? 0 : 1;
}
