// SPDX-License-Identifier: GPL-3.0-or-later
// The way out for prices: what the sheet will hold, what should be seen before it leaves, and the file.
#pragma once

#include "document.h"
#include "sheet_model.h"

#include <QDialog>

#include <memory>

namespace Ui
{
class SheetDialog;
}

namespace rungwright
{

class Questions;

/// Shows the ladder as it was when the dialog was made, so that what is written is what was looked at. For open(): nothing blocks but the
/// question for the file's name.
class SheetDialog : public QDialog
{
    Q_OBJECT
public:
    /// `candidate` -1 = the current ladder. `questions` outlives the dialog.
    SheetDialog(const Document& document, int tier, int candidate, Questions& questions, QWidget* parent = nullptr);
    ~SheetDialog() override;

    /// What was handed over, once it was: for Document::recordSignedSheet().
    const SignedSheet& handedOver() const { return m_signed; }

signals:
    /// The sheet has left for the first time; once more, to another file, says nothing new.
    void leftTheTool();
    /// Written, read again and found equal.
    void saved(const QString& path);
    /// The same, or why not, in one sentence for the status bar.
    void told(const QString& sentence);

protected:
    void changeEvent(QEvent* event) override;

private:
    void showTitle(const TierCase& tierCase, int candidate);
    void showSummary(const TierCase& tierCase, const std::vector<Price>& prices);
    void dress();
    void save();
    void showResult(const QString& sentence, bool good);

    Questions& m_questions;
    Currency m_currency;
    PriceRules m_rules;
    std::vector<SheetRow> m_rows; ///< In the order of the file.
    SignedSheet m_signed;         ///< Without a time until it is handed over.
    QString m_suggestion;
    SheetModel m_model;
    SheetFilter m_filter;
    std::unique_ptr<Ui::SheetDialog> m_ui;
};

} // namespace rungwright
