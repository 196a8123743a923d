// SPDX-License-Identifier: GPL-3.0-or-later
// The door through which this room's messages can be translated, and the way a found text is shown in them.
#pragma once

#include <QCoreApplication>
#include <QString>

#include <string_view>

namespace rungwright
{

class Words
{
    Q_DECLARE_TR_FUNCTIONS(rungwright::Words)
};

/// A text found in a file as a message shows it: control characters spelled out (\n, \x1b), long texts cut in the middle to `most`
/// characters.
QString shownText(std::string_view utf8, int most = 60);
QString shownText(const QString& text, int most = 60);

} // namespace rungwright
