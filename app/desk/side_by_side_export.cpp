// SPDX-License-Identifier: GPL-3.0-or-later
#include "side_by_side_export.h"

#include "caution.h"
#include "file_names.h"
#include "paper_plot.h"
#include "picture_file.h"
#include "questions.h"
#include "table_text.h"
#include "whole_file.h"

#include <QMenu>

namespace rungwright
{

SideBySideExport::SideBySideExport(const From& from, QWidget* page) : QObject(page), m_from(from), m_page(page)
{
    // The plot's own context menu asks and tells the same way.
    from.plot.setAskPath(
        [&questions = from.questions](QWidget* over, const QString& title, const QString& suggestion, const QString& filter) {
            const QString path = questions.savePath(over, title, suggestion, filter);
            return path.isEmpty() ? path : withSuffix(path, QStringLiteral("png"));
        });
    connect(&from.plot, &PaperPlot::told, this, &SideBySideExport::told);
    connect(&from.plot, &PaperPlot::saveFailed, this,
            [this](const QString& reason) { m_from.questions.tell(m_page, tr("The picture was not saved."), reason); });
}

void SideBySideExport::fill(QMenu& menu)
{
    const auto add = [&](const QString& text, const char* name, void (SideBySideExport::*does)()) {
        menu.addAction(text, this, does)->setObjectName(QLatin1String(name));
    };
    add(tr("Copy &picture"), "copyPictureAction", &SideBySideExport::copyPicture);
    add(tr("&Save picture…"), "savePictureAction", &SideBySideExport::savePicture);
    menu.addSeparator();
    add(tr("Copy &table"), "copyTableAction", &SideBySideExport::copyTable);
    add(tr("Save table as &CSV…"), "saveTableAction", &SideBySideExport::saveTable);
    menu.addSeparator();
    add(tr("Copy prices by &unit"), "copyUnitPricesAction", &SideBySideExport::copyUnitPrices);
    add(tr("Save prices &by unit as CSV…"), "saveUnitPricesAction", &SideBySideExport::saveUnitPrices);
}

void SideBySideExport::copyPicture() { m_from.plot.copyPlot(); }

void SideBySideExport::savePicture()
{
    const QString path = askPath(tr("Save the picture"), QStringLiteral("png"), pictureFilter());
    if (!path.isEmpty())
        report(m_from.plot.savePlot(path), tr("Picture saved: %1").arg(path), tr("The picture was not saved."));
}

void SideBySideExport::copyTable()
{
    rungwright::copyTable(m_from.table, CopyPart::everything);
    emit told(tr("Table copied."));
}

void SideBySideExport::saveTable()
{
    const QString path = askPath(tr("Save the table"), QStringLiteral("csv"), tr("Comma-separated table (*.csv)"));
    if (!path.isEmpty())
        report(writeWhole(path, m_from.model.csv()), tr("Table saved: %1").arg(path), tr("The table was not saved."));
}

void SideBySideExport::copyUnitPrices()
{
    rungwright::copyTable(m_from.unitTable, CopyPart::everything);
    emit told(tr("Prices copied. %1").arg(cautionText()));
}

void SideBySideExport::saveUnitPrices()
{
    const QString path = askPath(tr("Save the prices by unit"), QStringLiteral("csv"), tr("Comma-separated table (*.csv)"));
    if (!path.isEmpty())
        report(writeWhole(path, m_from.unitPrices.csv()), tr("Prices saved: %1. %2").arg(path, cautionText()),
               tr("The prices were not saved."));
}

QString SideBySideExport::askPath(const QString& title, const QString& suffix, const QString& filter)
{
    const Tier& tier = m_from.bench.tierCase()->tier;
    const QString suggestion =
        fileNameFrom({QString::fromStdString(tier.site), QString::fromStdString(tier.name), tr("side by side")}, suffix);
    const QString path = m_from.questions.savePath(m_page, title, suggestion, filter);
    return path.isEmpty() ? path : withSuffix(path, suffix);
}

void SideBySideExport::report(const Outcome<bool>& written, const QString& good, const QString& bad)
{
    if (written.ok())
        emit told(good);
    else
        m_from.questions.tell(m_page, bad, QString::fromStdString(written.trouble()));
}

} // namespace rungwright
