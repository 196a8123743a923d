// SPDX-License-Identifier: GPL-3.0-or-later
// The eight invented exports in tests/app/files/mapped, and the little that a user has to say of each after the proposal.
#pragma once

#include "mapped_list.h"
#include "mapping_preview.h"
#include "mapping_profile.h"

#include <QFile>

#include <array>
#include <set>

namespace rungwright::tests
{

inline const QString kMappedFolder = QStringLiteral(RUNGWRIGHT_TEST_DATA "/app/files/mapped/");
inline constexpr std::array kExports{"1-german", "2-tab", "3-grouped", "4-french", "5-two-lines", "6-odd-order", "7-total", "8-quotes"};

inline QString exportPath(const QString& name) { return kMappedFolder + name + QStringLiteral(".csv"); }
inline QString ownPath(const QString& name) { return kMappedFolder + name + QStringLiteral(".own.csv"); }
inline QString profilePath(const QString& name) { return kMappedFolder + name + QStringLiteral(".mapping.json"); }
inline QString floorsPath(const QString& name)
{
    const QString path = kMappedFolder + name + QStringLiteral(".floors.csv");
    return QFile::exists(path) ? path : QString();
}

/// What no list can tell of itself: a currency that stands nowhere in it, the one site it is of, floors that are in another file.
inline void saySpecial(const QString& name, ImportMapping& mapping)
{
    if (name == QLatin1String("5-two-lines"))
        mapping.from(Column::currency) = ColumnSource::always(QStringLiteral("MXN"));
    if (name == QLatin1String("7-total")) {
        mapping.from(Column::site) = ColumnSource::always(QStringLiteral("Kleidervaart"));
        mapping.from(Column::currency) = ColumnSource::always(QStringLiteral("EUR"));
        mapping.floorsFromFile = true;
    }
}

} // namespace rungwright::tests
