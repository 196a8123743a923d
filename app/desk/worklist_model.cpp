// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_model.h"

#include "wording.h"

#include <QStringList>

#include <algorithm>

namespace rungwright
{

int TierFlags::count() const
{
    return int(noneOnOffer) + int(floorNotOnSale) + int(belowFloor) + int(leansLeft) + int(lastUnits) + int(inversions);
}

TierFlags tierFlags(const Measurement& m)
{
    TierFlags flags;
    flags.noneOnOffer = m.onOffer == 0;
    flags.floorNotOnSale = m.onOffer > 0 && m.atFloor == 0;
    flags.belowFloor = m.belowFloor > 0;
    flags.leansLeft = m.figures.skew.moment && *m.figures.skew.moment < kLeansLeft;
    flags.lastUnits = m.onOffer > 0 && m.onOffer <= kLastUnits;
    flags.inversions = m.figures.inversions > 0;
    return flags;
}

QString flagWords(const TierFlags& flags)
{
    QStringList words;
    if (flags.noneOnOffer)
        words << WorklistModel::tr("none on offer");
    if (flags.floorNotOnSale)
        words << WorklistModel::tr("floor not on sale");
    if (flags.belowFloor)
        words << WorklistModel::tr("below floor");
    if (flags.leansLeft)
        words << WorklistModel::tr("leans left");
    if (flags.lastUnits)
        words << WorklistModel::tr("last units");
    if (flags.inversions)
        words << WorklistModel::tr("inversions");
    return words.join(QStringLiteral(", "));
}

WorklistModel::WorklistModel(Document& document, QObject* parent) : QAbstractTableModel(parent), m_document(document)
{
    connect(&document, &Document::changed, this, &WorklistModel::onChanged);
    measureAll();
}

int WorklistModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_rows.size()); }

int WorklistModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : columnCount_; }

void WorklistModel::onChanged(const DocumentChange& change)
{
    using Kind = DocumentChange::Kind;
    if (change.kind == Kind::everything || change.kind == Kind::refreshed) {
        beginResetModel();
        measureAll();
        endResetModel();
    } else if ((change.kind == Kind::model || change.kind == Kind::floor) && change.tier >= 0) {
        m_rows[static_cast<std::size_t>(change.tier)] = measureRow(*m_document.tier(change.tier));
        const double before = m_greatestShare;
        findGreatest();
        const bool barsMove = before != m_greatestShare;
        const int last = static_cast<int>(m_rows.size()) - 1;
        emit dataChanged(index(barsMove ? 0 : change.tier, 0), index(barsMove ? last : change.tier, columnCount_ - 1));
    }
}

void WorklistModel::measureAll()
{
    m_rows.clear();
    m_rows.reserve(m_document.scenario().tiers.size());
    for (const TierCase& tierCase : m_document.scenario().tiers)
        m_rows.push_back(measureRow(tierCase));
    findGreatest();
}

WorklistModel::Row WorklistModel::measureRow(const TierCase& tierCase)
{
    const Measurement& m = m_measurer.measure(tierCase.tier, askingPrices(tierCase.tier.units), tierCase.model, MeasureParts::figuresOnly);
    return {m.onOffer, m.rentable, m.gap.expectedCheapest, m.gap.gap, m.gap.gapShare, m.figures.skew.moment, tierFlags(m)};
}

void WorklistModel::findGreatest()
{
    m_greatestShare = 0;
    for (const Row& row : m_rows)
        m_greatestShare = std::max(m_greatestShare, row.share.value_or(0.0));
}

int WorklistModel::worstTier() const
{
    int worst = -1;
    for (int i = 0; i < rowCount(); ++i) {
        const auto& share = m_rows[static_cast<std::size_t>(i)].share;
        if (share && (worst < 0 || *share > *m_rows[static_cast<std::size_t>(worst)].share))
            worst = i;
    }
    return worst;
}

QVariant WorklistModel::text(int row, int column) const
{
    const Row& r = m_rows[static_cast<std::size_t>(row)];
    const Tier& tier = m_document.tier(row)->tier;
    const Currency& currency = m_document.scenario().currency;
    const auto money = [&](const std::optional<double>& v) { return v ? moneyText(*v, currency) : undefinedText(); };
    switch (column) {
    case tierColumn:
        return QString::fromStdString(tier.name);
    case siteColumn:
        return QString::fromStdString(tier.site);
    case onOfferColumn:
        return tr("%1 / %2").arg(r.onOffer).arg(r.rentable);
    case floorColumn:
        return floorText(tier.advertisedFloor, currency);
    case cheapestColumn:
        return money(r.cheapest);
    case gapColumn:
        return money(r.gap);
    case leanColumn:
        return r.lean ? numberText(*r.lean) : undefinedText();
    case flagsColumn:
        return flagWords(r.flags);
    default:
        return {};
    }
}

