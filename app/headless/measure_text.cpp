// SPDX-License-Identifier: GPL-3.0-or-later
#include "measure_text.h"

#include "text_table.h"
#include "wording.h"

namespace rungwright
{

namespace
{

QString money(std::optional<double> minorUnits, const Currency& currency, const QLocale& locale)
{
    return minorUnits ? moneyText(*minorUnits, currency, locale) : undefinedText();
}

QString percent(std::optional<double> share, const QLocale& locale) { return share ? percentText(*share, true, locale) : undefinedText(); }

QString overview(const std::vector<MeasuredLadder>& all, const Currency& currency, const QLocale& locale)
{
    TextTable table({QStringLiteral("Site"), QStringLiteral("Tier"), QStringLiteral("Ladder"), QStringLiteral("On offer"),
                     QStringLiteral("Floor"), QStringLiteral("Cheapest"), QStringLiteral("Gap"), QStringLiteral("of floor"),
                     QStringLiteral("Floor met"), QStringLiteral("Lean")},
                    {0, 1, 2});
    for (const MeasuredLadder& one : all) {
        const Measurement& m = one.measurement;
        const Tier& tier = one.ladder.tierCase->tier;
        const std::string_view candidate = one.ladder.candidateName();
        table.add({QString::fromStdString(tier.site), QString::fromStdString(tier.name),
                   QString::fromUtf8(candidate.data(), qsizetype(candidate.size())),
                   QStringLiteral("%1 / %2").arg(locale.toString(qulonglong(m.onOffer)), locale.toString(qulonglong(m.rentable))),
                   floorText(m.advertisedFloor, currency, locale), money(m.gap.expectedCheapest, currency, locale),
                   money(m.gap.gap, currency, locale), percent(m.gap.gapShare, locale), percent(m.gap.chanceFloorMet, locale),
                   m.figures.skew.moment ? numberText(*m.figures.skew.moment, 2, locale) : undefinedText()});
    }
    return table.text();
}

QString allFigures(const Measurement& m, const Currency& currency, const QLocale& locale)
{
    TextTable table({QStringLiteral("Figure"), QStringLiteral("Value")}, {0});
    for (const FigureRow& row : figureRows())
        table.add(
            {QString(2 * row.indent, QLatin1Char(' ')) + QString::fromUtf8(row.label), figureText(row, row.value(m), currency, locale)});
    return table.text();
}

QString inWords(const MeasuredLadder& one, const Currency& currency, const QLocale& locale)
{
    const Reading words = reading(one.measurement, currency, locale);
    const Tier& tier = one.ladder.tierCase->tier;
    const QString share = words.share.isEmpty() ? QString() : QStringLiteral(" (%1)").arg(words.share);
    return QStringLiteral("%1 / %2, %3: %4%5. %6\n")
        .arg(oneLine(QString::fromStdString(tier.site)), oneLine(QString::fromStdString(tier.name)),
             modelName(one.measurement.model).toLower(), words.headline, share, words.sentence);
}

} // namespace

QString measurementsToText(const std::vector<MeasuredLadder>& all, const Currency& currency, const QLocale& locale)
{
    QString text = currency.code == Currency{}.code
                       ? QStringLiteral("Amounts per billing period; the currency was not said.\n\n")
                       : QStringLiteral("Amounts in %1 per billing period.\n\n").arg(QString::fromStdString(currency.code));
    text += overview(all, currency, locale) + QLatin1Char('\n');
    for (const MeasuredLadder& one : all)
        text += inWords(one, currency, locale);
    if (all.size() == 1)
        text += QLatin1Char('\n') + allFigures(all.front().measurement, currency, locale);
    return text;
}

} // namespace rungwright
