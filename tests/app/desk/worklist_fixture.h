// SPDX-License-Identifier: GPL-3.0-or-later
// A desk with an invented portfolio on it, for tests of its worklist.
#pragma once

#include "app/session/invented_portfolio.h"
#include "desk_fixture.h"
#include "worklist_panel.h"

#include <memory>

namespace rungwright
{

class WorklistFixture : public QObject
{
protected:
    DeskFixture& desk() { return *m_desk; }
    MainWindow& window() { return *m_desk->window; }
    Document& document() { return window().document(); }
    WorklistPanel& panel() { return window().worklist(); }
    WorklistModel& model() { return panel().model(); }
    QTableView& table() { return panel().table(); }
    void begin(int tiers, int units = 16)
    {
        const QString path = desk().folder.filePath(QStringLiteral("portfolio-%1.rungs.json").arg(tiers));
        Document writer;
        writer.begin(inventedPortfolio(tiers, units), {}, false);
        QVERIFY(writer.saveTo(path).ok());
        QVERIFY(desk().open(path));
        QTRY_VERIFY(!model().list().measuring());
        QCoreApplication::processEvents();
    }
    QPoint cell(int row, int column) { return table().visualRect(model().index(row, column)).center(); }
    void key(Qt::Key k, Qt::KeyboardModifiers m = {}) { QTest::keyClick(&window(), k, m); }

    void start() { m_desk = std::make_unique<DeskFixture>(); }
    void end() { m_desk.reset(); }

private:
    std::unique_ptr<DeskFixture> m_desk;
};

} // namespace rungwright
