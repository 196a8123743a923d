// SPDX-License-Identifier: GPL-3.0-or-later
#include "side_by_side_model.h"

#include "claims/ranking.h"
#include "sheet_cells.h"
#include "table_text.h"

#include <QFont>

#include <algorithm>
#include <array>
#include <cmath>
#include <string_view>

namespace rungwright
{

namespace
{

using Kind = FigureRow::Kind;

std::optional<double> amount(std::optional<Price> price) { return price ? std::optional(static_cast<double>(price->minor)) : std::nullopt; }

/// What a choice between ladders turns on, in this order; the other figures follow in their own.
constexpr std::array kFirst{"gap", "claim_part", "shape_part", "gap_share", "expected_cheapest", "chance_floor_met"};

QString plainFigure(double value, Kind kind, const Currency& currency)
{
    if (kind == Kind::count)
        return QString::number(value, 'f', 0);
    // More decimals than a reader needs and fewer than a double has; zeros at the end are dropped down to the currency's.
    const bool money = kind == Kind::money;
    QString text = QString::number(money ? currency.major(value) : value, 'f', 8);
    const auto keep = text.indexOf(u'.') + 1 + (money ? currency.decimals : 0);
    while (text.size() > keep && text.endsWith(u'0'))
        text.chop(1);
    if (text.endsWith(u'.'))
        text.chop(1);
    return text == QStringLiteral("-0") ? QStringLiteral("0") : text;
}

std::string fileUnit(const FigureRow& figure, const Currency& currency)
{
    switch (figure.kind) {
    case Kind::money:
        return currency.code;
    case Kind::share:
        return "share";
    case Kind::count:
        return figure.unit;
    case Kind::number:
        break;
    }
    return {};
}

} // namespace

SideBySideModel::SideBySideModel(QObject* parent) : QAbstractTableModel(parent)
{
    const auto figures = figureRows();
    const auto isFirst = [](const FigureRow& figure) { return std::ranges::find(kFirst, std::string_view(figure.key)) != kFirst.end(); };
    for (const std::string_view key : kFirst) {
        const auto found = std::ranges::find_if(figures, [key](const FigureRow& figure) { return figure.key == key; });
        if (found != figures.end())
            m_rows.push_back({*found});
    }
    const char* const money = "the currency's major units, per billing period";
    const char* const own = "own definition";
    m_rows.push_back({{"total_change", QT_TR_NOOP("Change of asking total"), Kind::money, 0, nullptr,
                       QT_TR_NOOP("asking total on offer − asking total on offer today"), money, own, 0},
                      [](const ComparedLadder& c) { return amount(c.change.askingTotal); }});
    m_rows.push_back({{"units_changed", QT_TR_NOOP("Units changed"), Kind::count, 0, nullptr,
                       QT_TR_NOOP("units of the tier, taken ones too, whose price differs from today's"), "units", own, 0},
                      [](const ComparedLadder& c) { return std::optional(static_cast<double>(c.change.unitsChanged)); }});
    m_rows.push_back({{"greatest_change", QT_TR_NOOP("Greatest change"), Kind::money, 0, nullptr,
                       QT_TR_NOOP("the change of one unit's price that is greatest in money, up or down"), money, own, 0},
                      [](const ComparedLadder& c) { return amount(c.change.greatest); }});
    m_rows.push_back({{"greatest_change_share", QT_TR_NOOP("in percent"), Kind::share, 1, nullptr,
                       QT_TR_NOOP("the change of one unit's price that is greatest in percent of its price today; may be another unit's"),
                       "share", own, 0},
                      [](const ComparedLadder& c) { return c.change.greatestShare; }});
    m_rows.push_back(
        {{"rms_change", QT_TR_NOOP("Amount of change"), Kind::money, 0, nullptr,
          QT_TR_NOOP("typical change a unit (root mean square) against today, of the units the model works on, as in the trade-off"), money,
          own, 0},
         [](const ComparedLadder& c) { return std::optional(c.typicalChange); }});
    for (const FigureRow& figure : figures) {
        if (!isFirst(figure))
            m_rows.push_back({figure});
    }
}

void SideBySideModel::show(std::vector<ComparedLadder> ladders, const Currency& currency)
{
    beginResetModel();
    m_ladders = std::move(ladders);
    m_currency = currency;
    rank();
    findBest();
    endResetModel();
}

SideBySideModel::Row SideBySideModel::rankingRow()
{
    Row row{
        {"ranking", QT_TR_NOOP("Rank by your weights"), Kind::number, 0, nullptr,
         QT_TR_NOOP("place and points of 100: each figure that has a weight is scaled between its worst (0) and its best (100) among the "
                    "ladders shown, and the scaled figures are averaged by weight; with other ladders beside it the points change"),
         "points of 100", "min-max scaling, weighted mean", +1}};
    row.ranking = true;
    return row;
}

void SideBySideModel::rank()
{
    std::erase_if(m_rows, [](const Row& row) { return row.ranking; });
    m_scores.assign(m_ladders.size(), std::nullopt);
    m_places.assign(m_ladders.size(), 0);
    if (!m_weights.any())
        return;
    std::array<Criterion, 4> criteria;
    criteria[0].weight = m_weights.gap;
    criteria[1].weight = m_weights.totalChange;
    criteria[2].weight = m_weights.amountOfChange;
    criteria[3].weight = m_weights.floorMet;
    criteria[3].lowerIsBetter = false;
    for (const ComparedLadder& ladder : m_ladders) {
        const std::optional<double> total = amount(ladder.change.askingTotal);
        criteria[0].values.push_back(ladder.measurement.gap.gap);
        criteria[1].values.push_back(total ? std::optional(std::abs(*total)) : std::nullopt);
        criteria[2].values.emplace_back(ladder.typicalChange);
        criteria[3].values.push_back(ladder.measurement.gap.chanceFloorMet);
    }
    m_scores = weightedScores(criteria);
    m_places = placesByScore(m_scores);
    m_rows.insert(m_rows.begin(), rankingRow());
}

QString SideBySideModel::rankingText() const
{
    if (!m_weights.any())
        return {};
    std::vector<std::size_t> order;
    for (std::size_t c = 0; c < m_ladders.size(); ++c) {
        if (m_places[c] > 0)
            order.push_back(c);
    }
    std::ranges::stable_sort(order, {}, [this](std::size_t c) { return m_places[c]; });
    QStringList said;
    for (const std::size_t c : order)
        said << tr("%1. %2 (%3)").arg(numberText(m_places[c], 0), m_ladders[c].name, numberText(100.0 * *m_scores[c], 0));
    return said.isEmpty() ? tr("Nothing can be ranked: a figure with a weight is undefined.") : said.join(tr(", "));
}

std::optional<std::size_t> SideBySideModel::againstColumn() const
{
    const int column = m_against ? columnOf(*m_against) : -1;
    return column < 0 ? std::nullopt : std::optional(static_cast<std::size_t>(column));
}

int SideBySideModel::columnOf(int candidate) const
{
    const auto found = std::ranges::find(m_ladders, candidate, &ComparedLadder::candidate);
    return found == m_ladders.end() ? -1 : static_cast<int>(found - m_ladders.begin());
}

int SideBySideModel::rowOf(const char* key) const
{
    const auto found = std::ranges::find_if(m_rows, [key](const Row& row) { return qstrcmp(row.figure.key, key) == 0; });
    return found == m_rows.end() ? -1 : static_cast<int>(found - m_rows.begin());
}

int SideBySideModel::rowCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_rows.size()); }