QVariant WorklistModel::sortValue(int row, int column) const
{
    const Row& r = m_rows[static_cast<std::size_t>(row)];
    const auto figure = [](const std::optional<double>& v) { return v ? QVariant(*v) : QVariant(); };
    switch (column) {
    case onOfferColumn:
        return static_cast<qulonglong>(r.onOffer);
    case floorColumn:
        return static_cast<qlonglong>(m_document.tier(row)->tier.advertisedFloor.minor);
    case cheapestColumn:
        return figure(r.cheapest);
    case gapColumn:
        return figure(r.share); // a gap of 10 on 30 is worse than one of 12 on 120
    case leanColumn:
        return figure(r.lean);
    case flagsColumn:
        return r.flags.count();
    default:
        return text(row, column);
    }
}

QVariant WorklistModel::data(const QModelIndex& index, int role) const
{
    // The document may have fewer tiers already while a refresh is being announced.
    if (!index.isValid() || index.row() >= rowCount() || !m_document.tier(index.row()))
        return {};
    const Row& r = m_rows[static_cast<std::size_t>(index.row())];
    const Tier& tier = m_document.tier(index.row())->tier;
    switch (role) {
    case Qt::DisplayRole:
        return text(index.row(), index.column());
    case Qt::TextAlignmentRole:
        if (index.column() >= onOfferColumn && index.column() <= leanColumn)
            return QVariant(Qt::AlignRight | Qt::AlignVCenter);
        return QVariant(Qt::AlignLeft | Qt::AlignVCenter);
    case Qt::ToolTipRole:
    case Qt::AccessibleDescriptionRole: {
        QString said = tr("%1, %2: %3 of %4 rentable units on offer, advertised from %5")
                           .arg(QString::fromStdString(tier.site), QString::fromStdString(tier.name))
                           .arg(r.onOffer)
                           .arg(r.rentable)
                           .arg(floorText(tier.advertisedFloor, m_document.scenario().currency));
        if (r.gap)
            said += tr(", gap %1 (%2)").arg(text(index.row(), gapColumn).toString(), percentText(*r.share, true));
        const QString flags = flagWords(r.flags);
        return flags.isEmpty() ? said : said + QLatin1Char('\n') + flags;
    }
    case sortRole:
        return sortValue(index.row(), index.column());
    case searchRole:
        return QString(QString::fromStdString(tier.site) + QLatin1Char(' ') + QString::fromStdString(tier.name) + QLatin1Char(' ') +
                       flagWords(r.flags));
    case shareRole:
        return r.share ? QVariant(*r.share) : QVariant();
    case greatestShareRole:
        return m_greatestShare;
    case secondLineRole: {
        const QString site = QString::fromStdString(tier.site);
        const QString flags = flagWords(r.flags);
        return flags.isEmpty() ? site : tr("%1 · %2").arg(site, flags);
    }
    default:
        return {};
    }
}

QVariant WorklistModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (orientation != Qt::Horizontal)
        return QAbstractTableModel::headerData(section, orientation, role);
    static const char* const kNames[] = {QT_TR_NOOP("Tier"),     QT_TR_NOOP("Site"), QT_TR_NOOP("On offer"), QT_TR_NOOP("Floor"),
                                         QT_TR_NOOP("Cheapest"), QT_TR_NOOP("Gap"),  QT_TR_NOOP("Lean"),     QT_TR_NOOP("Flags")};
    static const char* const kTips[] = {
        QT_TR_NOOP("Size tier: its units are advertised together"),
        QT_TR_NOOP("Where it is"),
        QT_TR_NOOP("Units on offer / rentable units"),
        QT_TR_NOOP("Advertised floor: the “from” price"),
        QT_TR_NOOP("Expected cheapest: what an enquirer can expect as the cheapest unit"),
        QT_TR_NOOP("Expected cheapest minus advertised floor; the bar is its share of the floor, by which it sorts"),
        QT_TR_NOOP("Skewness g1 of the prices on offer; below zero the ladder leans left"),
        QT_TR_NOOP("What to look at")};
    if (role == Qt::DisplayRole)
        return tr(kNames[section]);
    if (role == Qt::ToolTipRole)
        return tr(kTips[section]);
    if (role == Qt::TextAlignmentRole)
        return section >= onOfferColumn && section <= leanColumn ? QVariant(Qt::AlignRight | Qt::AlignVCenter)
                                                                 : QVariant(Qt::AlignLeft | Qt::AlignVCenter);
    return {};
}

} // namespace rungwright
