// SPDX-License-Identifier: GPL-3.0-or-later
// The gap's parts as every plot draws them: fill, hatching of the claim part, lines, bracket.
#pragma once

#include "look.h"

#include <QLineF>
#include <QRectF>

class QPainter;

namespace rungwright
{

/// Fills `band` and hatches `hatched` (a part of it, may be null).
void paintGapBand(QPainter& painter, const QRectF& band, const QRectF& hatched, const Look& look);
/// Hatching only; its lines stand still while the rectangle's edges move.
void paintHatching(QPainter& painter, const QRectF& rect, const Look& look);
void paintExpectedLine(QPainter& painter, double left, double right, double y, const Look& look);
void paintFloorLine(QPainter& painter, double left, double right, double y, const Look& look);
void paintBracket(QPainter& painter, const QLineF& bracket, const Look& look);

} // namespace rungwright
