// SPDX-License-Identifier: GPL-3.0-or-later
// A mapping profile, a line of "====", and the list that is read through it; without such a line all is a list, and its mapping proposed.
#include "mapped_list.h"
#include "mapping_preview.h"
#include "mapping_profile.h"

#include <cstdlib>

using namespace rungwright;

namespace
{

void must(bool holds)
{
    if (!holds)
        std::abort();
}

void readThrough(const ImportMapping& mapping, const QByteArray& list)
{
    const QByteArray floors = mapping.floorsFromFile ? QByteArrayLiteral("site,tier,advertised_floor\nA,T,69.00\n") : QByteArray();
    const QString floorsName = mapping.floorsFromFile ? QStringLiteral("floors") : QString();
    const MappedListResult mapped = readMappedList(list, QStringLiteral("F"), mapping, floors, floorsName, {QString(), true});
    qint64 units = 0;
    for (const TierCase& tierCase : mapped.list.tiers) {
        must(!tierCase.tier.units.empty() && (mapping.floorsMayBeMissing || tierCase.tier.advertisedFloor.minor > 0));
        units += qint64(tierCase.tier.units.size());
        for (const Unit& unit : tierCase.tier.units)
            must(unit.asking.minor > 0 && unit.asking <= kGreatestPrice && !unit.name.empty());
    }
    must(units == mapped.list.rowsTaken);
    for (const RefusedRow& row : mapped.list.refused)
        must(!row.text(QStringLiteral("F")).isEmpty());
    const MappingPreview preview = previewMapping({list, false}, mapping, 20);
    must(preview.rowsPassedOver + preview.rowsInTrouble <= preview.rowsSeen);
}

} // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size)
{
    const QByteArray bytes(reinterpret_cast<const char*>(data), qsizetype(size));
    const QByteArray between = QByteArrayLiteral("\n====\n");
    const qsizetype at = bytes.indexOf(between);
    if (at < 0) {
        const MappingProposal proposal = proposeMapping({bytes, true});
        readThrough(proposal.mapping, bytes);
        return 0;
    }
    const Outcome<MappingProfile> profile = mappingFromJson(bytes.left(at), QStringLiteral("F"));
    if (!profile)
        return 0;
    const QByteArray json = mappingToJson(profile.value());
    const Outcome<MappingProfile> again = mappingFromJson(json, QStringLiteral("F"));
    must(again.ok() && again.value() == profile.value() && mappingToJson(again.value()) == json);
    readThrough(profile.value().mapping, bytes.mid(at + between.size()));
    return 0;
}
