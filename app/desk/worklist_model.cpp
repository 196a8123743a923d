// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_model.h"

#include "table_text.h"
#include "wording.h"

#include <QStringList>

#include <utility>

namespace rungwright
{

namespace
{

QString worklistText(const std::string& text) { return QString::fromUtf8(text.data(), static_cast<qsizetype>(text.size())); }

bool isNumeric(int column) { return column >= WorklistModel::onOfferColumn && column <= WorklistModel::leanColumn; }

WorklistKey keyOf(int column)
{
    static constexpr WorklistKey kKeys[] = {WorklistKey::tier,     WorklistKey::site, WorklistKey::onOffer, WorklistKey::floor,
                                            WorklistKey::cheapest, WorklistKey::gap,  WorklistKey::lean,    WorklistKey::flags,
                                            WorklistKey::seen,     WorklistKey::note};
    static_assert(std::size(kKeys) == WorklistModel::columnCount_);
    return kKeys[column];
}

QString count(std::uint64_t n) { return QLocale().toString(static_cast<qulonglong>(n)); }

} // namespace

WorklistModel::WorklistModel(Worklist& list, QObject* parent) : QAbstractTableModel(parent), m_list(list)
{
    connect(&list, &Worklist::reset, this, &WorklistModel::onReset);
    connect(&list, &Worklist::rowsChanged, this, &WorklistModel::onRowsChanged);
    connect(&list, &Worklist::marksChanged, this, &WorklistModel::update);
    connect(&list, &Worklist::pickChanged, this, [this] {
        m_wish.pickedOnly = m_list.pickedCount() > 0;
        update();
    });
    m_shown = arranged(m_list, m_wish);
    indexRows();
}

int WorklistModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_shown.rows.size()); }

int WorklistModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : columnCount_; }

int WorklistModel::tierAt(int row) const { return row >= 0 && row < rowCount() ? shown(row).tier : -1; }

int WorklistModel::rowOf(const ShownRow& what) const
{
    const std::vector<int>& rows = what.isSite() ? m_rowOfSite : m_rowOfTier;
    const int at = what.isSite() ? what.site : what.tier;
    return at >= 0 && at < static_cast<int>(rows.size()) ? rows[static_cast<std::size_t>(at)] : -1;
}

// Arranging ----------------------------------------------------------------------------------------------------------

void WorklistModel::onReset()
{
    m_sameTiers = false;
    m_wish.pickedOnly = m_list.pickedCount() > 0;
    rearrange();
    m_sameTiers = true;
}

void WorklistModel::onRowsChanged()
{
    if (m_list.measuring())
        allDataChanged(); // rows that jumped about while figures come in would be no help
    else
        update();
}

void WorklistModel::update()
{
    WorklistArrangement now = arranged(m_list, m_wish);
    if (now.rows != m_shown.rows) {
        rearrange();
        return;
    }
    m_shown = std::move(now);
    allDataChanged();
}

void WorklistModel::rearrange()
{
    beginResetModel();
    m_shown = arranged(m_list, m_wish);
    indexRows();
    endResetModel();
}

void WorklistModel::indexRows()
{
    m_rowOfTier.assign(static_cast<std::size_t>(m_list.count()), -1);
    m_rowOfSite.assign(m_list.names().sites.size(), -1);
    for (std::size_t row = 0; row < m_shown.rows.size(); ++row) {
        const ShownRow& at = m_shown.rows[row];
        auto& place = at.isSite() ? m_rowOfSite[static_cast<std::size_t>(at.site)] : m_rowOfTier[static_cast<std::size_t>(at.tier)];
        place = static_cast<int>(row);
    }
}

void WorklistModel::allDataChanged()
{
    if (rowCount() > 0)
        emit dataChanged(index(0, 0), index(rowCount() - 1, columnCount_ - 1));
}

void WorklistModel::sort(int column, Qt::SortOrder order)
{
    if (column < 0 || column >= columnCount_)
        return;
    WorklistWish wish = m_wish;
    wish.key = keyOf(column);
    wish.descending = order == Qt::DescendingOrder;
    setWish(wish);
}

void WorklistModel::setWish(const WorklistWish& wish)
{
    m_wish = wish;
    rearrange();
}

void WorklistModel::fold(int site, bool folded)
{
    if (folded)
        m_wish.folded.insert(siteName(site));
    else
        m_wish.folded.remove(siteName(site));
    rearrange();
}

