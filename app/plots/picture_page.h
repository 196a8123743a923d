// SPDX-License-Identifier: GPL-3.0-or-later
// The page an exported picture stands on: a heading above, the caution in small print below.
#pragma once

#include <QFont>
#include <QRect>
#include <QSize>
#include <QString>

#include <functional>

class QPainter;

namespace rungwright
{

struct Look;

/// The page that leaves a plot of `plot` its size.
QSize pictureSizeFor(const QSize& plot, const QFont& font);

/// Fills the page with paper, writes heading and caution, and calls `content` with the rectangle between them.
void paintPicturePage(QPainter& painter, const QSize& size, const QFont& font, const Look& look, const QString& heading,
                      const std::function<void(const QRect&)>& content);

} // namespace rungwright
