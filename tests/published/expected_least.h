// SPDX-License-Identifier: GPL-3.0-or-later
// Expected least of N draws from distributions with closed forms.
#pragma once

namespace published
{

/// Closed forms, each cross-checked by quadrature (R 4.2.2, integrate()):
///  uniform       on [100, 200]: 100 + 100 / (N + 1)
///  exponential   100 + Exp(mean 50): 100 + 50 / N
///  power         F = ((x - 100) / 100)^c on [100, 200]: 100 + 100 Gamma(1 + 1/c) Gamma(N + 1) / Gamma(N + 1 + 1/c)
///  kumaraswamy   1 - (1 - x^a)^b on [0, 1]: b N Beta(1 + 1/a, b N). Kumaraswamy, J. Hydrology 46 (1980) 79-88; Jones, Stat.
///                Methodology 6 (2009) 70-81 (both references from memory)
///  beta          no closed form: integral of (1 - F)^N by R 4.2.2, integrate() to 1e-12 and pbeta()
///  weibull       shape 2, scale 100: 100 Gamma(3/2) / sqrt(N)
///  pareto        least 100, index 3: 300 N / (3 N - 1)
enum class Law { uniform, exponential, power, kumaraswamy, beta, weibull, pareto };

struct ExpectedLeast {
    Law law;
    double a; ///< c of the power law, a of kumaraswamy and beta; else 0.
    double b; ///< b of kumaraswamy and beta; else 0.
    int n;
    double value;
};

inline constexpr ExpectedLeast kExpectedLeast[] = {
    {Law::uniform, 0, 0, 1, 150},
    {Law::uniform, 0, 0, 2, 133.3333333333},
    {Law::uniform, 0, 0, 5, 116.6666666667},
    {Law::uniform, 0, 0, 10, 109.0909090909},
    {Law::uniform, 0, 0, 50, 101.9607843137},
    {Law::exponential, 0, 0, 1, 150},
    {Law::exponential, 0, 0, 2, 125},
    {Law::exponential, 0, 0, 5, 110},
    {Law::exponential, 0, 0, 10, 105},
    {Law::power, 0.5, 0, 1, 133.3333333333},
    {Law::power, 0.5, 0, 2, 116.6666666667},
    {Law::power, 0.5, 0, 5, 104.7619047619},
    {Law::power, 0.5, 0, 10, 101.5151515152},
    {Law::power, 2, 0, 1, 166.6666666667},
    {Law::power, 2, 0, 2, 153.3333333333},
    {Law::power, 2, 0, 5, 136.9408369408},
    {Law::power, 2, 0, 10, 127.0260183573},
    {Law::power, 3, 0, 1, 175},
    {Law::power, 3, 0, 2, 164.2857142857},
    {Law::power, 3, 0, 5, 150.0686813187},
    {Law::power, 3, 0, 10, 140.5618914193},
    {Law::kumaraswamy, 2, 3, 1, 0.4571428571429},
    {Law::beta, 2, 3, 1, 0.4},
    {Law::kumaraswamy, 2, 3, 2, 0.3409923409923},
    {Law::beta, 2, 3, 2, 0.2857142857143},
    {Law::kumaraswamy, 2, 3, 5, 0.2232941387424},
    {Law::beta, 2, 3, 5, 0.1777974347634},
    {Law::kumaraswamy, 2, 3, 10, 0.1598141411778},
    {Law::beta, 2, 3, 10, 0.1234034377728},
    {Law::kumaraswamy, 0.5, 0.5, 1, 0.5333333333333},
    {Law::beta, 0.5, 0.5, 1, 0.5},
    {Law::kumaraswamy, 0.5, 0.5, 2, 0.3333333333333},
    {Law::beta, 0.5, 0.5, 2, 0.2973576327153},
    {Law::kumaraswamy, 0.5, 0.5, 5, 0.1269841269841},
    {Law::beta, 0.5, 0.5, 5, 0.1027470988577},
    {Law::kumaraswamy, 0.5, 0.5, 10, 0.04761904761905},
    {Law::beta, 0.5, 0.5, 10, 0.03543828634721},
    {Law::kumaraswamy, 5, 2, 1, 0.7575757575758},
    {Law::beta, 5, 2, 1, 0.7142857142857},
    {Law::kumaraswamy, 5, 2, 2, 0.6764069264069},
    {Law::beta, 5, 2, 2, 0.6243756243756},
    {Law::kumaraswamy, 5, 2, 5, 0.5725724613877},
    {Law::beta, 5, 2, 5, 0.5145311643042},
    {Law::kumaraswamy, 5, 2, 10, 0.5013498343355},
    {Law::beta, 5, 2, 10, 0.4426190992693},
    {Law::kumaraswamy, 2, 5, 1, 0.3694083694084},
    {Law::beta, 2, 5, 1, 0.2857142857143},
    {Law::kumaraswamy, 2, 5, 2, 0.2702601835729},
    {Law::beta, 2, 5, 2, 0.1958041958042},
    {Law::kumaraswamy, 2, 5, 5, 0.1746409528736},
    {Law::beta, 2, 5, 5, 0.1177621044139},
    {Law::kumaraswamy, 2, 5, 10, 0.1244011178401},
    {Law::beta, 2, 5, 10, 0.08048305123242},
    {Law::weibull, 0, 0, 1, 88.62269254528},
    {Law::pareto, 0, 0, 1, 150},
    {Law::weibull, 0, 0, 2, 62.66570686578},
    {Law::pareto, 0, 0, 2, 120},
    {Law::weibull, 0, 0, 5, 39.63327297606},
    {Law::pareto, 0, 0, 5, 107.1428571429},
    {Law::weibull, 0, 0, 10, 28.02495608199},
    {Law::pareto, 0, 0, 10, 103.4482758621},
};

/// Ten listed prices, and the expected least of m of them drawn without replacement (each of the C(10, m) sets, enumerated with R's
/// combn()) and of m draws with replacement (the distribution of the least order statistic of a discrete law).
inline constexpr double kTenPrices[] = {100, 105, 112, 120, 130, 142, 155, 170, 190, 215};

struct ListedLeast {
    int m;
    double withoutReplacement;
    double withReplacement;
};

inline constexpr ListedLeast kListedLeast[] = {
    {1, 143.9, 143.9}, {2, 121.2666666667, 123.53}, {3, 112.325, 115.055}, {5, 105.0079365079, 107.91959}, {10, 100, 102.7946303753},
};

/// Expected least rank of 3 drawn without replacement from ranks 1..10: (10 + 1) / (3 + 1). Textbook.
inline constexpr double kLeastRank3Of10 = 2.75;

/// Chances of k of 6 drawn numbers being among 6 marked ones of 49, k = 0..6: R 4.2.2, dhyper(k, 6, 43, 6).
inline constexpr double kSixOfFortyNine[] = {0.4359649755117,    0.4130194504848,    0.1323780290015,   0.01765040386687,
                                             0.0009686197244014, 1.844989951241e-05, 7.151123842019e-08};

} // namespace published