void WorklistModel::foldAll(bool folded)
{
    m_wish.folded.clear();
    for (const QString& site : m_list.names().sites) {
        if (folded)
            m_wish.folded.insert(site);
    }
    rearrange();
}

// Words --------------------------------------------------------------------------------------------------------------

QString WorklistModel::tierText(int tier, int column) const
{
    const WorklistRow& r = m_list.row(tier);
    const TierCase& tierCase = m_list.tierCase(tier);
    const Currency& currency = m_list.document().scenario().currency;
    const auto pending = QStringLiteral("…");
    const auto money = [&](const std::optional<double>& v) {
        if (!r.measured)
            return pending;
        return v ? moneyText(*v, currency) : undefinedText();
    };
    switch (column) {
    case tierColumn:
        return worklistText(tierCase.tier.name);
    case siteColumn:
        return worklistText(tierCase.tier.site);
    case onOfferColumn:
        return r.measured ? tr("%1 / %2").arg(r.onOffer).arg(r.rentable) : pending;
    case floorColumn:
        return floorText(tierCase.tier.advertisedFloor, currency);
    case cheapestColumn:
        return money(r.cheapest);
    case gapColumn:
        return money(r.gap);
    case leanColumn:
        if (!r.measured)
            return pending;
        return r.lean ? numberText(*r.lean) : undefinedText();
    case flagsColumn:
        return flagWords(m_list.flags(tier));
    case seenColumn:
        return tierCase.seen ? tr("seen") : QString();
    case noteColumn:
        return worklistText(tierCase.note).simplified();
    default:
        return {};
    }
}

QString WorklistModel::siteText(int site, int column) const
{
    const SiteSummary& s = summary(site);
    switch (column) {
    case tierColumn:
    case siteColumn:
        return siteName(site);
    case onOfferColumn:
        return tr("%1 / %2").arg(count(s.onOffer), count(s.rentable));
    case gapColumn:
        return s.worstShare ? percentText(*s.worstShare, true) : undefinedText();
    case flagsColumn:
        return tr("%1 of %2 flagged").arg(s.flagged).arg(s.tiers);
    case seenColumn:
        return tr("%1 of %2 seen").arg(s.tiers - s.unseen).arg(s.tiers);
    default:
        return {};
    }
}

QVariant WorklistModel::value(int tier, int column) const
{
    if (!isNumeric(column))
        return tierText(tier, column);
    const auto number = sortNumber(m_list, tier, keyOf(column));
    return number ? QVariant(*number) : QVariant();
}

QString WorklistModel::description(int tier) const
{
    const WorklistRow& r = m_list.row(tier);
    const TierCase& tierCase = m_list.tierCase(tier);
    QString said = tr("%1, %2: ").arg(worklistText(tierCase.tier.site), worklistText(tierCase.tier.name));
    said += r.measured ? tr("%1 of %2 rentable units on offer").arg(r.onOffer).arg(r.rentable) : tr("not measured yet");
    said += tr(", advertised from %1").arg(floorText(tierCase.tier.advertisedFloor, m_list.document().scenario().currency));
    if (r.gap && r.share)
        said += tr(", gap %1 (%2)").arg(tierText(tier, gapColumn), percentText(*r.share, true));
    if (tierCase.seen)
        said += tr(", seen");
    const QString flags = flagWords(m_list.flags(tier));
    if (!flags.isEmpty())
        said += QLatin1Char('\n') + flags;
    if (!tierCase.note.empty())
        said += QLatin1Char('\n') + tr("Note: %1").arg(worklistText(tierCase.note));
    return said;
}

QString WorklistModel::siteDescription(int site) const
{
    const SiteSummary& s = summary(site);
    QString said = s.tiers == 1 ? tr("%1: 1 tier").arg(siteName(site)) : tr("%1: %2 tiers").arg(siteName(site)).arg(s.tiers);
    said += tr(", %1 flagged, %2 not yet seen").arg(s.flagged).arg(s.unseen);
    said += tr("; %1 of %2 rentable units on offer").arg(count(s.onOffer), count(s.rentable));
    if (s.worstShare)
        said += tr("; the widest gap is %1 of its floor").arg(percentText(*s.worstShare, true));
    return said + (m_wish.folded.contains(siteName(site)) ? tr("; folded") : tr("; unfolded"));
}

