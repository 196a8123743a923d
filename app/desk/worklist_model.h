// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist as a table: every tier with its gap, worst first, or sites with their tiers below them.
#pragma once

#include "worklist_order.h"

#include <QAbstractTableModel>

#include <vector>

namespace rungwright
{

/// Sorts, filters and groups by itself, over bare figures: a proxy model would ask for a QVariant a comparison. Every rearrangement is a
/// model reset; rowOf() finds what was shown before. A folded site's row stays, its tiers' do not.
class WorklistModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column {
        tierColumn,
        siteColumn,
        onOfferColumn,
        floorColumn,
        cheapestColumn,
        gapColumn,
        leanColumn,
        flagsColumn,
        seenColumn,
        noteColumn,
        columnCount_
    };
    enum Role {
        shareRole = Qt::UserRole, ///< Gap share as a double, a site's worst; invalid when undefined.
        greatestShareRole,        ///< The worklist's greatest gap share, for the bars.
        secondLineRole,           ///< tierColumn: site and flags; of a site: number of tiers and how many are flagged.
        siteRole,                 ///< Whether the row is a site's.
        foldedRole,               ///< Whether a site's tiers are folded away.
        groupedRole,              ///< Whether tiers stand below their sites.
        seenRole,                 ///< Whether the tier is marked as seen.
        notedRole,                ///< Whether the tier has a note.
    };

    /// `list` outlives the model.
    explicit WorklistModel(Worklist& list, QObject* parent = nullptr);

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role) const override;
    void sort(int column, Qt::SortOrder order) override;

    const Worklist& list() const { return m_list; }
    const WorklistWish& wish() const { return m_wish; }
    void setWish(const WorklistWish& wish);
    void fold(int site, bool folded);
    void foldAll(bool folded);

    const WorklistArrangement& arrangement() const { return m_shown; }
    ShownRow shown(int row) const { return m_shown.rows[static_cast<std::size_t>(row)]; }
    /// The tier of a row, -1 for a site's row and beyond the last.
    int tierAt(int row) const;
    /// The row of a tier or a site, -1 when it is not shown.
    int rowOf(const ShownRow& what) const;
    /// False while a reset brings other tiers: indices from before mean nothing any more.
    bool sameTiers() const { return m_sameTiers; }

private:
    void onReset();
    void onRowsChanged();
    void update();
    void rearrange();
    void indexRows();
    void allDataChanged();
    QString tierText(int tier, int column) const;
    QString siteText(int site, int column) const;
    QVariant tierData(int tier, int column, int role) const;
    QVariant siteData(int site, int column, int role) const;
    QVariant value(int tier, int column) const;
    QString description(int tier) const;
    QString siteDescription(int site) const;
    const SiteSummary& summary(int site) const { return m_shown.sites[static_cast<std::size_t>(site)]; }
    QString siteName(int site) const { return m_list.names().sites[static_cast<std::size_t>(site)]; }

    Worklist& m_list;
    WorklistWish m_wish;
    WorklistArrangement m_shown;
    std::vector<int> m_rowOfTier;
    std::vector<int> m_rowOfSite;
    bool m_sameTiers = true;
};

} // namespace rungwright
