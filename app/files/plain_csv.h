// SPDX-License-Identifier: GPL-3.0-or-later
// The plain case of CSV, fast: what is not plainly fine here is left to csv_records.h, which knows everything and has the words for it.
#pragma once

#include <bit>
#include <cstddef>
#include <cstdint>
#include <cstring>
#include <span>
#include <string_view>
#include <vector>

#ifdef __SSE2__
#include <emmintrin.h>
#endif

namespace rungwright
{

/// True for well-formed UTF-8 (RFC 3629) without NUL. A character that the end cuts off is not well-formed.
bool isPlainUtf8(std::string_view bytes);

/// So many bytes behind a text must be readable, and NUL.
inline constexpr std::size_t kPadding = 64;

/// The places of commas, quotation marks, CR and LF in a text, one after the other, found 64 bytes at a time.
class CsvMarks
{
public:
    /// kPadding zeros follow `end`.
    CsvMarks(char* begin, char* end) : m_block(begin), m_end(end) { m_marks = begin < end ? marksAt(begin) : 0; }

    /// The next one; the end when there is no more.
    char* next()
    {
        while (m_marks == 0) {
            if (m_end - m_block <= 64)
                return m_end;
            m_block += 64;
            m_marks = marksAt(m_block);
        }
        char* place = m_block + std::countr_zero(m_marks);
        m_marks &= m_marks - 1;
        return place;
    }

private:
    static std::uint64_t marksAt(const char* block)
    {
        std::uint64_t marks = 0;
#ifdef __SSE2__
        const auto equal = [](__m128i text, char c) { return _mm_cmpeq_epi8(text, _mm_set1_epi8(c)); };
        for (unsigned part = 0; part < 4; ++part) {
            const __m128i text = _mm_loadu_si128(reinterpret_cast<const __m128i*>(block + 16 * std::size_t(part)));
            const __m128i found =
                _mm_or_si128(_mm_or_si128(equal(text, ','), equal(text, '"')), _mm_or_si128(equal(text, '\n'), equal(text, '\r')));
            marks |= std::uint64_t(static_cast<unsigned>(_mm_movemask_epi8(found))) << (16 * part);
        }
#else
        for (unsigned i = 0; i < 64; ++i)
            marks |= std::uint64_t(block[i] == ',' || block[i] == '"' || block[i] == '\n' || block[i] == '\r') << i;
#endif
        return marks;
    }

    char* m_block;
    char* m_end;
    std::uint64_t m_marks;
};

/// Hands the records of a text to `take`, a `bool(std::span<const std::string_view>)` that ends everything by giving false; empty lines
/// are records of one empty cell. False when `take` said so, or at the first thing that is not plainly fine: a quotation mark out of place,
/// a CR alone, more than `mostCells` cells, an end inside quotes. kPadding zeros follow the text, which is written to: cells with doubled
/// quotation marks are put right where they stand, so that the views stay good as long as the text does.
template <class Take>
bool plainRecords(char* begin, char* end, std::size_t mostCells, std::vector<std::string_view>& cells, Take take)
{
    CsvMarks marks(begin, end);
    cells.clear();
    char* start = begin;
    // A comma as the last byte opens one more cell, which is empty; a line end opens no record.
    while (start < end || !cells.empty()) {
        char* stop = end;
        if (start < end && *start == '"') {
            marks.next();
            char* from = start + 1;
            char* to = from;
            for (;;) {
                stop = marks.next();
                if (stop == end)
                    return false;
                if (*stop != '"')
                    continue;
                const bool doubled = stop + 1 < end && stop[1] == '"';
                const auto length = static_cast<std::size_t>(stop - from) + (doubled ? 1 : 0);
                if (to != from)
                    std::memmove(to, from, length);
                to += length;
                if (!doubled)
                    break;
                marks.next();
                from = stop + 2;
            }
            cells.emplace_back(start + 1, static_cast<std::size_t>(to - start) - 1);
            ++stop;
            if (stop < end && marks.next() != stop)
                return false;
        } else {
            stop = marks.next();
            cells.emplace_back(start, static_cast<std::size_t>(stop - start));
        }
        if (stop < end && *stop == '"')
            return false;
        if (cells.size() > mostCells)
            return false;
        if (stop < end && *stop == ',') {
            start = stop + 1;
            continue;
        }
        if (stop < end && *stop == '\r') {
            ++stop;
            if (stop == end || *stop != '\n')
                return false;
            marks.next();
        }
        if (!take(std::span<const std::string_view>(cells)))
            return false;
        cells.clear();
        start = stop < end ? stop + 1 : end;
    }
    return true;
}

} // namespace rungwright
