// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_export_dialog.h"

#include "caution.h"
#include "file_names.h"
#include "questions.h"
#include "ui_worklist_export_dialog.h"
#include "whole_file.h"
#include "worklist_csv.h"

#include <QFileInfo>

#include <utility>

namespace rungwright
{

WorklistExportDialog::WorklistExportDialog(const Worklist& list, std::vector<int> tiers, Questions& questions, QWidget* parent) :
    QDialog(parent), m_list(list), m_tiers(std::move(tiers)), m_questions(questions), m_ui(std::make_unique<Ui::WorklistExportDialog>())
{
    m_ui->setupUi(this);
    m_ui->exportCaution->setText(cautionText());
    m_ui->exportResult->hide();
    connect(m_ui->exportSaveButton, &QPushButton::clicked, this, &WorklistExportDialog::save);
    connect(m_ui->exportCloseButton, &QPushButton::clicked, this, &QDialog::reject);
    connect(&list, &Worklist::measured, this, &WorklistExportDialog::showSummary);
    connect(&list, &Worklist::reset, this, &QDialog::reject); // the tiers are others now
    resize(520, sizeHint().height());
    showSummary();
}

WorklistExportDialog::~WorklistExportDialog() = default;

void WorklistExportDialog::showSummary()
{
    const auto number = [](qint64 n) { return QLocale().toString(n); };
    const auto tiers = static_cast<qint64>(m_tiers.size());
    QString said = tiers == m_list.count() ? tr("All %1 tiers, in the order shown.").arg(number(tiers))
                                           : tr("The %1 tiers of %2 that the filter leaves, in the order shown; those of folded sites too.")
                                                 .arg(number(tiers), number(m_list.count()));
    if (m_list.measuring())
        said += QLatin1Char(' ') + tr("Wait until all are measured.");
    m_ui->exportSummary->setText(said);
    m_ui->exportSaveButton->setEnabled(!m_list.measuring() && tiers > 0);
}

void WorklistExportDialog::save()
{
    const QString base = QFileInfo(m_list.document().displayName()).completeBaseName().section(QLatin1Char('.'), 0, 0);
    const QString chosen = m_questions.savePath(this, tr("Save the worklist"), fileNameFrom({base, tr("worklist")}, QStringLiteral("csv")),
                                                tr("Comma-separated table (*.csv)"));
    if (chosen.isEmpty())
        return;
    const QString path = withSuffix(chosen, QStringLiteral("csv"));
    const Outcome<bool> written = writeWhole(path, worklistCsv(m_list, m_tiers));
    const QString said =
        written.ok() ? tr("✓ Written: %1").arg(path) : tr("⚠ Not saved: %1").arg(QString::fromStdString(written.trouble()));
    m_ui->exportResult->setText(said);
    m_ui->exportResult->show();
    if (written.ok())
        m_ui->exportCloseButton->setFocus();
    emit told(said);
}

} // namespace rungwright
