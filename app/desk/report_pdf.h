// SPDX-License-Identifier: GPL-3.0-or-later
// A ladder on paper, before or after it is signed off: two to four pages to be read, approved and filed.
#pragma once

#include "outcome.h"
#include "signoff_case.h"

#include <QByteArray>
#include <QPageSize>
#include <QStringList>

namespace rungwright
{

/// What stands in a report beside the case itself.
struct ReportFrame {
    QString who; ///< Prepares the report; may be empty. Whether anything is signed off is the ledger's to say.
    QString note;
    QString when;                                ///< As it is to be read: a date and a time in the user's locale, with the zone's offset.
    QStringList places;                          ///< Keys of the jurisdictions whose reminders are wanted, see files/reminders.h.
    QPageSize::PageSizeId paper = QPageSize::A4; ///< A4 or Letter.
};

/// The pages as a PDF file's bytes. Page 1: which ladder of which tier, the key sentence, the figures a choice turns on, ladder and curtain
/// before and after on one price axis. Page 2 and on: checks, reminders, all figures, and the changes, greatest first, as many as fit on
/// four pages; it says how many more the price sheet has. Caution and page number on every page. Text is text, fonts are embedded. Needs a
/// GUI application, as it draws with the plots' own painters. Empty when the device could not be painted on.
QByteArray reportPdf(const SignOffCase& c, const ReportFrame& frame);

/// Whole or not at all.
Outcome<bool> writeReport(const SignOffCase& c, const ReportFrame& frame, const QString& path);

/// Letter where the locale's country is one that uses it (United States, Canada, Mexico and some of their neighbours; common practice, no
/// source), else A4.
QPageSize::PageSizeId paperOf(const QLocale& locale);

} // namespace rungwright
