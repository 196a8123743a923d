// SPDX-License-Identifier: GPL-3.0-or-later
// The way out for prices: the ladder, what it changes, what should be looked at, who signs, and the files.
#pragma once

#include "questions.h"
#include "sheet_model.h"
#include "signoff_case.h"
#include "workbench.h"

#include <QSettings>
#include <QWidget>

#include <functional>
#include <memory>
#include <optional>

class QCheckBox;
class QLabel;

namespace Ui
{
class SignOffPage;
}

namespace rungwright
{

struct ReportFrame;

/// Shows the chosen ladder of the tier on the bench, or else the one worked on, or another the user picks here. Who signs, the
/// jurisdictions and the least time at the floor are the user's and kept in the settings.
class SignOffPage : public QWidget
{
    Q_OBJECT
public:
    /// All outlive the page. `saveFirst` gives the scenario a file, when the user wants it to; false when it has none afterwards.
    SignOffPage(Workbench& bench, Questions& questions, QSettings& settings, std::function<bool()> saveFirst, QWidget* parent = nullptr);
    ~SignOffPage() override;

    /// What is shown; nothing while there is nothing to sign.
    const SignOffCase* shown() const { return m_case.get(); }

signals:
    /// A sentence for the status bar.
    void told(const QString& sentence);
    /// An entry stands in the ledger at `path`.
    void recorded(const QString& path);

protected:
    void showEvent(QShowEvent* event) override;
    void changeEvent(QEvent* event) override;

private:
    void prepareTable();
    void prepareChecks();
    void preparePlaces();
    void prepareWays();
    void dress();
    void refresh();
    void showEmpty();
    void showLadderBox();
    void showCase();
    void showTitle();
    void showChecks();
    void showReminders();
    int candidateToShow() const;
    QStringList places() const;

    void writeSheet();
    void writeReportFile();
    void signOff();
    /// Asks where to write; nothing when it is given up, or when another case is shown by then, which is said.
    QString pathFor(const QString& title, const QString& suffix, const QString& filter);
    QString sheetPath();
    /// False when nothing was written, which is said.
    bool sheetTo(const QString& path);
    /// Whether what is shown is no longer what was asked about; says so.
    bool changedSince(const std::shared_ptr<const SignOffCase>& asked);
    /// A ladder is tried on the bench: what is shown here is not what is seen there, and edits would end the trial.
    bool trialOn() const;
    /// Why nothing can be signed; empty when it can.
    QString hindrance();
    QString suggestion(const QString& suffix) const;
    ReportFrame frame() const;
    void showResult(const QString& sentence, bool good);

    Workbench& m_bench;
    Questions& m_questions;
    QSettings& m_settings;
    std::function<bool()> m_saveFirst;
    std::shared_ptr<const SignOffCase> m_case; ///< Shared, so that one asked about can be told from one that came meanwhile.
    std::unique_ptr<SheetModel> m_model;
    std::unique_ptr<SheetFilter> m_filter;
    std::vector<QCheckBox*> m_places; ///< In the order of jurisdictions().
    struct CheckLine {
        QLabel* outcome;
        QLabel* words;
    };
    std::vector<CheckLine> m_checkLines;
    std::optional<std::string> m_pick; ///< The ladder picked here, by name; empty = current.
    std::string m_site;
    std::string m_tier;
    std::optional<int> m_chosen; ///< The tier's choice when the pick was made.
    bool m_stale = true;
    QString m_signedNote;   ///< The last note entered in the ledger: it stays for the report, and goes with its tier.
    bool m_signing = false; ///< What it says of itself stays while its own edits come back.
    std::unique_ptr<Ui::SignOffPage> m_ui;
};

} // namespace rungwright
