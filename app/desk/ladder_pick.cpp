// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder_pick.h"

#include <algorithm>
#include <cassert>

namespace rungwright
{

bool LadderPick::isShown(int candidate) const { return std::ranges::find(m_shown, candidate) != m_shown.end(); }

void LadderPick::beginWith(int workedOn)
{
    m_shown = {-1};
    for (int i = 0; i < m_names.size() && m_shown.size() < kComparedAtFirst; ++i)
        m_shown.push_back(i);
    if (workedOn >= 0 && !isShown(workedOn))
        m_shown.back() = workedOn;
    m_begun = true;
}

void LadderPick::update(const QStringList& names, int workedOn)
{
    if (!m_begun || m_names.isEmpty()) {
        m_names = names;
        beginWith(workedOn);
        return;
    }
    // A name that is gone while the number stayed was renamed in its place.
    const bool samePlaces = names.size() == m_names.size();
    std::vector<int> kept;
    for (const int was : m_shown) {
        if (was < 0) {
            kept.push_back(was);
            continue;
        }
        const auto now = static_cast<int>(names.indexOf(m_names[was]));
        if (now >= 0)
            kept.push_back(now);
        else if (samePlaces)
            kept.push_back(was);
    }
    std::vector<int> come;
    for (int i = 0; i < names.size(); ++i) {
        if (!samePlaces && !m_names.contains(names[i]))
            come.push_back(i);
    }
    m_names = names;
    m_shown = std::move(kept);
    for (const int candidate : come) {
        if (canShowMore())
            m_shown.push_back(candidate);
    }
    fillUp();
}

void LadderPick::fillUp()
{
    for (int i = -1; i < m_names.size() && m_shown.size() < kFewestCompared; ++i) {
        if (!isShown(i))
            m_shown.push_back(i);
    }
}

bool LadderPick::setShown(int candidate, bool on)
{
    if (isShown(candidate) == on)
        return true;
    if (on ? !canShowMore() : !canShowFewer())
        return false;
    if (on)
        m_shown.push_back(candidate);
    else
        std::erase(m_shown, candidate);
    return true;
}

void LadderPick::reorder(std::vector<int> order)
{
    assert(std::ranges::is_permutation(order, m_shown));
    m_shown = std::move(order);
}

} // namespace rungwright
