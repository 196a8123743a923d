// SPDX-License-Identifier: GPL-3.0-or-later
#include "cheapest/erlang.h"

#include <boost/math/tools/roots.hpp>

#include <algorithm>
#include <cassert>
#include <cmath>
#include <cstdint>
#include <limits>
#include <tuple>

namespace rungwright
{

namespace
{

/// B(n, a) and the mean number of free servers, by one walk.
struct LossAndFree {
    double loss = 1;
    double free = 0;
};

LossAndFree lossAndFree(int n, double a)
{
    LossAndFree at;
    for (int i = 1; i <= n; ++i) {
        const double share = 1.0 / (i + a * at.loss);
        at.free = i * (at.free + 1) * share;
        at.loss *= a * share;
    }
    return at;
}

/// Root of `valueAndSlope` in [lo, hi] by Newton's method with bisection as its safety net, to the last few bits.
template <class ValueAndSlope>
double newton(ValueAndSlope valueAndSlope, double guess, double lo, double hi)
{
    std::uintmax_t steps = 200;
    return boost::math::tools::newton_raphson_iterate(valueAndSlope, guess, lo, hi, std::numeric_limits<double>::digits - 4, steps);
}

} // namespace

double erlangB(int n, double a)
{
    assert(n >= 0 && a >= 0);
    return lossAndFree(n, a).loss;
}

void erlangBAll(int n, double a, std::vector<double>& out)
{
    assert(n >= 0 && a >= 0);
    out.resize(static_cast<std::size_t>(n) + 1);
    out[0] = 1;
    for (int i = 1; i <= n; ++i) {
        const double taken = a * out[static_cast<std::size_t>(i) - 1];
        out[static_cast<std::size_t>(i)] = taken / (i + taken);
    }
}

double meanFree(int n, double a)
{
    assert(n >= 0 && a >= 0);
    return lossAndFree(n, a).free;
}

double loadForLoss(int n, double b)
{
    assert(n >= 1 && b > 0 && b < 1);
    if (n == 1)
        return b / (1 - b);
    // In logarithms the curve is nearly straight: d ln B / d ln a = n - a (1 - B), the mean number free. Brackets: B <= a^n / n!, and
    // the carried load a (1 - B) <= n.
    const double lo = (std::log(b) + std::lgamma(n + 1.0)) / n;
    const double hi = std::log(n) - std::log1p(-b);
    const auto valueAndSlope = [n, b](double logLoad) {
        const auto at = lossAndFree(n, std::exp(logLoad));
        return std::make_tuple(std::log(at.loss) - std::log(b), at.free);
    };
    return std::exp(newton(valueAndSlope, std::clamp(std::log(n), lo, hi), lo - 1e-9, hi + 1e-9));
}

std::optional<double> loadForCarried(int n, double carried)
{
    if (!(carried > 0 && carried < n))
        return std::nullopt;
    const double wanted = n - carried;
    // F falls in a like n / (a - n) under a heavy load, so that 1 / F is nearly straight there, and Newton's method on it does well for
    // light loads too. F' = -(1 - B (1 + F)). The carried load never exceeds the offered one; a load that is enough is found by doubling.
    const double lo = carried;
    double hi = carried / wanted + n;
    while (lossAndFree(n, hi).free > wanted)
        hi *= 2;
    const auto valueAndSlope = [n, wanted](double a) {
        const auto at = lossAndFree(n, a);
        const double slope = 1 - at.loss * (1 + at.free);
        return std::make_tuple(wanted / at.free - 1, wanted * slope / (at.free * at.free));
    };
    return newton(valueAndSlope, std::clamp(carried + 1, lo, hi), lo, hi);
}

} // namespace rungwright
