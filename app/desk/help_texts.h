// SPDX-License-Identifier: GPL-3.0-or-later
// Longer texts of the Help menu.
#pragma once

#include <QString>

namespace rungwright
{

QString keysText();
QString aboutText();

} // namespace rungwright
