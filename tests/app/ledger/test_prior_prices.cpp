// SPDX-License-Identifier: GPL-3.0-or-later
// The lowest asking price of the days before, against counting hour by hour on random histories.
#include "invented_entries.h"
#include "ledger.h"

#include <QTemporaryDir>
#include <QtTest>

#include <map>
#include <random>
#include <set>

using namespace rungwright;
using namespace rungwright::tests;

namespace
{

constexpr int kHours = 24 * 40;
constexpr int kUnits = 6;

std::string nameOf(int unit) { return "U" + std::to_string(unit); }

/// What was asked in every hour, as far as the sign-offs tell; several prices where a sign-off finds another one than was signed.
struct Hours {
    std::map<std::string, std::vector<std::set<std::int64_t>>> asked;
    std::vector<bool> signedAt = std::vector<bool>(kHours, false);

    Hours()
    {
        for (int unit = 0; unit < kUnits; ++unit)
            asked[nameOf(unit)].resize(kHours);
    }
    /// A sign-off in hour `hour`: what it finds was asked in the hour before, what it asks holds from then on.
    void take(int hour, const SignOff& entry)
    {
        signedAt[static_cast<std::size_t>(hour)] = true;
        for (auto& [name, hours] : asked) {
            for (std::size_t h = static_cast<std::size_t>(hour); h < kHours; ++h)
                hours[h].clear();
        }
        for (const LedgerUnit& unit : entry.units) {
            auto& hours = asked[unit.unit];
            hours[static_cast<std::size_t>(hour - 1)].insert(unit.before.minor);
            for (std::size_t h = static_cast<std::size_t>(hour); h < kHours; ++h)
                hours[h].insert(unit.after.minor);
        }
    }
    std::optional<std::int64_t> lowest(const std::string& unit, int from, int until) const
    {
        std::optional<std::int64_t> low;
        for (int h = std::max(0, from); h < until; ++h) {
            for (const std::int64_t price : asked.at(unit)[static_cast<std::size_t>(h)])
                low = low ? std::min(*low, price) : price;
        }
        return low;
    }
};

std::string utcOfHour(int hour) { return utcText(kFirstInstant + hour * kHour); }

} // namespace

class TestPriorPrices : public QObject
{
    Q_OBJECT

private slots:
    void agreeWithCounting()
    {
        const QTemporaryDir folder;
        int compared = 0;
        int known = 0;
        for (unsigned round = 0; round < 30; ++round) {
            std::mt19937 dice(round);
            const auto upTo = [&dice](unsigned most) { return static_cast<int>(dice() % most); };
            auto opened = Ledger::open(folder.filePath(QStringLiteral("%1.sqlite").arg(round)), Ledger::For::writing);
            QVERIFY(opened.ok());
            Ledger ledger = std::move(opened).value();
            Hours hours;
            std::set<int> times;
            for (int i = 2 + upTo(10); i > 0; --i)
                times.insert(1 + upTo(kHours - 1));
            std::map<int, std::int64_t> asking;
            std::vector<std::pair<int, SignOff>> entries;
            for (const int hour : times) {
                SignOff entry = inventedEntry(0, 1);
                entry.whenUtc = utcOfHour(hour);
                entry.units.clear();
                for (int unit = 0; unit < kUnits; ++unit) {
                    if (upTo(4) == 0 && !(unit == 0 && entry.units.empty() && kUnits == 1))
                        continue;                                             // Not listed this time.
                    const bool past = !asking.contains(unit) || upTo(5) == 0; // Changed past the ledger.
                    const std::int64_t before = past ? 5'000 + upTo(200) : asking[unit];
                    const std::int64_t after = upTo(3) == 0 ? before : 5'000 + upTo(200);
                    asking[unit] = after;
                    entry.units.push_back({nameOf(unit), static_cast<Status>(upTo(4)), Price{before}, Price{after}});
                }
                if (entry.units.empty())
                    entry.units.push_back({nameOf(0), Status::vacant, Price{5'100}, Price{5'100}});
                hours.take(hour, entry);
                entries.emplace_back(hour, entry);
            }
            // Recorded in any order: only the time counts.
            std::shuffle(entries.begin(), entries.end(), dice);
            for (const auto& [hour, entry] : entries)
                QVERIFY(ledger.record(entry).ok());
            for (int look = 0; look < 40; ++look) {
                const int until = look < 10 ? entries[static_cast<std::size_t>(look) % entries.size()].first : 1 + upTo(kHours - 1);
                PriorWindow window;
                window.until = kFirstInstant + until * kHour;
                window.days = 1 + upTo(35);
                const int from = until - 24 * window.days;
                const auto lowest = ledger.lowestAsked("Quayside (invented)", "Small", {"EUR", 2}, window).value();
                std::map<std::string, std::int64_t> said;
                for (const LowestAsked& one : lowest.units) {
                    said[one.unit] = one.lowest.value().minor;
                    // The sign-off it names shows that price.
                    const SignOff shown = ledger.entry(one.seen).value().value();
                    QVERIFY(std::any_of(shown.units.begin(), shown.units.end(), [&](const LedgerUnit& unit) {
                        return unit.unit == one.unit && (unit.before == one.lowest || unit.after == one.lowest);
                    }));
                    const bool fromTheStart =
                        from >= 0 && !hours.asked[one.unit][static_cast<std::size_t>(from)].empty() &&
                        std::any_of(times.begin(), times.end(), [&](int hour) { return hour <= from; }) && [&] {
                            const int last = *std::prev(times.upper_bound(from));
                            const auto entry = std::find_if(entries.begin(), entries.end(), [&](const auto& e) { return e.first == last; });
                            return std::any_of(entry->second.units.begin(), entry->second.units.end(),
                                               [&](const LedgerUnit& unit) { return unit.unit == one.unit; });
                        }();
                    QCOMPARE(one.whole, fromTheStart);
                }
                std::optional<std::int64_t> least;
                for (int unit = 0; unit < kUnits; ++unit) {
                    const auto counted = hours.lowest(nameOf(unit), from, until);
                    const auto found = said.find(nameOf(unit));
                    QCOMPARE(found != said.end(), counted.has_value());
                    ++compared;
                    if (!counted)
                        continue;
                    ++known;
                    QCOMPARE(found->second, *counted);
                    least = least ? std::min(*least, *counted) : *counted;
                }
                QCOMPARE(lowest.tier.has_value(), least.has_value());
                if (least)
                    QCOMPARE(lowest.tier->lowest->minor, *least);
            }
        }
        qInfo("%d windows of a unit compared, %d with a price known", compared, known);
        QVERIFY(known > compared / 2 && known < compared); // Both sides were met.
    }

