// SPDX-License-Identifier: GPL-3.0-or-later
#include "colour_difference.h"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace rungwright::eyes
{

namespace
{

constexpr double kDegree = std::numbers::pi / 180.0;

// Machado, Oliveira & Fernandes 2009, severity 1.0, as published; the same values stand in several public implementations.
constexpr double kMatrices[4][3][3] = {{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}},
                                       {{0.152286, 1.052583, -0.204868}, {0.114503, 0.786281, 0.099216}, {-0.003882, -0.048116, 1.051998}},
                                       {{0.367322, 0.860646, -0.227968}, {0.280085, 0.672501, 0.047413}, {-0.011820, 0.042940, 0.968881}},
                                       {{1.255528, -0.076749, -0.178779}, {-0.078411, 0.930809, 0.147602}, {0.004733, 0.691367, 0.303900}}};

double hue(double a, double b)
{
    if (a == 0 && b == 0)
        return 0;
    const double h = std::atan2(b, a) / kDegree;
    return h < 0 ? h + 360 : h;
}

double luminance(const Rgb& c) { return 0.2126 * c[0] + 0.7152 * c[1] + 0.0722 * c[2]; }

} // namespace

Rgb linear(const QColor& colour)
{
    const auto line = [](double v) { return v <= 0.04045 ? v / 12.92 : std::pow((v + 0.055) / 1.055, 2.4); };
    return {line(colour.redF()), line(colour.greenF()), line(colour.blueF())};
}

Rgb seen(const Rgb& colour, Vision vision)
{
    Rgb out{};
    const auto& m = kMatrices[static_cast<int>(vision)];
    for (std::size_t i = 0; i < 3; ++i)
        out[i] = std::clamp(m[i][0] * colour[0] + m[i][1] * colour[1] + m[i][2] * colour[2], 0.0, 1.0);
    return out;
}

Lab lab(const Rgb& c)
{
    // sRGB primaries and D65, IEC 61966-2-1; the white point is the matrix's own.
    const double x = (0.4124564 * c[0] + 0.3575761 * c[1] + 0.1804375 * c[2]) / 0.95047;
    const double y = 0.2126729 * c[0] + 0.7151522 * c[1] + 0.0721750 * c[2];
    const double z = (0.0193339 * c[0] + 0.1191920 * c[1] + 0.9503041 * c[2]) / 1.08883;
    const auto f = [](double t) { return t > 216.0 / 24389.0 ? std::cbrt(t) : (24389.0 / 27.0 * t + 16.0) / 116.0; };
    return {116 * f(y) - 16, 500 * (f(x) - f(y)), 200 * (f(y) - f(z))};
}

double difference(const Lab& p, const Lab& q)
{
    const auto pow7 = [](double v) { return std::pow(v, 7); };
    const double meanC = 0.5 * (std::hypot(p[1], p[2]) + std::hypot(q[1], q[2]));
    const double g = 0.5 * (1 - std::sqrt(pow7(meanC) / (pow7(meanC) + pow7(25))));
    const double a1 = (1 + g) * p[1];
    const double a2 = (1 + g) * q[1];
    const double c1 = std::hypot(a1, p[2]);
    const double c2 = std::hypot(a2, q[2]);
    const double h1 = hue(a1, p[2]);
    const double h2 = hue(a2, q[2]);
    double dh = 0;
    double h = h1 + h2;
    if (c1 * c2 != 0) {
        dh = h2 - h1;
        if (dh > 180)
            dh -= 360;
        else if (dh < -180)
            dh += 360;
        if (std::abs(h1 - h2) <= 180)
            h = 0.5 * (h1 + h2);
        else
            h = h1 + h2 < 360 ? 0.5 * (h1 + h2 + 360) : 0.5 * (h1 + h2 - 360);
    }
    const double dL = q[0] - p[0];
    const double dC = c2 - c1;
    const double dH = 2 * std::sqrt(c1 * c2) * std::sin(0.5 * dh * kDegree);
    const double l = 0.5 * (p[0] + q[0]);
    const double c = 0.5 * (c1 + c2);
    const double t = 1 - 0.17 * std::cos((h - 30) * kDegree) + 0.24 * std::cos(2 * h * kDegree) + 0.32 * std::cos((3 * h + 6) * kDegree) -
                     0.20 * std::cos((4 * h - 63) * kDegree);
    const double sl = 1 + 0.015 * (l - 50) * (l - 50) / std::sqrt(20 + (l - 50) * (l - 50));
    const double sc = 1 + 0.045 * c;
    const double sh = 1 + 0.015 * c * t;
    const double turn = 30 * std::exp(-std::pow((h - 275) / 25, 2));
    const double rt = -std::sin(2 * turn * kDegree) * 2 * std::sqrt(pow7(c) / (pow7(c) + pow7(25)));
    return std::sqrt(std::pow(dL / sl, 2) + std::pow(dC / sc, 2) + std::pow(dH / sh, 2) + rt * (dC / sc) * (dH / sh));
}

double contrast(const QColor& a, const QColor& b)
{
    const double la = luminance(linear(a));
    const double lb = luminance(linear(b));
    return (std::max(la, lb) + 0.05) / (std::min(la, lb) + 0.05);
}

} // namespace rungwright::eyes
