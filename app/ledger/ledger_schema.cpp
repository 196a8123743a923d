// SPDX-License-Identifier: GPL-3.0-or-later
#include "ledger_schema.h"

#include <array>

namespace rungwright
{

namespace
{

// STRICT: a column holds its type or nothing. Prices are whole minor units, instants milliseconds since 1970-01-01T00:00:00Z.
constexpr const char* kForm1[] = {
    R"(CREATE TABLE tier(
        id INTEGER PRIMARY KEY,
        site TEXT NOT NULL,
        name TEXT NOT NULL CHECK(name <> ''),
        UNIQUE(site, name)) STRICT)",
    R"(CREATE TABLE unit(
        id INTEGER PRIMARY KEY,
        tier INTEGER NOT NULL REFERENCES tier(id),
        name TEXT NOT NULL CHECK(name <> ''),
        UNIQUE(tier, name)) STRICT)",
    R"(CREATE TABLE sign_off(
        id INTEGER PRIMARY KEY AUTOINCREMENT,
        instant INTEGER NOT NULL,
        tier INTEGER NOT NULL REFERENCES tier(id),
        who TEXT NOT NULL CHECK(who <> ''),
        note TEXT NOT NULL,
        candidate TEXT NOT NULL CHECK(candidate <> ''),
        currency TEXT NOT NULL CHECK(length(currency) = 3),
        decimals INTEGER NOT NULL CHECK(decimals BETWEEN 0 AND 4),
        advertised_floor INTEGER CHECK(advertised_floor > 0),
        units INTEGER NOT NULL CHECK(units > 0),
        changed INTEGER NOT NULL CHECK(changed BETWEEN 0 AND units),
        model_words TEXT NOT NULL,
        model_stored TEXT NOT NULL,
        sheet_sha256 TEXT NOT NULL CHECK(length(sheet_sha256) = 64 AND sheet_sha256 NOT GLOB '*[^0-9a-f]*')) STRICT)",
    "CREATE INDEX sign_off_by_tier ON sign_off(tier, instant, id)",
    "CREATE INDEX sign_off_by_time ON sign_off(instant, id)",
    R"(CREATE TABLE unit_price(
        sign_off INTEGER NOT NULL REFERENCES sign_off(id),
        unit INTEGER NOT NULL REFERENCES unit(id),
        place INTEGER NOT NULL CHECK(place >= 0),
        status TEXT NOT NULL CHECK(status IN ('vacant', 'occupied', 'reserved', 'closed')),
        before INTEGER NOT NULL CHECK(before > 0),
        after INTEGER NOT NULL CHECK(after > 0),
        PRIMARY KEY(sign_off, unit)) STRICT, WITHOUT ROWID)",
    "CREATE INDEX unit_price_by_unit ON unit_price(unit, sign_off)",
    R"(CREATE TABLE figure(
        sign_off INTEGER NOT NULL REFERENCES sign_off(id),
        key TEXT NOT NULL CHECK(key <> ''),
        place INTEGER NOT NULL CHECK(place >= 0),
        before REAL,
        after REAL,
        PRIMARY KEY(sign_off, key)) STRICT, WITHOUT ROWID)",
    R"(CREATE TABLE check_made(
        sign_off INTEGER NOT NULL REFERENCES sign_off(id),
        place INTEGER NOT NULL CHECK(place >= 0),
        name TEXT NOT NULL CHECK(name <> ''),
        outcome TEXT NOT NULL CHECK(outcome IN ('holds', 'look at this', 'not checked')),
        why TEXT NOT NULL,
        PRIMARY KEY(sign_off, place)) STRICT, WITHOUT ROWID)",
    // What was signed stays as it was signed.
    "CREATE TRIGGER sign_off_stays BEFORE UPDATE ON sign_off BEGIN SELECT RAISE(ABORT, 'a sign-off is never changed'); END",
    "CREATE TRIGGER sign_off_kept BEFORE DELETE ON sign_off BEGIN SELECT RAISE(ABORT, 'a sign-off is never deleted'); END",
    "CREATE TRIGGER unit_price_stays BEFORE UPDATE ON unit_price BEGIN SELECT RAISE(ABORT, 'a sign-off is never changed'); END",
    "CREATE TRIGGER unit_price_kept BEFORE DELETE ON unit_price BEGIN SELECT RAISE(ABORT, 'a sign-off is never deleted'); END",
    "CREATE TRIGGER figure_stays BEFORE UPDATE ON figure BEGIN SELECT RAISE(ABORT, 'a sign-off is never changed'); END",
    "CREATE TRIGGER figure_kept BEFORE DELETE ON figure BEGIN SELECT RAISE(ABORT, 'a sign-off is never deleted'); END",
    "CREATE TRIGGER check_made_stays BEFORE UPDATE ON check_made BEGIN SELECT RAISE(ABORT, 'a sign-off is never changed'); END",
    "CREATE TRIGGER check_made_kept BEFORE DELETE ON check_made BEGIN SELECT RAISE(ABORT, 'a sign-off is never deleted'); END",
};

constexpr std::array kForms{std::span<const char* const>(kForm1)};

} // namespace

std::span<const std::span<const char* const>> ledgerForms() { return kForms; }

} // namespace rungwright
