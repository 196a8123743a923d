// SPDX-License-Identifier: GPL-3.0-or-later
// Trade-off: what a smaller gap takes, in change of prices or of the asking total, and the way to a ladder on the curve.
#pragma once

#include "frontier_trace.h"
#include "workbench.h"

#include <QFutureWatcher>
#include <QWidget>

#include <memory>
#include <optional>
#include <string>
#include <tuple>

namespace Ui
{
class FrontierPage;
}

namespace rungwright
{

class Questions;

class FrontierPage : public QWidget
{
    Q_OBJECT
public:
    /// Both outlive the page.
    FrontierPage(Workbench& bench, Questions& questions, QWidget* parent = nullptr);
    ~FrontierPage() override;

    /// Of more units than this the curve is traced off the window's thread.
    static constexpr std::size_t kAtOnce = 800;
    bool tracing() const { return m_tracing; }

signals:
    /// A sentence for the status bar.
    void told(const QString& sentence);

protected:
    void showEvent(QShowEvent* event) override;

private:
    using Against = FrontierPicture::Against;

    void servePlot();
    void refresh();
    void trace();
    void showTraced(FrontierTraced traced);
    QString sentence(const FrontierPicture& picture) const;
    QString emptyText(const LeastChangeAnswer& why) const;
    void takePoint(int point);
    void saveTable();

    Workbench& m_bench;
    Questions& m_questions;
    FrontierAsk m_ask; ///< What is shown, or being traced.
    QFutureWatcher<FrontierTraced> m_watcher;
    std::optional<std::tuple<std::string, std::string, OrderKept>> m_orderOf; ///< Site, tier, and what its rules say of the order.
    bool m_tracing = false;
    bool m_again = false; ///< Something changed while a curve was being traced.
    bool m_stale = true;  ///< Something changed while the page was hidden.
    LeastChange m_solver;
    std::unique_ptr<Ui::FrontierPage> m_ui;
};

} // namespace rungwright
