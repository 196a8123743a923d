// SPDX-License-Identifier: GPL-3.0-or-later
// Whole files in, and whole files out or none at all.
#pragma once

#include "outcome.h"

#include <QByteArray>
#include <QByteArrayView>
#include <QFile>
#include <QString>

#include <functional>

namespace rungwright
{

/// Everything in the file; refused beyond `most` bytes. The message starts with the path and gives the system's reason.
Outcome<QByteArray> readWhole(const QString& path, qint64 most);
/// The same from a file that is open already, a pipe for one.
Outcome<QByteArray> readRest(QFile& file, qint64 most);

/// Replaces the file in one step (QSaveFile: written beside it, synced, renamed). On any error the old file stands, and the message says
/// so and gives the system's reason. What is there and is no regular file is never replaced.
Outcome<bool> writeWhole(const QString& path, const QByteArray& bytes);
/// The same for bytes that come piece by piece; an empty piece is the end.
using NextPiece = std::function<QByteArrayView()>;
Outcome<bool> writeWhole(const QString& path, const NextPiece& next);

} // namespace rungwright
