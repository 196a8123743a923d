// SPDX-License-Identifier: GPL-3.0-or-later
// The price ledger: every sign-off, in an SQLite file beside the scenario. Entries are added, never changed.
#pragma once

#include "outcome.h"
#include "sign_off.h"

#include <QString>

#include <cstdint>
#include <memory>
#include <optional>
#include <string>
#include <vector>

namespace rungwright
{

/// Where the ledger of a scenario file is: "north.rungs.json" -> "north.ledger.sqlite" in the same folder. Empty for a scenario that has
/// no file of its own yet (no path, or one inside the program). "north.json" and "north.rungs.json" in one folder share a ledger.
QString ledgerPathFor(const QString& scenarioPath);

/// A sign-off in one line. Instants are milliseconds since 1970-01-01T00:00:00Z.
struct SignOffLine {
    std::int64_t id = 0;
    std::int64_t instant = 0;
    std::string who;
    std::string note;
    std::string site;
    std::string tier;
    std::string candidate;
    Currency currency;
    std::optional<Price> advertisedFloor;
    std::optional<double> cheapestBefore; ///< Expected cheapest, minor units.
    std::optional<double> cheapestAfter;
    std::optional<double> gapBefore; ///< Minor units.
    std::optional<double> gapAfter;
    std::int64_t units = 0;
    std::int64_t changed = 0; ///< Units whose price it changes.

    bool operator==(const SignOffLine&) const = default;
};

/// A unit's price as one sign-off found and left it.
struct UnitLine {
    std::int64_t signOff = 0;
    std::int64_t instant = 0;
    Currency currency;
    Status status = Status::vacant;
    Price before;
    Price after;

    bool operator==(const UnitLine&) const = default;
};

/// The days back from `until` that a prior-price rule looks at: the instants from until - days * 24 h (included) to until (excluded).
/// A day is 24 hours of elapsed time, not a calendar day: over the night on which clocks change, "30 days ago" stands an hour off on the
/// clock. Choose one day more where the rule that binds you counts calendar days.
struct PriorWindow {
    std::int64_t until = 0; ///< Usually now; the moment the new price is announced.
    int days = 30;          ///< >= 1.

    std::int64_t from() const { return until - std::int64_t{days} * 86'400'000; }
};

/// The lowest price that held at any instant of the window, as far as the ledger knows:
///  - what the last sign-off at or before the window's start asks: it was in force then;
///  - before and after of every sign-off inside the window;
///  - before of a sign-off at the very end.
/// Counted whatever the unit's status: it may have become free between two sign-offs. A unit that the last sign-off before the window
/// does not list any more was not asked then. Sign-offs in another currency are left out and counted.
/// A price that was changed past the ledger, and changed back before the next sign-off, is not known to it.
struct LowestAsked {
    std::string unit;
    std::optional<Price> lowest; ///< Nothing when nothing is known of the window.
    std::int64_t seen = 0;       ///< A sign-off that shows it within the window: its id.
    bool whole = false;          ///< Known from the window's start on; else only from the first sign-off in it.
    bool operator==(const LowestAsked&) const = default;
};
struct LowestOfTier {
    std::vector<LowestAsked> units;  ///< By unit, in alphabetic order of the bytes of their names.
    std::optional<LowestAsked> tier; ///< The lowest of them.
    std::int64_t signOffs = 0;       ///< Looked at.
    std::int64_t otherCurrency = 0;  ///< Of the window or the last before it: left out, being in another currency.
};

/// An open ledger. Belongs to the thread that opened it; another thread or window opens one of its own on the same file: readers never
/// wait, and writers wait up to five seconds for each other. What goes wrong is told with the path, the reason and a remedy; a failed
/// call leaves the file as it was. In a folder that may only be read, it shows what was there when it was opened. On a network drive, one
/// machine at a time: SQLite's log is shared by memory. Needs a QCoreApplication.
class Ledger
{
public:
    enum class For {
        reading, ///< Never creates or changes the file.
        writing, ///< Creates it where there is none; brings an older one to this version's form.
    };
    /// How long a writer waits for another, in milliseconds.
    static constexpr int kWait = 5000;

    static Outcome<Ledger> open(const QString& path, For use, int wait = kWait);
    Ledger(Ledger&&) noexcept;
    Ledger& operator=(Ledger&&) noexcept;
    ~Ledger();

    const QString& path() const;

    /// Adds the entry in one transaction, on the disk when this returns: whole, or on trouble not at all. Returns its id.
    Outcome<std::int64_t> record(const SignOff& entry);

    /// All sign-offs, or those of one tier, by time; equal times in the order they were recorded.
    Outcome<std::vector<SignOffLine>> listing() const;
    Outcome<std::vector<SignOffLine>> history(const std::string& site, const std::string& tier) const;
    /// The names of all units any sign-off of the tier lists, in alphabetic order of their bytes.
    Outcome<std::vector<std::string>> unitsOf(const std::string& site, const std::string& tier) const;
    Outcome<std::vector<UnitLine>> unitHistory(const std::string& site, const std::string& tier, const std::string& unit) const;
    /// A whole entry; nothing when there is none of that id.
    Outcome<std::optional<SignOff>> entry(std::int64_t id) const;
    /// The entry of the tier that was signed last.
    Outcome<std::optional<SignOff>> lastOf(const std::string& site, const std::string& tier) const;
    /// For every unit of the tier and the tier as a whole.
    Outcome<LowestOfTier> lowestAsked(const std::string& site, const std::string& tier, const Currency& currency,
                                      const PriorWindow& window) const;

    /// SQLite's own thorough look at the file; true, or what it found.
    Outcome<bool> check() const;

private:
    struct Connection;
    explicit Ledger(std::unique_ptr<Connection> connection);
    std::unique_ptr<Connection> m_connection;
};

} // namespace rungwright
