// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_floors.h"

#include "csv_records.h"
#include "words.h"

#include <QBuffer>

#include <algorithm>

namespace rungwright
{

namespace
{

// No text holds a NUL, so it keeps ("ab", "c") and ("a", "bc") apart.
std::string keyOf(std::string_view site, std::string_view tier)
{
    std::string key(site);
    key.push_back('\0');
    return key.append(tier);
}

bool isBlank(std::span<const std::string_view> cells)
{
    return std::all_of(cells.begin(), cells.end(), [](std::string_view cell) { return trimmedText(cell).empty(); });
}

constexpr std::array<std::string_view, 3> kFloorColumns{"site", "tier", "advertised_floor"};

} // namespace

std::string_view FloorTable::floorOf(std::string_view site, std::string_view tier)
{
    const auto known = m_byKey.find(keyOf(site, tier));
    if (known == m_byKey.end())
        return {};
    Floor& floor = m_floors[known->second];
    floor.used = true;
    return floor.text;
}

qint64 FloorTable::unusedCount() const
{
    return std::count_if(m_floors.begin(), m_floors.end(), [](const Floor& floor) { return !floor.used; });
}

QStringList FloorTable::unused(int most) const
{
    QStringList names;
    for (const Floor& floor : m_floors) {
        if (!floor.used && names.size() < most)
            names << Words::tr("%1 / %2 (line %3)").arg(shownText(floor.site), shownText(floor.tier)).arg(floor.line);
    }
    return names;
}

class FloorReader
{
public:
    FloorReader(const QByteArray& bytes, QString fileName, const NumberStyle& style, const Currency& currency) :
        m_bytes(bytes), m_fileName(std::move(fileName)), m_numbers(style), m_grouping(style.grouping), m_currency(currency)
    {
        m_layout.encoding = guessEncoding(bytes, true).encoding;
    }

    Outcome<FloorTable> read()
    {
        QString header;
        const bool found = std::any_of(kDelimiters.begin(), kDelimiters.end(), [&](char delimiter) {
            m_layout.delimiter = delimiter;
            return headerFits(delimiter == kDelimiters.front() ? &header : nullptr);
        });
        if (!found && m_trouble.isEmpty())
            m_trouble = Words::tr("%1: not a file of floors; found the header '%2'; wanted: a header row with the columns site, tier and "
                                  "advertised_floor, and one row for each tier")
                            .arg(m_fileName, shownText(header, 200));
        if (m_trouble.isEmpty())
            readRows();
        if (m_troubles > 1)
            m_trouble += Words::tr(" (and %1 more rows in trouble)").arg(m_troubles - 1);
        return m_trouble.isEmpty() ? Outcome<FloorTable>(std::move(m_table)) : Trouble{m_trouble.toStdString()};
    }

private:
    CsvEnd eachRecord(const CsvSink& sink)
    {
        QBuffer buffer;
        buffer.setData(m_bytes);
        buffer.open(QIODevice::ReadOnly);
        return readCsv(buffer, m_fileName, m_layout, sink);
    }

    bool headerFits(QString* shown)
    {
        m_places.fill(-1);
        const CsvEnd end = eachRecord([&](qint64, std::span<const std::string_view> cells) {
            if (isBlank(cells))
                return true;
            m_cells = cells.size();
            QStringList texts;
            for (std::size_t i = 0; i < cells.size(); ++i) {
                const QString text = foldedText(cells[i]);
                texts << text;
                for (std::size_t k = 0; k < kFloorColumns.size(); ++k) {
                    if (text == QLatin1String(kFloorColumns[k].data(), qsizetype(kFloorColumns[k].size())) && m_places[k] < 0)
                        m_places[k] = static_cast<int>(i);
                }
            }
            if (shown != nullptr)
                *shown = texts.join(QStringLiteral(", "));
            return false;
        });
        const bool fits = std::none_of(m_places.begin(), m_places.end(), [](int place) { return place < 0; });
        // Bytes that are not text are told at once; quotes may stand wrong for one delimiter only.
        if (!fits && shown != nullptr && shown->isEmpty())
            m_trouble = end.trouble;
        return fits;
    }

    void readRows()
    {
        bool headerSeen = false;
        const CsvEnd end = eachRecord([&](qint64 line, std::span<const std::string_view> cells) {
            if (isBlank(cells))
                return true;
            if (headerSeen)
                take(line, cells);
            headerSeen = true;
            return true;
        });
        if (!end.trouble.isEmpty() && m_trouble.isEmpty())
            m_trouble = end.trouble;
    }

