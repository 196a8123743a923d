// SPDX-License-Identifier: GPL-3.0-or-later
// A drawing as a picture: PNG, SVG or PDF on disk, or an image for the clipboard.
#pragma once

#include "outcome.h"

#include <QImage>
#include <QSize>
#include <QString>

#include <functional>

class QCPPainter;

namespace rungwright
{

/// Draws the whole picture, paper included, in logical pixels from (0, 0) to the size asked for.
using Drawing = std::function<void(QCPPainter&)>;

/// "PNG picture (*.png);;..." for file dialogs.
QString pictureFilter();

/// Writes the picture by the ending of `path` (.png at two pixels a logical pixel, .svg, .pdf with text as text), whole or not at all.
/// `size` in logical pixels, not empty.
Outcome<bool> savePicture(const QString& path, const QSize& size, const QString& title, const Drawing& draw);

/// The picture as pixels, `scale` of them a logical pixel.
QImage pictureImage(const QSize& size, double scale, const Drawing& draw);

} // namespace rungwright
