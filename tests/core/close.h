// SPDX-License-Identifier: GPL-3.0-or-later
// Comparing floating-point figures in tests.
#pragma once

#include <QtTest>

#include <algorithm>
#include <cmath>

/// |actual - expected| <= relative * max(|expected|, scale); false for NaN.
inline bool isClose(double actual, double expected, double relative, double scale = 0)
{
    return std::abs(actual - expected) <= relative * std::max(std::abs(expected), scale);
}

/// Fails the test with both numbers when they differ by more than `relative` of the expected one.
#define COMPARE_CLOSE(actual, expected, relative)                                                                                          \
    do {                                                                                                                                   \
        const double theActual = (actual);                                                                                                 \
        const double theExpected = (expected);                                                                                             \
        QVERIFY2(isClose(theActual, theExpected, (relative)), qPrintable(QStringLiteral("%1 is %2, expected %3, relative difference %4")   \
                                                                             .arg(QLatin1String(#actual))                                  \
                                                                             .arg(theActual, 0, 'g', 17)                                   \
                                                                             .arg(theExpected, 0, 'g', 17)                                 \
                                                                             .arg(std::abs(theActual / theExpected - 1))));                \
    } while (false)

/// The same against a given scale, for figures that may be near 0.
#define COMPARE_WITHIN(actual, expected, absolute)                                                                                         \
    do {                                                                                                                                   \
        const double theActual = (actual);                                                                                                 \
        const double theExpected = (expected);                                                                                             \
        QVERIFY2(std::abs(theActual - theExpected) <= (absolute), qPrintable(QStringLiteral("%1 is %2, expected %3, difference %4")        \
                                                                                 .arg(QLatin1String(#actual))                              \
                                                                                 .arg(theActual, 0, 'g', 17)                               \
                                                                                 .arg(theExpected, 0, 'g', 17)                             \
                                                                                 .arg(theActual - theExpected)));                          \
    } while (false)