int SideBySideModel::columnCount(const QModelIndex& parent) const { return parent.isValid() ? 0 : static_cast<int>(m_ladders.size()); }

std::optional<double> SideBySideModel::value(const Row& row, std::size_t column) const
{
    const ComparedLadder& ladder = m_ladders[column];
    if (row.ranking)
        return m_scores[column] ? std::optional(100.0 * *m_scores[column]) : std::nullopt;
    return row.change ? row.change(ladder) : row.figure.value(ladder.measurement);
}

QString SideBySideModel::text(const Row& row, std::optional<double> value) const
{
    const QString plain = figureText(row.figure, value, m_currency);
    const bool isSigned = row.change && row.figure.kind != Kind::count;
    return isSigned && value && *value > 0 ? u'+' + plain : plain;
}

QString SideBySideModel::shownText(const Row& row, std::size_t column) const
{
    const auto one = value(row, column);
    if (row.ranking)
        return one ? tr("%1. with %2").arg(numberText(m_places[column], 0), numberText(*one, 0)) : tr("not ranked");
    const auto against = againstColumn();
    if (!against || *against == column)
        return text(row, one);
    const auto from = value(row, *against);
    if (!one || !from)
        return undefinedText();
    const QString by = figureChangeText(row.figure, from, one, m_currency);
    return by.isEmpty() ? tr("the same") : by;
}

void SideBySideModel::findBest()
{
    const std::size_t columns = m_ladders.size();
    m_best.assign(m_rows.size(), std::vector<bool>(columns, false));
    for (std::size_t r = 0; r < m_rows.size(); ++r) {
        const Row& row = m_rows[r];
        std::optional<double> best;
        for (std::size_t c = 0; c < columns && row.figure.better != 0; ++c) {
            const auto one = value(row, c);
            if (one && (!best || (row.figure.better < 0 ? *one < *best : *one > *best)))
                best = one;
        }
        if (!best)
            continue;
        // Figures that show the same are the same to the reader, whatever their last bits say.
        const QString bestText = text(row, best);
        bool differ = false;
        for (std::size_t c = 0; c < columns; ++c) {
            const auto one = value(row, c);
            m_best[r][c] = one && text(row, one) == bestText;
            differ = differ || (one && !m_best[r][c]);
        }
        if (!differ)
            m_best[r].assign(columns, false);
    }
}

