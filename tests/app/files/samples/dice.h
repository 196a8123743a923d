// SPDX-License-Identifier: GPL-3.0-or-later
// Chance that falls the same on every machine: the standard fixes the engine's numbers, but not what its distributions make of them.
#pragma once

#include <cstdint>
#include <random>

namespace rungwright::samples
{

class Dice
{
public:
    explicit Dice(std::uint64_t seed) : m_engine(seed) {}

    /// In [0, 1).
    double share() { return static_cast<double>(m_engine() >> 11) / 9007199254740992.0; }
    /// From `least` to `greatest`, both included.
    int whole(int least, int greatest) { return least + static_cast<int>(m_engine() % static_cast<std::uint64_t>(greatest - least + 1)); }

private:
    std::mt19937_64 m_engine;
};

} // namespace rungwright::samples
