// SPDX-License-Identifier: GPL-3.0-or-later
// One entry of the price ledger: what was signed off, when, by whom, and on which grounds.
#pragma once

#include "ladder/currency.h"
#include "ladder/unit.h"

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace rungwright
{

/// A unit of the tier at the time of the sign-off. Every unit of the tier is kept, changed or not: only then is a price known for every
/// unit at every time since.
struct LedgerUnit {
    std::string unit;
    Status status = Status::vacant;
    Price before; ///< What was asked when the sheet was signed, > 0.
    Price after;  ///< What the sheet asks, > 0.

    bool operator==(const LedgerUnit&) const = default;
};

/// A figure of the tier before and after, as the Figures show it. Money in minor units; nothing where it is undefined.
struct LedgerFigure {
    std::string key; ///< FigureRow::key: "expected_cheapest", "gap", "gap_share", "chance_floor_met", "asking_total", "skew.moment", ...
    std::optional<double> before;
    std::optional<double> after;

    bool operator==(const LedgerFigure&) const = default;
};

/// The keys the history reads.
inline constexpr const char* kLedgerCheapest = "expected_cheapest";
inline constexpr const char* kLedgerGap = "gap";

enum class CheckOutcome : unsigned char { holds, lookAtThis, notChecked };
/// "holds", "look at this", "not checked": as the ledger stores them, untranslated.
const char* checkOutcomeWord(CheckOutcome outcome);

struct LedgerCheck {
    std::string name;
    CheckOutcome outcome = CheckOutcome::notChecked;
    std::string why;

    bool operator==(const LedgerCheck&) const = default;
};

/// Texts are UTF-8.
struct SignOff {
    std::string whenUtc; ///< ISO 8601 in UTC, to the second or millisecond: "2026-12-01T09:30:00Z".
    std::string who;     ///< Not empty.
    std::string note;
    std::string site;
    std::string tier;      ///< Not empty.
    std::string candidate; ///< The ladder's name, not empty.
    Currency currency;
    std::optional<Price> advertisedFloor; ///< > 0; nothing when none is known.
    std::vector<LedgerUnit> units;        ///< Every unit of the tier, in its order; names unique.
    std::string modelWords;               ///< "Random remainder, 3 units left"
    std::string modelStored;              ///< The model's settings as a scenario file stores them.
    std::vector<LedgerFigure> figures;    ///< Keys unique.
    std::vector<LedgerCheck> checks;      ///< In the order shown.
    std::string sheetSha256;              ///< Of the price sheet's bytes: 64 hexadecimal digits, lower case.

    bool operator==(const SignOff&) const = default;
};

/// "2026-12-01T09:30:00.250Z" -> milliseconds since 1970-01-01T00:00:00Z. Nothing unless it is such a time and ends in Z: a time without
/// a zone is not an instant.
std::optional<std::int64_t> instantFromUtcText(const std::string& text);
/// The other way; milliseconds are written only where there are any.
std::string utcText(std::int64_t instant);

} // namespace rungwright
