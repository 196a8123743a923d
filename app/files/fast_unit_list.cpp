// SPDX-License-Identifier: GPL-3.0-or-later
#include "fast_unit_list.h"

#include "cell_values.h"
#include "csv_records.h"
#include "in_parallel.h"
#include "piece_readers.h"
#include "plain_csv.h"

#include <algorithm>
#include <chrono>
#include <optional>

namespace rungwright
{

namespace
{

/// Cuts a file into pieces that end where records end.
class Pieces
{
public:
    Pieces(QIODevice& device, std::size_t size) : m_device(device), m_size(std::clamp<std::size_t>(size, 1, kLongestCell / 2))
    {
        // A small list needs no great buffer.
        if (!device.isSequential())
            m_size = std::min(m_size, static_cast<std::size_t>(std::max<qint64>(1, device.size() - device.pos())));
    }

    /// The next piece, with kPadding zeros behind it. False when the device fails, or when a record is longer than fast ways are for.
    bool read(std::vector<char>& buffer, std::size_t& length)
    {
        std::size_t kept = m_rest.size();
        // A long record is asked for in ever greater steps, so that it is looked through a few times only.
        const auto step = [&] { return std::max(m_size, kept); };
        const auto makeRoom = [&] { buffer.resize(std::max(buffer.size(), kept + step() + kPadding)); };
        makeRoom();
        std::copy(m_rest.begin(), m_rest.end(), buffer.begin());
        for (;; makeRoom()) {
            const qint64 got = m_device.read(buffer.data() + kept, static_cast<qint64>(step()));
            if (got < 0)
                return false;
            kept += static_cast<std::size_t>(got);
            m_soFar += got;
            m_atEnd = got == 0;
            length = m_atEnd ? kept : recordsEnd({buffer.data(), kept});
            if (kept > kLongestCell)
                return false;
            if (m_atEnd || length > 0)
                break;
        }
        m_rest.assign(buffer.begin() + static_cast<std::ptrdiff_t>(length), buffer.begin() + static_cast<std::ptrdiff_t>(kept));
        std::fill_n(buffer.begin() + static_cast<std::ptrdiff_t>(length), kPadding, '\0');
        return true;
    }

    bool atEnd() const { return m_atEnd; }
    qint64 soFar() const { return m_soFar; }

private:
    /// Behind the last LF that stands outside quotation marks, of a text that begins outside of them; 0 when there is none.
    static std::size_t recordsEnd(std::string_view text)
    {
        const std::size_t quote = text.find('"');
        if (quote == std::string_view::npos)
            return text.rfind('\n') + 1;
        bool inside = std::count(text.begin() + static_cast<std::ptrdiff_t>(quote), text.end(), '"') % 2 != 0;
        for (std::size_t end = text.size(); end > 0; --end) {
            if (text[end - 1] == '"')
                inside = !inside;
            else if (text[end - 1] == '\n' && !inside)
                return end;
        }
        return 0;
    }

    QIODevice& m_device;
    std::size_t m_size;
    std::vector<char> m_rest;
    qint64 m_soFar = 0;
    bool m_atEnd = false;
};

/// What the first piece tells: the columns and the currency.
struct Beginning {
    std::optional<UnitListHeader> header;
    std::optional<Currency> currency; ///< The first one named.
};

/// Looks at a copy, since looking writes to the text.
Beginning lookAt(std::vector<char> piece, std::size_t from, std::size_t length)
{
    Beginning begin;
    std::vector<std::string_view> cells;
    char* const text = piece.data();
    if (!isPlainUtf8({text + from, length - from}))
        return begin;
    plainRecords(text + from, text + length, kMostCells, cells, [&](std::span<const std::string_view> row) {
        if (isBlankRow(row))
            return true;
        if (!begin.header) {
            const Outcome<UnitListHeader> header = readUnitListHeader(row);
            if (!header)
                return false;
            begin.header = header.value();
            return true;
        }
        const int place = begin.header->at(Column::currency);
        if (place < 0 || static_cast<std::size_t>(place) >= row.size())
            return false;
        const std::string_view code = trimmedText(row[static_cast<std::size_t>(place)]);
        if (code.empty())
            return true;
        Currency currency;
        if (!readCurrency(code, currency))
            begin.currency = currency;
        return false;
    });
    return begin;
}

/// The asked currency and the file's; nothing when they quarrel or are none.
std::optional<Currency> settled(const std::optional<Currency>& named, const QString& asked)
{
    Currency currency;
    if (!asked.isEmpty() && readCurrency(asked.trimmed().toStdString(), currency))
        return {};
    if (named && !asked.isEmpty() && *named != currency)
        return {};
    return named ? *named : currency;
}

/// Tells of what is read: at once, and then a few times a second.
class Teller
{
public:
    explicit Teller(const FastSettings& settings) : m_settings(settings) {}

