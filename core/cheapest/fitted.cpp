// SPDX-License-Identifier: GPL-3.0-or-later
#include "cheapest/fitted.h"

#include <boost/math/quadrature/exp_sinh.hpp>
#include <boost/math/quadrature/tanh_sinh.hpp>
#include <boost/math/special_functions/beta.hpp>

#include <algorithm>
#include <array>
#include <cassert>
#include <cmath>
#include <numbers>

namespace rungwright
{

namespace
{

// Successive refinements at least double the number of right digits, so the last one before stopping is better than this by far.
constexpr double kTolerance = 1e-12;

/// Integral of `f` over [from, to]; 0 when empty.
template <class F>
double integral(F f, double from, double to)
{
    if (!(from < to))
        return 0;
    // Tables of nodes, which the library makes and extends as needed; one set a thread, as it does not promise more.
    thread_local boost::math::quadrature::tanh_sinh<double> finite;
    thread_local boost::math::quadrature::exp_sinh<double> infinite;
    return std::isinf(from) || std::isinf(to) ? infinite.integrate(f, from, to, kTolerance) : finite.integrate(f, from, to, kTolerance);
}

template <class Survival>
double leastOf(const Survival& survival, double lower, double upper, double anchor, double n)
{
    const auto nothingCheaper = [&](double x) { return std::pow(survival(x), n); };
    // 1 - S^N, also where S is close to 1.
    const auto somethingCheaper = [&](double x) {
        const double s = survival(x);
        return s > 0 ? -std::expm1(n * std::log(s)) : 1.0;
    };
    return anchor + integral(nothingCheaper, anchor, upper) - integral(somethingCheaper, lower, anchor);
}

// Without promotion to long double, whose few more digits nobody would see and which takes three times as long; and a root that is not
// found to the last digit is given as far as it was found.
using BetaPolicy = boost::math::policies::policy<boost::math::policies::promote_double<false>,
                                                 boost::math::policies::evaluation_error<boost::math::policies::ignore_error>>;

/// P(u' > u) and P(u' <= u) on the unit scale.
double unitAbove(const FittedRange& fit, double u)
{
    return u <= 0 ? 1.0 : u >= 1 ? 0.0 : boost::math::ibetac(fit.alpha, fit.beta, u, BetaPolicy());
}

double unitBelow(const FittedRange& fit, double u)
{
    return u <= 0 ? 0.0 : u >= 1 ? 1.0 : boost::math::ibeta(fit.alpha, fit.beta, u, BetaPolicy());
}

/// The stretch of the unit scale outside which S^n is 1 or 0 for all practical purposes, for every n in [leastN, greatestN]. A sharp fall
/// in the midst of [0, 1] would need very many nodes otherwise.
struct Stretch {
    double from = 0;
    double to = 1;
    double width() const { return to - from; }
};

Stretch fallOf(const FittedRange& fit, double leastN, double greatestN)
{
    constexpr double kNothing = 1e-18;
    const double total = fit.alpha + fit.beta;
    const double mean = fit.alpha / total;
    const double deviation = std::sqrt(mean * (fit.beta / total) / (total + 1));
    const double nearTail = kNothing / std::max(greatestN, 1.0);
    const double farTail = std::exp(std::log(kNothing) / std::min(leastN, 1.0));
    Stretch fall;
    for (double reach = 4; mean - reach * deviation > 0 && fall.from == 0; reach *= 1.25)
        if (const double u = mean - reach * deviation; unitBelow(fit, u) <= nearTail)
            fall.from = u;
    for (double reach = 4; mean + reach * deviation < 1 && fall.to == 1; reach *= 1.25)
        if (const double u = mean + reach * deviation; unitAbove(fit, u) <= farTail)
            fall.to = u;
    return fall;
}

/// Nodes u and weights of a tanh-sinh rule on [0, 1], u = 1 / (1 + exp(-pi sinh t)), at the finest spacing; every 2nd, 4th, ... node makes
/// the coarser ones. It reaches further down than up: the expected least may itself be tiny, the way to the top may not. Takahasi & Mori,
/// Publ. RIMS 9 (1974) 721-741 (from memory).
struct TanhSinhRule {
    static constexpr std::size_t kPerUnit = 256; ///< Nodes in a unit of t.
    static constexpr std::size_t kDown = kPerUnit * 15 / 4;
    static constexpr std::size_t kUp = kPerUnit * 13 / 4;
    static constexpr std::size_t kNodes = kDown + kUp + 1;
    static constexpr std::size_t kCoarsest = 16; ///< Stride of the first try: spacing 1/16.
    std::array<double, kNodes> node{};
    std::array<double, kNodes> slope{}; ///< du/dt

