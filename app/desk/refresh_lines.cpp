// SPDX-License-Identifier: GPL-3.0-or-later
#include "refresh_lines.h"

#include "sheet_cells.h"
#include "wording.h"

namespace rungwright
{

namespace
{

using What = RefreshTopic::What;

QString fromUtf8(const std::string& text) { return QString::fromStdString(text); }

const TierCase& at(const TierList& tiers, int index) { return tiers[static_cast<std::size_t>(index)]; }

const Candidate& candidateAt(const TierCase& tierCase, int index) { return tierCase.candidates[static_cast<std::size_t>(index)]; }

/// "2026-12-01 09:30 UTC" of "2026-12-01T09:30:00Z".
QString whenText(const std::string& utc)
{
    QString text = fromUtf8(utc);
    if (text.size() == 20 && text[10] == u'T' && text.endsWith(u'Z'))
        return text.left(10) + u' ' + text.mid(11, 5) + QStringLiteral(" UTC");
    return text;
}

} // namespace

std::vector<RefreshTopic> refreshTopics(const RefreshPlan& plan, const Currency& currency)
{
    std::vector<RefreshTopic> topics;
    const auto tr = [](const char* text) { return RefreshLines::tr(text); };
    if (plan.changesInAll() > 0) {
        RefreshTopic all{What::changes, -1, QString(), 0, 0};
        topics.push_back({What::heading, -1, tr("What the list changes"), 0, 0});
        const std::size_t first = topics.size();
        for (std::size_t k = 0; k < kRefreshKinds; ++k) {
            const auto kept = static_cast<std::int64_t>(plan.lines[k].size());
            all.count += plan.counts[k];
            all.kept += kept;
            if (plan.counts[k] > 0)
                topics.push_back({What::changes, static_cast<int>(k), refreshCountText(plan, static_cast<RefreshKind>(k), currency),
                                  plan.counts[k], kept});
        }
        all.text = all.count == 1 ? RefreshLines::tr("The one change")
                                  : RefreshLines::tr("All %1 changes").arg(numberText(static_cast<double>(all.count), 0));
        topics.insert(topics.begin() + static_cast<std::ptrdiff_t>(first), all);
    }
    if (!plan.candidates.empty()) {
        const auto count = static_cast<std::int64_t>(plan.candidates.size());
        topics.push_back({What::heading, -1, tr("Your candidates"), 0, 0});
        topics.push_back({What::candidates, -1,
                          count == 1 ? tr("1 candidate") : tr("%1 candidates").arg(numberText(static_cast<double>(count), 0)), count,
                          count});
        for (std::size_t f = 0; f < kChangeFates; ++f) {
            if (plan.changeCounts[f] > 0)
                topics.push_back({What::fates, static_cast<int>(f), changeFateCountText(plan, static_cast<ChangeFate>(f)),
                                  plan.changeCounts[f], static_cast<std::int64_t>(plan.changes[f].size())});
        }
    }
    if (!plan.signedTiers.empty()) {
        const auto count = static_cast<std::int64_t>(plan.signedTiers.size());
        topics.push_back({What::heading, -1, tr("Handed over, and asked now"), 0, 0});
        topics.push_back({What::sheets, -1,
                          count == 1 ? tr("1 price sheet") : tr("%1 price sheets").arg(numberText(static_cast<double>(count), 0)), count,
                          count});
    }
    return topics;
}

RefreshLines::RefreshLines(const RefreshPlan& plan, const Currency& currency, const RefreshTopic& topic) :
    m_plan(&plan), m_currency(currency), m_topic(topic)
{
    switch (topic.what) {
    case What::heading:
        break;
    case What::changes:
        m_headings = QStringList{tr("Change"), tr("Site"), tr("Tier"), tr("Unit"), tr("Before"), tr("Then")};
        m_firstNumber = 4;
        m_lastNumber = 5;
        break;
    case What::candidates:
        m_headings = QStringList{tr("Site"), tr("Tier"),     tr("Candidate"), tr("What becomes of it"),
                                 tr("Kept"), tr("Clashing"), tr("Asked now"), tr("Dropped")};
        m_firstNumber = 4;
        m_lastNumber = 7;
        break;
    case What::fates:
        m_headings =
            QStringList{tr("Site"), tr("Tier"), tr("Candidate"), tr("Unit"), tr("Asked before"), tr("Candidate’s"), tr("Asked then")};
        if (topic.which == static_cast<int>(ChangeFate::clash))
            m_headings << tr("Why");
        m_firstNumber = 4;
        m_lastNumber = 6;
        break;
    case What::sheets:
        m_headings = QStringList{tr("Site"), tr("Tier"),   tr("Ladder"),      tr("When"),     tr("What became of it"),
                                 tr("Unit"), tr("Before"), tr("Handed over"), tr("Asked now")};
        m_firstNumber = 6;
        m_lastNumber = 8;
        break;
    }
    if (topic.what != What::sheets)
        return;
    for (std::size_t t = 0; t < plan.signedTiers.size(); ++t) {
        m_sheetLines.push_back({static_cast<int>(t), -1});
        for (std::size_t d = 0; d < plan.signedTiers[t].check.differences.size(); ++d)
            m_sheetLines.push_back({static_cast<int>(t), static_cast<int>(d)});
    }
}

int RefreshLines::rows() const
{
    if (m_topic.what == What::heading)
        return 0;
    return static_cast<int>(m_topic.what == What::sheets ? static_cast<std::int64_t>(m_sheetLines.size()) : m_topic.kept);
}

QStringList RefreshLines::texts(int row, bool forFile) const
{
    if (m_topic.what == What::changes)
        return changeTexts(row, forFile);
    QStringList texts;
    for (int column = 0; column < static_cast<int>(m_headings.size()); ++column) {
        if (m_topic.what == What::candidates)
            texts << candidateText(row, column, forFile);
        else
            texts << (m_topic.what == What::fates ? fateText(row, column, forFile) : sheetText(row, column, forFile));
    }
    return texts;
}

bool RefreshLines::isNumber(int row, int column, const QString& text) const
{
    if (!isNumberColumn(column))
        return false;
    if (m_topic.what != What::changes)
        return !text.isEmpty();
    const RefreshKind kind = changeAt(row).kind;
    return kind == RefreshKind::raised || kind == RefreshKind::lowered;
}

QString RefreshLines::money(Price price, bool forFile) const
{
    return forFile ? QString::fromStdString(plainText(price, m_currency)) : moneyText(price, m_currency);
}

QString RefreshLines::counted(std::int64_t count, bool forFile) const
{
    return forFile ? QString::number(count) : numberText(static_cast<double>(count), 0);
}

const RefreshLine& RefreshLines::changeAt(int row) const
{
    auto place = static_cast<std::size_t>(row);
    if (m_topic.which >= 0)
        return m_plan->lines[static_cast<std::size_t>(m_topic.which)][place];
    std::size_t kind = 0;
    while (place >= m_plan->lines[kind].size())
        place -= m_plan->lines[kind++].size();
    return m_plan->lines[kind][place];
}

QStringList RefreshLines::changeTexts(int row, bool forFile) const
{
    const RefreshLine& line = changeAt(row);
    const RefreshLineText text = refreshLineText(*m_plan, line, [&](Price price) { return money(price, forFile); });
    return {refreshKindText(line.kind), text.site, text.tier, text.unit, text.before, text.after};
}

QString RefreshLines::candidateText(int row, int column, bool forFile) const
{
    const CandidateOutcome& outcome = m_plan->candidates[static_cast<std::size_t>(row)];
    const TierCase& was = at(m_plan->before, outcome.tierBefore);
    switch (column) {
    case 0:
        return fromUtf8(was.tier.site);
    case 1:
        return fromUtf8(was.tier.name);
    case 2:
        return fromUtf8(candidateAt(was, outcome.candidate).name);
    case 3:
        return outcome.tierAfter < 0 ? tr("leaves with its tier") : tr("stays");
    case 4:
        return counted(outcome.of(ChangeFate::kept), forFile);
    case 5:
        return counted(outcome.of(ChangeFate::clash), forFile);
    case 6:
        return counted(outcome.of(ChangeFate::nowAsked), forFile);
    default:
        return counted(outcome.dropped(), forFile);
    }
}

QString RefreshLines::fateText(int row, int column, bool forFile) const
{
    const CandidateChange& change = m_plan->changes[static_cast<std::size_t>(m_topic.which)][static_cast<std::size_t>(row)];
    const TierCase& was = at(m_plan->before, change.tierBefore);
    const auto unit = static_cast<std::size_t>(change.unitBefore);
    switch (column) {
    case 0:
        return fromUtf8(was.tier.site);
    case 1:
        return fromUtf8(was.tier.name);
    case 2:
        return fromUtf8(candidateAt(was, change.candidate).name);
    case 3:
        return fromUtf8(was.tier.units[unit].name);
    case 4:
        return money(was.tier.units[unit].asking, forFile);
    case 5:
        return money(candidateAt(was, change.candidate).prices[unit], forFile);
    default:
        break;
    }
    if (change.tierAfter < 0)
        return {};
    const Unit& now = at(m_plan->after, change.tierAfter).tier.units[static_cast<std::size_t>(change.unitAfter)];
    if (column == 6)
        return money(now.asking, forFile);
    const bool newlyLocked = now.locked && !was.tier.units[unit].locked;
    const bool otherPrice = now.asking != was.tier.units[unit].asking;
    return newlyLocked ? (otherPrice ? tr("new price, locked") : tr("now locked")) : tr("new price");
}

QString RefreshLines::sheetText(int row, int column, bool forFile) const
{
    const SheetLine& line = m_sheetLines[static_cast<std::size_t>(row)];
    const SignedTier& tier = m_plan->signedTiers[static_cast<std::size_t>(line.tier)];
    const TierCase& was = at(m_plan->before, tier.tierBefore);
    const SignedDifference* one = line.difference < 0 ? nullptr : &tier.check.differences[static_cast<std::size_t>(line.difference)];
    switch (column) {
    case 0:
        return fromUtf8(was.tier.site);
    case 1:
        return fromUtf8(was.tier.name);
    case 2:
        return fromUtf8(was.signedOff->candidate);
    case 3:
        return forFile ? fromUtf8(was.signedOff->whenUtc) : whenText(was.signedOff->whenUtc);
    case 4:
        if (one)
            return one->asked ? tr("another price is asked") : tr("the unit is gone");
        return tier.tierAfter < 0 ? tr("cannot be told: the tier is gone") : signedStateText(tier.check);
    case 5:
        return one ? fromUtf8(one->unit) : QString();
    case 6:
        return one ? money(one->before, forFile) : QString();
    case 7:
        return one ? money(one->wanted, forFile) : QString();
    default:
        return one && one->asked ? money(*one->asked, forFile) : QString();
    }
}

std::optional<QByteArray> RefreshLines::csv(const Progress& progress) const
{
    constexpr int kRowsBetweenProgress = 1000;
    std::string out;
    const auto write = [&](const std::string& text, bool last) {
        out += csvCell(text);
        out += last ? "\r\n" : ",";
    };
    const int columns = static_cast<int>(m_headings.size());
    for (int column = 0; column < columns; ++column)
        write(m_headings[column].toStdString(), column + 1 == columns);
    const int all = rows();
    for (int row = 0; row < all; ++row) {
        if (progress && row % kRowsBetweenProgress == 0 && !progress(static_cast<double>(row) / all))
            return {};
        const QStringList cells = texts(row, true);
        for (int column = 0; column < columns; ++column) {
            const std::string cell = cells[column].toStdString();
            write(isNumber(row, column, cells[column]) ? cell : guarded(cell), column + 1 == columns);
        }
    }
    return QByteArray::fromStdString(out);
}

} // namespace rungwright
