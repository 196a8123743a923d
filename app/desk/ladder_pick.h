// SPDX-License-Identifier: GPL-3.0-or-later
// Which ladders of a tier are compared, and in which order.
#pragma once

#include <QStringList>

#include <span>
#include <vector>

namespace rungwright
{

inline constexpr std::size_t kFewestCompared = 2;
inline constexpr std::size_t kMostCompared = 6;
/// So many are taken without asking: more columns than these get narrow beside the docks.
inline constexpr std::size_t kComparedAtFirst = 4;

/// The pick for one tier. Ladders are candidate indices, -1 the current ladder. The pick follows candidates by name when others come and
/// go, and by place when they are renamed.
class LadderPick
{
public:
    /// Takes over what candidates there are now (`names`, by index). At first: the current ladder and the first candidates, the one worked
    /// on
    /// (-1: none) among them. Later: candidates that have come are added as long as there is room, those that have gone are left out.
    void update(const QStringList& names, int workedOn);

    /// In the order of the columns. Fewer than kFewestCompared only while there are fewer ladders.
    const std::vector<int>& shown() const { return m_shown; }
    bool isShown(int candidate) const;
    bool canShowMore() const { return m_shown.size() < kMostCompared; }
    bool canShowFewer() const { return m_shown.size() > kFewestCompared; }
    /// False when the limits forbid it.
    bool setShown(int candidate, bool on);
    /// `order` holds the same ladders as shown().
    void reorder(std::vector<int> order);

private:
    void beginWith(int workedOn);
    void fillUp();

    QStringList m_names;
    std::vector<int> m_shown;
    bool m_begun = false;
};

} // namespace rungwright
