// SPDX-License-Identifier: GPL-3.0-or-later
// An invented unit list of any size, the same bytes on every machine.
#pragma once

#include <array>
#include <cstdint>
#include <cstdio>
#include <functional>
#include <string>
#include <string_view>

namespace rungwright::benchmarks
{

/// A well-mixed number from another (the finalizer of Steele, Lea & Flood's SplitMix, OOPSLA 2014; from memory).
inline std::uint64_t mixed(std::uint64_t x)
{
    x += 0x9E3779B97F4A7C15U;
    x = (x ^ (x >> 30)) * 0xBF58476D1CE4E5B9U;
    x = (x ^ (x >> 27)) * 0x94D049BB133111EBU;
    return x ^ (x >> 31);
}

/// Writes `units` invented units, 50 a tier and ten tiers a site, in our own unit list format and with all of its columns, as a system
/// that lists each site door by door would: the tiers of a site are mixed. Every tier leans its own way; between 5 and 45 units in a
/// hundred are on offer. `write` gets pieces of about a megabyte.
inline void inventedList(int units, const std::function<void(std::string_view)>& write)
{
    constexpr int kUnitsPerSite = 500;
    constexpr std::array<const char*, 10> kTiers{"Locker 1 m²", "Locker 1.5 m²", "Room 2 m²", "Room 3 m²",  "Room 4 m²",
                                                 "Room 5 m²",   "Room 6 m²",     "Room 9 m²", "Room 12 m²", "Room 15 m²"};
    constexpr std::array<const char*, 10> kAreas{"1", "1.5", "2", "3", "4", "5", "6", "9", "12", "15"};
    std::string text = "site,tier,unit,asking_price,status,advertised_floor,currency,grade,area,vacancy_chance,locked\n";
    std::array<char, 256> row{};
    for (int i = 0; i < units; ++i) {
        const int site = i / kUnitsPerSite;
        const int door = i % kUnitsPerSite;
        // Ten doors in a row have one unit of every tier each, in an order of their own.
        const auto turn = mixed(static_cast<std::uint64_t>(i / 10)) % 10;
        const auto size = (static_cast<std::uint64_t>(door) * 7 + turn) % 10;
        const std::uint64_t ofTier = mixed(static_cast<std::uint64_t>(site) * 10 + size + 1'000'000'007U);
        const std::uint64_t dice = mixed(static_cast<std::uint64_t>(i) + 5'000'000'029U);
        const auto floor = static_cast<long>(1900 + 700 * size + ofTier % 500 / 50 * 50);
        // The square root piles prices up near the top, the square near the floor.
        const double u = static_cast<double>(dice >> 40) / static_cast<double>(1U << 24);
        const double lean = ofTier >> 32 & 1 ? u * (2 - u) : u * u;
        const auto asking = floor + static_cast<long>(lean * static_cast<double>(floor) * 0.8) / 50 * 50;
        const auto offered = 5 + ofTier / 512 % 41;
        const auto fate = dice % 100;
        const char* status = fate < offered ? "vacant" : fate < 96 ? "occupied" : fate < 98 ? "reserved" : "closed";
        const int length = std::snprintf(row.data(), row.size(), "Invented site %04d,%s,%c-%03d,%ld.%02ld,%s,%ld.%02ld,EUR,%d,%s,,\n",
                                         site + 1, kTiers[size], 'A' + door / 100, door % 100 + 1, asking / 100, asking % 100, status,
                                         floor / 100, floor % 100, static_cast<int>(1 + dice / 128 % 5), kAreas[size]);
        text.append(row.data(), static_cast<std::size_t>(length));
        if (text.size() > 1'000'000) {
            write(text);
            text.clear();
        }
    }
    write(text);
}

} // namespace rungwright::benchmarks
