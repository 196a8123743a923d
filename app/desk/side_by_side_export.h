// SPDX-License-Identifier: GPL-3.0-or-later
// The comparison's ways out: the picture and the table, to the clipboard or into a file.
#pragma once

#include "side_by_side_model.h"
#include "unit_prices_model.h"
#include "workbench.h"

#include <QObject>

class QMenu;
class QTableView;

namespace rungwright
{

class PaperPlot;
class Questions;

class SideBySideExport : public QObject
{
    Q_OBJECT
public:
    /// What is exported, and how.
    struct From {
        const Workbench& bench;
        const SideBySideModel& model;
        const UnitPricesModel& unitPrices;
        QTableView& table;
        QTableView& unitTable;
        PaperPlot& plot;
        Questions& questions;
    };

    /// Questions are asked over `page`, which owns this object.
    SideBySideExport(const From& from, QWidget* page);

    /// Adds the entries: copy and save the picture, copy and save the table, and the prices by unit.
    void fill(QMenu& menu);

signals:
    void told(const QString& sentence);

private:
    void copyPicture();
    void savePicture();
    void copyTable();
    void saveTable();
    void copyUnitPrices();
    void saveUnitPrices();
    /// A file to write; empty when given up.
    QString askPath(const QString& title, const QString& suffix, const QString& filter);
    /// Says that the file stands, or asks the user to look at why it does not.
    void report(const Outcome<bool>& written, const QString& good, const QString& bad);

    From m_from;
    QWidget* m_page;
};

} // namespace rungwright
