// SPDX-License-Identifier: GPL-3.0-or-later
// Asking for a tier's advertised floor.
#pragma once

class QWidget;

namespace rungwright
{

class Document;
class Questions;

/// Shows the floor there is and takes another: an amount above zero, or nothing for "no floor is known". Says what is wrong with anything
/// else and asks again, with what was typed still there.
void askFloor(Document& document, int tier, Questions& questions, QWidget* parent);

} // namespace rungwright
