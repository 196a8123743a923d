// SPDX-License-Identifier: GPL-3.0-or-later
// The worklist: every tier with its gap, worst first.
#pragma once

#include "document.h"
#include "gap/measure.h"

#include <QAbstractTableModel>

#include <optional>
#include <vector>

namespace rungwright
{

/// What a tier is flagged for.
struct TierFlags {
    bool noneOnOffer = false;
    bool floorNotOnSale = false; ///< No unit on offer asks the advertised floor or less.
    bool belowFloor = false;     ///< A unit on offer is asked for less than the floor.
    bool leansLeft = false;      ///< g1 below kLeansLeft.
    bool lastUnits = false;      ///< At most kLastUnits on offer.
    bool inversions = false;

    int count() const;
};

/// Lean is flagged below this g1, and scarcity at this many units (common practice, no source).
inline constexpr double kLeansLeft = -0.5;
inline constexpr std::size_t kLastUnits = 3;

TierFlags tierFlags(const Measurement& m);
/// "floor not on sale, leans left"; empty when nothing is flagged.
QString flagWords(const TierFlags& flags);

/// One row a tier of the document, in its order (sorting is a proxy's). Figures are the current ladder's, under the tier's own model.
class WorklistModel : public QAbstractTableModel
{
    Q_OBJECT
public:
    enum Column { tierColumn, siteColumn, onOfferColumn, floorColumn, cheapestColumn, gapColumn, leanColumn, flagsColumn, columnCount_ };
    enum Role {
        sortRole = Qt::UserRole, ///< A number or a text to sort by; undefined figures are invalid.
        searchRole,              ///< All words of the row.
        shareRole,               ///< Gap share as a double; invalid when undefined.
        greatestShareRole,       ///< The worklist's greatest gap share, for the bars.
        secondLineRole,          ///< tierColumn: site and flags.
    };

    explicit WorklistModel(Document& document, QObject* parent = nullptr);

    int rowCount(const QModelIndex& parent = {}) const override;
    int columnCount(const QModelIndex& parent = {}) const override;
    QVariant data(const QModelIndex& index, int role) const override;
    QVariant headerData(int section, Qt::Orientation orientation, int role) const override;

    /// The tier with the greatest gap share; -1 when there is none with a gap, or no tier.
    int worstTier() const;

private:
    struct Row {
        std::size_t onOffer = 0;
        std::size_t rentable = 0;
        std::optional<double> cheapest;
        std::optional<double> gap;
        std::optional<double> share;
        std::optional<double> lean;
        TierFlags flags;
    };

    void onChanged(const DocumentChange& change);
    void measureAll();
    Row measureRow(const TierCase& tierCase);
    void findGreatest();
    QVariant text(int row, int column) const;
    QVariant sortValue(int row, int column) const;

    Document& m_document;
    Measurer m_measurer;
    std::vector<Row> m_rows;
    double m_greatestShare = 0;
};

} // namespace rungwright