QVariant WorklistModel::tierData(int tier, int column, int role) const
{
    const TierCase& tierCase = m_list.tierCase(tier);
    switch (role) {
    case Qt::DisplayRole:
        return tierText(tier, column);
    case Qt::AccessibleTextRole:
        if (column == tierColumn && tierCase.seen)
            return tr("%1, seen").arg(tierText(tier, column));
        return tierText(tier, column);
    case Qt::ToolTipRole:
    case Qt::AccessibleDescriptionRole:
        return description(tier);
    case kValueRole:
        return value(tier, column);
    case shareRole: {
        const auto& share = m_list.row(tier).share;
        return share ? QVariant(*share) : QVariant();
    }
    case secondLineRole: {
        QStringList parts;
        if (!m_wish.grouped)
            parts << worklistText(tierCase.tier.site);
        const QString flags = flagWords(m_list.flags(tier));
        if (!flags.isEmpty())
            parts << flags;
        return parts.join(QStringLiteral(" · "));
    }
    case seenRole:
        return tierCase.seen;
    case notedRole:
        return !tierCase.note.empty();
    default:
        return {};
    }
}

QVariant WorklistModel::siteData(int site, int column, int role) const
{
    const SiteSummary& s = summary(site);
    switch (role) {
    case Qt::DisplayRole:
    case Qt::AccessibleTextRole:
        return siteText(site, column);
    case Qt::ToolTipRole:
    case Qt::AccessibleDescriptionRole:
        return siteDescription(site);
    case kValueRole:
        if (!isNumeric(column))
            return siteText(site, column);
        return column == gapColumn && s.worstShare ? QVariant(*s.worstShare) : QVariant();
    case shareRole:
        return s.worstShare ? QVariant(*s.worstShare) : QVariant();
    case secondLineRole: {
        const QString tiers = s.tiers == 1 ? tr("1 tier") : tr("%1 tiers").arg(s.tiers);
        const QString offered = tr("%1 on offer").arg(siteText(site, onOfferColumn));
        return s.flagged ? tr("%1 · %2 flagged · %3").arg(tiers).arg(s.flagged).arg(offered) : tr("%1 · %2").arg(tiers, offered);
    }
    case siteRole:
        return true;
    case foldedRole:
        return m_wish.folded.contains(siteName(site));
    default:
        return {};
    }
}

QVariant WorklistModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid() || index.row() >= rowCount())
        return {};
    switch (role) {
    case Qt::TextAlignmentRole:
        return isNumeric(index.column()) ? QVariant(Qt::AlignRight | Qt::AlignVCenter) : QVariant(Qt::AlignLeft | Qt::AlignVCenter);
    case greatestShareRole:
        return m_list.greatestShare();
    case groupedRole:
        return m_wish.grouped;
    default:
        break;
    }
    const ShownRow at = shown(index.row());
    return at.isSite() ? siteData(at.site, index.column(), role) : tierData(at.tier, index.column(), role);
}

QVariant WorklistModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal)
        return QAbstractTableModel::headerData(section, orientation, role);
    static const char* const kNames[] = {QT_TR_NOOP("Tier"),     QT_TR_NOOP("Site"), QT_TR_NOOP("On offer"), QT_TR_NOOP("Floor"),
                                         QT_TR_NOOP("Cheapest"), QT_TR_NOOP("Gap"),  QT_TR_NOOP("Lean"),     QT_TR_NOOP("Flags"),
                                         QT_TR_NOOP("Seen"),     QT_TR_NOOP("Note")};
    static const char* const kTips[] = {
        QT_TR_NOOP("Size tier: its units are advertised together"),
        QT_TR_NOOP("Where it is"),
        QT_TR_NOOP("Units on offer / rentable units"),
        QT_TR_NOOP("Advertised floor: the “from” price"),
        QT_TR_NOOP("Expected cheapest: what an enquirer can expect as the cheapest unit"),
        QT_TR_NOOP("Expected cheapest minus advertised floor; the bar is its share of the floor, by which it sorts"),
        QT_TR_NOOP("Skewness g1 of the prices on offer; below zero the ladder leans left"),
        QT_TR_NOOP("What to look at"),
        QT_TR_NOOP("Tiers you have dealt with"),
        QT_TR_NOOP("Your note on the tier")};
    if (role == Qt::DisplayRole)
        return tr(kNames[section]);
    if (role == Qt::ToolTipRole)
        return tr(kTips[section]);
    if (role == Qt::TextAlignmentRole)
        return isNumeric(section) ? QVariant(Qt::AlignRight | Qt::AlignVCenter) : QVariant(Qt::AlignLeft | Qt::AlignVCenter);
    return {};
}

} // namespace rungwright
