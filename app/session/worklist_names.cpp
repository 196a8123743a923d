// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_names.h"

#include <QCollator>
#include <QHash>

#include <algorithm>
#include <numeric>

namespace rungwright
{

namespace
{

QString fromUtf8(const std::string& text) { return QString::fromUtf8(text.data(), static_cast<qsizetype>(text.size())); }

/// Numbers each different text in the order they come.
class Numbering
{
public:
    std::uint32_t of(const std::string& text)
    {
        const QByteArray key = QByteArray::fromRawData(text.data(), static_cast<qsizetype>(text.size()));
        const auto known = m_numbers.constFind(key);
        if (known != m_numbers.cend())
            return *known;
        const auto number = static_cast<std::uint32_t>(texts.size());
        texts.push_back(fromUtf8(text));
        m_numbers.insert(key, number);
        return number;
    }
    std::vector<QString> texts;

private:
    QHash<QByteArray, std::uint32_t> m_numbers; ///< Views of the tier list's own strings, which outlive this.
};

/// The place of every text in the user's alphabet.
std::vector<std::uint32_t> ranks(const std::vector<QString>& texts, const std::atomic<bool>& cancel)
{
    QCollator collator;
    collator.setNumericMode(true);
    collator.setCaseSensitivity(Qt::CaseInsensitive);
    std::vector<QCollatorSortKey> keys;
    keys.reserve(texts.size());
    for (const QString& text : texts) {
        if (cancel)
            return {};
        keys.push_back(collator.sortKey(text));
    }
    std::vector<std::uint32_t> order(texts.size());
    std::iota(order.begin(), order.end(), 0U);
    std::sort(order.begin(), order.end(), [&](std::uint32_t a, std::uint32_t b) { return keys[a] < keys[b]; });
    std::vector<std::uint32_t> rank(texts.size());
    std::uint32_t place = 0;
    for (std::size_t i = 0; i < order.size(); ++i) {
        if (i > 0 && keys[order[i - 1]] < keys[order[i]])
            ++place;
        rank[order[i]] = place;
    }
    return rank;
}

} // namespace

WorklistNames worklistNames(const TierList& tiers)
{
    WorklistNames names;
    Numbering sites;
    names.site.reserve(tiers.size());
    for (const TierCase& tierCase : tiers)
        names.site.push_back(sites.of(tierCase.tier.site));
    names.sites = std::move(sites.texts);
    return names;
}

QString searchText(const Tier& tier) { return (fromUtf8(tier.site) + QLatin1Char(' ') + fromUtf8(tier.name)).toCaseFolded(); }

std::vector<QString> searchTexts(const TierList& tiers, const std::atomic<bool>& cancel)
{
    std::vector<QString> texts;
    texts.reserve(tiers.size());
    for (const TierCase& tierCase : tiers) {
        if (cancel)
            return {};
        texts.push_back(searchText(tierCase.tier));
    }
    return texts;
}

NameRanks nameRanks(const TierList& tiers, const std::atomic<bool>& cancel)
{
    Numbering sites;
    Numbering names;
    std::vector<std::uint32_t> name;
    name.reserve(tiers.size());
    for (const TierCase& tierCase : tiers) {
        if (cancel)
            return {};
        sites.of(tierCase.tier.site);
        name.push_back(names.of(tierCase.tier.name));
    }
    const std::vector<std::uint32_t> places = ranks(names.texts, cancel);
    NameRanks found;
    found.site = ranks(sites.texts, cancel);
    if (cancel)
        return {};
    found.tier.reserve(name.size());
    for (const std::uint32_t n : name)
        found.tier.push_back(places[n]);
    return found;
}

} // namespace rungwright
