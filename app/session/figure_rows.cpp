// SPDX-License-Identifier: GPL-3.0-or-later
// The rows of the Figures, each with its formula, unit and source.
#include "wording.h"

#include <array>

namespace rungwright
{

namespace
{

using Kind = FigureRow::Kind;
using M = const Measurement&;
using Value = std::optional<double>;

Value amount(std::optional<Price> price) { return price ? Value(static_cast<double>(price->minor)) : Value(); }

/// The asking total is a sum over the units on offer: with none there is no amount to speak of.
Value total(M m) { return m.onOffer ? Value(static_cast<double>(m.figures.total.minor)) : Value(); }

const char* const kMoney = "the currency's major units, per billing period";
const char* const kShare = "share";
const char* const kNone = "no unit";
const char* const kOwn = "own definition";
const char* const kUsual = "common practice, no source";

const std::array kRows{
    FigureRow{"expected_cheapest", "Expected cheapest", Kind::money, 0, [](M m) { return m.gap.expectedCheapest; },
              "sum over rungs of the chance to be the cheapest found × price, given that something is on offer", kMoney, kOwn, -1},
    FigureRow{"gap", "Gap", Kind::money, 0, [](M m) { return m.gap.gap; }, "expected cheapest − advertised floor", kMoney, kOwn, -1},
    FigureRow{"claim_part", "floor not on sale", Kind::money, 1, [](M m) { return m.gap.claimPart; },
              "lowest price of the ladder the model works on − advertised floor", kMoney, kOwn, -1},
    FigureRow{"shape_part", "thin low end", Kind::money, 1, [](M m) { return m.gap.shapePart; }, "gap − floor not on sale", kMoney, kOwn,
              -1},
    FigureRow{"gap_share", "Gap share", Kind::share, 0, [](M m) { return m.gap.gapShare; }, "gap ÷ advertised floor", kShare, kOwn, -1},
    FigureRow{"gap_median", "Gap, median", Kind::money, 0, [](M m) { return m.gap.gapMedian; },
              "least price whose cumulated chance reaches 50 %, − advertised floor", kMoney, kOwn, -1},
    FigureRow{"gap_p90", "Gap, 90th perc.", Kind::money, 0, [](M m) { return m.gap.gapP90; },
              "least price whose cumulated chance reaches 90 %, − advertised floor", kMoney, kOwn, -1},
    FigureRow{"chance_floor_met", "Floor met", Kind::share, 0, [](M m) { return m.gap.chanceFloorMet; },
              "chance that the cheapest unit found costs no more than the advertised floor", kShare, kOwn, +1},
    FigureRow{"chance_none", "Nothing on offer", Kind::share, 0, [](M m) { return Value(m.odds.none); },
              "chance that no unit is on offer, under the model", kShare, kOwn, 0},
    FigureRow{"skew.moment", "Lean (g1)", Kind::number, 0, [](M m) { return m.figures.skew.moment; },
              "m3 ÷ m2^1.5, population moments of the prices on offer; below zero the ladder leans left: prices crowd near the top", kNone,
              "moment coefficient of skewness", 0},
    FigureRow{"skew.adjusted", "adjusted (G1)", Kind::number, 1, [](M m) { return m.figures.skew.adjusted; },
              "g1 × √(m (m − 1)) ÷ (m − 2), m ≥ 3", kNone, "Joanes & Gill, The Statistician 47 (1998)", 0},
    FigureRow{"skew.medcouple", "medcouple", Kind::number, 1, [](M m) { return m.figures.skew.medcouple; },
              "median of ((xi − med) − (med − xj)) ÷ (xi − xj) over xi ≥ med ≥ xj; robust, from −1 to 1", kNone,
              "Brys, Hubert & Struyf, J. Comput. Graph. Stat. 13 (2004)", 0},
    FigureRow{"skew.l", "L-skewness", Kind::number, 1, [](M m) { return m.figures.skew.l; },
              "l3 ÷ l2 from unbiased probability-weighted moments", kNone, "Hosking, J. R. Stat. Soc. B 52 (1990)", 0},
    FigureRow{"on_offer", "Units on offer", Kind::count, 0, [](M m) { return Value(static_cast<double>(m.onOffer)); },
              "units with status vacant", "units", kOwn, 0},
    FigureRow{"lowest", "Lowest on offer", Kind::money, 0, [](M m) { return amount(m.figures.lowest); },
              "cheapest asking price among the units on offer", kMoney, kOwn, 0},
    FigureRow{"highest", "Highest on offer", Kind::money, 0, [](M m) { return amount(m.figures.highest); },
              "dearest asking price among the units on offer", kMoney, kOwn, 0},
    FigureRow{"width", "Width", Kind::money, 0, [](M m) { return amount(m.figures.width); }, "highest on offer − advertised floor", kMoney,
              kOwn, 0},
    FigureRow{"mean", "Mean on offer", Kind::money, 0, [](M m) { return m.figures.mean; }, "asking total ÷ units on offer", kMoney, kUsual,
              0},
    FigureRow{"median", "Median on offer", Kind::money, 0, [](M m) { return m.figures.median; },
              "middle price, or the mean of the middle two", kMoney, kUsual, 0},
    FigureRow{"mean_standing", "Mean’s standing", Kind::share, 0, [](M m) { return m.figures.meanStanding; },
              "(mean − floor) ÷ (highest − floor)", kShare, kOwn, 0},
    FigureRow{"asking_total", "Asking total", Kind::money, 0, total, "sum of the asking prices on offer", kMoney, kUsual, 0},
    FigureRow{"inversions", "Inversions", Kind::count, 0, [](M m) { return Value(static_cast<double>(m.figures.inversions)); },
              "pairs on offer in which the unit of higher grade is asked for less", "pairs", kOwn, -1},
};

} // namespace

std::span<const FigureRow> figureRows() { return kRows; }

QString figureText(const FigureRow& row, std::optional<double> value, const Currency& currency, const QLocale& locale)
{
    if (!value)
        return undefinedText();
    switch (row.kind) {
    case Kind::money:
        return moneyText(*value, currency, locale);
    case Kind::share:
        return percentText(*value, true, locale);
    case Kind::number:
        return numberText(*value, 2, locale);
    case Kind::count:
        return numberText(*value, 0, locale);
    }
    return {};
}

QString figureChangeText(const FigureRow& row, std::optional<double> from, std::optional<double> to, const Currency& currency,
                         const QLocale& locale)
{
    if (!from || !to)
        return {};
    const double change = *to - *from;
    QString text = figureText(row, change, currency, locale);
    if (text == figureText(row, 0.0, currency, locale))
        return {};
    if (row.kind == Kind::share) // a change of a share is in percentage points, not in percent of it
        text.replace(QLatin1Char('%'), QStringLiteral("pp"));
    return change > 0 ? QLatin1Char('+') + text : text;
}

} // namespace rungwright
