// SPDX-License-Identifier: GPL-3.0-or-later
// Following the workbench, and where everything is. Painting: ladder_paint.cpp; hands and keys: ladder_hands.cpp, ladder_keys.cpp.
#include "ladder_plot.h"

#include "plot_words.h"
#include "wording.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace rungwright
{

namespace
{

constexpr double kSidePad = 8; ///< Pixels between the area's sides and the first and last column.

bool drawnWithMovers(const Workbench& bench, const Unit& unit)
{
    if (bench.gesture() == Workbench::Gesture::trial)
        return !unit.locked;
    // When the total is held, or all is bent, any unit on offer may give way.
    return bench.holdsTotal() && unit.onOffer() && !unit.locked;
}

} // namespace

LadderPlot::LadderPlot(QWidget* parent) :
    PaperPlot(parent, Marks::buffered),
    m_priceTicks(QSharedPointer<MoneyTicks>::create()),
    m_placeTicks(QSharedPointer<CountTicks>::create())
{
    setObjectName(QStringLiteral("ladderPlot"));
    setAccessibleName(tr("Ladder"));
    setFocusPolicy(Qt::StrongFocus);
    setMouseTracking(true);
    setMinimumSize(320, 180);
    yAxis->setTicker(m_priceTicks);
    xAxis->setTicker(m_placeTicks);
    LadderPlot::lookChanged();
}

void LadderPlot::setWorkbench(Workbench* bench)
{
    if (m_bench)
        m_bench->disconnect(this);
    m_bench = bench;
    if (bench) {
        connect(bench, &Workbench::reset, this, &LadderPlot::onReset);
        connect(bench, &Workbench::moving, this, &LadderPlot::onMoving);
        connect(bench, &Workbench::gestureChanged, this, &LadderPlot::onGestureChanged);
        connect(bench, &Workbench::selectionChanged, this, &LadderPlot::onSelectionChanged);
    }
    onReset();
}

int LadderPlot::headingRows(int width) const { return m_legend.rows(width, font(), strongFont()); }

int LadderPlot::numbersWidth() const
{
    return shows() ? static_cast<int>(std::ceil(m_priceTicks->widest(yAxis->range(), QFontMetricsF(font())))) + 14 : 40;
}

// Following the workbench ------------------------------------------------------------------------------------------------

void LadderPlot::onReset()
{
    // What the hand was about to do belonged to what was shown before.
    if (!m_bench || m_bench->gesture() == Workbench::Gesture::none) {
        m_hand = Hand::empty;
        m_pressed = -1;
        m_rubber = QRectF();
        m_selectedBefore.clear();
    }
    m_zoomed = m_zoomed && shows();
    m_behind.clear();
    m_placeOf.clear();
    m_moves.clear();
    if (shows()) {
        const Tier& tier = m_bench->tierCase()->tier;
        m_placeOf.resize(tier.units.size());
        const auto columns = m_bench->columns();
        for (std::size_t place = 0; place < columns.size(); ++place)
            m_placeOf[columns[place]] = static_cast<std::uint32_t>(place);
        m_moves.assign(tier.units.size(), 0);
        markMovers();
        if (m_bench->candidate() >= 0 || m_bench->gesture() == Workbench::Gesture::trial)
            sortLadder(tier.units, m_bench->currentPrices(), Among::all, m_behind);
        const auto any = [&tier](auto what) { return std::any_of(tier.units.begin(), tier.units.end(), what); };
        m_legend.setKey(any([](const Unit& u) { return u.status == Status::reserved; }),
                        any([](const Unit& u) { return u.status == Status::closed; }), any([](const Unit& u) { return u.locked; }));
        nameLadders();
        m_priceTicks->setCurrency(m_bench->currency());
        setPictureHeading(benchHeading(*m_bench));
    }
    m_hover = -1;
    fitRange();
    areaChanged();
    describe();
    redrawAll();
}

void LadderPlot::onMoving()
{
    if (stretchRange()) {
        areaChanged();
        redrawAll();
        return;
    }
    placeMovers();
    arrange(m_nextScene);
    update(changedRect(m_scene, m_nextScene));
    std::swap(m_scene, m_nextScene);
}

void LadderPlot::onGestureChanged()
{
    if (!shows())
        return;
    markMovers();
    if (m_bench->gesture() == Workbench::Gesture::trial) { // Today's ladder stays in sight, whatever is tried.
        sortLadder(m_bench->tierCase()->tier.units, m_bench->currentPrices(), Among::all, m_behind);
        nameLadders();
        redrawAll();
    }
    placeRungs();
    arrange(m_scene);
    marksChanged();
}

void LadderPlot::nameLadders()
{
    const bool trial = m_bench->gesture() == Workbench::Gesture::trial;
    m_legend.setLadders(priceAxisTitle(m_bench->currency()), trial ? tr("trial") : isolated(m_bench->candidateName()),
                        trial || m_bench->candidate() >= 0 ? tr("current") : QString());
}

void LadderPlot::markMovers()
{
    const auto& units = m_bench->tierCase()->tier.units;
    std::fill(m_moves.begin(), m_moves.end(), char{0});
    const Workbench::Gesture gesture = m_bench->gesture();
    if (gesture == Workbench::Gesture::none || gesture == Workbench::Gesture::left)
        return;
    for (const std::uint32_t unit : m_bench->moved())
        m_moves[unit] = 1;
    for (std::size_t i = 0; i < units.size(); ++i) {
        if (drawnWithMovers(*m_bench, units[i]))
            m_moves[i] = 1;
    }
}

void LadderPlot::onSelectionChanged()
{
    if (!shows())
        return;
    chooseBendUnit();
    placeRungs();
    arrange(m_scene);
    marksChanged();
    if (m_hand == Hand::empty)
        describe();
}

void LadderPlot::describe() { setAccessibleDescription(m_bench ? ladderDescription(*m_bench) : QString()); }

// Ranges -----------------------------------------------------------------------------------------------------------------

QCPRange LadderPlot::wantedRange() const
{
    const Measurement& m = m_bench->worked();
    double low = std::numeric_limits<double>::max();
    double high = std::numeric_limits<double>::lowest();
    const auto take = [&](double price) {
        low = std::min(low, price);
        high = std::max(high, price);
    };
    for (const auto prices : {m_bench->workedPrices(), m_bench->currentPrices()}) {
        for (const Price price : prices)
            take(static_cast<double>(price.minor));
    }
    if (m_bench->tierCase()->tier.hasFloor() || high < low)
        take(static_cast<double>(m.advertisedFloor.minor));
    if (m.gap.expectedCheapest)
        take(*m.gap.expectedCheapest);
    if (!(high > low)) {
        const double around = std::max(1.0, 0.05 * std::abs(low));
        low -= around;
        high += around;
    }
    // Room for a label beyond the lowest and the highest line.
    const double pad = QFontMetricsF(strongFont()).height() + 14;
    const double height = std::max(area().height(), 3.5 * pad);
    const double perPixel = (high - low) / (height - 2 * pad);
    return {low - pad * perPixel, high + pad * perPixel};
}

void LadderPlot::setRange(const QCPRange& range)
{
    if (range == yAxis->range())
        return;
    yAxis->setRange(range);
    emit priceRangeChanged(range);
}

void LadderPlot::fitRange()
{
    if (!m_zoomed && shows())
        setRange(wantedRange());
}

void LadderPlot::resetZoom()
{
    m_zoomed = false;
    fitRange();
    areaChanged();
    redrawAll();
}

bool LadderPlot::stretchRange()
{
    // The axis stands still during a drag; only what is dragged beyond its end moves it, and then outwards by a good step.
    if (m_zoomed || m_bench->gesture() == Workbench::Gesture::left)
        return false;
    QCPRange range = yAxis->range();
    double low = range.upper;
    double high = range.lower;
    for (const std::uint32_t place : m_moverPlaces) {
        const auto price = static_cast<double>(m_bench->workedPrices()[m_bench->columns()[place]].minor);
        low = std::min(low, price);
        high = std::max(high, price);
    }
    const double step = 0.12 * range.size();
    const double air = 6 * range.size() / std::max(area().height(), 1.0);
    bool stretched = false;
    if (low < range.lower + air) {
        range.lower = std::min(low, range.lower) - step;
        stretched = true;
    }
    if (high > range.upper - air) {
        range.upper = std::max(high, range.upper) + step;
        stretched = true;
    }
    if (stretched)
        setRange(range);
    return stretched;
}

// Geometry ---------------------------------------------------------------------------------------------------------------

void LadderPlot::areaChanged()
{
    if (!shows()) {
        m_still.clear();
        m_movers.clear();
        m_points.clear();
        m_scene = Scene();
        return;
    }
    if (m_bench->gesture() == Workbench::Gesture::none)
        fitRange();
    const auto columns = static_cast<double>(std::max<std::size_t>(m_bench->columns().size(), 1));
    const double pad = columns * kSidePad / std::max(area().width() - 2 * kSidePad, 1.0);
    xAxis->setRange(0.5 - pad, columns + 0.5 + pad);
    const QFontMetricsF metrics(font());
    m_priceTicks->setSpacing(area().height(), 2.2 * metrics.height());
    m_placeTicks->setSpacing(area().width(), 4.2 * metrics.height());
    updateTransform();
    // Place numbers stop where the axis's title begins, at the right.
    const double titleLeft = area().right() - metrics.horizontalAdvance(tr("place on the ladder")) - 24;
    m_placeTicks->setLastWritten((titleLeft - m_x0) / m_dx);
    m_size = RungSize::forColumn(columnPixels());
    chooseBendUnit();
    placeRungs();
    arrange(m_scene);
}

void LadderPlot::updateTransform()
{
    const QCPRange x = xAxis->range();
    const QCPRange y = yAxis->range();
    m_dx = (xAxis->coordToPixel(x.upper) - xAxis->coordToPixel(x.lower)) / x.size();
    m_x0 = xAxis->coordToPixel(0);
    m_dy = (yAxis->coordToPixel(y.upper) - yAxis->coordToPixel(y.lower)) / y.size();
    m_y0 = yAxis->coordToPixel(y.lower) - m_dy * y.lower;
}

void LadderPlot::placeRungs()
{
    m_still.clear();
    m_movers.clear();
    m_moverPlaces.clear();
    m_points.clear();
    const auto columns = m_bench->columns();
    const auto prices = m_bench->workedPrices();
    const auto& units = m_bench->tierCase()->tier.units;
    const QRectF in = area();
    for (std::size_t place = 0; place < columns.size(); ++place) {
        const std::uint32_t unit = columns[place];
        const QPointF at(xOf(place), yOf(static_cast<double>(prices[unit].minor)));
        m_points.push_back(at);
        const RungMark mark{at, units[unit].status, units[unit].locked, m_bench->isSelected(unit)};
        if (m_moves[unit]) {
            m_movers.push_back(mark);
            m_moverPlaces.push_back(static_cast<std::uint32_t>(place));
        } else if (at.y() >= in.top() && at.y() <= in.bottom()) {
            m_still.push_back(mark);
        }
    }
}

void LadderPlot::placeMovers()
{
    const auto columns = m_bench->columns();
    const auto prices = m_bench->workedPrices();
    for (std::size_t i = 0; i < m_moverPlaces.size(); ++i) {
        const std::uint32_t place = m_moverPlaces[i];
        m_points[place].setY(yOf(static_cast<double>(prices[columns[place]].minor)));
        m_movers[i].at = m_points[place];
    }
}

QPointF LadderPlot::rungPosition(std::uint32_t unit) const
{
    return unit < m_placeOf.size() && m_placeOf[unit] < m_points.size() ? m_points[m_placeOf[unit]] : QPointF();
}

int LadderPlot::unitAt(QPointF pos) const
{
    if (!shows() || m_points.empty())
        return -1;
    constexpr double reach = 9; // Pixels: a comfortable target whatever the size of the rung.
    const double column = std::max(columnPixels(), 0.05);
    const double middle = (pos.x() - m_x0) / column - 1.0;
    const double around = (reach + m_size.half) / column + 1.0;
    const auto last = static_cast<double>(m_points.size()) - 1.0;
    if (middle + around < 0 || middle - around > last)
        return -1;
    const auto from = static_cast<std::size_t>(std::clamp(std::floor(middle - around), 0.0, last));
    const auto to = static_cast<std::size_t>(std::clamp(std::ceil(middle + around), 0.0, last));
    const auto& units = m_bench->tierCase()->tier.units;
    int best = -1;
    double nearest = reach * reach;
    for (std::size_t place = from; place <= to; ++place) {
        const double dx = std::max(0.0, std::abs(pos.x() - m_points[place].x()) - 0.4 * column);
        const double dy = pos.y() - m_points[place].y();
        const std::uint32_t unit = m_bench->columns()[place];
        // Where rungs crowd, those on offer are meant.
        const double distance = dx * dx + dy * dy + (units[unit].onOffer() ? 0.0 : 4.0);
        if (distance < nearest) {
            nearest = distance;
            best = static_cast<int>(unit);
        }
    }
    return best;
}

void LadderPlot::lookChanged()
{
    yAxis->grid()->setVisible(true);
    xAxis->grid()->setVisible(false);
    PaperPlot::lookChanged();
    LadderPlot::areaChanged();
}

} // namespace rungwright
