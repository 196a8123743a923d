// SPDX-License-Identifier: GPL-3.0-or-later
#include "portfolio_plot.h"

#include "plot_words.h"
#include "wording.h"

#include <QAccessible>
#include <QKeyEvent>
#include <QMouseEvent>
#include <QToolTip>

#include <algorithm>
#include <cmath>

namespace rungwright
{

namespace
{

constexpr double kReach = 9;    ///< Pixels around a point that take the pointer.
constexpr double kDragFrom = 5; ///< Pixels from where on a press becomes a box.

class LeanTicks : public QCPAxisTicker
{
    QString getTickLabel(double tick, const QLocale&, QChar, int) override { return numberText(tick, 1); }
    int getSubTickCount(double) override { return 0; }
};

class ShareTicks : public QCPAxisTicker
{
    QString getTickLabel(double tick, const QLocale&, QChar, int) override { return percentText(tick, true); }
    int getSubTickCount(double) override { return 0; }
};

QString number(qint64 n) { return QLocale().toString(n); }

} // namespace

PortfolioPlot::PortfolioPlot(QWidget* parent) : PaperPlot(parent, Marks::buffered)
{
    setObjectName(QStringLiteral("portfolioPlot"));
    setAccessibleName(tr("Portfolio"));
    setFocusPolicy(Qt::StrongFocus);
    setMouseTracking(true);
    setMinimumSize(320, 240);
    xAxis->setTicker(QSharedPointer<LeanTicks>::create());
    yAxis->setTicker(QSharedPointer<ShareTicks>::create());
    PortfolioPlot::lookChanged();
}

void PortfolioPlot::setSources(Worklist* list, Workbench* bench)
{
    if (m_list) {
        m_list->disconnect(this);
        m_list->document().disconnect(this);
    }
    if (m_bench)
        m_bench->disconnect(this);
    m_list = list;
    m_bench = bench;
    if (list) {
        connect(list, &Worklist::reset, this, [this] { takeRows(Tiers::others); });
        connect(&list->document(), &Document::saveStateChanged, this, &PortfolioPlot::showHeading);
        // While figures come in by pieces the picture would be drawn a hundred times over: it waits for the last.
        connect(list, &Worklist::rowsChanged, this, [this] {
            if (!m_list->measuring())
                takeRows(Tiers::same);
        });
        connect(list, &Worklist::pickChanged, this, [this] {
            marksChanged();
            describe();
        });
    }
    if (bench)
        connect(bench, &Workbench::reset, this, qOverload<>(&QWidget::update));
    takeRows(Tiers::others);
}

void PortfolioPlot::takeRows(Tiers tiers)
{
    const int tierAtCursor = tiers == Tiers::same && m_cursor >= 0 ? point(m_cursor).tier : -1;
    const bool ringAtCursor = m_hover >= 0 && m_hover == m_cursor;
    m_pressed = m_boxing = false;
    m_all = m_list ? portfolioPoints(*m_list) : PortfolioPoints{};
    m_pointOf.assign(static_cast<std::size_t>(m_list ? m_list->count() : 0), -1);
    std::vector<double> leans;
    std::vector<double> shares;
    for (std::size_t i = 0; i < m_all.points.size(); ++i) {
        m_pointOf[static_cast<std::size_t>(m_all.points[i].tier)] = static_cast<int>(i);
        leans.push_back(m_all.points[i].lean);
        shares.push_back(m_all.points[i].share);
    }
    // Keys go on from where they were, as long as that tier is in the picture.
    m_cursor = tierAtCursor >= 0 ? m_pointOf[static_cast<std::size_t>(tierAtCursor)] : -1;
    m_hover = ringAtCursor ? m_cursor : -1;
    const FlagThresholds thresholds = m_list ? m_list->thresholds() : FlagThresholds{};
    m_leanRange = robustRange(std::move(leans), {0.0, thresholds.leansLeft});
    m_shareRange = robustRange(std::move(shares), {0.0, thresholds.gapShare});
    xAxis->setRange(m_leanRange.lower, m_leanRange.upper);
    yAxis->setRange(m_shareRange.lower, m_shareRange.upper);
    showHeading();
    areaChanged();
    describe();
    redrawAll();
}

void PortfolioPlot::showHeading()
{
    if (m_list)
        setPictureHeading(tr("%1 · portfolio of %2 tiers").arg(isolated(m_list->document().displayName()), number(m_list->count())));
}

int PortfolioPlot::noteHeight() const
{
    const QString note = leftOutText();
    if (note.isEmpty())
        return 0;
    const QRect room(0, 0, std::max(100, viewport().width() - 16), 10'000);
    return fontMetrics().boundingRect(room, Qt::TextWordWrap, note).height() + 4;
}

void PortfolioPlot::setMargins()
{
    const int line = fontMetrics().height();
    const int numbers = fontMetrics().horizontalAdvance(QStringLiteral("888.8 %")) + 14;
    setAreaMargins(QMargins(numbers, kHeadingTop + legendLines() * (line + kLegendGap) + line, 16, 2 * line + 14 + noteHeight()));
}

void PortfolioPlot::areaChanged()
{
    // The note below wraps by the width, and takes its room from the points.
    setMargins();
    axisRect()->setOuterRect(viewport());
    // QCustomPlot counts a vertical axis from the area's last row of pixels, not from its lower edge.
    m_shape.place(m_all.points, area().translated(0, -1), m_leanRange, m_shareRange);
}

void PortfolioPlot::lookChanged()
{
    xAxis->grid()->setVisible(true);
    yAxis->grid()->setVisible(true);
    PaperPlot::lookChanged();
}

double PortfolioPlot::radius(int index) const { return radiusFor(point(index).onOffer); }

double PortfolioPlot::radiusFor(double onOffer)
{
    // The area goes with the number; one unit can still be seen and a great many do not cover the rest.
    return std::clamp(1.4 + 0.7 * std::sqrt(onOffer), 2.0, 9.0);
}

QString PortfolioPlot::shareTitle() { return tr("gap share of the advertised floor"); }

QPointF PortfolioPlot::placeOf(int tier) const
{
    const int at = tier >= 0 && tier < static_cast<int>(m_pointOf.size()) ? m_pointOf[static_cast<std::size_t>(tier)] : -1;
    return at < 0 ? QPointF() : m_shape.places()[static_cast<std::size_t>(at)];
}

// Words ----------------------------------------------------------------------------------------------------------------------

QString PortfolioPlot::leftOutText() const
{
    const PortfolioLeftOut& out = m_all.leftOut;
    if (out.total() == 0)
        return {};
    if (out.notMeasured > 0)
        return tr("%1 tiers are still being measured.").arg(number(out.notMeasured));
    QStringList parts;
    const auto add = [&](int n, const QString& what) {
        if (n > 0)
            parts << what.arg(number(n));
    };
    add(out.noneOnOffer, tr("%1 with nothing on offer"));
    add(out.noFloor, tr("%1 without an advertised floor"));
    add(out.noGap, tr("%1 whose gap their model cannot tell"));
    add(out.noLean, tr("%1 without a lean (a single unit on offer, or all at one price)"));
    const QString which = out.total() == 1 ? tr("1 tier") : tr("%1 tiers").arg(number(out.total()));
    return tr("Not in the picture: %1 – %2.").arg(which, parts.join(QStringLiteral(", ")));
}

QString PortfolioPlot::summaryText() const
{
    if (!m_list || m_list->count() == 0)
        return tr("No tiers yet.");
    qint64 left = 0;
    qint64 wide = 0;
    qint64 both = 0;
    for (const PortfolioPoint& p : m_all.points) {
        left += p.leansLeft ? 1 : 0;
        wide += p.wideGap ? 1 : 0;
        both += p.leansLeft && p.wideGap ? 1 : 0;
    }
    const auto shown = static_cast<qint64>(m_all.points.size());
    return tr("%1 of %2 tiers in the picture: %3 lean left, %4 have a wide gap, %5 both.")
        .arg(number(shown), number(m_list->count()), number(left), number(wide), number(both));
}

void PortfolioPlot::describe()
{
    QString said = summaryText();
    if (m_list && m_list->pickedCount() > 0)
        said += QLatin1Char(' ') + tr("%1 picked.").arg(number(m_list->pickedCount()));
    if (m_list && !m_all.points.empty()) {
        const auto worst = std::max_element(m_all.points.begin(), m_all.points.end(), [](auto& a, auto& b) { return a.share < b.share; });
        said += QLatin1Char(' ') + tr("The greatest gap share: %1").arg(pointText(static_cast<int>(worst - m_all.points.begin())));
    }
    const QString note = leftOutText();
    if (!note.isEmpty())
        said += QLatin1Char('\n') + note;
    if (m_cursor >= 0)
        said = pointText(m_cursor) + (m_list->isPicked(point(m_cursor).tier) ? tr("\npicked") : QString()) + QLatin1Char('\n') + said;
    setAccessibleDescription(said);
}

QString PortfolioPlot::pointText(int index) const
{
    const PortfolioPoint& p = point(index);
    const TierCase& tc = m_list->tierCase(p.tier);
    const Currency& currency = m_list->document().scenario().currency;
    const WorklistRow& row = m_list->row(p.tier);
    QString said = tr("%1 · %2").arg(isolated(tc.tier.site), isolated(tc.tier.name)) + QLatin1Char('\n');
    said +=
        tr("gap share %1, gap %2, lean %3").arg(percentText(p.share, true), moneyText(row.gap.value_or(0.0), currency), numberText(p.lean));
    said += QLatin1Char('\n') + tr("%1 of %2 rentable units on offer, advertised from %3")
                                    .arg(row.onOffer)
                                    .arg(row.rentable)
                                    .arg(floorText(tc.tier.advertisedFloor, currency));
    const QString flags = flagWords(m_list->flags(p.tier));
    if (!flags.isEmpty())
        said += QLatin1Char('\n') + flags;
    if (m_shape.atEdge(index))
        said += QLatin1Char('\n') + tr("lies beyond the edge");
    return said;
}

// Hands and keys ---------------------------------------------------------------------------------------------------------------

void PortfolioPlot::setHover(int index, const QPoint& at)
{
    if (m_hover == index)
        return;
    m_hover = index;
    if (index >= 0) {
        const auto around = m_shape.countAround(index);
        QString said = pointText(index);
        if (dense() && around > 2)
            said += QLatin1Char('\n') + tr("the nearest of %1 tiers in this cell").arg(number(around));
        QToolTip::showText(at, said.toHtmlEscaped().replace(QLatin1Char('\n'), QStringLiteral("<br>")), this);
        setCursor(Qt::PointingHandCursor);
    } else {
        QToolTip::hideText();
        unsetCursor();
    }
    update();
}

void PortfolioPlot::mousePressEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton || !m_list || !area().adjusted(-4, -4, 4, 4).contains(event->position())) {
        PaperPlot::mousePressEvent(event);
        return;
    }
    event->accept();
    m_pressed = true;
    m_pressedAt = m_pointer = event->position();
}

