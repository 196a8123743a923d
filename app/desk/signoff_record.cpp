// SPDX-License-Identifier: GPL-3.0-or-later
#include "signoff_record.h"

#include "signoff_words.h"
#include "wording.h"

#include <QCryptographicHash>
#include <QJsonDocument>
#include <QJsonObject>

namespace rungwright
{

namespace
{

CheckOutcome ledgerOutcome(ClaimOutcome outcome)
{
    switch (outcome) {
    case ClaimOutcome::holds:
        return CheckOutcome::holds;
    case ClaimOutcome::lookAtThis:
        return CheckOutcome::lookAtThis;
    case ClaimOutcome::notChecked:
        break;
    }
    return CheckOutcome::notChecked;
}

/// The model's settings by the names a scenario file gives them.
std::string storedModel(const ModelSettings& model)
{
    const std::string_view word = modelWord(model.kind);
    QJsonObject stored{{QStringLiteral("kind"), QString::fromUtf8(word.data(), static_cast<qsizetype>(word.size()))}};
    if (model.left)
        stored.insert(QStringLiteral("left"), *model.left);
    if (model.load)
        stored.insert(QStringLiteral("load"), *model.load);
    return QJsonDocument(stored).toJson(QJsonDocument::Compact).toStdString();
}

} // namespace

std::string sheetHash(const SignOffCase& c)
{
    return QCryptographicHash::hash(sheetToCsv(c.rows, c.currency), QCryptographicHash::Sha256).toHex().toStdString();
}

SignOff ledgerEntry(const SignOffCase& c, const QString& who, const QString& note, const std::string& whenUtc)
{
    SignOff entry;
    entry.whenUtc = whenUtc;
    entry.who = who.toStdString();
    entry.note = note.toStdString();
    entry.site = c.tier.site;
    entry.tier = c.tier.name;
    entry.candidate = c.sheet.candidate;
    entry.currency = c.currency;
    if (c.tier.hasFloor())
        entry.advertisedFloor = c.tier.advertisedFloor;
    entry.units.reserve(c.tier.units.size());
    for (std::size_t i = 0; i < c.tier.units.size(); ++i)
        entry.units.push_back({c.tier.units[i].name, c.tier.units[i].status, c.tier.units[i].asking, c.prices[i]});
    entry.modelWords = SignOffWords::model(c).toStdString();
    entry.modelStored = storedModel(c.model);
    for (const FigureRow& row : figureRows())
        entry.figures.push_back({row.key, row.value(c.before), row.value(c.after)});
    for (const Check& check : c.checks)
        entry.checks.push_back({SignOffWords::checkName(check.kind).toStdString(), ledgerOutcome(check.outcome),
                                SignOffWords::why(check, c.tier.advertisedFloor, c.currency).toStdString()});
    entry.sheetSha256 = sheetHash(c);
    return entry;
}

} // namespace rungwright
