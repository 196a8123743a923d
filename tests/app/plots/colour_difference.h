// SPDX-License-Identifier: GPL-3.0-or-later
// Colours as eyes see them: contrast, colour difference, and simulated colour-vision deficiencies. For tests.
#pragma once

#include <QColor>

#include <array>

namespace rungwright::eyes
{

using Rgb = std::array<double, 3>; ///< Linear, 0 to 1.
using Lab = std::array<double, 3>; ///< CIELAB under D65.

enum class Vision { normal, protan, deutan, tritan };

/// IEC 61966-2-1 (sRGB) transfer function.
Rgb linear(const QColor& colour);
/// Dichromats by the matrices of Machado, Oliveira & Fernandes, IEEE Trans. Vis. Comput. Graph. 15 (2009) 1291-1298, severity 1.0, applied
/// to linear RGB.
Rgb seen(const Rgb& colour, Vision vision);
Lab lab(const Rgb& colour);
/// CIEDE2000, after Sharma, Wu & Dalal, Color Res. Appl. 30 (2005) 21-30.
double difference(const Lab& a, const Lab& b);
/// WCAG 2.1 contrast ratio, 1 to 21.
double contrast(const QColor& a, const QColor& b);

} // namespace rungwright::eyes
