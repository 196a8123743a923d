// SPDX-License-Identifier: GPL-3.0-or-later
// The caution that stands wherever a price can leave the tool.
#pragma once

#include <QString>

namespace rungwright
{

/// Two plain sentences: advertised "from" prices are regulated, local law and the operator's own counsel decide, prices rest on the
/// operator's own data.
QString cautionText();

} // namespace rungwright