    void look(const FastUnitList& list, double share)
    {
        if (!m_settings.tell || list.units.units() == 0 || !(share > 0 && share < 1))
            return;
        const auto now = Clock::now();
        const double so = std::chrono::duration<double, std::milli>(now - m_start).count();
        if (so < m_next || so * (1 - share) / share < m_settings.tellWhenLeftMs)
            return;
        m_next = so + kEveryMs;
        m_settings.tell({list.currency, list.units.units(), list.units.tiers(), list.units.firstTiers(kTiersToldSoFar)});
    }

private:
    using Clock = std::chrono::steady_clock;
    static constexpr double kEveryMs = 100;
    const FastSettings& m_settings;
    Clock::time_point m_start = Clock::now();
    double m_next = 0;
};

} // namespace

FastEnd readFast(QIODevice& device, const UnitListOptions& options, KeepUnits keep, const FastSettings& settings, const Progress& progress,
                 FastUnitList& out)
{
    const auto whole = static_cast<double>(std::max<qint64>(1, device.size()));
    Teller teller(settings);
    Pieces pieces(device, settings.pieceSize);
    std::vector<char> first;
    std::size_t length = 0;
    if (!pieces.read(first, length))
        return FastEnd::careful;
    const bool marked = std::string_view(first.data(), length).starts_with("\xEF\xBB\xBF");
    const Beginning begin = lookAt(first, marked ? 3 : 0, length);
    const std::optional<Currency> currency = settled(begin.currency, options.currencyCode);
    if (!begin.header || !currency)
        return FastEnd::careful;
    out.currency = *currency;
    out.unknownColumns = begin.header->unknown;
    out.encoding = marked ? QStringLiteral("UTF-8 with BOM") : QStringLiteral("UTF-8");

    PieceReaders readers(*begin.header, *currency, keep, threadsFor(settings.threads), out.units);
    bool goesWell = readers.add(first, marked ? 3 : 0, length, PlainRows::Begins::withHeader);
    while (goesWell) {
        const double share = std::min(1.0, static_cast<double>(pieces.soFar()) / whole);
        if (progress && !progress(share))
            return FastEnd::cancelled;
        teller.look(out, share);
        if (pieces.atEnd())
            break;
        std::vector<char>& next = readers.buffer();
        goesWell = pieces.read(next, length) && readers.add(next, 0, length, PlainRows::Begins::withRow);
    }
    return goesWell && readers.finish() && out.units.group() ? FastEnd::done : FastEnd::careful;
}

FastEnd readFastResult(QIODevice& device, const UnitListOptions& options, const FastSettings& settings, const Progress& progress,
                       UnitListResult& out)
{
    FastUnitList list;
    if (const FastEnd end = readFast(device, options, KeepUnits::whole, settings, progress, list); end != FastEnd::done)
        return end;
    std::vector<TierCase> tiers(list.units.tiers());
    const unsigned threads = threadsFor(settings.threads);
    std::vector<std::vector<std::uint64_t>> scratch(threads);
    const bool differ = inParallel(tiers.size(), threads, [&](std::size_t i, unsigned thread) {
        if (!list.units.namesDiffer(i, scratch[thread]))
            return false;
        list.units.fill(i, tiers[i].tier);
        return true;
    });
    if (!differ)
        return FastEnd::careful;
    out.currency = list.currency;
    out.tiers = std::move(tiers);
    out.rowsTaken = out.rowsFine = static_cast<qint64>(list.units.units());
    out.unknownColumns = list.unknownColumns;
    out.encoding = list.encoding;
    return FastEnd::done;
}

} // namespace rungwright
