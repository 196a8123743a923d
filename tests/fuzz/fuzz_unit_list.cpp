// SPDX-License-Identifier: GPL-3.0-or-later
// The unit list reader, both ways of going on after bad rows. What it takes must hold together whatever the bytes are.
#include "unit_list.h"

#include <cstdlib>

using namespace rungwright;

namespace
{

void must(bool holds)
{
    if (!holds)
        std::abort();
}

} // namespace

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size)
{
    const auto bytes = QByteArray::fromRawData(reinterpret_cast<const char*>(data), qsizetype(size));
    for (const bool withoutBadRows : {false, true}) {
        const UnitListResult list = readUnitList(bytes, QStringLiteral("F"), {QString(), withoutBadRows});
        qint64 units = 0;
        for (const TierCase& tierCase : list.tiers) {
            must(!tierCase.tier.units.empty() && tierCase.tier.advertisedFloor.minor > 0 && !tierCase.tier.name.empty());
            units += qint64(tierCase.tier.units.size());
            for (const Unit& unit : tierCase.tier.units)
                must(unit.asking.minor > 0 && unit.asking <= kGreatestPrice && !unit.name.empty());
        }
        must(units == list.rowsTaken);
        must(withoutBadRows || list.clean() || list.tiers.empty());
        must(list.fileTrouble.isEmpty() || list.tiers.empty());
        for (const RefusedRow& row : list.refused)
            must(!row.text(QStringLiteral("F")).isEmpty() && row.line > 0);
    }
    return 0;
}
