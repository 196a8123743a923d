// SPDX-License-Identifier: GPL-3.0-or-later
// A tier's bench as a picture, without a window.
#pragma once

#include "document.h"
#include "outcome.h"

#include <QSize>
#include <QString>

namespace rungwright
{

/// Heading, reading line, the three plots, and the caution, on light paper, as PNG, SVG or PDF by the ending of `path`. `candidate` as for
/// Workbench::showTier (-1 = the current ladder). `size` in logical pixels; refused below 600 x 520, where words would be cut.
/// Wants a QApplication; any platform plugin will do, "offscreen" included.
Outcome<bool> renderBench(const Document& document, int tier, int candidate, const QString& path, const QSize& size = QSize(1200, 860));

} // namespace rungwright
