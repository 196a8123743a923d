// SPDX-License-Identifier: GPL-3.0-or-later
// The unit list reader, both ways of going on after bad rows. What it takes must hold together whatever the bytes are, and what the fast
// way takes, the file cut into small pieces, must be what the careful way takes.
#include "fast_unit_list.h"
#include "unit_list.h"

#include <QBuffer>

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
        const UnitListOptions options{QString(), withoutBadRows};
        const UnitListResult list = readUnitListCarefully(bytes, QStringLiteral("F"), options);
        QBuffer buffer;
        buffer.setData(bytes);
        buffer.open(QIODevice::ReadOnly);
        UnitListResult fast;
        const FastSettings pieces{1, 1 + size % 61};
        if (readFastResult(buffer, options, pieces, {}, fast) == FastEnd::done)
            must(list.clean() && fast.clean() && fast.tiers == list.tiers && fast.currency == list.currency &&
                 fast.rowsTaken == list.rowsTaken && fast.rowsFine == list.rowsFine && fast.unknownColumns == list.unknownColumns &&
                 fast.encoding == list.encoding);
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
