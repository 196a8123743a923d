// SPDX-License-Identifier: GPL-3.0-or-later
#include "signed_check.h"

#include <string_view>
#include <unordered_map>

namespace rungwright
{

SignedCheck checkSigned(const SignedSheet& sheet, const Tier* asked)
{
    SignedCheck check;
    check.wanted = static_cast<std::int64_t>(sheet.prices.size());
    std::unordered_map<std::string_view, Price> prices;
    if (asked) {
        prices.reserve(asked->units.size());
        for (const Unit& unit : asked->units)
            prices.emplace(unit.name, unit.asking);
    }
    for (const SignedPrice& one : sheet.prices) {
        const auto found = prices.find(one.unit);
        if (found == prices.end()) {
            ++check.gone;
            check.differences.push_back({one.unit, one.before, one.after, {}});
        } else if (found->second == one.after) {
            ++check.applied;
        } else {
            check.differences.push_back({one.unit, one.before, one.after, found->second});
        }
    }
    using State = SignedCheck::State;
    if (check.wanted == 0)
        check.state = State::nothingSigned;
    else if (check.gone == check.wanted)
        check.state = State::cannotTell;
    else if (check.applied == check.wanted)
        check.state = State::applied;
    else
        check.state = check.applied > 0 ? State::partly : State::notApplied;
    return check;
}

} // namespace rungwright