QVariant SideBySideModel::data(const QModelIndex& index, int role) const
{
    if (!index.isValid())
        return {};
    const Row& row = m_rows[static_cast<std::size_t>(index.row())];
    const auto shown = value(row, static_cast<std::size_t>(index.column()));
    const QString said = shownText(row, static_cast<std::size_t>(index.column()));
    const bool best = isBest(index.row(), index.column());
    switch (role) {
    case Qt::DisplayRole:
        return best ? tr("★ best  %1").arg(said) : said;
    case kCopyRole:
        return said;
    case kValueRole:
        return shown ? QVariant(*shown) : QVariant();
    case bestRole:
        return best;
    case Qt::TextAlignmentRole:
        return QVariant(Qt::AlignRight | Qt::AlignVCenter);
    case Qt::FontRole: {
        QFont font;
        font.setBold(best);
        return font;
    }
    case Qt::ToolTipRole:
        return explanation(row);
    case Qt::AccessibleTextRole: {
        const QString name = m_ladders[static_cast<std::size_t>(index.column())].name;
        const auto against = againstColumn();
        const bool differs = against && !row.ranking && static_cast<int>(*against) != index.column();
        const QString heard = differs ? tr("%1, %2 against %3: %4").arg(tr(row.figure.label), name, m_ladders[*against].name, said)
                                      : tr("%1, %2: %3").arg(tr(row.figure.label), name, said);
        return best ? tr("%1, best").arg(heard) : heard;
    }
    default:
        return {};
    }
}

QVariant SideBySideModel::headerData(int section, Qt::Orientation orientation, int role) const
{
    if (section < 0 || section >= (orientation == Qt::Horizontal ? columnCount() : rowCount()))
        return {};
    if (orientation == Qt::Horizontal) {
        const ComparedLadder& ladder = m_ladders[static_cast<std::size_t>(section)];
        switch (role) {
        case Qt::DisplayRole:
            return ladder.chosen ? tr("✓ %1").arg(ladder.name) : ladder.name;
        case kCopyRole:
            return ladder.name;
        case Qt::ToolTipRole:
            return ladder.chosen ? tr("%1 (chosen). Drag to reorder.").arg(ladder.name) : tr("%1. Drag to reorder.").arg(ladder.name);
        case Qt::AccessibleTextRole:
            return ladder.chosen ? tr("%1, chosen").arg(ladder.name) : ladder.name;
        case Qt::TextAlignmentRole:
            return QVariant(Qt::AlignRight | Qt::AlignVCenter);
        default:
            return {};
        }
    }
    const Row& row = m_rows[static_cast<std::size_t>(section)];
    switch (role) {
    case Qt::DisplayRole:
        return QString(row.figure.indent * 4, u' ') + tr(row.figure.label);
    case kCopyRole:
        return tr(row.figure.label);
    case Qt::ToolTipRole:
        return explanation(row);
    case Qt::TextAlignmentRole:
        return QVariant(Qt::AlignLeft | Qt::AlignVCenter);
    default:
        return {};
    }
}

QString SideBySideModel::explanation(const Row& row) const
{
    QString best;
    if (row.figure.better != 0)
        best = row.figure.better < 0 ? tr("Lower is better for the enquirer.") : tr("Higher is better for the enquirer.");
    return QStringLiteral("<p><b>%1</b></p><p>%2</p><p>%3</p>")
        .arg(tr(row.figure.label).toHtmlEscaped(), tr(row.figure.formula).toHtmlEscaped(), best);
}

QByteArray SideBySideModel::csv() const
{
    const auto cell = [](const QString& text) { return csvCell(guarded(text.toStdString())); };
    std::string out = "key,figure,unit";
    for (const ComparedLadder& ladder : m_ladders)
        out += ',' + cell(ladder.name);
    out += ",best";
    const auto against = againstColumn();
    for (std::size_t c = 0; against && c < m_ladders.size(); ++c) {
        if (c != *against)
            out += ',' + cell(tr("%1 minus %2").arg(m_ladders[c].name, m_ladders[*against].name));
    }
    out += "\r\n";
    for (std::size_t r = 0; r < m_rows.size(); ++r) {
        const FigureRow& figure = m_rows[r].figure;
        out += std::string(figure.key) + ',' + cell(tr(figure.label)) + ',' + fileUnit(figure, m_currency);
        QStringList best;
        for (std::size_t c = 0; c < m_ladders.size(); ++c) {
            const auto one = value(m_rows[r], c);
            out += ',';
            // A figure is a number to a spreadsheet: its minus sign is left alone.
            if (one)
                out += plainFigure(*one, figure.kind, m_currency).toStdString();
            if (m_best[r][c])
                best << m_ladders[c].name;
        }
        out += ',' + cell(best.join(QStringLiteral("; ")));
        for (std::size_t c = 0; against && c < m_ladders.size(); ++c) {
            if (c == *against)
                continue;
            const auto one = value(m_rows[r], c);
            const auto from = value(m_rows[r], *against);
            out += ',';
            if (one && from)
                out += plainFigure(*one - *from, figure.kind, m_currency).toStdString();
        }
        out += "\r\n";
    }
    return QByteArray::fromStdString(out);
}

} // namespace rungwright
