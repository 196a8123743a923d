// SPDX-License-Identifier: GPL-3.0-or-later
// The Figures in their dock: the table, and below it what the chosen figure means.
#pragma once

#include "figures_model.h"

#include <QWidget>

#include <memory>

namespace Ui
{
class FiguresPanel;
}

namespace rungwright
{

class FiguresPanel : public QWidget
{
    Q_OBJECT
public:
    explicit FiguresPanel(Workbench& bench, QWidget* parent = nullptr);
    ~FiguresPanel() override;

private:
    void explain();

    FiguresModel m_model;
    std::unique_ptr<Ui::FiguresPanel> m_ui;
};

} // namespace rungwright
