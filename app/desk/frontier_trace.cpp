// SPDX-License-Identifier: GPL-3.0-or-later
#include "frontier_trace.h"

#include "gap/measure.h"
#include "ladder_change.h"
#include "sheet_cells.h"
#include "wording.h"

#include <QCoreApplication>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

constexpr int kFrontierPoints = 50;

/// A row of the table, amounts in minor units; NaN = not shown.
struct FrontierRow {
    bool named = false;
    QString name;
    double gap = 0;
    double typical = 0;
    double total = 0;
};

std::vector<FrontierRow> frontierRows(const FrontierPicture& picture)
{
    const double none = std::nan("");
    const bool prices = picture.against == FrontierPicture::Against::prices;
    std::vector<FrontierRow> rows;
    for (const FrontierPoint& point : picture.curve)
        rows.push_back({false, {}, point.gap, prices ? point.rmsChange : none, point.totalChange});
    for (const FrontierPicture::Mark& mark : picture.marks)
        rows.push_back({true, mark.name, mark.gap, prices ? mark.amount : none, prices ? none : mark.amount});
    return rows;
}

} // namespace

FrontierTraced traceFrontier(const FrontierAsk& ask)
{
    FrontierTracer tracer;
    FrontierTraced traced;
    traced.curve = ask.against == FrontierPicture::Against::prices
                       ? tracer.byChange(ask.tier, ask.model, ask.rules, ask.wish, kFrontierPoints)
                       : tracer.byTotal(ask.tier, ask.model, ask.rules, ask.wish, kFrontierPercent, kFrontierPoints);
    std::erase_if(traced.curve, [](const FrontierPoint& point) { return std::isnan(point.gap); });
    if (traced.curve.empty()) {
        ChangeWish wish = ask.wish;
        wish.target = {TargetKind::gap, 0};
        LeastChange solver;
        traced.why = solver.solve(ask.tier, ask.model, ask.rules, wish);
    }
    return traced;
}

std::optional<FrontierPicture::Mark> frontierMark(const FrontierAsk& ask, const QString& name, int candidate, std::span<const Price> prices)
{
    const Measurement m = measured(ask.tier, prices, ask.model, MeasureParts::figuresOnly);
    if (!m.gap.gap)
        return {};
    const double amount = ask.against == FrontierPicture::Against::prices
                              ? typicalChange(ask.tier.units, prices, modelUnits(ask.model.kind))
                              : inMinor(ladderChange(ask.tier.units, prices).askingTotal.value_or(Price{}));
    return FrontierPicture::Mark{name, candidate, *m.gap.gap, amount};
}

QByteArray frontierCsv(const FrontierPicture& picture)
{
    const auto plain = [](double value, int decimals) {
        return std::isnan(value) ? std::string() : QString::number(value, 'f', decimals).toStdString();
    };
    const Currency& currency = picture.currency;
    const auto money = [&](double minor) { return plain(currency.major(minor), currency.decimals + 2); };
    std::string csv = "kind,name,gap,gap_share,typical_change,total_change,currency\r\n";
    for (const FrontierRow& row : frontierRows(picture)) {
        csv += std::string(row.named ? "ladder," : "trade-off,") + csvCell(guarded(row.name.toStdString())) + ',' + money(row.gap) + ',';
        csv += picture.floor.minor > 0 ? plain(row.gap / inMinor(picture.floor), 6) : std::string();
        csv += ',' + money(row.typical) + ',' + money(row.total) + ',' + csvCell(currency.code) + "\r\n";
    }
    return QByteArray::fromStdString(csv);
}

QString frontierTable(const FrontierPicture& picture)
{
    const auto words = [](const char* text) { return QCoreApplication::translate("FrontierTable", text); };
    const Currency& currency = picture.currency;
    const auto money = [&](double minor) { return std::isnan(minor) ? QString() : moneyText(minor, currency); };
    QStringList lines{QStringList{words("Ladder"), words("Gap"), words("Typical change"), words("Change of the asking total")}.join(u'\t')};
    for (const FrontierRow& row : frontierRows(picture)) {
        // A name is a text, even where a spreadsheet would take it for a formula.
        QString name = QString::fromStdString(guarded(row.name.toStdString()));
        name.replace(u'\t', u' ').replace(u'\n', u' ');
        lines << QStringList{row.named ? name : words("trade-off"), money(row.gap), money(row.typical), money(row.total)}.join(u'\t');
    }
    return lines.join(u'\n') + u'\n';
}

} // namespace rungwright
