// SPDX-License-Identifier: GPL-3.0-or-later
// All tiers as points: the portfolio picture, what it counts, and the way to the thresholds.
#pragma once

#include "workbench.h"
#include "worklist.h"

#include <QWidget>

#include <memory>

namespace Ui
{
class PortfolioPage;
}

namespace rungwright
{

class Questions;

class PortfolioPage : public QWidget
{
    Q_OBJECT
public:
    /// All outlive the page.
    PortfolioPage(Worklist& list, Workbench& bench, Questions& questions, QWidget* parent = nullptr);
    ~PortfolioPage() override;

signals:
    void tierChosen(int tier);
    void thresholdsWanted();
    /// A sentence for the status bar.
    void told(const QString& sentence);

private:
    void showSummary();

    Worklist& m_list;
    std::unique_ptr<Ui::PortfolioPage> m_ui;
};

} // namespace rungwright
