// SPDX-License-Identifier: GPL-3.0-or-later
// The scenario reader. What can be read must be written, read again and written as the same bytes.
#include "scenario_json.h"

#include <cstdlib>

using namespace rungwright;

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size)
{
    const auto bytes = QByteArray::fromRawData(reinterpret_cast<const char*>(data), qsizetype(size));
    const Outcome<Scenario> read = scenarioFromJson(bytes, QStringLiteral("F"));
    if (!read)
        return 0;
    const QByteArray json = scenarioToJson(read.value());
    const Outcome<Scenario> again = scenarioFromJson(json, QStringLiteral("F"));
    if (!again.ok() || !(again.value() == read.value()) || scenarioToJson(again.value()) != json)
        std::abort();
    return 0;
}
