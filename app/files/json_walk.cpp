// SPDX-License-Identifier: GPL-3.0-or-later
#include "json_walk.h"

#include "cell_values.h"
#include "csv_records.h"
#include "words.h"

#include <QStringList>

#include <cmath>

namespace rungwright
{

void JsonTrouble::set(const QString& place, const QString& wrong, const QString& found, const QString& wanted)
{
    if (any())
        return;
    const QString where = place.isEmpty() ? Words::tr("the document") : place;
    m_text = Words::tr("%1: %2; found %3; wanted: %4").arg(where, wrong, found.isEmpty() ? Words::tr("nothing") : found, wanted);
}

QString shownValue(const QJsonValue& value)
{
    switch (value.type()) {
    case QJsonValue::String:
        return QStringLiteral("'%1'").arg(shownText(value.toString()));
    case QJsonValue::Double:
        return QString::number(value.toDouble(), 'g', 12);
    case QJsonValue::Bool:
        return value.toBool() ? QStringLiteral("true") : QStringLiteral("false");
    case QJsonValue::Null:
        return QStringLiteral("null");
    case QJsonValue::Array:
        return Words::tr("a list");
    case QJsonValue::Object:
        return Words::tr("an object");
    case QJsonValue::Undefined:
        break;
    }
    return Words::tr("nothing");
}

JsonWalk::JsonWalk(const QJsonValue& value, QString place, std::initializer_list<QLatin1String> known, JsonTrouble& trouble) :
    m_place(std::move(place)), m_trouble(trouble)
{
    if (m_trouble.any())
        return;
    if (!value.isObject()) {
        m_trouble.set(m_place, Words::tr("not an object"), shownValue(value), Words::tr("an object { ... }"));
        return;
    }
    m_object = value.toObject();
    // A key that is not understood is refused: skipping it would lose what it holds at the next save.
    for (auto it = m_object.constBegin(); it != m_object.constEnd(); ++it) {
        bool isKnown = false;
        for (const QLatin1String key : known)
            isKnown = isKnown || it.key() == key;
        if (isKnown)
            continue;
        QStringList keys;
        for (const QLatin1String key : known)
            keys << key;
        m_trouble.set(m_place, Words::tr("a key that is not known"), QStringLiteral("'%1'").arg(shownText(it.key())),
                      Words::tr("one of %1").arg(keys.join(QStringLiteral(", "))));
        return;
    }
}

QString JsonWalk::placeOf(QLatin1String key) const { return m_place.isEmpty() ? QString(key) : m_place + QLatin1Char('.') + key; }

QString JsonWalk::placeOf(QLatin1String key, qsizetype index) const
{
    return QStringLiteral("%1[%2]").arg(placeOf(key), QString::number(index));
}

void JsonWalk::refuse(QLatin1String key, const QString& wrong, const QString& wanted) const
{
    m_trouble.set(placeOf(key), wrong, shownValue(m_object.value(key)), wanted);
}

bool JsonWalk::need(QLatin1String key, const QString& wanted) const
{
    if (m_trouble.any())
        return false;
    if (!has(key))
        refuse(key, Words::tr("missing"), wanted);
    return has(key);
}

std::string JsonWalk::text(QLatin1String key) const
{
    if (m_trouble.any() || !has(key))
        return {};
    const QJsonValue value = m_object.value(key);
    const QString text = value.toString();
    if (!value.isString()) {
        refuse(key, Words::tr("not a text"), Words::tr("a text in quotation marks"));
        return {};
    }
    if (text.contains(QChar(0)) || !text.isValidUtf16()) {
        refuse(key, Words::tr("a text with a NUL or half a character in it"), Words::tr("plain text"));
        return {};
    }
    std::string utf8 = text.toStdString();
    if (utf8.size() > kLongestCell) {
        refuse(key, Words::tr("a text longer than 1 MB"), Words::tr("a shorter one"));
        return {};
    }
    return utf8;
}

std::string JsonWalk::name(QLatin1String key) const
{
    if (!need(key, Words::tr("a name")))
        return {};
    std::string name = text(key);
    if (trimmedText(name).empty())
        refuse(key, Words::tr("no name"), Words::tr("a text that is more than white space"));
    return name;
}

std::optional<int> JsonWalk::integer(QLatin1String key, int least, int greatest) const
{
    if (m_trouble.any() || !has(key))
        return {};
    const QJsonValue value = m_object.value(key);
    const double number = value.toDouble();
    if (value.isDouble() && number >= least && number <= greatest && number == std::floor(number))
        return static_cast<int>(number);
    refuse(key, Words::tr("not a whole number in range"),
           Words::tr("a whole number from %1 to %2").arg(QString::number(least), QString::number(greatest)));
    return {};
}

std::optional<double> JsonWalk::number(QLatin1String key, double above, double most, bool withAbove) const
{
    if (m_trouble.any() || !has(key))
        return {};
    const QJsonValue value = m_object.value(key);
    const double number = value.toDouble();
    if (value.isDouble() && std::isfinite(number) && (withAbove ? number >= above : number > above) && number <= most)
        return number;
    refuse(key, Words::tr("not a number in range"),
           (withAbove ? Words::tr("a number from %1 to %2") : Words::tr("a number above %1, at most %2"))
               .arg(QString::number(above), QString::number(most)));
    return {};
}

bool JsonWalk::yes(QLatin1String key) const
{
    if (m_trouble.any() || !has(key))
        return false;
    const QJsonValue value = m_object.value(key);
    if (!value.isBool())
        refuse(key, Words::tr("neither true nor false"), Words::tr("true or false"));
    return value.toBool();
}

std::optional<Price> JsonWalk::price(QLatin1String key, const Currency& currency) const
{
    if (m_trouble.any() || !has(key))
        return {};
    const QJsonValue value = m_object.value(key);
    if (!value.isString()) {
        refuse(key, Words::tr("not a price in quotation marks"),
               QStringLiteral("\"%1\"").arg(QString::fromStdString(plainText(Price{69 * currency.minorPerMajor()}, currency))));
        return {};
    }
    Price price;
    if (const auto complaint = readPrice(value.toString().toStdString(), currency, price)) {
        refuse(key, complaint->wrong, complaint->wanted);
        return {};
    }
    return price;
}

Price JsonWalk::neededPrice(QLatin1String key, const Currency& currency) const
{
    if (!need(key, Words::tr("a price")))
        return {};
    return price(key, currency).value_or(Price{});
}

QJsonArray JsonWalk::list(QLatin1String key, bool needed) const
{
    if (m_trouble.any() || (!has(key) && !needed) || !need(key, Words::tr("a list [ ... ]")))
        return {};
    const QJsonValue value = m_object.value(key);
    if (!value.isArray())
        refuse(key, Words::tr("not a list"), Words::tr("a list [ ... ]"));
    return value.toArray();
}

} // namespace rungwright
