// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape/by_hand.h"

#include <algorithm>
#include <cassert>
#include <cstdlib>

namespace rungwright
{

namespace
{

/// One unit that takes a share. Amounts count in the direction of the spreading, so that all of them are >= 0.
struct Receiver {
    std::uint32_t unit = 0;
    Room room;
    std::int64_t roomLeft = 0;
    double remainder = 0; ///< Share minus what was given so far.
};

class Spreading
{
public:
    Spreading(std::span<const Price> start, const PriceRules& rules, std::int64_t toSpread, Reshaped& out) :
        m_start(start), m_rules(rules), m_sign(toSpread < 0 ? -1 : 1), m_left(std::abs(toSpread)), m_out(out)
    {
    }

    void addReceiver(std::uint32_t unit, const Room& room)
    {
        const std::int64_t inside = m_sign > 0 ? (room.hi - m_start[unit]).minor : (m_start[unit] - room.lo).minor;
        if (inside > 0) {
            m_receivers.push_back({unit, room, inside, 0});
            m_roomOfAll += static_cast<double>(inside);
        }
    }

    void giveShares()
    {
        const auto all = static_cast<double>(m_left);
        for (Receiver& receiver : m_receivers) {
            const double share = std::min(1.0, all / m_roomOfAll) * static_cast<double>(receiver.roomLeft);
            const std::int64_t whole = std::min(static_cast<std::int64_t>(share), m_left);
            const std::int64_t given = lastAllowed(receiver, whole);
            receiver.remainder = share - static_cast<double>(given);
            give(receiver, given);
        }
    }

    void giveSingleSteps()
    {
        std::ranges::sort(m_receivers, [](const Receiver& a, const Receiver& b) {
            return a.remainder != b.remainder ? a.remainder > b.remainder : a.unit < b.unit;
        });
        for (bool gave = true; gave && m_left > 0;) {
            gave = false;
            for (Receiver& receiver : m_receivers) {
                const std::int64_t step = stepOnward(receiver);
                if (step > 0 && step <= m_left) {
                    give(receiver, step);
                    gave = true;
                }
            }
        }
    }

    void exchangeSteps()
    {
        if (m_left == 0)
            return;
        struct Step {
            std::int64_t size;
            std::size_t receiver;
        };
        std::vector<Step> back;
        for (std::size_t i = 0; i < m_receivers.size(); ++i)
            if (const std::int64_t size = stepBack(m_receivers[i]); size > 0)
                back.push_back({size, i});
        std::ranges::stable_sort(back, {}, &Step::size);
        for (std::size_t i = 0; i < m_receivers.size(); ++i) {
            const std::int64_t onward = stepOnward(m_receivers[i]);
            for (auto match = std::ranges::lower_bound(back, onward - m_left, {}, &Step::size);
                 onward > 0 && match != back.end() && match->size == onward - m_left; ++match) {
                if (match->receiver == i)
                    continue;
                give(m_receivers[match->receiver], -match->size);
                give(m_receivers[i], onward);
                return;
            }
        }
    }

    /// What was not spread, as new total minus old: positive when the spreading was downwards.
    Price leftOver() const { return Price{-m_sign * m_left}; }

private:
    Price priceOf(const Receiver& receiver) const { return m_out.prices[receiver.unit]; }

    void give(Receiver& receiver, std::int64_t amount)
    {
        m_out.prices[receiver.unit] += Price{m_sign * amount};
        receiver.roomLeft -= amount;
        m_left -= amount;
    }

    /// The greatest amount not above `whole` that ends on a price point; 0 when there is none.
    std::int64_t lastAllowed(const Receiver& receiver, std::int64_t whole) const
    {
        const Price ideal = priceOf(receiver) + Price{m_sign * whole};
        if (whole == receiver.roomLeft)
            return whole; // The end of the room is allowed even where it is no point.
        const auto point = m_sign > 0 ? m_rules.points.atOrBelow(ideal) : m_rules.points.atOrAbove(ideal);
        return point ? std::max<std::int64_t>(0, m_sign * (*point - priceOf(receiver)).minor) : 0;
    }

    /// To the next allowed price in the direction of the spreading; 0 when the room has none.
    std::int64_t stepOnward(const Receiver& receiver) const { return stepTowards(receiver, static_cast<int>(m_sign)); }

    /// Back towards `start`, never beyond it.
    std::int64_t stepBack(const Receiver& receiver) const
    {
        const Price price = priceOf(receiver);
        const std::int64_t given = m_sign * (price - m_start[receiver.unit]).minor;
        if (given <= 0)
            return 0;
        const std::int64_t size = stepTowards(receiver, -static_cast<int>(m_sign));
        return size == 0 ? 0 : std::min(size, given);
    }

    std::int64_t stepTowards(const Receiver& receiver, int direction) const
    {
        const Price price = priceOf(receiver);
        const Price next = std::clamp(m_rules.points.stepped(price, direction), receiver.room.lo, receiver.room.hi);
        return std::max<std::int64_t>(0, direction * (next - price).minor);
    }

    std::span<const Price> m_start;
    const PriceRules& m_rules;
    std::int64_t m_sign;
    std::int64_t m_left;
    Reshaped& m_out;
    std::vector<Receiver> m_receivers;
    double m_roomOfAll = 0;
};

} // namespace

void holdTotal(std::span<const Unit> units, std::span<const Price> start, std::span<const std::uint32_t> counted,
               std::span<const std::uint32_t> moved, const PriceRules& rules, Reshaped& out)
{
    assert(out.prices.size() == units.size() && start.size() == units.size());
    std::int64_t taken = 0;
    for (const std::uint32_t unit : counted)
        taken += (out.prices[unit] - start[unit]).minor;
    out.leftOver = {};
    if (taken == 0)
        return;

    std::vector<bool> isMoved(units.size());
    for (const std::uint32_t unit : moved)
        isMoved[unit] = true;
    Spreading spreading(start, rules, -taken, out);
    for (const std::uint32_t unit : counted)
        if (!isMoved[unit] && !units[unit].locked)
            spreading.addReceiver(unit, roomOf(units[unit], rules));
    spreading.giveShares();
    spreading.giveSingleSteps();
    spreading.exchangeSteps();
    out.leftOver = spreading.leftOver();
}

} // namespace rungwright
