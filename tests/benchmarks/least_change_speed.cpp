// SPDX-License-Identifier: GPL-3.0-or-later
// How long a least change takes: a full solve with rounding of one tier at one position of the target's slider, by number of units; how
// that grows; and a frontier. Prints one line of JSON, times in milliseconds: by the clock, and
// of the processor ("cpu"), which other programs do not disturb and which the growth is told by. Answers are checked before anything is
// timed. An argument:
// how many solves are timed for each size. With --problems the ladders are printed instead, for least_change_quadprog.R.
#include "gap/measure.h"
#include "reshape/frontier.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <ctime>
#include <random>
#include <string>
#include <vector>

using namespace rungwright;

namespace
{

using Clock = std::chrono::steady_clock;

struct Percentiles {
    double p50 = 0, p95 = 0;
    double cpu50 = 0, cpu95 = 0;
};

/// Times the same thing again and again.
class Stopwatch
{
public:
    void start()
    {
        m_start = Clock::now();
        m_cpuStart = std::clock();
    }
    void stop()
    {
        m_cpu.push_back(1000.0 * static_cast<double>(std::clock() - m_cpuStart) / CLOCKS_PER_SEC);
        m_wall.push_back(std::chrono::duration<double, std::milli>(Clock::now() - m_start).count());
    }
    Percentiles percentiles()
    {
        const auto at = [](std::vector<double>& times, double p) {
            std::ranges::sort(times);
            return times[static_cast<std::size_t>(p * static_cast<double>(times.size() - 1))];
        };
        return {at(m_wall, 0.50), at(m_wall, 0.95), at(m_cpu, 0.50), at(m_cpu, 0.95)};
    }

private:
    Clock::time_point m_start;
    std::clock_t m_cpuStart = 0;
    std::vector<double> m_wall, m_cpu;
};

void print(const Percentiles& p)
{
    std::printf("\"p50\": %.3f, \"p95\": %.3f, \"cpu50\": %.3f, \"cpu95\": %.3f", p.p50, p.p95, p.cpu50, p.cpu95);
}

/// An invented tier that leans left, all on offer, one in ten of the dearer units locked. (Locks among the cheapest would leave a large
/// tier next to no room, since the order is kept.)
Tier inventedTier(std::size_t units)
{
    std::mt19937_64 random(20240901 + units);
    std::uniform_real_distribution<double> uniform;
    Tier tier{"Invented", "Invented", {4900}, {}};
    for (std::size_t i = 0; i < units; ++i) {
        Unit unit;
        unit.name = std::to_string(i + 1);
        unit.asking = {4900 + 50 * std::llround(80 * std::sqrt(uniform(random)))};
        unit.locked = uniform(random) < 0.1 && unit.asking.minor > 7000;
        tier.units.push_back(unit);
    }
    return tier;
}

PriceRules houseRules()
{
    PriceRules rules;
    rules.points.step = {50};
    rules.greatestChangePercent = 20;
    return rules;
}

// Twelve draws whatever the size, so that the gap stays one worth narrowing.
const ModelSettings kModel{ModelKind::perceived, 12, {}};

void require(bool holds, const char* what)
{
    if (!holds) {
        std::fprintf(stderr, "least_change_speed: wrong answer, nothing timed: %s\n", what);
        std::exit(1);
    }
}

double gapOf(const Tier& tier, const std::vector<Price>& prices)
{
    return *measured(tier, prices, kModel, MeasureParts::figuresOnly).gap.gap;
}

ChangeWish wishFor(double gap)
{
    ChangeWish wish;
    wish.target = {TargetKind::gap, gap};
    return wish;
}

/// Target met by the ladder's own measurement, total held, nothing below the lower bound.
void check(const Tier& tier, const LeastChangeAnswer& answer, double wanted)
{
    require(answer.obstacle == Obstacle::none && answer.targetMet, "no ladder");
    require(gapOf(tier, answer.prices) <= wanted + 1e-6, "target");
    Price total;
    Price before;
    for (std::size_t i = 0; i < tier.units.size(); ++i) {
        total += answer.prices[i];
        before += tier.units[i].asking;
    }
    require(total == before, "total");
    require(answer.cost >= answer.leastCost * (1 - 1e-9) && answer.cost <= answer.leastCost + answer.bound + 1e-6, "bound");
    require(answer.changed > 0, "nothing changed");
}

Percentiles timed(std::size_t units, int runs)
{
    const Tier tier = inventedTier(units);
    const double now = gapOf(tier, askingPrices(tier.units));
    LeastChange solver;
    const PriceRules rules = houseRules();
    check(tier, solver.solve(tier, kModel, rules, wishFor(0.85 * now)), 0.85 * now);
    Stopwatch watch;
    for (int run = 0; run < runs; ++run) {
        const double wanted = now * (0.8 + 0.15 * run / runs); // As a slider goes.
        watch.start();
        const bool solved = solver.solve(tier, kModel, rules, wishFor(wanted)).obstacle == Obstacle::none;
        watch.stop();
        require(solved, "on the slider's way");
    }
    return watch.percentiles();
}

Percentiles frontierTimed(std::size_t units, int points, int runs)
{
    const Tier tier = inventedTier(units);
    FrontierTracer tracer;
    Stopwatch watch;
    for (int run = 0; run < runs; ++run) {
        watch.start();
        const auto& frontier = tracer.byChange(tier, kModel, houseRules(), {}, points);
        watch.stop();
        require(frontier.size() == static_cast<std::size_t>(points), "frontier");
        for (std::size_t i = 1; i < frontier.size(); ++i)
            require(frontier[i].gap < frontier[i - 1].gap && frontier[i].rmsChange > frontier[i - 1].rmsChange, "frontier's order");
    }
    return watch.percentiles();
}

/// One line a size: n, total, expectedMost, then n each of price, weight, lo, hi, counted, odds, and the cost found here.
void printProblems()
{
    for (const std::size_t units : {50, 200, 500, 1000}) {
        const Tier tier = inventedTier(units);
        LadderChain chain;
        chain.build(tier, kModel, houseRules(), OrderKept::present, false, {});
        const double wanted = 0.85 * gapOf(tier, askingPrices(tier.units));
        LeastChange solver;
        const LeastChangeAnswer& answer = solver.solve(tier, kModel, houseRules(), wishFor(wanted));
        std::printf("%zu %lld %.17g", units, static_cast<long long>(chain.total.minor),
                    wanted + static_cast<double>(tier.advertisedFloor.minor));
        for (const auto* part : {&chain.today, &chain.weight, &chain.lo, &chain.hi, &chain.counted, &chain.odds})
            for (const double number : *part)
                std::printf(" %.17g", number);
        std::printf(" %.17g\n", answer.leastCost);
    }
}

} // namespace

