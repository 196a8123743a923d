// SPDX-License-Identifier: GPL-3.0-or-later
#include "reshape_panel.h"

#include "least_change_form.h"
#include "shape_form.h"
#include "ui_reshape_panel.h"

#include <QKeyEvent>

#include <algorithm>

namespace rungwright
{

ReshapePanel::ReshapePanel(Workbench& bench, QWidget* parent) : QWidget(parent), m_bench(bench), m_ui(std::make_unique<Ui::ReshapePanel>())
{
    m_ui->setupUi(this);
    m_ui->leastChangeForm->attach(bench);
    m_ui->shapeForm->attach(bench);
    connect(m_ui->keepButton, &QPushButton::clicked, &bench, &Workbench::finishGesture);
    connect(m_ui->giveUpButton, &QPushButton::clicked, &bench, &Workbench::giveUpGesture);
    // What one tab tried is not what the other one shows.
    connect(m_ui->reshapeTabs, &QTabWidget::currentChanged, this, [this] {
        if (m_bench.gesture() == Workbench::Gesture::trial)
            m_bench.giveUpGesture();
    });
    connect(&bench, &Workbench::gestureChanged, this, &ReshapePanel::showKeep);
    connect(&bench, &Workbench::moving, this, &ReshapePanel::showKeep);
    connect(&bench, &Workbench::reset, this, &ReshapePanel::showKeep);
    showKeep();
}

ReshapePanel::~ReshapePanel() = default;

LeastChangeForm& ReshapePanel::leastChange() { return *m_ui->leastChangeForm; }

ShapeForm& ReshapePanel::shape() { return *m_ui->shapeForm; }

void ReshapePanel::showLeastChange()
{
    m_ui->reshapeTabs->setCurrentWidget(m_ui->leastChangeForm);
    m_ui->leastChangeForm->focusTarget();
}

void ReshapePanel::showShape()
{
    m_ui->reshapeTabs->setCurrentWidget(m_ui->shapeForm);
    m_ui->shapeForm->focusFirst();
}

bool ReshapePanel::somethingToKeep() const
{
    const auto tried = m_bench.workedPrices();
    const auto today = m_bench.currentPrices();
    return m_bench.gesture() == Workbench::Gesture::trial && !std::equal(tried.begin(), tried.end(), today.begin(), today.end());
}

void ReshapePanel::showKeep()
{
    m_ui->keepButton->setEnabled(somethingToKeep());
    m_ui->giveUpButton->setEnabled(m_bench.gesture() == Workbench::Gesture::trial);
}

void ReshapePanel::keyPressEvent(QKeyEvent* event)
{
    // What a field or a button takes for itself does not come here.
    const bool enter = event->key() == Qt::Key_Return || event->key() == Qt::Key_Enter;
    if (enter && somethingToKeep())
        m_bench.finishGesture();
    else if (event->key() == Qt::Key_Escape && m_bench.gesture() == Workbench::Gesture::trial)
        m_bench.giveUpGesture();
    else
        QWidget::keyPressEvent(event);
}

} // namespace rungwright
