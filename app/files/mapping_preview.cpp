// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_preview.h"

#include "csv_records.h"
#include "mapping_cells.h"
#include "mapping_header.h"
#include "mapping_sample.h"
#include "words.h"

#include <QFile>
#include <QFileInfo>

#include <algorithm>
#include <optional>

namespace rungwright
{

namespace
{

QString shownTrouble(const Complaint& complaint, const QString& found)
{
    const QString seen = found.isEmpty() ? Words::tr("found nothing") : Words::tr("found '%1'").arg(shownText(found));
    return Words::tr("%1; %2; wanted: %3").arg(complaint.wrong, seen, complaint.wanted);
}

QString textOf(std::string_view utf8) { return QString::fromUtf8(utf8.data(), qsizetype(utf8.size())); }

class Previewer
{
public:
    Previewer(const ListSample& sample, const ImportMapping& mapping, int rows) :
        m_sample(sample), m_mapping(mapping), m_rows(static_cast<std::size_t>(std::max(rows, 0))), m_gate(mapping)
    {
    }

    MappingPreview run()
    {
        // A currency is needed before the first price can be read, as in the whole list.
        findCurrency();
        const QString trouble = eachSampleRecord(m_sample, {m_mapping.encoding, m_mapping.delimiter},
                                                 [this](qint64 line, std::span<const std::string_view> cells) {
                                                     take(line, cells);
                                                     return true;
                                                 });
        m_preview.trouble = trouble;
        if (m_preview.trouble.isEmpty() && !m_cells)
            m_preview.trouble = m_gate.records() == 0 ? Words::tr("the file is empty")
                                                      : Words::tr("there is no row %1 for the header: the file has %2 rows")
                                                            .arg(m_mapping.headerRow + m_mapping.headerLines - 1)
                                                            .arg(m_gate.records());
        return std::move(m_preview);
    }

private:
    void findCurrency()
    {
        HeaderGate gate(m_mapping);
        std::optional<CellMapper> cells;
        eachSampleRecord(m_sample, {m_mapping.encoding, m_mapping.delimiter}, [&](qint64, std::span<const std::string_view> record) {
            const HeaderGate::Place place = gate.pass(record);
            if (place == HeaderGate::Place::headerEnds)
                cells.emplace(m_mapping, gate.headers());
            if (place != HeaderGate::Place::row || cells->ruleFor(record) >= 0)
                return true;
            Currency found;
            const std::string_view code = cells->mayTellCurrency() ? cells->currencyOf(record) : std::string_view();
            if (!code.empty() && !readCurrency(code, found))
                m_currency = found;
            else
                return cells->mayTellCurrency();
            return false;
        });
    }

    void take(qint64 line, std::span<const std::string_view> cells)
    {
        const HeaderGate::Place place = m_gate.pass(cells);
        if (place != HeaderGate::Place::row) {
            constexpr std::size_t most = 50;
            if (m_preview.above.size() < most)
                m_preview.above.push_back(cellTexts(cells));
            if (place == HeaderGate::Place::headerEnds) {
                m_preview.headers = m_gate.headers();
                m_cells.emplace(m_mapping, m_gate.headers());
                m_preview.missingColumns = m_cells->missing();
            }
            return;
        }
        if (isEmptyRecord(cells))
            return;
        ++m_preview.rowsSeen;
        PreviewRow row;
        row.line = line;
        if (m_cells->ruleFor(cells) >= 0) {
            ++m_preview.rowsPassedOver;
            row.passedOver = true;
        } else if (const auto complaint = m_cells->countTrouble(cells)) {
            ++m_preview.rowsInTrouble;
            row.trouble = shownTrouble(*complaint, QString::number(cells.size()));
        } else {
            translate(cells, row);
        }
        if (m_preview.rows.size() >= m_rows)
            return;
        row.raw = cellTexts(cells);
        m_preview.rows.push_back(std::move(row));
    }

    void translate(std::span<const std::string_view> cells, PreviewRow& row)
    {
        m_cells->take(cells, m_currency);
        m_preview.rowsInTrouble += m_cells->anyTrouble() ? 1 : 0;
        const bool shown = m_preview.rows.size() < m_rows;
        for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
            const auto& trouble = m_cells->troubles()[i];
            m_preview.troubles[i] += trouble ? 1 : 0;
            if (!shown)
                continue;
            row.cells[i].text = textOf(m_cells->texts()[i]);
            if (trouble)
                row.cells[i].trouble = shownTrouble(*trouble, textOf(m_cells->theirs(static_cast<Column>(i), cells)));
        }
    }

    const ListSample& m_sample;
    const ImportMapping& m_mapping;
    std::size_t m_rows;
    HeaderGate m_gate;
    std::optional<CellMapper> m_cells;
    Currency m_currency;
    MappingPreview m_preview;
};

class ValueCounter
{
public:
    ValueCounter(const ImportMapping& mapping, TheirColumn column, int limit) :
        m_mapping(mapping), m_column(std::move(column)), m_limit(static_cast<std::size_t>(std::max(limit, 0))), m_gate(mapping)
    {
        // Only the layout and the rows passed over count.
        m_mapping.sources.fill({});
        m_mapping.from(Column::site) = {ColumnSource::Kind::column, m_column, {}};
    }

    void take(std::span<const std::string_view> cells)
    {
        const HeaderGate::Place place = m_gate.pass(cells);
        if (place == HeaderGate::Place::headerEnds)
            m_cells.emplace(m_mapping, m_gate.headers());
        if (place != HeaderGate::Place::row || isEmptyRecord(cells) || m_cells->ruleFor(cells) >= 0 || m_cells->place(Column::site) < 0)
            return;
        const std::string text(m_cells->theirs(Column::site, cells));
        if (const auto known = m_index.find(text); known != m_index.end()) {
            ++m_values[known->second].count;
        } else if (m_values.size() < m_limit) {
            m_index.emplace(text, m_values.size());
            m_values.push_back({textOf(text), 1});
        }
    }

    std::vector<DistinctValue> values()
    {
        std::stable_sort(m_values.begin(), m_values.end(),
                         [](const DistinctValue& a, const DistinctValue& b) { return a.count > b.count; });
        return std::move(m_values);
    }

private:
    ImportMapping m_mapping;
    TheirColumn m_column;
    std::size_t m_limit;
    HeaderGate m_gate;
    std::optional<CellMapper> m_cells;
    std::unordered_map<std::string, std::size_t> m_index;
    std::vector<DistinctValue> m_values;
};

} // namespace

MappingPreview previewMapping(const ListSample& sample, const ImportMapping& mapping, int rows)
{
    return Previewer(sample, mapping, rows).run();
}

std::vector<DistinctValue> distinctValues(const ListSample& sample, const ImportMapping& mapping, const TheirColumn& column, int limit)
{
    ValueCounter counter(mapping, column, limit);
    eachSampleRecord(sample, {mapping.encoding, mapping.delimiter}, [&](qint64, std::span<const std::string_view> cells) {
        counter.take(cells);
        return true;
    });
    return counter.values();
}

std::vector<DistinctValue> distinctValuesOf(const QString& path, const ImportMapping& mapping, const TheirColumn& column, int limit)
{
    QFile file(path);
    if (QFileInfo(path).isDir() || !file.open(QIODevice::ReadOnly))
        return {};
    ValueCounter counter(mapping, column, limit);
    readCsv(file, path, CsvLayout{mapping.encoding, mapping.delimiter}, [&](qint64, std::span<const std::string_view> cells) {
        counter.take(cells);
        return true;
    });
    return counter.values();
}

} // namespace rungwright
