// SPDX-License-Identifier: GPL-3.0-or-later
// What of the worklist leaves the tool, the caution that goes with it, and the file.
#pragma once

#include "worklist.h"

#include <QDialog>

#include <memory>
#include <vector>

namespace Ui
{
class WorklistExportDialog;
}

namespace rungwright
{

class Questions;

class WorklistExportDialog : public QDialog
{
    Q_OBJECT
public:
    /// Writes `tiers` in their order. The other two outlive the dialog.
    WorklistExportDialog(const Worklist& list, std::vector<int> tiers, Questions& questions, QWidget* parent = nullptr);
    ~WorklistExportDialog() override;

signals:
    /// A sentence for the status bar.
    void told(const QString& sentence);

private:
    void save();
    void showSummary();

    const Worklist& m_list;
    std::vector<int> m_tiers;
    Questions& m_questions;
    std::unique_ptr<Ui::WorklistExportDialog> m_ui;
};

} // namespace rungwright
