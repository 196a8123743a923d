// SPDX-License-Identifier: GPL-3.0-or-later
#include "portfolio_page.h"

#include "file_names.h"
#include "questions.h"
#include "ui_portfolio_page.h"

namespace rungwright
{

PortfolioPage::PortfolioPage(Worklist& list, Workbench& bench, Questions& questions, QWidget* parent) :
    QWidget(parent), m_list(list), m_ui(std::make_unique<Ui::PortfolioPage>())
{
    m_ui->setupUi(this);
    PortfolioPlot* plot = m_ui->portfolioPlot;
    plot->setSources(&list, &bench);
    plot->setAskPath([&questions](QWidget* over, const QString& title, const QString& suggestion, const QString& filter) {
        const QString path = questions.savePath(over, title, suggestion, filter);
        return path.isEmpty() ? path : withSuffix(path, QStringLiteral("png"));
    });
    connect(plot, &PortfolioPlot::tierChosen, this, &PortfolioPage::tierChosen);
    connect(plot, &PaperPlot::told, this, &PortfolioPage::told);
    connect(plot, &PaperPlot::saveFailed, this,
            [this, &questions](const QString& reason) { questions.tell(this, tr("The picture was not saved."), reason); });
    connect(m_ui->thresholdsButton, &QPushButton::clicked, this, &PortfolioPage::thresholdsWanted);
    connect(&list, &Worklist::reset, this, &PortfolioPage::showSummary);
    connect(&list, &Worklist::rowsChanged, this, [this] {
        if (!m_list.measuring())
            showSummary();
    });
    showSummary();
}

PortfolioPage::~PortfolioPage() = default;

void PortfolioPage::showSummary() { m_ui->portfolioSummary->setText(m_ui->portfolioPlot->summaryText()); }

} // namespace rungwright