    void take(qint64 line, std::span<const std::string_view> cells)
    {
        if (cells.size() < m_cells)
            return refuse(line, Words::tr("too few cells; found %1; wanted: %2, as in the header row")
                                    .arg(QString::number(cells.size()), QString::number(m_cells)));
        // A decimal comma without quotation marks tears a floor apart: 69,50 would be 69.
        if (!isBlank(cells.subspan(m_cells)))
            return refuse(line, Words::tr("too many cells; found %1; wanted: %2, as in the header row (%3 inside a cell, such as a decimal "
                                          "comma, needs quotation marks around the cell)")
                                    .arg(QString::number(cells.size()), QString::number(m_cells),
                                         m_layout.delimiter == '\t' ? Words::tr("a tab")
                                                                    : QStringLiteral("'%1'").arg(QLatin1Char(m_layout.delimiter))));
        const auto cell = [&](std::size_t k) { return trimmedText(cells[static_cast<std::size_t>(m_places[k])]); };
        FloorTable::Floor floor{std::string(cell(0)), std::string(cell(1)), {}, line};
        if (floor.site.empty() || floor.tier.empty())
            return refuse(line, Words::tr("no %1; found nothing; wanted: a name").arg(floor.site.empty() ? "site" : "tier"));
        ReadNumber number;
        if (const auto complaint = floorTrouble(cell(2), number))
            return refuse(line, Words::tr("column 'advertised_floor': %1; found '%2'; wanted: %3")
                                    .arg(complaint->wrong, shownText(cell(2)), complaint->wanted));
        const auto [same, fresh] = m_table.m_byKey.emplace(keyOf(floor.site, floor.tier), m_table.m_floors.size());
        if (!fresh)
            return refuse(line, Words::tr("the tier '%1' at '%2' is there already, on line %3; wanted: each tier once")
                                    .arg(shownText(floor.tier), shownText(floor.site))
                                    .arg(m_table.m_floors[same->second].line));
        floor.text = std::move(number.plain);
        m_table.m_floors.push_back(std::move(floor));
    }

    // With commas between the cells the floors are written as ours are, else as the mapping has numbers.
    std::optional<Complaint> floorTrouble(std::string_view text, ReadNumber& number) const
    {
        const bool ours = m_layout.delimiter == ',';
        number.plain = text;
        const bool fine = ours || m_numbers.read(text, number);
        if (fine && !number.currency.empty() && number.currency != m_currency.code)
            return Complaint{Words::tr("the sign beside the floor stands for %1 and the list's currency is %2")
                                 .arg(QString::fromStdString(std::string(number.currency)), QString::fromStdString(m_currency.code)),
                             Words::tr("floors in the list's currency, or another meaning of the sign in the mapping")};
        if (fine && (ours || m_grouping == Grouping::none)) {
            if (auto complaint = twoWaysTrouble(number.plain, m_currency))
                return complaint;
        }
        Price price;
        if (fine && !number.percent && !readPrice(number.plain, m_currency, price))
            return {};
        return Complaint{number.percent ? Words::tr("a percentage, not a floor") : Words::tr("not a floor"),
                         Words::tr("an amount above 0 such as %1, with at most %2 decimals (%3)")
                             .arg(ours ? QStringLiteral("1234.50") : m_numbers.example(), QString::number(m_currency.decimals),
                                  QString::fromStdString(m_currency.code))};
    }

    void refuse(qint64 line, const QString& why)
    {
        if (++m_troubles == 1)
            m_trouble = QStringLiteral("%1:%2: %3").arg(m_fileName, QString::number(line), why);
    }

    const QByteArray& m_bytes;
    QString m_fileName;
    NumberReader m_numbers;
    Grouping m_grouping;
    Currency m_currency;
    CsvLayout m_layout;
    std::array<int, kFloorColumns.size()> m_places{};
    std::size_t m_cells = 0;
    FloorTable m_table;
    qint64 m_troubles = 0;
    QString m_trouble;
};

Outcome<FloorTable> readFloors(const QByteArray& bytes, const QString& fileName, const NumberStyle& style, const Currency& currency)
{
    return FloorReader(bytes, fileName, style, currency).read();
}

} // namespace rungwright
