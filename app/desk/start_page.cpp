// SPDX-License-Identifier: GPL-3.0-or-later
#include "start_page.h"

#include "ui_start_page.h"

#include <QFileInfo>

namespace rungwright
{

StartPage::StartPage(QWidget* parent) : QWidget(parent), m_ui(std::make_unique<Ui::StartPage>())
{
    m_ui->setupUi(this);
    QFont title = font();
    title.setPointSizeF(title.pointSizeF() * 1.8);
    title.setWeight(QFont::DemiBold);
    m_ui->startTitle->setFont(title);
    connect(m_ui->startImport, &QPushButton::clicked, this, &StartPage::importWanted);
    connect(m_ui->startOpen, &QPushButton::clicked, this, &StartPage::openWanted);
    connect(m_ui->startSample, &QPushButton::clicked, this, &StartPage::sampleWanted);
    connect(m_ui->startRecent, &QListWidget::itemActivated, this,
            [this](const QListWidgetItem* item) { emit recentWanted(item->data(Qt::UserRole).toString()); });
    setRecent({});
}

StartPage::~StartPage() = default;

void StartPage::setRecent(const QStringList& paths)
{
    m_ui->startRecent->clear();
    for (const QString& path : paths) {
        auto* item = new QListWidgetItem(QFileInfo(path).fileName(), m_ui->startRecent);
        item->setData(Qt::UserRole, path);
        item->setToolTip(path);
    }
    m_ui->startRecent->setVisible(!paths.isEmpty());
    m_ui->startRecentTitle->setVisible(!paths.isEmpty());
}

} // namespace rungwright
