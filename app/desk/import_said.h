// SPDX-License-Identifier: GPL-3.0-or-later
// What the user has said in the import form outlives a change of the list's layout.
#pragma once

#include "mapping_propose.h"

namespace rungwright
{

/// `proposal` is made for another encoding, delimiter or header than `said`. Kept of `said` are constants and the columns whose headers
/// still stand there, and with them what was said of their contents: the numbers with the asking price, the status words (those of the
/// proposal join them), yes and no, rows passed over by columns that still stand. Notes of kept columns go.
MappingProposal keepWhatWasSaid(const ImportMapping& said, MappingProposal proposal);

} // namespace rungwright
