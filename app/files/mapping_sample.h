// SPDX-License-Identifier: GPL-3.0-or-later
// Records of the beginning of a file, the last of which may be torn.
#pragma once

#include "csv_records.h"
#include "mapping_propose.h"

namespace rungwright
{

/// Hands over every whole record. The trouble, without a file name; what comes of the sample's end being torn is none.
QString eachSampleRecord(const ListSample& sample, const CsvLayout& layout, const CsvSink& sink);

} // namespace rungwright
