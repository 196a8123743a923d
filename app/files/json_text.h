// SPDX-License-Identifier: GPL-3.0-or-later
// JSON text to a document: its troubles by line and column, and keys that are written twice.
#pragma once

#include <QJsonDocument>
#include <QString>

#include <string>

namespace rungwright
{

/// Parses UTF-8 text. False when it is not JSON, or when an object holds a key twice (QJsonDocument would keep the last one and drop the
/// other without a word); `trouble` then begins with "file:line: character column: ".
bool parseJson(const std::string& text, const QString& fileName, QJsonDocument& document, QString& trouble);

} // namespace rungwright
