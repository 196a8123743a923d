// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/shape.h"

#include <boost/math/distributions/beta.hpp>
#include <boost/math/quadrature/tanh_sinh.hpp>
#include <boost/math/special_functions/beta.hpp>
#include <boost/math/special_functions/gamma.hpp>
#include <boost/math/tools/roots.hpp>

#include <algorithm>
#include <cassert>
#include <cmath>
#include <numeric>

namespace rungwright
{

namespace
{

double logBeta(double a, double b) { return std::lgamma(a) + std::lgamma(b) - std::lgamma(a + b); }

double betaScale(const BetaShape& shape)
{
    const auto [a, b] = shape;
    return 2 / (a + b) * std::exp(logBeta(2 * a, 2 * b) - 2 * logBeta(a, b));
}

} // namespace

BetaLMoments lMomentsOf(const BetaShape& shape)
{
    const double a = shape.alpha;
    const double b = shape.beta;
    const double scale = betaScale(shape);
    // F and 1 - F each from its own end, so that nothing cancels.
    boost::math::quadrature::tanh_sinh<double> quadrature;
    const double l3 = quadrature.integrate(
        [&](double x) {
            const double below = boost::math::ibeta(a, b, x);
            const double above = boost::math::ibetac(a, b, x);
            return below * above * (below - above);
        },
        0.0, 1.0);
    return {a / (a + b), scale, l3 / scale};
}

std::optional<BetaShape> betaFromLMoments(double mean, double scale)
{
    if (!(mean > 0 && mean < 1 && scale > 0 && scale < mean * (1 - mean)))
        return {};
    const auto shapeAt = [&](double logSize) {
        const double size = std::exp(logSize);
        return BetaShape{mean * size, (1 - mean) * size};
    };
    // The scale falls from mean (1 - mean) to 0 as alpha + beta grows.
    const auto miss = [&](double logSize) { return betaScale(shapeAt(logSize)) - scale; };
    const double from = -30;
    const double to = 30;
    if (miss(from) <= 0 || miss(to) >= 0)
        return {}; // Beyond any ladder: a shape within 1e-13 of one of its limits.
    std::uintmax_t steps = 200;
    const auto root = boost::math::tools::toms748_solve(miss, from, to, boost::math::tools::eps_tolerance<double>(48), steps);
    return shapeAt((root.first + root.second) / 2);
}

std::optional<BetaShape> betaFromLean(double lSkewness)
{
    if (!(std::abs(lSkewness) < 1.0 / 3))
        return {};
    const double t = -std::abs(lSkewness);
    const double c = (1 - t) / (1 + 3 * t); // 1 / k.
    return lSkewness <= 0 ? BetaShape{c, 1} : BetaShape{1, c};
}

std::optional<BetaLMoments> unitLMoments(std::span<const Rung> sorted)
{
    if (sorted.size() < 2 || sorted.front().price == sorted.back().price)
        return {};
    const auto n = static_cast<double>(sorted.size());
    const auto width = static_cast<double>((sorted.back().price - sorted.front().price).minor);
    double b0 = 0;
    double b1 = 0;
    double b2 = 0;
    for (std::size_t i = 0; i < sorted.size(); ++i) {
        const double u = static_cast<double>((sorted[i].price - sorted.front().price).minor) / width;
        const auto below = static_cast<double>(i);
        b0 += u / n;
        b1 += u * below / (n - 1) / n;
        b2 += sorted.size() > 2 ? u * below * (below - 1) / ((n - 1) * (n - 2)) / n : 0;
    }
    const double l2 = 2 * b1 - b0;
    return BetaLMoments{b0, l2, sorted.size() > 2 ? (6 * b2 - 6 * b1 + b0) / l2 : 0};
}

namespace
{

std::vector<Price> stepRungs(std::vector<PriceStep> steps, std::size_t m)
{
    std::ranges::stable_sort(steps, {}, &PriceStep::price);
    const double all = std::accumulate(steps.begin(), steps.end(), 0.0, [](double sum, const PriceStep& step) { return sum + step.share; });
    struct Count {
        std::size_t units;
        double remainder;
        std::size_t step;
    };
    std::vector<Count> counts;
    std::size_t given = 0;
    for (std::size_t i = 0; i < steps.size(); ++i) {
        const double share = static_cast<double>(m) * steps[i].share / all;
        const auto whole = static_cast<std::size_t>(std::floor(share * (1 + 1e-12))); // 0.3 of 10 is 3.
        counts.push_back({whole, share - static_cast<double>(whole), i});
        given += whole;
    }
    std::ranges::stable_sort(counts, std::greater{}, &Count::remainder);
    for (std::size_t i = 0; given < m; ++i, ++given)
        ++counts[i % counts.size()].units;
    std::ranges::sort(counts, {}, &Count::step);
    std::vector<Price> rungs;
    for (const Count& count : counts)
        rungs.insert(rungs.end(), count.units, steps[count.step].price);
    rungs.resize(m, steps.back().price);
    return rungs;
}

std::optional<Trouble> troubleWith(const LadderShape& shape)
{
    if (shape.steps.empty()) {
        if (shape.floor.minor <= 0)
            return Trouble{"The lowest price of a shape must be above zero."};
        if (shape.top < shape.floor)
            return Trouble{"The highest price of a shape must not lie below the lowest."};
        if (!(shape.beta.alpha > 0 && shape.beta.beta > 0 && std::isfinite(shape.beta.alpha) && std::isfinite(shape.beta.beta)))
            return Trouble{"Both numbers that shape the ladder must be above zero."};
        return {};
    }
    double all = 0;
    for (const PriceStep& step : shape.steps) {
        if (step.price.minor <= 0)
            return Trouble{"Every price step must be above zero."};
        if (!(step.share >= 0 && std::isfinite(step.share)))
            return Trouble{"A price step's share of the units cannot be below zero."};
        all += step.share;
    }
    if (!(all > 0))
        return Trouble{"At least one price step must have a share of the units."};
    return {};
}

/// Brings the lowest units on offer down to the floor, as many as the rules want there. False when one of them cannot come down.
bool holdLowestAtFloor(const Tier& tier, const PriceRules& rules, std::span<const std::uint32_t> places, std::vector<Price>& prices)
{
    if (!tier.hasFloor())
        return true;
    const auto onOffer = static_cast<std::size_t>(std::ranges::count_if(tier.units, &Unit::onOffer));
    std::size_t left = unitsWantedAtFloor(onOffer, rules);
    for (const std::uint32_t i : places) {
        const Unit& unit = tier.units[i];
        if (left == 0)
            break;
        if (!unit.onOffer())
            continue;
        --left;
        if (prices[i] <= tier.advertisedFloor)
            continue;
        const auto point = rules.points.atOrBelow(tier.advertisedFloor);
        const Price wanted =
            unit.asking <= tier.advertisedFloor ? std::max(unit.asking, point.value_or(unit.asking)) : point.value_or(unit.asking);
        prices[i] = snapped(unit, unit.asking, wanted, rules).price;
        if (prices[i] > tier.advertisedFloor)
            return false;
    }
    return true;
}

} // namespace

std::vector<Price> shapeRungs(const LadderShape& shape, std::size_t m)
{
    assert(!troubleWith(shape));
    if (!shape.steps.empty())
        return stepRungs(shape.steps, m);
    const boost::math::beta_distribution<double> distribution(shape.beta.alpha, shape.beta.beta);
    const auto width = static_cast<double>((shape.top - shape.floor).minor);
    std::vector<Price> rungs;
    rungs.reserve(m);
    for (std::size_t i = 0; i < m; ++i) {
        double u = 0;
        if (i + 1 == m && m > 1)
            u = 1;
        else if (i > 0)
            u = boost::math::quantile(distribution, static_cast<double>(i) / static_cast<double>(m - 1));
        rungs.push_back(shape.floor + Price{std::llround(width * u)});
        if (i > 0)
            rungs[i] = std::max(rungs[i], rungs[i - 1]); // The quantiles' own rounding.
    }
    return rungs;
}

Outcome<std::vector<Price>> shapedPrices(const Tier& tier, const PriceRules& rules, const LadderShape& shape, const ShapePlacing& placing)
{
    if (auto trouble = troubleWith(shape))
        return *std::move(trouble);
    std::vector<Room> rooms;
    roomsOf(tier.units, rules, {}, rooms);
    std::vector<std::uint32_t> places;
    chainOrder(tier.units, rooms, placing.among, placing.order, places);
    const std::vector<Price> rungs = shapeRungs(shape, places.size());
    std::vector<Price> prices = askingPrices(tier.units);
    Price todayTotal;
    Price total;
    for (const Unit& unit : tier.units)
        todayTotal += unit.onOffer() ? unit.asking : Price{};
    for (std::size_t i = 0; i < places.size(); ++i) {
        const Unit& unit = tier.units[places[i]];
        if (unit.locked)
            continue;
        Price price = rungs[i];
        if (placing.withinRules)
            price = snapped(unit, unit.asking, price, rules).price;
        else if (placing.onPricePoints)
            price = rules.points.nearest(price).value_or(price);
        prices[places[i]] = price;
    }
    if (!placing.withinRules)
        return prices;
    if (!holdLowestAtFloor(tier, rules, places, prices))
        return Trouble{"Too few units on offer can come down to the advertised floor for the share that the rules ask for."};
    for (std::size_t i = 0; i < prices.size(); ++i)
        total += tier.units[i].onOffer() ? prices[i] : Price{};
    if (const auto room = totalRoomOf(todayTotal, rules); room && (total < room->least || total > room->most))
        return Trouble{"This shape would change the asking total of the units on offer by more than the rules allow."};
    return prices;
}

} // namespace rungwright
