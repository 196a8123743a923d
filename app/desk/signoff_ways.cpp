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

bool SignOffPage::trialOn() const { return m_bench.gesture() == Workbench::Gesture::trial; }

bool SignOffPage::changedSince(const std::shared_ptr<const SignOffCase>& asked)
{
    // While the page is hidden the case is only marked as stale.
    if (!m_stale && m_case && m_case == asked)
        return false;
    showResult(tr("Not saved: the ladder changed meanwhile."), false);
    return true;
}

QString SignOffPage::pathFor(const QString& title, const QString& suffix, const QString& filter)
{
    // The question has an event loop of its own: a file may finish loading, a list be refreshed.
    const std::shared_ptr<const SignOffCase> asked = m_case;
    const QString path = m_questions.savePath(this, title, suggestion(suffix), filter);
    return path.isEmpty() || changedSince(asked) ? QString() : withSuffix(path, suffix);
}

QString SignOffPage::sheetPath() { return pathFor(tr("Save the price sheet"), QStringLiteral("csv"), tr("Price sheet (*.csv)")); }

bool SignOffPage::sheetTo(const QString& path)
{
    const Outcome<bool> written = saveSheet(m_case->rows, m_case->currency, path);
    if (!written.ok())
        showResult(tr("Not saved: %1").arg(QString::fromStdString(written.trouble())), false);
    return written.ok();
}

void SignOffPage::writeSheet()
{
    if (!m_case)
        return;
    if (trialOn()) {
        showResult(tr("No price sheet written: a ladder is being tried on the bench. Keep it or give it up first."), false);
        return;
    }
    const QString path = sheetPath();
    if (path.isEmpty() || !sheetTo(path))
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
    if (trialOn()) {
        showResult(tr("No report written: a ladder is being tried on the bench. Keep it or give it up first."), false);
        return;
    }
    const QString path = pathFor(tr("Save the report"), QStringLiteral("pdf"), tr("PDF document (*.pdf)"));
    if (path.isEmpty())
        return;
    const Outcome<bool> written = writeReport(*m_case, frame(), path);
    if (written.ok())
        showResult(tr("Report written: %1").arg(path), true);
    else
        showResult(tr("Not saved: %1").arg(QString::fromStdString(written.trouble())), false);
}

QString SignOffPage::hindrance()
{
    if (trialOn())
        return tr("Not signed off: a ladder is being tried on the bench. Keep it or give it up first.");
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
    const std::shared_ptr<const SignOffCase> asked = m_case;
    // Being saved changes nothing that is signed, but views may be told so.
    m_signing = true;
    const QString why = hindrance();
    m_signing = false;
    if (!why.isEmpty()) {
        showResult(why, false);
        return;
    }
    if (changedSince(asked))
        return;
    const QString path = sheetPath();
    if (path.isEmpty())
        return;
    // The ledger first: no price leaves by a sign-off that cannot be entered.
    const QString ledgerPath = ledgerPathFor(m_bench.document().path());
    Outcome<Ledger> opened = Ledger::open(ledgerPath, Ledger::For::writing);
    if (!opened.ok()) {
        showResult(tr("Not signed off, and no price sheet written: %1").arg(QString::fromStdString(opened.trouble())), false);
        return;
    }
    if (!sheetTo(path))
        return;
    Ledger ledger = std::move(opened).value();
    SignedSheet sheet = m_case->sheet;
    sheet.whenUtc = QDateTime::currentDateTimeUtc().toString(Qt::ISODate).toStdString();
    const QString note = m_ui->noteEdit->text().trimmed();
    const SignOff entry = ledgerEntry(*m_case, m_ui->whoEdit->text().trimmed(), note, sheet.whenUtc);
    m_signing = true;
    m_bench.document().recordSignedSheet(m_bench.tier(), std::move(sheet));
    m_signing = false;
    if (const auto id = ledger.record(entry); !id.ok()) {
        showResult(tr("The price sheet stands (%1), but the ledger has no entry of it: %2 Sign off again when that is mended.")
                       .arg(path, QString::fromStdString(id.trouble())),
                   false);
        return;
    }
    m_signedNote = note;
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