int main(int argc, char** argv)
{
    if (argc > 1 && std::strcmp(argv[1], "--problems") == 0) {
        printProblems();
        return 0;
    }
    const int runs = argc > 1 ? std::max(10, std::atoi(argv[1])) : 200;
    std::printf("{\"benchmark\": \"least_change_speed\", \"unit\": \"milliseconds\", \"runs\": %d, \"solve\": [", runs);
    for (const std::size_t units : {50, 200, 500, 1000}) {
        const Percentiles p = timed(units, runs);
        std::printf("%s{\"units\": %zu, ", units == 50 ? "" : ", ", units);
        print(p);
        std::printf("}");
    }
    // Growth: the slope of log time on log size from the first to the last, beside that of n log n.
    const std::vector<std::size_t> sizes{1000, 10'000, 100'000};
    std::printf("], \"growth\": [");
    double first = 0;
    double last = 0;
    for (const std::size_t units : sizes) {
        const Percentiles p = timed(units, std::max(10, runs / 20));
        last = p.cpu50;
        first = units == sizes.front() ? last : first;
        std::printf("%s{\"units\": %zu, ", units == sizes.front() ? "" : ", ", units);
        print(p);
        std::printf("}");
    }
    const double decades = std::log(static_cast<double>(sizes.back()) / static_cast<double>(sizes.front()));
    const double nLogN = 1 + std::log(std::log(static_cast<double>(sizes.back())) / std::log(static_cast<double>(sizes.front()))) / decades;
    const Percentiles frontier = frontierTimed(500, 50, std::max(10, runs / 10));
    std::printf("], \"exponent\": %.3f, \"nLogNExponent\": %.3f, \"frontierOf50For500\": {", std::log(last / first) / decades, nLogN);
    print(frontier);
    std::printf("}}\n");
    return 0;
}