void PortfolioPlot::mouseMoveEvent(QMouseEvent* event)
{
    event->accept();
    m_pointer = event->position();
    if (m_pressed && !m_boxing && (m_pointer - m_pressedAt).manhattanLength() >= kDragFrom) {
        m_boxing = true;
        setHover(-1, {});
    }
    if (m_boxing) {
        update();
        return;
    }
    if (!m_pressed && m_list)
        setHover(m_shape.nearest(m_pointer, kReach), event->globalPosition().toPoint());
}

void PortfolioPlot::mouseReleaseEvent(QMouseEvent* event)
{
    if (event->button() != Qt::LeftButton || !m_pressed) {
        PaperPlot::mouseReleaseEvent(event);
        return;
    }
    event->accept();
    m_pressed = false;
    if (std::exchange(m_boxing, false)) {
        finishBox(QRectF(m_pressedAt, event->position()).normalized());
        return;
    }
    const int at = m_shape.nearest(event->position(), kReach);
    if (at >= 0)
        emit tierChosen(point(at).tier);
}

void PortfolioPlot::finishBox(const QRectF& box)
{
    std::vector<int> tiers;
    for (const int at : m_shape.inside(box))
        tiers.push_back(point(at).tier);
    update();
    if (tiers.empty())
        emit told(tr("No tier lies in the box."));
    else
        tellPicked(tiers.size());
    m_list->pick(tiers);
}

