// SPDX-License-Identifier: GPL-3.0-or-later
// The sign-off page's ways out: sheet, report, and both with an entry in the ledger.
#include "file_names.h"
#include "ledger.h"
#include "report_pdf.h"
#include "signoff_page.h"
#include "signoff_record.h"
#include "ui_signoff_page.h"
#include "wording.h"

#include <QAccessible>
#include <QDateTime>
#include <QFileInfo>
#include <QLocale>

namespace rungwright
{

namespace
{

const auto kSigner = QStringLiteral("signoff/who");

} // namespace

void SignOffPage::prepareWays()
{
    m_ui->whoEdit->setText(m_settings.value(kSigner).toString());
    connect(m_ui->whoEdit, &QLineEdit::editingFinished, this, [this] { m_settings.setValue(kSigner, m_ui->whoEdit->text().trimmed()); });
    m_ui->paperBox->addItem(tr("A4"), static_cast<int>(QPageSize::A4));
    m_ui->paperBox->addItem(tr("Letter"), static_cast<int>(QPageSize::Letter));
    m_ui->paperBox->setCurrentIndex(m_ui->paperBox->findData(static_cast<int>(paperOf(QLocale()))));
    connect(m_ui->sheetButton, &QPushButton::clicked, this, &SignOffPage::writeSheet);
    connect(m_ui->reportButton, &QPushButton::clicked, this, &SignOffPage::writeReportFile);
    connect(m_ui->signButton, &QPushButton::clicked, this, &SignOffPage::signOff);
}

QString SignOffPage::suggestion(const QString& suffix) const
{
    return fileNameFrom({QString::fromStdString(m_case->tier.site), QString::fromStdString(m_case->tier.name), m_case->ladder}, suffix);
}

ReportFrame SignOffPage::frame() const
{
    const QDateTime now = QDateTime::currentDateTime();
    ReportFrame frame;
    frame.who = m_ui->whoEdit->text().trimmed();
    frame.note = m_ui->noteEdit->text().trimmed();
    frame.when =
        tr("%1 (UTC %2)").arg(QLocale().toString(now, QLocale::ShortFormat), now.toUTC().toString(QStringLiteral("yyyy-MM-dd HH:mm")));
    frame.places = places();
    frame.paper = static_cast<QPageSize::PageSizeId>(m_ui->paperBox->currentData().toInt());
    return frame;
}

QString SignOffPage::sheetTo()
{
    const QString path =
        m_questions.savePath(this, tr("Save the price sheet"), suggestion(QStringLiteral("csv")), tr("Price sheet (*.csv)"));
    if (path.isEmpty())
        return {};
    const QString target = withSuffix(path, QStringLiteral("csv"));
    const Outcome<bool> written = saveSheet(m_case->rows, m_case->currency, target);
    if (!written.ok()) {
        showResult(tr("Not saved: %1").arg(QString::fromStdString(written.trouble())), false);
        return {};
    }
    return target;
}

void SignOffPage::writeSheet()
{
    if (!m_case)
        return;
    const QString path = sheetTo();
    if (path.isEmpty())
        return;
    // Prices have left the tool: that is remembered, signed or not.
    SignedSheet sheet = m_case->sheet;
    sheet.whenUtc = QDateTime::currentDateTimeUtc().toString(Qt::ISODate).toStdString();
    m_signing = true;
    m_bench.document().recordSignedSheet(m_bench.tier(), std::move(sheet));
    m_signing = false;
    showResult(tr("Price sheet written and read back: %1. Not signed off: nothing stands in the ledger.").arg(path), true);
}

void SignOffPage::writeReportFile()
{
    if (!m_case)
        return;
    const QString path = m_questions.savePath(this, tr("Save the report"), suggestion(QStringLiteral("pdf")), tr("PDF document (*.pdf)"));
    if (path.isEmpty())
        return;
    const QString target = withSuffix(path, QStringLiteral("pdf"));
    const Outcome<bool> written = writeReport(*m_case, frame(), target);
    if (written.ok())
        showResult(tr("Report written: %1").arg(target), true);
    else
        showResult(tr("Not saved: %1").arg(QString::fromStdString(written.trouble())), false);
}

QString SignOffPage::hindrance()
{
    if (m_ui->whoEdit->text().trimmed().isEmpty()) {
        m_ui->whoEdit->setFocus();
        return tr("Not signed off: say who signs.");
    }
    if (!ledgerPathFor(m_bench.document().path()).isEmpty())
        return {};
    const int answer = m_questions.choose(this, tr("Save the scenario before signing off?"),
                                          tr("The price ledger lies beside the scenario's file, and this scenario has none yet."),
                                          {tr("Save"), tr("Not now")});
    if (answer == 0 && m_saveFirst() && !ledgerPathFor(m_bench.document().path()).isEmpty())
        return {};
    return tr("Not signed off: the ledger lies beside the scenario's file, and this scenario has none yet.");
}

void SignOffPage::signOff()
{
    if (!m_case)
        return;
    m_settings.setValue(kSigner, m_ui->whoEdit->text().trimmed());
    // Being saved changes nothing that is signed, but views may be told so.
    m_signing = true;
    const QString why = hindrance();
    m_signing = false;
    if (!why.isEmpty()) {
        showResult(why, false);
        return;
    }
    const QString path = sheetTo();
    if (path.isEmpty())
        return;
    SignedSheet sheet = m_case->sheet;
    sheet.whenUtc = QDateTime::currentDateTimeUtc().toString(Qt::ISODate).toStdString();
    const SignOff entry = ledgerEntry(*m_case, m_ui->whoEdit->text().trimmed(), m_ui->noteEdit->text().trimmed(), sheet.whenUtc);
    m_signing = true;
    m_bench.document().recordSignedSheet(m_bench.tier(), std::move(sheet));
    m_signing = false;

    const QString ledgerPath = ledgerPathFor(m_bench.document().path());
    QString trouble;
    if (Outcome<Ledger> opened = Ledger::open(ledgerPath, Ledger::For::writing); opened.ok()) {
        Ledger ledger = std::move(opened).value();
        if (const auto id = ledger.record(entry); !id.ok())
            trouble = QString::fromStdString(id.trouble());
    } else {
        trouble = QString::fromStdString(opened.trouble());
    }
    if (!trouble.isEmpty()) {
        showResult(
            tr("The price sheet stands (%1), but the ledger has no entry of it: %2 Sign off again when that is mended.").arg(path, trouble),
            false);
        return;
    }
    m_ui->noteEdit->clear();
    showResult(tr("Signed off: %1. Entered in the ledger %2.").arg(path, QFileInfo(ledgerPath).fileName()), true);
    emit recorded(ledgerPath);
}

void SignOffPage::showResult(const QString& sentence, bool good)
{
    m_ui->signOffResult->setText((good ? QStringLiteral("✓ ") : QStringLiteral("⚠ ")) + sentence);
    m_ui->signOffResult->show();
    QAccessibleEvent alert(m_ui->signOffResult, QAccessible::Alert);
    QAccessible::updateAccessibility(&alert);
    emit told(sentence);
}

} // namespace rungwright
