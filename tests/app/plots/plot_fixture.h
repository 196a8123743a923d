// SPDX-License-Identifier: GPL-3.0-or-later
// A tier on a shown bench, mice and keys for it, and an ear for complaints.
#pragma once

#include "bench_plots.h"
#include "invented_tiers.h"

#include <QApplication>
#include <QMouseEvent>
#include <QTest>

namespace rungwright
{

/// Collects warnings of any origin, and the debug messages by which QCustomPlot complains.
class Complaints
{
public:
    Complaints()
    {
        s_heard.clear();
        m_before = qInstallMessageHandler(&Complaints::hear);
        s_next = m_before;
    }
    ~Complaints() { qInstallMessageHandler(m_before); }
    QStringList heard() const { return s_heard; }

private:
    static void hear(QtMsgType type, const QMessageLogContext& context, const QString& message)
    {
        const bool complaint = type == QtWarningMsg || type == QtCriticalMsg || message.contains(QLatin1String("QCP")) ||
                               message.contains(QLatin1String("QCustomPlot"));
        if (complaint)
            s_heard << message;
        if (s_next)
            s_next(type, context, message);
    }
    static inline QStringList s_heard;
    static inline QtMessageHandler s_next = nullptr;
    QtMessageHandler m_before = nullptr;
};

/// Counts the paints a widget gets and keeps the last one's region.
class PaintCount : public QObject
{
public:
    explicit PaintCount(QWidget* widget) { widget->installEventFilter(this); }
    bool eventFilter(QObject*, QEvent* event) override
    {
        if (event->type() == QEvent::Paint) {
            ++count;
            region = static_cast<QPaintEvent*>(event)->region();
        }
        return false;
    }
    int count = 0;
    QRegion region;
};

struct OnBench {
    explicit OnBench(Scenario scenario, int candidate = -1, QSize size = {860, 600})
    {
        document.begin(std::move(scenario), {}, true);
        bench.showTier(0, candidate);
        plots.resize(size);
        plots.setWorkbench(&bench);
        plots.show();
        settle();
    }
    /// Lets queued replots and paints happen.
    static void settle()
    {
        for (int i = 0; i < 4; ++i)
            QCoreApplication::processEvents();
        QTest::qWait(1);
    }
    LadderPlot& ladder() { return *plots.ladder(); }
    ThinningPlot& thinning() { return *plots.thinning(); }
    const Tier& tier() { return bench.tierCase()->tier; }

    /// The place-th unit from the cheapest that satisfies `what`.
    template <class What>
    std::uint32_t unitWhere(What what, int nth = 0)
    {
        for (const std::uint32_t unit : bench.columns()) {
            if (what(tier().units[unit]) && nth-- == 0)
                return unit;
        }
        return 0;
    }
    std::uint32_t onOffer(int nth)
    {
        return unitWhere([](const Unit& u) { return u.onOffer(); }, nth);
    }

    Document document;
    Workbench bench{document};
    BenchPlots plots;
};

/// Mouse events as the window system sends them, without moving the real pointer and without letting other events in between.
inline void mouse(QWidget& widget, QEvent::Type type, QPointF at, Qt::MouseButton button, Qt::MouseButtons held,
                  Qt::KeyboardModifiers modifiers = {})
{
    QMouseEvent event(type, at, widget.mapToGlobal(at), button, held, modifiers);
    QApplication::sendEvent(&widget, &event);
}
inline void press(QWidget& widget, QPointF at, Qt::KeyboardModifiers modifiers = {})
{
    mouse(widget, QEvent::MouseButtonPress, at, Qt::LeftButton, Qt::LeftButton, modifiers);
}
inline void moveTo(QWidget& widget, QPointF at, Qt::KeyboardModifiers modifiers = {})
{
    mouse(widget, QEvent::MouseMove, at, Qt::NoButton, Qt::LeftButton, modifiers);
}
inline void hoverTo(QWidget& widget, QPointF at) { mouse(widget, QEvent::MouseMove, at, Qt::NoButton, Qt::NoButton); }
inline void release(QWidget& widget, QPointF at, Qt::KeyboardModifiers modifiers = {})
{
    mouse(widget, QEvent::MouseButtonRelease, at, Qt::LeftButton, Qt::NoButton, modifiers);
}

} // namespace rungwright
