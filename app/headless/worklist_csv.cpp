// SPDX-License-Identifier: GPL-3.0-or-later
#include "worklist_csv.h"

#include "figures_list.h"
#include "in_parallel.h"

#include <algorithm>
#include <limits>
#include <utility>

namespace rungwright
{

namespace
{

/// One thread's tools, used again from ladder to ladder, and the rows it wrote.
class RowWriter
{
public:
    std::string_view write(const ChosenLadder& ladder, const Currency& currency)
    {
        m_measured.ladder = ladder;
        const std::vector<Price> prices = pricesOf(*ladder.tierCase, ladder.candidate);
        m_measured.measurement = m_measurer.measure(ladder.tierCase->tier, prices, ladder.settings, MeasureParts::figuresOnly);
        m_row.clear();
        appendCsvRow(m_measured, currency, m_row);
        // Texts of a fixed size, so that rows stay where they are and little room is left over.
        if (m_texts.empty() || m_texts.back().capacity() - m_texts.back().size() < m_row.size()) {
            m_texts.emplace_back();
            m_texts.back().reserve(std::max(kTextSize, m_row.size()));
        }
        std::string& text = m_texts.back();
        text += m_row;
        return std::string_view(text).substr(text.size() - m_row.size());
    }
    /// Undefined gap shares come behind every number.
    double rank() const { return m_measured.measurement.gap.gapShare.value_or(-std::numeric_limits<double>::infinity()); }

    std::deque<std::string> takeTexts() { return std::move(m_texts); }

private:
    static constexpr std::size_t kTextSize = 65'536;
    Measurer m_measurer;
    MeasuredLadder m_measured;
    std::string m_row;
    std::deque<std::string> m_texts;
};

struct Row {
    double rank = 0;
    std::string_view text;
};

} // namespace

std::optional<WorklistCsv> WorklistCsv::of(const Currency& currency, std::size_t ladders, unsigned threads, const LadderAt& ladderAt,
                                           const std::function<void(double)>& measured)
{
    std::vector<RowWriter> writers(threads);
    std::vector<Row> rows(ladders);
    const bool whole = inParallel(ladders, threads, [&](std::size_t place, unsigned thread) {
        const std::optional<ChosenLadder> ladder = ladderAt(place, thread);
        if (!ladder)
            return false;
        rows[place].text = writers[thread].write(*ladder, currency);
        rows[place].rank = writers[thread].rank();
        if (thread == 0 && measured)
            measured(static_cast<double>(place) / static_cast<double>(ladders));
        return true;
    });
    if (!whole)
        return std::nullopt;
    std::stable_sort(rows.begin(), rows.end(), [](const Row& a, const Row& b) { return a.rank > b.rank; });
    WorklistCsv list;
    list.m_headings = csvHeadings(currency);
    list.m_texts.reserve(writers.size()); // the rows look into them, so they must not move
    for (RowWriter& writer : writers)
        list.m_texts.push_back(writer.takeTexts());
    list.m_rows.reserve(rows.size());
    for (const Row& row : rows)
        list.m_rows.push_back(row.text);
    return list;
}

NextPiece WorklistCsv::pieces() const
{
    constexpr std::size_t pieceSize = 65'536;
    return [this, row = std::size_t(0), piece = m_headings, first = true]() mutable {
        if (!std::exchange(first, false))
            piece.clear();
        for (; row < m_rows.size() && piece.size() < pieceSize; ++row)
            piece += m_rows[row];
        return QByteArrayView(piece.data(), qsizetype(piece.size()));
    };
}

} // namespace rungwright
