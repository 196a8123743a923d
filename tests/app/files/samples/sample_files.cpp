// SPDX-License-Identifier: GPL-3.0-or-later
#include "sample_files.h"

#include "sample_scenarios.h"
#include "scenario_json.h"

namespace rungwright::samples
{

std::vector<SampleFile> sampleFiles()
{
    std::vector<SampleFile> files;
    const auto both = [&files](const QString& name, const Scenario& scenario) {
        files.push_back({name + QStringLiteral(".rungs.json"), scenarioToJson(scenario)});
        files.push_back({name + QStringLiteral(".csv"), unitListCsv(scenario)});
    };
    both(QStringLiteral("quillmere-storage"), storageSample());
    both(QStringLiteral("kumonoura-berths"), berthSample());
    both(QStringLiteral("rimalin-studios"), studioSample());
    both(QStringLiteral("edge-cases"), edgeSample());
    files.push_back({QStringLiteral("import-2400-units.csv"), longListCsv()});
    files.push_back({QStringLiteral("with-refused-rows.csv"), refusedListCsv()});
    return files;
}

} // namespace rungwright::samples
