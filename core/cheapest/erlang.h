// SPDX-License-Identifier: GPL-3.0-or-later
// Erlang's loss formula and its inverses.
#pragma once

#include <optional>
#include <vector>

namespace rungwright
{

/// Erlang B: the chance that all n servers are taken at offered load a. B(0) = 1, B(n) = a B(n-1) / (n + a B(n-1)), stable
/// for every n. n >= 0, a >= 0. Erlang 1917; Jagerman, Bell Syst. Tech. J. 53 (1974) 525-551 for the recursion (from memory).
double erlangB(int n, double a);

/// B(0..n, a) into `out` (n + 1 values).
void erlangBAll(int n, double a, std::vector<double>& out);

/// Mean number of free servers, n - a (1 - B(n, a)), by F(0) = 0, F(n) = n (F(n-1) + 1) / (n + a B(n-1, a)): every term is
/// positive, so that nothing cancels however heavy the load (both identities follow from the recursion of B). n >= 0, a >= 0.
double meanFree(int n, double a);

/// The offered load at which n servers lose the share b of the offers: B(n, a) = b, 0 < b < 1, n >= 1.
double loadForLoss(int n, double b);

/// The offered load whose carried load a (1 - B(n, a)) equals `carried`. Nothing unless 0 < carried < n.
/// As accurate as n - carried is: about 1e-12 relative except for carried within 1e-9 of n.
std::optional<double> loadForCarried(int n, double carried);

} // namespace rungwright
