// SPDX-License-Identifier: GPL-3.0-or-later
#include "wording.h"

#include <QCoreApplication>
#include <QRegularExpression>

#include <cmath>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("Wording", text); }

constexpr QChar kMinus(0x2212);

/// The locale's digits with a true minus sign, and without "-0.00".
QString digits(double value, int decimals, const QLocale& locale)
{
    QString text = locale.toString(std::abs(value), 'f', decimals);
    const bool zero = std::abs(value) < 0.5 * std::pow(10.0, -decimals);
    if (value < 0 && !zero)
        text.prepend(kMinus);
    return text;
}

} // namespace

QString moneyText(double minorUnits, const Currency& currency, const QLocale& locale)
{
    return digits(currency.major(minorUnits), currency.decimals, locale);
}

QString moneyText(Price price, const Currency& currency, const QLocale& locale)
{
    return moneyText(static_cast<double>(price.minor), currency, locale);
}

QString signedMoneyText(double minorUnits, const Currency& currency, const QLocale& locale)
{
    const QString text = moneyText(minorUnits, currency, locale);
    return minorUnits > 0.5 ? QLatin1Char('+') + text : text;
}

QString percentText(double share, bool fine, const QLocale& locale)
{
    const double percent = share * 100.0;
    const int decimals = fine && std::abs(percent) < 9.95 ? 1 : 0;
    return digits(percent, decimals, locale) + QChar(0x00A0) + QLatin1Char('%');
}

QString numberText(double value, int decimals, const QLocale& locale) { return digits(value, decimals, locale); }

QString floorText(Price advertisedFloor, const Currency& currency, const QLocale& locale)
{
    return advertisedFloor.minor > 0 ? moneyText(advertisedFloor, currency, locale) : undefinedText();
}

QString undefinedText() { return QString(QChar(0x2013)); }

std::optional<Price> moneyFromText(const QString& text, const Currency& currency, const QLocale& locale)
{
    QString typed = text.trimmed();
    typed.replace(kMinus, QLatin1Char('-'));
    // The locale's own spelling first: groups of three before its decimal sign; spaces of any width group too. Signs that do not
    // stand where they group are not passed over: "82,50" is no way to write 8250.
    QString bare;
    for (const QChar c : typed)
        bare += c.isSpace() ? QLatin1Char(' ') : c;
    const QString group = QStringLiteral("[ ") + QRegularExpression::escape(locale.groupSeparator()) + QLatin1Char(']');
    const QString point = QRegularExpression::escape(locale.decimalPoint());
    const QRegularExpression local(QStringLiteral("^([+-]?)(\\d{1,3}(?:%1\\d{3})+|\\d+)(?:%2(\\d+))?$").arg(group, point));
    if (const auto match = local.match(bare); match.hasMatch()) {
        QString whole = match.captured(2);
        whole.remove(QRegularExpression(group));
        const QString decimals = match.captured(3);
        const QString plain = match.captured(1) + whole + (decimals.isEmpty() ? QString() : QLatin1Char('.') + decimals);
        return parsePlain(plain.toStdString(), currency);
    }
    return parsePlain(typed.toStdString(), currency);
}

QString modelName(ModelKind kind)
{
    switch (kind) {
    case ModelKind::perceived:
        return tr("Perceived range");
    case ModelKind::fitted:
        return tr("Fitted range");
    case ModelKind::remainder:
        return tr("Random remainder");
    case ModelKind::unit:
        return tr("Unit by unit");
    case ModelKind::turnover:
        return tr("Cheapest-first turnover");
    case ModelKind::onHand:
        return tr("On hand");
    }
    return {};
}

QString modelExplanation(ModelKind kind)
{
    switch (kind) {
    case ModelKind::perceived:
        return tr("The enquirer sees a number of units and takes their prices for draws from the range on offer.");
    case ModelKind::fitted:
        return tr("As the perceived range, with a smooth beta distribution fitted to the prices on offer.");
    case ModelKind::remainder:
        return tr("A number of the rentable units is left, any of them equally likely.");
    case ModelKind::unit:
        return tr("Each rentable unit is free with a chance of its own, independently of the others.");
    case ModelKind::turnover:
        return tr("Enquirers keep taking the cheapest free unit and leave after a while: what is free in the long run.");
    case ModelKind::onHand:
        return tr("Exactly the units on offer now: the enquirer finds the cheapest of them.");
    }
    return {};
}

QString oddsNoteText(OddsNote note)
{
    switch (note) {
    case OddsNote::nothingOnOffer:
        return tr("Nothing is on offer, so there is no cheapest unit to find.");
    case OddsNote::nothingRentable:
        return tr("No unit of this tier is rentable.");
    case OddsNote::tierFull:
        return tr("Every rentable unit is taken, so the demand cannot be inferred. Type an offered load, or choose another model.");
    case OddsNote::tierEmpty:
        return tr("No unit is taken, so the demand cannot be inferred. Type an offered load, or choose another model.");
    case OddsNote::fitNotFeasible:
        return tr("No beta distribution fits these prices (too few, all equal, too spread out, or a price below the floor). Choose the "
                  "perceived range.");
    case OddsNote::noFloor:
        return tr("The fitted range begins at the advertised floor, and none is known for this tier.");
    case OddsNote::neverFree:
        return tr("Every unit's chance to be free is zero.");
    }
    return {};
}

} // namespace rungwright
