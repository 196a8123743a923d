// SPDX-License-Identifier: GPL-3.0-or-later
#include "caution.h"

#include "words.h"

namespace rungwright
{

QString cautionText()
{
    return Words::tr(
        "Advertised \"from\" prices are regulated; local law and your own counsel decide what may be said, and this is not legal advice. "
        "Set prices from your own data: rivals' non-public prices do not belong in them.");
}

} // namespace rungwright
