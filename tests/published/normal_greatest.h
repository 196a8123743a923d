// SPDX-License-Identifier: GPL-3.0-or-later
// Expected greatest of n independent standard normal draws.
#pragma once

namespace published
{

/// Printed: Harter, Biometrika 48 (1961) 151-165, Table 1, as transcribed in a public header file (retrieved, not seen in the journal).
/// Value: the integral of z n phi(z) Phi(z)^(n-1) recomputed with mpmath 1.3.0 at 40 digits. By symmetry the expected least is its
/// negative.
struct NormalGreatest {
    int n;
    double value;
    double printed; ///< To five decimals.
};

inline constexpr NormalGreatest kNormalGreatest[] = {
    {2, 0.5641895835477563, 0.56419}, {3, 0.8462843753216344, 0.84628},  {4, 1.029375373003964, 1.02938},  {5, 1.16296447364052, 1.16296},
    {6, 1.267206360611471, 1.26721},  {7, 1.352178375606904, 1.35218},   {8, 1.423600306045278, 1.42360},  {9, 1.485013162209237, 1.48501},
    {10, 1.538752730835173, 1.53875}, {11, 1.586436351908, 1.58644},     {12, 1.629227639871913, 1.62923}, {13, 1.667990177049127, 1.66799},
    {14, 1.703381554099977, 1.70338}, {15, 1.735913444941037, 1.73591},  {16, 1.765991393054788, 1.76599}, {17, 1.793941980882691, 1.79394},
    {18, 1.820031878968722, 1.82003}, {19, 1.844481511603825, 1.84448},  {20, 1.86747505979832, 1.86748},  {25, 1.965314609753557, 1.96531},
    {50, 2.24907362938985, 2.24907},  {100, 2.507593636441684, 2.50759},
};

} // namespace published
