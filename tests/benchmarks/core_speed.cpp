// SPDX-License-Identifier: GPL-3.0-or-later
// How long one measurement of a ladder takes, figures and both curves, beside std::sort of the same ladder in the same run. Prints JSON;
// times in microseconds. Answers are checked before anything is timed.
#include "gap/measure.h"

#include <algorithm>
#include <chrono>
#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <random>
#include <string>
#include <vector>

using namespace rungwright;

namespace
{

using Clock = std::chrono::steady_clock;

struct Percentiles {
    double p50 = 0;
    double p95 = 0;
    double p99 = 0;
};

Percentiles percentiles(std::vector<double> times)
{
    std::ranges::sort(times);
    const auto at = [&](double p) { return times[static_cast<std::size_t>(p * static_cast<double>(times.size() - 1))]; };
    return {at(0.50), at(0.95), at(0.99)};
}

double microseconds(Clock::duration elapsed) { return std::chrono::duration<double, std::micro>(elapsed).count(); }

/// An invented tier that leans left, three units in ten taken.
Tier inventedTier(int units, std::mt19937_64& random)
{
    std::uniform_real_distribution<double> uniform;
    Tier tier{"Invented", "Invented", {4900}, {}};
    for (int i = 0; i < units; ++i) {
        Unit unit;
        unit.name = std::to_string(i + 1);
        unit.asking = {4900 + 25 * std::llround(160 * std::sqrt(uniform(random)))};
        unit.status = uniform(random) < 0.7 ? Status::vacant : Status::occupied;
        unit.grade = 1 + static_cast<int>(5 * uniform(random));
        unit.vacancyChance = 0.1 + 0.8 * uniform(random);
        tier.units.push_back(unit);
    }
    tier.units[0].status = Status::vacant;
    tier.units[1].status = Status::occupied;
    return tier;
}

void require(bool holds, const char* what)
{
    if (!holds) {
        std::fprintf(stderr, "core_speed: wrong answer, nothing timed: %s\n", what);
        std::exit(1);
    }
}

/// The curtain's area and the thinning curve's own number must both give the gap, and the gap must follow from the odds.
void check(const Measurement& m)
{
    require(m.gap.gap.has_value() && !m.thinning.empty() && !m.curtain.empty(), "no figures");
    const double gap = *m.gap.gap;
    if (m.odds.left)
        require(std::abs(m.thinning[static_cast<std::size_t>(*m.odds.left) - 1] - gap) < 1e-6, "thinning curve");
    if (m.model == ModelKind::fitted)
        return; // Its curtain is a polyline for the eye.
    double area = 0;
    double from = static_cast<double>(m.advertisedFloor.minor);
    double expected = 0;
    double found = 0;
    for (const CurtainStep& step : m.curtain) {
        area += (step.price - from) * step.chance;
        from = step.price;
    }
    for (std::size_t i = 0; i < m.ladder.size(); ++i) {
        expected += m.odds.perRung[i] * static_cast<double>(m.ladder[i].price.minor);
        found += m.odds.perRung[i];
    }
    require(std::abs(area - gap) < 1e-6, "curtain");
    require(std::abs(expected / found - static_cast<double>(m.advertisedFloor.minor) - gap) < 1e-6, "odds");
}

void print(const char* name, const Percentiles& p, const char* after)
{
    std::printf("\"%s\": {\"p50\": %.2f, \"p95\": %.2f, \"p99\": %.2f}%s", name, p.p50, p.p95, p.p99, after);
}

} // namespace

int main(int argc, char** argv)
{
    const int rounds = argc > 1 ? std::max(20, std::atoi(argv[1])) : 400;
    std::mt19937_64 random(20240601);
    std::printf("{\"benchmark\": \"core_speed\", \"unit\": \"microseconds\", \"rounds\": %d, \"results\": [\n", rounds);
    bool first = true;
    for (const int units : {12, 60, 500, 1000}) {
        const Tier tier = inventedTier(units, random);
        for (const ModelKind kind : kModels) {
            const ModelSettings settings{kind, {}, {}};
            auto prices = askingPrices(tier.units);
            Measurer measurer;
            const auto firstStart = Clock::now();
            check(measurer.measure(tier, prices, settings));
            const double firstTime = microseconds(Clock::now() - firstStart);

            const std::vector<Rung> ladder = measurer.measure(tier, prices, settings).ladder;
            std::vector<Rung> shuffled;
            std::vector<double> measureTimes;
            std::vector<double> sortTimes;
            double sum = 0;
            for (int round = 0; round < rounds; ++round) {
                prices[static_cast<std::size_t>(random() % prices.size())].minor += round % 2 ? 25 : -25; // As a drag does.
                const auto start = Clock::now();
                sum += *measurer.measure(tier, prices, settings).gap.gap;
                measureTimes.push_back(microseconds(Clock::now() - start));

                shuffled = ladder;
                std::ranges::shuffle(shuffled, random);
                const auto sortStart = Clock::now();
                std::sort(shuffled.begin(), shuffled.end(), [](const Rung& a, const Rung& b) { return a.price < b.price; });
                sortTimes.push_back(microseconds(Clock::now() - sortStart));
                sum += static_cast<double>(shuffled.front().price.minor);
            }
            require(std::isfinite(sum), "not finite");
            const Percentiles measured = percentiles(measureTimes);
            const Percentiles sorted = percentiles(sortTimes);
            std::printf("%s{\"units\": %d, \"model\": \"%s\", \"first\": %.2f, ", first ? "" : ",\n", units,
                        std::string(modelWord(kind)).c_str(), firstTime);
            print("measure", measured, ", ");
            print("sort", sorted, ", ");
            std::printf("\"sorts\": %.1f}", measured.p50 / sorted.p50);
            first = false;
        }
    }
    std::printf("\n]}\n");
    return 0;
}
