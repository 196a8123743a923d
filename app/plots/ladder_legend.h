// SPDX-License-Identifier: GPL-3.0-or-later
// The ladder plot's heading: what the price axis counts, which ladder is which, what the grips mean.
#pragma once

#include "rung_painter.h"

#include <QFont>
#include <QString>

#include <vector>

namespace rungwright
{

class LadderLegend
{
public:
    /// `worked` is the ladder on the bench. `behind` stands for the current ladder's trace; empty when none is drawn.
    void setLadders(const QString& title, const QString& worked, const QString& behind);
    /// Which grips need a word: those the tier has.
    void setKey(bool reserved, bool closed, bool locked);

    /// One row when everything fits beside the title; the key goes on further rows when it does not.
    int rows(double width, const QFont& plain, const QFont& strong) const;
    /// Height of so many rows.
    static double height(int rows, const QFont& plain);
    /// From `where`'s upper left corner; its height does not matter.
    void paint(QPainter& painter, const QRectF& where, const QFont& plain, const QFont& strong, const Look& look) const;

private:
    struct Entry {
        enum class Glyph { worked, behind, rung } glyph = Glyph::rung;
        QString text;
        RungMark mark;
    };
    struct Placed {
        const Entry* entry;
        double x;
        int row;
        double textWidth;
    };
    std::vector<Placed> flow(double width, const QFont& plain, const QFont& strong) const;

    QString m_title;
    std::vector<Entry> m_ladders;
    std::vector<Entry> m_key;
};

} // namespace rungwright
