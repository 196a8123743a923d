// SPDX-License-Identifier: GPL-3.0-or-later
// Strict reading of JSON values: every one is looked at, and the first that is wrong is told with its place.
#pragma once

#include "ladder/currency.h"

#include <QJsonArray>
#include <QJsonObject>
#include <QString>

#include <initializer_list>
#include <optional>
#include <string>
#include <string_view>

namespace rungwright
{

/// Keeps the first trouble of a walk through a document; once there is one, all later reading gives empty values and may be left early.
class JsonTrouble
{
public:
    bool any() const { return !m_text.isEmpty(); }
    const QString& text() const { return m_text; }
    void set(const QString& place, const QString& wrong, const QString& found, const QString& wanted);

private:
    QString m_text;
};

/// A value as a message shows it: "'abc'", "12", "true", "null", "a list", "an object".
QString shownValue(const QJsonValue& value);

/// An object whose keys are all known. `place` is the way to it ("tiers[2].units[5]"), empty for the whole document.
class JsonWalk
{
public:
    JsonWalk(const QJsonValue& value, QString place, std::initializer_list<QLatin1String> known, JsonTrouble& trouble);

    bool has(QLatin1String key) const { return m_object.contains(key); }
    QString placeOf(QLatin1String key) const;
    QString placeOf(QLatin1String key, qsizetype index) const;

    /// Any text without NUL and half characters; empty when the key is absent.
    std::string text(QLatin1String key) const;
    /// A text that must be there and hold more than white space.
    std::string name(QLatin1String key) const;
    /// Absent gives nothing; present it must be a whole number from `least` to `greatest`.
    std::optional<int> integer(QLatin1String key, int least, int greatest) const;
    /// Absent gives nothing; present it must be a number above `above` and at most `most`, or from `above` on when `withAbove`.
    std::optional<double> number(QLatin1String key, double above, double most, bool withAbove = false) const;
    bool yes(QLatin1String key) const;
    /// A price written as a decimal text. Absent gives nothing.
    std::optional<Price> price(QLatin1String key, const Currency& currency) const;
    Price neededPrice(QLatin1String key, const Currency& currency) const;
    QJsonArray list(QLatin1String key, bool needed) const;
    QJsonValue value(QLatin1String key) const { return m_object.value(key); }

    void refuse(QLatin1String key, const QString& wrong, const QString& wanted) const;

private:
    bool need(QLatin1String key, const QString& wanted) const;

    QJsonObject m_object;
    QString m_place;
    JsonTrouble& m_trouble;
};

} // namespace rungwright