void PortfolioPlot::tellPicked(std::size_t tiers)
{
    if (tiers == 0)
        emit told(tr("The worklist shows all tiers again."));
    else
        emit told(tiers == 1 ? tr("1 tier picked; the worklist shows it. Esc shows all again.")
                             : tr("%1 tiers picked; the worklist shows these. Esc shows all again.").arg(number(qint64(tiers))));
}

void PortfolioPlot::moveCursor(int key)
{
    const auto before = [&](int a, int b) {
        const bool byShare = key == Qt::Key_Up || key == Qt::Key_Down || key == Qt::Key_Home;
        const double va = byShare ? point(a).share : point(a).lean;
        const double vb = byShare ? point(b).share : point(b).lean;
        return va != vb ? va < vb : a < b;
    };
    const bool up = key == Qt::Key_Up || key == Qt::Key_Right;
    int best = -1;
    const bool first = key == Qt::Key_Home || m_cursor < 0;
    for (int i = 0; i < static_cast<int>(m_all.points.size()); ++i) {
        if (first) { // begins at the greatest gap share
            const auto& p = point(i);
            if (best < 0 || p.share > point(best).share)
                best = i;
        } else if (up ? before(m_cursor, i) && (best < 0 || before(i, best)) : before(i, m_cursor) && (best < 0 || before(best, i))) {
            best = i;
        }
    }
    if (best < 0)
        return;
    m_cursor = best;
    describe();
    QAccessibleEvent changed(this, QAccessible::DescriptionChanged);
    QAccessible::updateAccessibility(&changed);
    m_hover = -1;
    setHover(best, mapToGlobal(m_shape.places()[static_cast<std::size_t>(best)].toPoint() + QPoint(8, 8)));
}

