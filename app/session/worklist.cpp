// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist.h"

#include <algorithm>
#include <numeric>
#include <utility>

namespace rungwright
{

Worklist::Worklist(Document& document, QObject* parent) : QObject(parent), m_document(document)
{
    connect(&document, &Document::changed, this, &Worklist::onChanged);
    takeTiers();
}

Worklist::~Worklist() { stop(); }

void Worklist::stop()
{
    if (m_cancel)
        *m_cancel = true;
    if (m_worker.joinable())
        m_worker.join();
}

void Worklist::onChanged(const DocumentChange& change)
{
    using Kind = DocumentChange::Kind;
    const int last = count() - 1;
    switch (change.kind) {
    case Kind::everything:
    case Kind::refreshed:
        takeTiers();
        break;
    case Kind::model:
    case Kind::floor:
        if (change.tier >= 0)
            remeasure(change.tier);
        else
            takeTiers();
        break;
    case Kind::flags:
        reflag();
        emit rowsChanged(0, last);
        break;
    case Kind::seen:
    case Kind::notes:
        emit marksChanged(change.tier >= 0 ? change.tier : 0, change.tier >= 0 ? change.tier : last);
        break;
    case Kind::prices:
    case Kind::candidates:
    case Kind::units:
    case Kind::rules:
    case Kind::signedOff:
        break; // the rows are the current ladders'
    }
}

void Worklist::takeTiers()
{
    stop();
    const TierList& tiers = m_document.scenario().tiers;
    const bool hadPick = std::exchange(m_pickedCount, 0) > 0;
    m_picked.clear();
    ++m_round;
    m_fresher.clear();
    m_rows.assign(tiers.size(), {});
    m_flags.assign(tiers.size(), {});
    m_measured = 0;
    m_greatestShare = 0;
    m_names = worklistNames(tiers);
    m_search.clear();
    if (takesLong(tiers)) {
        m_ranks.site.resize(m_names.sites.size());
        m_ranks.tier.resize(tiers.size());
        std::iota(m_ranks.site.begin(), m_ranks.site.end(), 0U);
        std::iota(m_ranks.tier.begin(), m_ranks.tier.end(), 0U);
        measureInBackground();
    } else {
        measureNow();
    }
    emit reset();
    if (hadPick)
        emit pickChanged();
}

void Worklist::measureNow()
{
    const TierList& tiers = m_document.scenario().tiers;
    m_ranks = nameRanks(tiers);
    m_search = searchTexts(tiers);
    for (std::size_t i = 0; i < tiers.size(); ++i)
        m_rows[i] = measureRow(m_measurer, tiers[i]);
    m_measured = m_rows.size();
    reflag();
    findGreatest();
}

void Worklist::measureInBackground()
{
    m_cancel = std::make_shared<std::atomic<bool>>(false);
    // The thread reads a copy of its own: the list may change meanwhile.
    m_worker = std::jthread([this, tiers = m_document.scenario().tiers, cancel = m_cancel, round = m_round] {
        NameRanks inAlphabet = nameRanks(tiers, *cancel);
        std::vector<QString> folded = searchTexts(tiers, *cancel);
        if (*cancel)
            return;
        QMetaObject::invokeMethod(
            this,
            [this, round, ranks = std::move(inAlphabet), search = std::move(folded)]() mutable {
                if (round != m_round)
                    return;
                m_ranks = std::move(ranks);
                m_search = std::move(search);
            },
            Qt::QueuedConnection);
        measureRows(tiers, 0, *cancel, [this, round](std::size_t first, std::vector<WorklistRow> rows) {
            QMetaObject::invokeMethod(
                this, [this, round, first, rows = std::move(rows)] { takeRows(round, first, rows); }, Qt::QueuedConnection);
        });
    });
}

void Worklist::takeRows(int round, std::size_t first, const std::vector<WorklistRow>& rows)
{
    if (round != m_round)
        return;
    for (std::size_t i = 0; i < rows.size(); ++i) {
        const std::size_t tier = first + i;
        if (m_fresher.contains(tier))
            continue;
        m_rows[tier] = rows[i];
        m_flags[tier] = flagsOf(rows[i], thresholds());
        m_greatestShare = std::max(m_greatestShare, rows[i].share.value_or(0.0));
        ++m_measured;
    }
    emit rowsChanged(static_cast<int>(first), static_cast<int>(first + rows.size()) - 1);
    if (!measuring())
        emit measured();
}

void Worklist::remeasure(int tier)
{
    const auto at = static_cast<std::size_t>(tier);
    const bool wasMeasuring = measuring();
    const bool first = !m_rows[at].measured;
    if (wasMeasuring)
        m_fresher.insert(at);
    m_rows[at] = measureRow(m_measurer, tierCase(tier));
    m_flags[at] = flagsOf(m_rows[at], thresholds());
    m_measured += first ? 1 : 0;
    const double before = m_greatestShare;
    findGreatest();
    // Every bar is as long as its share of the greatest.
    const bool barsMove = before != m_greatestShare;
    emit rowsChanged(barsMove ? 0 : tier, barsMove ? count() - 1 : tier);
    if (wasMeasuring && !measuring())
        emit measured();
}

void Worklist::reflag()
{
    for (std::size_t i = 0; i < m_rows.size(); ++i)
        m_flags[i] = flagsOf(m_rows[i], thresholds());
}

void Worklist::findGreatest()
{
    m_greatestShare = 0;
    for (const WorklistRow& row : m_rows)
        m_greatestShare = std::max(m_greatestShare, row.share.value_or(0.0));
}

int Worklist::worstTier() const
{
    int worst = -1;
    for (int i = 0; i < count(); ++i) {
        if (row(i).share && (worst < 0 || *row(i).share > *row(worst).share))
            worst = i;
    }
    return worst;
}

void Worklist::pick(const std::vector<int>& tiers)
{
    if (tiers.empty() && m_pickedCount == 0)
        return;
    m_picked.assign(m_rows.size(), false);
    m_pickedCount = 0;
    for (const int tier : tiers) {
        const auto at = static_cast<std::size_t>(tier);
        if (!m_picked[at])
            ++m_pickedCount;
        m_picked[at] = true;
    }
    emit pickChanged();
}

} // namespace rungwright
