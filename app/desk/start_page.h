// SPDX-License-Identifier: GPL-3.0-or-later
// What stands in the window while no scenario is open: three ways to begin.
#pragma once

#include <QStringList>
#include <QWidget>

#include <memory>

namespace Ui
{
class StartPage;
}

namespace rungwright
{

class StartPage : public QWidget
{
    Q_OBJECT
public:
    explicit StartPage(QWidget* parent = nullptr);
    ~StartPage() override;
    void setRecent(const QStringList& paths);

signals:
    void importWanted();
    void openWanted();
    void sampleWanted();
    void recentWanted(const QString& path);

private:
    std::unique_ptr<Ui::StartPage> m_ui;
};

} // namespace rungwright
