// SPDX-License-Identifier: GPL-3.0-or-later
// What a new list would change in the scenario, before anything changes.
#pragma once

#include "long_work.h"
#include "refresh_table.h"
#include "table_text.h"

#include <QDialog>

#include <memory>
#include <vector>

namespace Ui
{
class RefreshDialog;
}

namespace rungwright
{

class Questions;

/// On the left what changes, counted; on the right the lines of what is chosen there. Accepted = refresh; the dialog itself changes
/// nothing.
class RefreshDialog : public QDialog
{
    Q_OBJECT
public:
    /// The plan outlives the dialog, and so does `questions`, which asks where a table is to be saved (nullptr: the usual file dialog).
    /// `listName` = the file's name, with or without its folder. `warnings` = what of the list was not taken; stands above all else.
    RefreshDialog(const RefreshPlan& plan, const Currency& currency, const QString& listName, QWidget* parent = nullptr,
                  Questions* questions = nullptr, const QStringList& warnings = {});
    ~RefreshDialog() override;

protected:
    void changeEvent(QEvent* event) override;
    void showEvent(QShowEvent* event) override;

private:
    void showSummary(const RefreshPlan& plan);
    void fillTopics();
    void showTopic(int row);
    void fitColumns();
    void dress();
    void copy(CopyPart part);
    void save();
    void showResult(const QString& sentence);

    std::unique_ptr<Questions> m_ownQuestions;
    Questions* m_questions;
    const RefreshPlan& m_plan;
    Currency m_currency;
    QString m_listName; ///< Without its folder.
    RefreshTable m_table;
    std::vector<RefreshTopic> m_topics; ///< By row of the list.
    std::unique_ptr<Ui::RefreshDialog> m_ui;
    LongWork m_work;
};

} // namespace rungwright
