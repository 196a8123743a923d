// SPDX-License-Identifier: GPL-3.0-or-later
// The strip of candidates below the bench.
#pragma once

#include "candidates_model.h"

#include <QWidget>

#include <memory>

namespace Ui
{
class CandidatesPanel;
}

namespace rungwright
{

class Questions;

class CandidatesPanel : public QWidget
{
    Q_OBJECT
public:
    explicit CandidatesPanel(QWidget* parent = nullptr);
    ~CandidatesPanel() override;

    /// Called once, before the panel is shown.
    void attach(Workbench& bench, Questions& questions);

    void copyWorked();
    void renameWorked();
    void noteWorked();
    void discardWorked();

signals:
    /// The user wants the price sheet of this candidate.
    void sheetWanted(int candidate);

private:
    void onBenchReset();
    void showButtons();

    Workbench* m_bench = nullptr;
    Questions* m_questions = nullptr;
    std::unique_ptr<CandidatesModel> m_model;
    std::unique_ptr<Ui::CandidatesPanel> m_ui;
    bool m_followingBench = false;
};

} // namespace rungwright
