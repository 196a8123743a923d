// SPDX-License-Identifier: GPL-3.0-or-later
#include "sign_off.h"

#include <QDateTime>
#include <QRegularExpression>
#include <QTimeZone>

namespace rungwright
{

const char* checkOutcomeWord(CheckOutcome outcome)
{
    switch (outcome) {
    case CheckOutcome::holds:
        return "holds";
    case CheckOutcome::lookAtThis:
        return "look at this";
    case CheckOutcome::notChecked:
        break;
    }
    return "not checked";
}

std::optional<std::int64_t> instantFromUtcText(const std::string& text)
{
    // QDateTime would take a time without a zone as local, and much else.
    static const QRegularExpression form(QStringLiteral("\\A[0-9]{4}-[0-9]{2}-[0-9]{2}T[0-9]{2}:[0-9]{2}:[0-9]{2}(\\.[0-9]{3})?Z\\z"));
    const QString words = QString::fromStdString(text);
    if (!form.match(words).hasMatch())
        return {};
    const QDateTime time = QDateTime::fromString(words, Qt::ISODateWithMs);
    if (!time.isValid())
        return {};
    return time.toMSecsSinceEpoch();
}

std::string utcText(std::int64_t instant)
{
    const QDateTime time = QDateTime::fromMSecsSinceEpoch(instant, Qt::UTC);
    return time.toString(instant % 1000 == 0 ? Qt::ISODate : Qt::ISODateWithMs).toStdString();
}

} // namespace rungwright