void PortfolioPlot::pickAtCursor(bool toggle, int before)
{
    if (!m_list || m_cursor < 0)
        return;
    const int here = point(m_cursor).tier;
    const bool letGo = toggle && m_list->isPicked(here);
    std::vector<int> tiers;
    for (int tier = 0; tier < m_list->count(); ++tier) {
        const bool wanted = tier == here ? !letGo : m_list->isPicked(tier) || (before >= 0 && tier == point(before).tier);
        if (wanted)
            tiers.push_back(tier);
    }
    tellPicked(tiers.size());
    m_list->pick(tiers);
}

void PortfolioPlot::keyPressEvent(QKeyEvent* event)
{
    event->accept();
    switch (event->key()) {
    case Qt::Key_Up:
    case Qt::Key_Down:
    case Qt::Key_Left:
    case Qt::Key_Right:
    case Qt::Key_Home: {
        const int before = m_cursor;
        moveCursor(event->key());
        if (event->modifiers() & Qt::ShiftModifier)
            pickAtCursor(false, before);
        return;
    }
    case Qt::Key_Space:
        pickAtCursor(true, -1);
        return;
    case Qt::Key_Return:
    case Qt::Key_Enter:
        if (m_cursor >= 0)
            emit tierChosen(point(m_cursor).tier);
        return;
    case Qt::Key_Escape:
        if (std::exchange(m_pressed, false) && std::exchange(m_boxing, false)) {
            update();
            return;
        }
        if (m_list && m_list->pickedCount() > 0) {
            m_list->clearPick();
            emit told(tr("The worklist shows all tiers again."));
            return;
        }
        break;
    default:
        break;
    }
    event->ignore();
    PaperPlot::keyPressEvent(event);
}

void PortfolioPlot::leaveEvent(QEvent* event)
{
    PaperPlot::leaveEvent(event);
    setHover(-1, {});
}

void PortfolioPlot::focusInEvent(QFocusEvent* event)
{
    PaperPlot::focusInEvent(event);
    update();
}

void PortfolioPlot::focusOutEvent(QFocusEvent* event)
{
    PaperPlot::focusOutEvent(event);
    update();
}

} // namespace rungwright