    TanhSinhRule()
    {
        for (std::size_t i = 0; i < kNodes; ++i) {
            const double t = (static_cast<double>(i) - static_cast<double>(kDown)) / kPerUnit;
            const double e = std::exp(-std::numbers::pi * std::sinh(t));
            node[i] = 1 / (1 + e);
            slope[i] = std::numbers::pi * std::cosh(t) * node[i] * (e / (1 + e));
        }
    }
    static constexpr double spacing(std::size_t stride) { return static_cast<double>(stride) / kPerUnit; }
};
static_assert(TanhSinhRule::kDown % TanhSinhRule::kCoarsest == 0 && TanhSinhRule::kUp % TanhSinhRule::kCoarsest == 0);

} // namespace

double expectedLeast(const std::function<double(double)>& survival, double lower, double upper, double anchor, double n)
{
    assert(lower <= anchor && anchor <= upper && n > 0);
    return leastOf(survival, lower, upper, anchor, n);
}

double FittedRange::survival(double x) const { return unitAbove(*this, (x - floor) / (highest - floor)); }

std::optional<FittedRange> fitRange(std::span<const Rung> sorted, Price advertisedFloor)
{
    if (sorted.size() < 2 || sorted.front().price < advertisedFloor || sorted.back().price <= advertisedFloor ||
        sorted.front().price == sorted.back().price)
        return std::nullopt;

    const auto width = static_cast<double>((sorted.back().price - advertisedFloor).minor);
    const auto count = static_cast<double>(sorted.size());
    // u (1 - u) summed on its own: mean (1 - mean) - variance is its mean, without the cancellation.
    double sum = 0;
    double inside = 0;
    for (const Rung& rung : sorted) {
        const double u = static_cast<double>((rung.price - advertisedFloor).minor) / width;
        const double toHighest = static_cast<double>((sorted.back().price - rung.price).minor) / width;
        sum += u;
        inside += u * toHighest;
    }
    const double mean = sum / count;
    double variance = 0;
    double toHighest = 0;
    for (const Rung& rung : sorted) {
        const double d = static_cast<double>((rung.price - advertisedFloor).minor) / width - mean;
        variance += d * d;
        toHighest += static_cast<double>((sorted.back().price - rung.price).minor) / width;
    }
    variance /= count;
    toHighest /= count;
    if (!(inside > 0 && variance > 0))
        return std::nullopt;

    const double concentration = inside / count / variance; // mean (1 - mean) / variance - 1
    return FittedRange{static_cast<double>(advertisedFloor.minor), static_cast<double>(sorted.back().price.minor), mean * concentration,
                       toHighest * concentration};
}

double expectedCheapest(const FittedRange& fit, double n)
{
    assert(n > 0);
    const Stretch fall = fallOf(fit, n, n);
    const auto survival = [&](double t) { return unitAbove(fit, fall.from + fall.width() * t); };
    return fit.floor + (fit.highest - fit.floor) * (fall.from + fall.width() * leastOf(survival, 0.0, 1.0, 0.0, n));
}

double cheapestQuantile(const FittedRange& fit, double n, double p)
{
    assert(n > 0 && p >= 0 && p <= 1);
    if (p <= 0)
        return fit.floor;
    if (p >= 1)
        return fit.highest;
    // F(x) = 1 - (1 - p)^(1/n).
    const double u = boost::math::ibeta_inv(fit.alpha, fit.beta, -std::expm1(std::log1p(-p) / n), BetaPolicy());
    return fit.floor + (fit.highest - fit.floor) * u;
}

void expectedCheapestForAll(const FittedRange& fit, int count, std::vector<double>& out)
{
    out.resize(static_cast<std::size_t>(std::max(count, 0)));
    if (count <= 0)
        return;
    using Rule = TanhSinhRule;
    static const Rule rule;
    const Stretch fall = fallOf(fit, 1, count);
    std::array<double, Rule::kNodes> survival;
    const auto evaluate = [&](std::size_t first, std::size_t stride) {
        for (std::size_t i = first; i < Rule::kNodes; i += stride)
            survival[i] = unitAbove(fit, fall.from + fall.width() * rule.node[i]);
    };
    const auto leastInStretch = [&](std::size_t stride, double n) {
        double sum = 0;
        for (std::size_t i = 0; i < Rule::kNodes; i += stride)
            sum += rule.slope[i] * std::pow(survival[i], n);
        return Rule::spacing(stride) * sum;
    };

    // Halving the spacing squares the error, roughly: once two spacings agree to 1e-7 the finer one is good to far better. The first and
    // the last N are the hardest.
    std::size_t stride = Rule::kCoarsest;
    evaluate(0, stride);
    for (bool agree = false; !agree && stride > 1;) {
        const double coarseFirst = leastInStretch(stride, 1);
        const double coarseLast = leastInStretch(stride, count);
        stride /= 2;
        evaluate(stride, 2 * stride);
        const double fineFirst = leastInStretch(stride, 1);
        const double fineLast = leastInStretch(stride, count);
        agree = std::abs(fineFirst - coarseFirst) <= 1e-7 * fineFirst && std::abs(fineLast - coarseLast) <= 1e-7 * fineLast;
    }

    // Close together for the loop over N. S falls along the nodes: terms too small to matter sit at the end, and are dropped before they
    // become subnormal and slow.
    std::array<double, Rule::kNodes> term; // du * S^N
    std::size_t active = 0;
    for (std::size_t i = 0; i < Rule::kNodes; i += stride, ++active) {
        survival[active] = survival[i];
        term[active] = rule.slope[i] * Rule::spacing(stride);
    }
    const double width = fit.highest - fit.floor;
    for (double& expected : out) {
        double sum = 0;
        for (std::size_t i = 0; i < active; ++i) {
            term[i] *= survival[i];
            sum += term[i];
        }
        while (active > 0 && term[active - 1] < 1e-250)
            --active;
        expected = fit.floor + width * (fall.from + fall.width() * sum);
    }
}

} // namespace rungwright
