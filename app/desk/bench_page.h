// SPDX-License-Identifier: GPL-3.0-or-later
// The bench: reading line, model, plots, candidates.
#pragma once

#include "workbench.h"

#include <QWidget>

#include <memory>

namespace Ui
{
class BenchPage;
}

namespace rungwright
{

class BenchPlots;
class CandidatesPanel;
class Questions;

class BenchPage : public QWidget
{
    Q_OBJECT
public:
    BenchPage(Workbench& bench, Questions& questions, QWidget* parent = nullptr);
    ~BenchPage() override;

    BenchPlots& plots();
    CandidatesPanel& candidates();

signals:
    /// A sentence for the status bar.
    void told(const QString& sentence);

protected:
    void changeEvent(QEvent* event) override;

private:
    void fillModels();
    void servePictures();
    void showReading();
    void showTitle();
    void showModel();
    void applyModel();
    void askPrice(std::uint32_t unit);
    void dressLabels();

    Workbench& m_bench;
    Questions& m_questions;
    std::unique_ptr<Ui::BenchPage> m_ui;
    bool m_showing = false; ///< The page is being filled from the model: what changes is not the user's doing.
};

} // namespace rungwright
