// SPDX-License-Identifier: GPL-3.0-or-later
#include "input.h"

#include "file_kind.h"
#include "mapped_list.h"
#include "mapping_profile.h"
#include "scenario_json.h"
#include "streams.h"
#include "unit_list.h"
#include "whole_file.h"

#include <QFile>
#include <QFileInfo>

namespace rungwright
{

namespace
{

/// A hundred times what the largest operator's list of units comes to.
constexpr qint64 kLargestInput = qint64(1) << 30;

Trouble trouble(const QString& text) { return {text.toStdString()}; }

QString refusedText(const UnitListResult& list, const QString& fileName)
{
    QString text;
    for (const RefusedRow& row : list.refused)
        text += row.text(fileName) + QLatin1Char('\n');
    if (list.refusedCount > qint64(list.refused.size()))
        text += QStringLiteral("%1: the first %2 of %3 refused rows are listed\n")
                    .arg(fileName)
                    .arg(list.refused.size())
                    .arg(list.refusedCount);
    return text;
}

Outcome<Scenario> taken(UnitListResult list, const Request& request)
{
    if (!list.fileTrouble.isEmpty())
        return trouble(list.fileTrouble);
    sayColumnsNotUsed(request.file, list.unknownColumns);
    if (list.refusedCount > 0 && !request.withoutBadRows)
        return trouble(refusedText(list, request.file) +
                       QStringLiteral("%1: %2 rows refused, so nothing was taken. Mend them, or go on without them by --without-bad-rows.")
                           .arg(request.file)
                           .arg(list.refusedCount));
    if (list.refusedCount > 0)
        say(refusedText(list, request.file) +
            QStringLiteral("%1: went on without %2 refused rows; %3 taken").arg(request.file).arg(list.refusedCount).arg(list.rowsTaken));
    if (list.tiers.empty())
        return trouble(QStringLiteral("%1: holds no unit that could be taken").arg(request.file));

    Scenario scenario;
    scenario.currency = list.currency;
    scenario.tiers = std::move(list.tiers);
    return scenario;
}

Outcome<Scenario> fromUnitList(const QByteArray& bytes, const Request& request)
{
    return taken(readUnitList(bytes, request.file, {request.currency, request.withoutBadRows}), request);
}

Outcome<Scenario> fromMappedList(const Request& request)
{
    const Outcome<MappingProfile> profile = loadMapping(request.mapping);
    if (!profile)
        return Trouble{profile.trouble()};
    if (isScenarioFile(request.file))
        return trouble(
            QStringLiteral("%1: is a scenario, which is read as it is; --mapping is for a list of another system").arg(request.file));
    MappedListResult mapped =
        loadMappedList(request.file, profile.value().mapping, request.floors, {request.currency, request.withoutBadRows});
    for (const QString& note : mapped.notes)
        say(QStringLiteral("%1: %2").arg(request.file, note));
    return taken(std::move(mapped.list), request);
}

Outcome<Scenario> fromScenario(const QByteArray& bytes, const Request& request)
{
    Outcome<Scenario> scenario = scenarioFromJson(bytes, request.file);
    if (scenario && !request.currency.isEmpty() && request.currency.toStdString() != scenario.value().currency.code)
        return trouble(QStringLiteral("%1: is in %2; --currency %3 cannot change that")
                           .arg(request.file, QString::fromStdString(scenario.value().currency.code), request.currency));
    return scenario;
}

} // namespace

bool isScenarioFile(const QString& path)
{
    QFile file(path);
    constexpr qint64 enoughToTell = 8192;
    return QFileInfo(path).isFile() && file.open(QIODevice::ReadOnly) && looksLikeScenario(file.peek(enoughToTell), path);
}

void sayColumnsNotUsed(const QString& file, const QStringList& columns)
{
    if (!columns.isEmpty())
        say(QStringLiteral("%1: columns not used: %2").arg(file, columns.join(QStringLiteral(", "))));
}

Outcome<Scenario> openInput(const Request& request)
{
    if (!request.mapping.isEmpty())
        return fromMappedList(request);
    const Outcome<QByteArray> bytes = readWhole(request.file, kLargestInput);
    if (!bytes)
        return Trouble{bytes.trouble()};
    return looksLikeScenario(bytes.value(), request.file) ? fromScenario(bytes.value(), request) : fromUnitList(bytes.value(), request);
}

} // namespace rungwright
