// SPDX-License-Identifier: GPL-3.0-or-later
// Four coefficients of skewness: which way a ladder leans.
#pragma once

#include <cstdint>
#include <optional>
#include <span>
#include <vector>

namespace rungwright
{

/// Negative = prices crowd near the top, the tail points to the floor ("leans left"). Each is empty where it is undefined.
struct SkewFigures {
    /// g1 = m3 / m2^(3/2), population moments. Undefined for no value and for all values equal.
    std::optional<double> moment;
    /// G1 = g1 sqrt(m (m-1)) / (m-2), m >= 3. Joanes & Gill, The Statistician 47 (1998) 183-189.
    std::optional<double> adjusted;
    /// The median of the kernel h(xi, xj) = ((xi-med) - (med-xj)) / (xi-xj) over xi >= med >= xj, with the ties at the median
    /// by Brys, Hubert & Struyf, J. Comput. Graph. Stat. 13 (2004) 996-1017; an even number of kernel values takes the mean of the middle
    /// two. In [-1, 1]. Undefined for fewer than 3 values and for all values equal.
    std::optional<double> medcouple;
    /// t3 = l3 / l2 from unbiased probability-weighted moments. Hosking, JRSS B 52 (1990) 105-124. Undefined below 3 values, and for all
    /// equal.
    std::optional<double> l;

    /// True when two of the defined coefficients have strictly opposite signs.
    bool signsDisagree() const;
};

/// Scratch storage of medcouple(), kept by a caller that measures again and again.
struct MedcoupleWorkspace {
    struct Weighted {
        double value;
        double weight;
    };
    std::vector<std::uint32_t> first, last, above, notBelow; ///< By row of the kernel matrix.
    std::vector<Weighted> rowMedians;
    std::vector<double> rest;
};

/// `sorted` ascending, in any unit. Shift- and (positive) scale-invariant. A third moment (or l3) that is no larger than its own
/// rounding error is given as 0, so that an even ladder leans nowhere.
std::optional<double> momentSkewness(std::span<const double> sorted);
std::optional<double> adjustedSkewness(std::span<const double> sorted);
/// O(n log n) time by selection in the implicitly sorted kernel matrix (Johnson & Mizoguchi, SIAM J. Comput. 7 (1978) 147-153).
std::optional<double> medcouple(std::span<const double> sorted);
std::optional<double> medcouple(std::span<const double> sorted, MedcoupleWorkspace& work);
std::optional<double> lSkewness(std::span<const double> sorted);
SkewFigures skewFigures(std::span<const double> sorted);
SkewFigures skewFigures(std::span<const double> sorted, MedcoupleWorkspace& work);

} // namespace rungwright
