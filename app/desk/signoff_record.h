// SPDX-License-Identifier: GPL-3.0-or-later
// What a sign-off leaves behind: the sheet's hash and the entry for the price ledger.
#pragma once

#include "sign_off.h"
#include "signoff_case.h"

namespace rungwright
{

/// SHA-256 of the bytes of the sheet, as 64 hexadecimal digits.
std::string sheetHash(const SignOffCase& c);

/// The entry: every unit of the tier, all figures, all checks. `whenUtc` as SignedSheet has it.
SignOff ledgerEntry(const SignOffCase& c, const QString& who, const QString& note, const std::string& whenUtc);

} // namespace rungwright
