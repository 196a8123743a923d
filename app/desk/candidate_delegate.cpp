// SPDX-License-Identifier: GPL-3.0-or-later
#include "candidate_delegate.h"

#include "candidates_model.h"
#include "ladder_thumb.h"
#include "look.h"

#include <QPainter>

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr int kMargin = 8;
constexpr int kThumbWidth = 72;

} // namespace

CandidateDelegate::CandidateDelegate(const Workbench& bench, QObject* parent) : QStyledItemDelegate(parent), m_bench(bench) {}

QSize CandidateDelegate::cardSize() const
{
    const auto* widget = qobject_cast<const QWidget*>(parent());
    const QFontMetrics metrics = widget ? widget->fontMetrics() : QFontMetrics(QFont());
    return {kThumbWidth + 3 * kMargin + metrics.averageCharWidth() * 19, 3 * metrics.lineSpacing() + 2 * kMargin};
}

QSize CandidateDelegate::sizeHint(const QStyleOptionViewItem&, const QModelIndex&) const { return cardSize() + QSize(kMargin, 0); }

void CandidateDelegate::paint(QPainter* painter, const QStyleOptionViewItem& option, const QModelIndex& index) const
{
    const TierCase* tc = m_bench.tierCase();
    if (!tc)
        return;
    const Look& look = Look::of(option.widget);
    const QRect card = option.rect.adjusted(0, 0, -kMargin, 0);
    const bool worked = option.state.testFlag(QStyle::State_Selected);
    const bool hovered = option.state.testFlag(QStyle::State_MouseOver);
    painter->save();
    painter->fillRect(card, worked ? look.selectionFill : look.paper);
    if (worked || hovered)
        painter->fillRect(QRect(card.left(), card.top(), card.width(), 3), worked ? look.focus : look.grid);

    const int candidate = CandidatesModel::candidateOf(index.row());
    const bool live = candidate == m_bench.candidate();
    const QRect thumb(card.left() + kMargin, card.top() + kMargin, kThumbWidth, card.height() - 2 * kMargin);
    const std::vector<Price> kept = live ? std::vector<Price>() : pricesOf(*tc, candidate);
    ThumbLadder ladder;
    ladder.units = tc->tier.units;
    ladder.prices = live ? m_bench.workedPrices() : std::span<const Price>(kept);
    ladder.advertisedFloor = tc->tier.advertisedFloor;
    ladder.expectedCheapest = index.data(CandidatesModel::expectedRole).isValid()
                                  ? std::optional(index.data(CandidatesModel::expectedRole).toDouble())
                                  : std::nullopt;
    // One scale for all cards, that of the current ladder: they are there to be compared.
    if (const auto& low = m_bench.current().figures.lowest) {
        ladder.low = static_cast<double>((tc->tier.hasFloor() ? std::min(*low, ladder.advertisedFloor) : *low).minor);
        for (const Price price : m_bench.currentPrices())
            ladder.high = std::max(ladder.high.value_or(0.0), static_cast<double>(price.minor));
    }
    paintLadderThumb(*painter, thumb, ladder, look);

    const QRect words(thumb.right() + kMargin, thumb.top(), card.right() - thumb.right() - 2 * kMargin, thumb.height());
    const int line = option.fontMetrics.lineSpacing();
    QFont bold = option.font;
    bold.setWeight(QFont::DemiBold);
    QString name = index.data(Qt::DisplayRole).toString();
    if (index.data(CandidatesModel::chosenRole).toBool())
        name = tr("✓ %1").arg(name);
    painter->setFont(bold);
    painter->setPen(look.ink);
    painter->drawText(words.left(), words.top() + option.fontMetrics.ascent(),
                      QFontMetrics(bold).elidedText(name, Qt::ElideRight, words.width()));
    painter->setFont(option.font);
    const QString gap = index.data(CandidatesModel::gapTextRole).toString();
    const QString total = index.data(CandidatesModel::totalTextRole).toString();
    painter->drawText(words.left(), words.top() + line + option.fontMetrics.ascent(),
                      option.fontMetrics.elidedText(gap, Qt::ElideRight, words.width()));
    painter->setPen(look.faintInk);
    painter->drawText(words.left(), words.top() + 2 * line + option.fontMetrics.ascent(),
                      option.fontMetrics.elidedText(total, Qt::ElideRight, words.width()));
    painter->restore();
}

} // namespace rungwright
