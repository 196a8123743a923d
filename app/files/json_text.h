// SPDX-License-Identifier: GPL-3.0-or-later
// JSON text to a document: its troubles by line and column, and keys that are written twice.
#pragma once

#include <QJsonDocument>
#include <QString>

#include <string>
#include <string_view>

namespace rungwright
{

/// Parses UTF-8 text. False when it is not JSON, or when an object holds a key twice (QJsonDocument would keep the last one and drop the
/// other without a word); `trouble` then begins with "file:line: character column: ".
bool parseJson(const std::string& text, const QString& fileName, QJsonDocument& document, QString& trouble);

/// The text as a JSON string in its quotation marks: escapes what RFC 8259, section 7, asks for and no more, so that names in any script
/// stay readable.
std::string quotedJson(std::string_view text);

} // namespace rungwright
