// SPDX-License-Identifier: GPL-3.0-or-later
// The ledger's tables, and the way from an older form of them to the newest.
#pragma once

#include <span>

namespace rungwright
{

/// Stands in the file's header, so that a database of another program is never taken for a ledger: "RwLd" as four bytes.
inline constexpr int kLedgerApplication = 0x52774C64;

/// The statements that make each form of the tables: the first makes form 1 out of an empty file, the second form 2 out of form 1.
/// `user_version` in the file's header is the number of those that were run.
std::span<const std::span<const char* const>> ledgerForms();
inline int newestLedgerForm() { return static_cast<int>(ledgerForms().size()); }

} // namespace rungwright
