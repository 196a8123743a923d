// SPDX-License-Identifier: GPL-3.0-or-later
#include "rules_text.h"

#include "wording.h"

#include <QCoreApplication>
#include <QRegularExpression>
#include <QStringList>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

QString tr(const char* text) { return QCoreApplication::translate("RulesText", text); }

Trouble trouble(const QString& words) { return {words.toStdString()}; }

bool pointIsDecimal(const QLocale& locale) { return locale.decimalPoint() == QStringLiteral("."); }

/// An example of an amount for messages: "12.50", "12,50", "12" as the currency has it.
QString exampleAmount(const Currency& currency, const QLocale& locale)
{
    return moneyText(12.5 * static_cast<double>(currency.minorPerMajor()), currency, locale);
}

/// The locale's own digits are as good as ours.
QString plainDigits(QString text)
{
    for (QChar& c : text) {
        if (c.isDigit())
            c = QChar(u'0' + c.digitValue());
    }
    return text;
}

/// An amount that may begin with its decimal sign.
std::optional<Price> looseAmount(const QString& typed, const Currency& currency, const QLocale& locale)
{
    QString text = plainDigits(typed);
    if (text.startsWith(u'.') || text.startsWith(locale.decimalPoint()))
        text.prepend(u'0');
    return moneyFromText(text, currency, locale);
}

QStringList endingWords(const QString& text, const QLocale& locale)
{
    static const QRegularExpression apart(QStringLiteral("[;\\s]+"));
    static const QRegularExpression apartOrComma(QStringLiteral("[;,\\s]+"));
    if (pointIsDecimal(locale))
        return text.split(apartOrComma, Qt::SkipEmptyParts);
    QStringList words;
    for (const QString& word : text.split(apart, Qt::SkipEmptyParts)) {
        // A comma at the end of a word, or in a word with points, sets apart here too: "0.00, 0.50".
        if (word.contains(u'.'))
            words << word.split(u',', Qt::SkipEmptyParts);
        else if (word.endsWith(u','))
            words << word.chopped(1);
        else
            words << word;
    }
    words.removeAll(QString());
    return words;
}

} // namespace

Outcome<std::optional<Price>> readAmount(const QString& text, const Currency& currency, const QLocale& locale)
{
    if (text.trimmed().isEmpty())
        return std::optional<Price>();
    const auto amount = looseAmount(text.trimmed(), currency, locale);
    if (!amount)
        return trouble(tr("Not an amount. Type one like %1.").arg(exampleAmount(currency, locale)));
    if (*amount <= Price{0})
        return trouble(tr("Must be more than zero."));
    return amount;
}

Outcome<std::optional<double>> readPercent(const QString& text, const QLocale& locale)
{
    QString plain = text.trimmed();
    if (plain.endsWith(u'%'))
        plain = plain.chopped(1).trimmed();
    if (plain.isEmpty() && text.trimmed().isEmpty())
        return std::optional<double>();
    bool ok = false;
    double percent = locale.toDouble(plain, &ok);
    if (!ok)
        percent = QLocale::c().toDouble(plain, &ok);
    if (!ok || !std::isfinite(percent))
        return trouble(tr("Not a percentage. Type one like %1.").arg(percentFieldText(7.5, locale)));
    if (percent <= 0)
        return trouble(tr("Must be more than zero."));
    return std::optional(percent);
}

Outcome<std::vector<Price>> readEndings(const QString& text, std::optional<Price> step, const Currency& currency, const QLocale& locale)
{
    std::vector<Price> endings;
    const QStringList words = endingWords(text, locale);
    if (words.isEmpty())
        return endings;
    if (!step)
        return trouble(tr("Endings need a step above."));
    for (const QString& word : words) {
        const auto ending = looseAmount(word, currency, locale);
        if (!ending || *ending < Price{0})
            return trouble(tr("“%1” is not an ending. Type them like %2.")
                               .arg(word, endingsText({Price{0}, Price{currency.minorPerMajor() / 2}}, currency, locale)));
        if (*ending >= *step)
            return trouble(tr("“%1” is not below the step of %2.").arg(word, moneyText(*step, currency, locale)));
        endings.push_back(*ending);
    }
    std::sort(endings.begin(), endings.end());
    endings.erase(std::unique(endings.begin(), endings.end()), endings.end());
    return endings;
}

QString endingsText(const std::vector<Price>& endings, const Currency& currency, const QLocale& locale)
{
    QStringList words;
    const bool point = pointIsDecimal(locale);
    const bool belowOne = std::ranges::all_of(endings, [&](Price ending) { return ending.minor < currency.minorPerMajor(); });
    for (const Price ending : endings) {
        // Without grouping: the list has separators enough.
        QString word = QString::fromStdString(plainText(ending, currency));
        if (!point)
            word.replace(u'.', locale.decimalPoint());
        else if (belowOne && currency.decimals > 0)
            word.remove(0, 1);
        words << word;
    }
    return words.join(point ? QStringLiteral(", ") : QStringLiteral("; "));
}

QString percentFieldText(double percent, const QLocale& locale) { return locale.toString(percent, 'g', QLocale::FloatingPointShortest); }

} // namespace rungwright
