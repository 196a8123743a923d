// SPDX-License-Identifier: GPL-3.0-or-later
// Where the header of a mapped list ends and its rows begin.
#pragma once

#include "mapping.h"

#include <QStringList>

#include <optional>
#include <span>
#include <string_view>

namespace rungwright
{

/// Is every cell empty?
bool isEmptyRecord(std::span<const std::string_view> cells);

/// The cells as texts.
QStringList cellTexts(std::span<const std::string_view> cells);

/// Is fed every record from the first on.
class HeaderGate
{
public:
    enum class Place : unsigned char { above, header, headerEnds, row };

    explicit HeaderGate(const ImportMapping& layout) : m_first(layout.headerRow), m_last(layout.headerRow + layout.headerLines - 1) {}

    Place pass(std::span<const std::string_view> cells);
    /// Good from headerEnds on.
    const QStringList& headers() const { return m_headers; }
    /// Records passed so far.
    qint64 records() const { return m_record; }

private:
    qint64 m_first, m_last;
    qint64 m_record = 0;
    QStringList m_upper;
    QStringList m_headers;
};

} // namespace rungwright