    // The edges by hand, in words: what held when the window began counts; what ended at that very moment does not.
    void edges()
    {
        const QTemporaryDir folder;
        auto opened = Ledger::open(folder.filePath(QStringLiteral("l.sqlite")), Ledger::For::writing);
        QVERIFY(opened.ok());
        Ledger ledger = std::move(opened).value();
        const auto sign = [&](int hour, std::int64_t before, std::int64_t after, const Currency& currency) {
            SignOff entry = inventedEntry(0, 1);
            entry.whenUtc = utcOfHour(hour);
            entry.currency = currency;
            entry.units = {{"U0", Status::occupied, Price{before}, Price{after}}};
            return ledger.record(entry).ok();
        };
        const Currency euro{"EUR", 2};
        QVERIFY(sign(10, 4'000, 5'000, euro));
        QVERIFY(sign(100, 5'000, 6'000, euro));
        const auto look = [&](int untilHour, int days) {
            PriorWindow window;
            window.until = kFirstInstant + untilHour * kHour;
            window.days = days;
            return ledger.lowestAsked("Quayside (invented)", "Small", euro, window).value();
        };
        QVERIFY(look(124, 1).tier->lowest == Price{6'000}); // Begins at the very sign-off.
        QVERIFY(look(123, 1).tier->lowest == Price{5'000}); // An hour earlier.
        QVERIFY(look(100, 1).tier->lowest == Price{5'000}); // Ends at it: only what it found.
        QVERIFY(look(100, 30).tier->lowest == Price{4'000});
        QVERIFY(!look(100, 30).tier->whole); // The ledger begins within.
        QVERIFY(look(100, 3).tier->whole);
        QVERIFY(look(10, 1).tier->lowest == Price{4'000});
        QVERIFY(!look(9, 1).tier);
        // Another currency's amounts are not compared.
        QVERIFY(sign(110, 1'000, 1'000, Currency{"JPY", 0}));
        QVERIFY(look(124, 1).tier->lowest == Price{6'000});
        QCOMPARE(look(124, 1).otherCurrency, std::int64_t{1});
        QVERIFY(!look(24 * 30, 1).tier); // It is what was in force.
        QCOMPARE(look(24 * 30, 1).otherCurrency, std::int64_t{1});
        // A month of 30 days in a leap-free February's way is no month: 30 * 24 h.
        QCOMPARE(PriorWindow{}.from(), std::int64_t{-30} * 24 * kHour);
    }
};

QTEST_GUILESS_MAIN(TestPriorPrices)
#include "test_prior_prices.moc"
