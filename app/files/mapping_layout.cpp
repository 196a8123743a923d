// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_layout.h"

#include "mapping_header.h"
#include "mapping_sample.h"
#include "trade_words.h"

#include <algorithm>
#include <map>

namespace rungwright
{

namespace
{

constexpr std::size_t kRecordsLookedAt = 200;
constexpr std::size_t kHeaderWithin = 30;

struct Widths {
    qsizetype usual = 0; ///< The number of cells most records have.
    double share = 0;    ///< Of the records.
};

// The greater number wins a tie: lines above the table are short.
Widths widthsOf(const SampleRecords& records)
{
    std::map<qsizetype, qsizetype> count;
    for (const QStringList& record : records)
        ++count[record.size()];
    Widths widths;
    qsizetype most = 0;
    for (const auto& [width, times] : count) {
        if (times >= most) {
            most = times;
            widths.usual = width;
        }
    }
    widths.share = records.empty() ? 0 : double(most) / double(records.size());
    return widths;
}

// Other than that of "m2".
bool holdsFigure(const QString& cell)
{
    const QStringList words = plainWords(cell).split(QLatin1Char(' '));
    return std::any_of(words.begin(), words.end(), [](const QString& word) {
        return word != QLatin1String("m2") && std::any_of(word.begin(), word.end(), [](QChar c) { return c.isDigit(); });
    });
}

int columnsSpokenFor(const QStringList& record)
{
    constexpr int word = 50;
    // Rows of units are dropped quickly: most of their cells hold figures.
    if (2 * std::count_if(record.begin(), record.end(), holdsFigure) > record.size())
        return 0;
    int columns = 0;
    for (std::size_t c = 0; c < kColumnNames.size(); ++c)
        columns += std::any_of(record.begin(), record.end(),
                               [c](const QString& cell) { return cell.size() < 120 && headerFit(static_cast<Column>(c), cell) >= word; })
                       ? 1
                       : 0;
    return columns;
}

// A line of headers: two texts at least, and nothing in it that would stand in a row of units.
bool looksLikeHeader(const QStringList& record, qsizetype width)
{
    const auto filled = std::count_if(record.begin(), record.end(), [](const QString& cell) { return !cell.trimmed().isEmpty(); });
    return filled >= 2 && record.size() == width && std::none_of(record.begin(), record.end(), looksLikeData);
}

} // namespace

bool looksLikeData(const QString& cell) { return holdsFigure(cell) || statusOfTradeWord(cell).has_value(); }

SampleRecords sampleRecords(const ListSample& sample, TextEncoding encoding, char delimiter, std::size_t most)
{
    SampleRecords records;
    eachSampleRecord(sample, {encoding, delimiter}, [&](qint64, std::span<const std::string_view> cells) {
        records.push_back(cellTexts(cells));
        return records.size() < most;
    });
    return records;
}

char guessDelimiter(const ListSample& sample, TextEncoding encoding)
{
    char best = kDelimiters.front();
    double bestScore = -1;
    for (const char delimiter : kDelimiters) {
        const SampleRecords records = sampleRecords(sample, encoding, delimiter, kRecordsLookedAt);
        const Widths widths = widthsOf(records);
        if (widths.usual < 2)
            continue;
        // A decimal comma in every row makes equal widths too, but never a header.
        const double score = widths.share * widths.share * double(std::min<qsizetype>(widths.usual, 12)) + 3.0 * guessHeader(records).fits;
        if (score > bestScore) {
            bestScore = score;
            best = delimiter;
        }
    }
    return best;
}

HeaderGuess guessHeader(const SampleRecords& records)
{
    HeaderGuess guess;
    const qsizetype width = widthsOf(records).usual;
    const std::size_t within = std::min(records.size(), kHeaderWithin);
    const auto row = [&](std::size_t i) -> const QStringList& { return records[i]; };
    std::size_t first = 0;
    for (std::size_t i = 0; i < within; ++i) {
        const int fits = row(i).size() == width ? columnsSpokenFor(row(i)) : 0;
        if (fits > guess.fits) {
            guess.fits = fits;
            first = i;
        }
    }
    constexpr int enough = 2;
    if (guess.fits < enough) {
        // One word may stand in a row of units too ("Room 4"). Without words we know: the first full line without figures, or the first
        // full line.
        const auto end = records.begin() + static_cast<std::ptrdiff_t>(within);
        auto found = std::find_if(records.begin(), end, [width](const QStringList& record) { return looksLikeHeader(record, width); });
        if (found == end)
            found = std::find_if(records.begin(), end, [width](const QStringList& record) { return record.size() == width; });
        first = found == end ? 0 : static_cast<std::size_t>(found - records.begin());
    }
    if (first + 2 < records.size() && looksLikeHeader(row(first), width) && looksLikeHeader(row(first + 1), width)) {
        guess.lines = 2;
    } else if (first > 0 && looksLikeHeader(row(first), width) && looksLikeHeader(row(first - 1), width)) {
        guess.lines = 2;
        --first;
    }
    guess.row = static_cast<int>(first) + 1;
    return guess;
}

} // namespace rungwright
