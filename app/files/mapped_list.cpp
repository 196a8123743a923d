// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapped_list.h"

#include "csv_records.h"
#include "mapping_cells.h"
#include "mapping_floors.h"
#include "mapping_header.h"
#include "unit_rows.h"
#include "whole_file.h"
#include "words.h"

#include <QBuffer>
#include <QFile>
#include <QFileInfo>

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr qint64 kLargestPipe = qint64(256) << 20;
constexpr qint64 kLargestFloors = qint64(64) << 20;

struct FloorsFile {
    QByteArray bytes;
    QString name; ///< Empty: none was given.
};

class MappedReading
{
public:
    MappedReading(QIODevice& device, QString fileName, const ImportMapping& mapping, const FloorsFile& floors,
                  const UnitListOptions& options, const Progress& progress) :
        m_device(device),
        m_fileName(std::move(fileName)),
        m_mapping(mapping),
        m_floorsFile(floors),
        m_options(options),
        m_progress(progress),
        m_layout{mapping.encoding, mapping.delimiter},
        m_list(m_result.list)
    {
    }

    MappedListResult read()
    {
        m_list.fileTrouble = begin();
        if (m_list.fileTrouble.isEmpty())
            readRows();
        m_list.rowsFine = m_list.fileTrouble.isEmpty() ? m_list.rowsTaken : 0;
        if (!m_list.fileTrouble.isEmpty() || (m_list.refusedCount > 0 && !m_options.withoutBadRows)) {
            m_list.tiers.clear();
            m_list.rowsTaken = 0;
        }
        m_result.tiersWithoutFloor = std::count_if(m_list.tiers.begin(), m_list.tiers.end(),
                                                   [](const TierCase& tierCase) { return tierCase.tier.advertisedFloor.minor == 0; });
        if (m_list.fileTrouble.isEmpty())
            tellNotes();
        return std::move(m_result);
    }

private:
    QString cancelled() const { return Words::tr("%1: reading was cancelled; nothing was taken").arg(m_fileName); }

    // Everything that must be known before the first row is taken.
    QString begin()
    {
        if (const QString wrong = mappingTrouble(m_mapping); !wrong.isEmpty())
            return Words::tr("%1: the mapping cannot be used: %2").arg(m_fileName, wrong);
        if (m_mapping.floorsFromFile && m_floorsFile.name.isEmpty())
            return Words::tr("%1: the mapping takes the floors from a second file, and none was given. Give a file with the columns site, "
                             "tier and advertised_floor beside the list")
                .arg(m_fileName);
        if (!m_mapping.floorsFromFile && !m_floorsFile.name.isEmpty() &&
            m_mapping.from(Column::advertisedFloor).kind != ColumnSource::Kind::absent)
            return Words::tr("%1: a file of floors was given (%2), but the mapping takes the floors from the list. Leave the file out, or "
                             "change the mapping")
                .arg(m_fileName, m_floorsFile.name);
        if (QString wrong = lookAhead(); !wrong.isEmpty())
            return wrong;
        if (QString wrong = settleCurrency(); !wrong.isEmpty())
            return wrong;
        if (!m_floorsFile.name.isEmpty()) {
            Outcome<FloorTable> floors = readFloors(m_floorsFile.bytes, m_floorsFile.name, m_mapping.numbers, m_list.currency);
            if (!floors)
                return QString::fromStdString(floors.trouble());
            m_floors = std::move(floors).value();
        }
        if (!m_device.seek(0))
            return Words::tr("%1: cannot be read: %2").arg(m_fileName, m_device.errorString());
        return {};
    }

    QString lookAhead()
    {
        HeaderGate gate(m_mapping);
        qint64 rows = 0;
        QString trouble;
        const auto sink = [&](qint64 line, std::span<const std::string_view> cells) {
            const HeaderGate::Place place = gate.pass(cells);
            if (place == HeaderGate::Place::headerEnds) {
                trouble = takeHeader(line, gate.headers());
                return trouble.isEmpty();
            }
            if (place != HeaderGate::Place::row || isEmptyRecord(cells) || m_cells->ruleFor(cells) >= 0)
                return true;
            ++rows;
            if (!m_cells->mayTellCurrency())
                return false;
            Currency currency;
            const std::string_view code = m_cells->currencyOf(cells);
            if (code.empty() || readCurrency(code, currency))
                return true;
            m_found = currency;
            m_currencyLine = line;
            return false;
        };
        const CsvEnd end = readCsv(m_device, m_fileName, m_layout, sink, [this](double) { return !m_progress || m_progress(0); });
        if (end.cancelled)
            return cancelled();
        if (!trouble.isEmpty())
            return trouble;
        if (!m_cells && end.trouble.isEmpty())
            return gate.records() == 0
                       ? Words::tr("%1: the file is empty. Wanted is a header row and one row for each unit").arg(m_fileName)
                       : Words::tr("%1: the mapping has the header in row %2, and the file has %3 rows only. Choose the header "
                                   "row, or another file")
                             .arg(m_fileName, QString::number(m_mapping.headerRow), QString::number(gate.records()));
        if (!m_cells || rows == 0)
            return end.trouble.isEmpty() ? Words::tr("%1: there is a header row but no unit below it").arg(m_fileName) : end.trouble;
        return {};
    }

    QString takeHeader(qint64 line, const QStringList& headers)
    {
        m_cells.emplace(m_mapping, headers);
        if (m_cells->missing().isEmpty()) {
            tellUnknown(headers);
            return {};
        }
        QString hint;
        if (headers.size() == 1) {
            for (const char other : kDelimiters) {
                if (other != m_mapping.delimiter && headers.front().count(QLatin1Char(other)) > 1)
                    hint = Words::tr(" The cells seem to be separated by '%1': choose that delimiter.")
                               .arg(other == '\t' ? Words::tr("tab") : QString(QLatin1Char(other)));
            }
        }
        return Words::tr(
                   "%1:%2: the header row lacks %3; found: %4. Choose the header row and the columns anew in the mapping, or take the "
                   "mapping that belongs to this list.%5")
            .arg(m_fileName, QString::number(line), m_cells->missing().join(QStringLiteral(", ")),
                 shownText(headers.join(QStringLiteral(", ")), 200), hint);
    }

    void tellUnknown(const QStringList& headers)
    {
        QStringList unknown;
        for (qsizetype i = 0; i < headers.size(); ++i) {
            bool used = false;
            for (std::size_t c = 0; c < kColumnNames.size(); ++c)
                used = used || m_cells->place(static_cast<Column>(c)) == i;
            if (!used)
                unknown << (headers[i].isEmpty() ? Words::tr("(column %1, without a name)").arg(i + 1) : headers[i]);
        }
        unknown.removeDuplicates();
        m_list.unknownColumns = unknown;
    }

    // The list's currency, else the asked one, else none; a quarrel of the two is settled by nobody but the user.
    QString settleCurrency()
    {
        const QString& asked = m_options.currencyCode;
        if (!asked.isEmpty()) {
            if (const auto complaint = readCurrency(asked.trimmed().toStdString(), m_list.currency))
                return Words::tr("'%1' is %2. Wanted: %3").arg(shownText(asked), complaint->wrong, complaint->wanted);
        }
        if (!m_found)
            return {};
        if (!asked.isEmpty() && m_list.currency != *m_found)
            return Words::tr(
                       "%1:%2: by the mapping the list's currency is %3, but %4 is wanted. Take a list in %4, or change the mapping; a "
                       "command can name %3 or none")
                .arg(m_fileName, QString::number(m_currencyLine), QString::fromStdString(m_found->code),
                     QString::fromStdString(m_list.currency.code));
        m_list.currency = *m_found;
        return {};
    }

    UnitListHeader ourHeader() const
    {
        UnitListHeader header;
        header.mapped = true;
        header.cells = kColumnNames.size();
        for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
            header.place[i] = static_cast<int>(i);
            header.theirName[i] = m_cells->shownName(static_cast<Column>(i));
            header.theirPlace[i] = m_cells->place(static_cast<Column>(i)) + 1;
        }
        return header;
    }

    void readRows()
    {
        m_rows.emplace(ourHeader(), m_list.currency, m_currencyLine, m_list);
        if (m_mapping.floorsMayBeMissing)
            m_rows->takeTiersWithoutFloor();
        for (const SkipRule& rule : m_mapping.skip)
            m_result.passedOver.push_back({rule, 0, 0});
        HeaderGate gate(m_mapping);
        const CsvEnd end = readCsv(
            m_device, m_fileName, m_layout,
            [&](qint64 line, std::span<const std::string_view> cells) {
                if (gate.pass(cells) == HeaderGate::Place::row && !isEmptyRecord(cells))
                    take(line, cells);
                return true;
            },
            m_progress);
        m_list.encoding = end.encoding;
        m_list.fileTrouble = end.cancelled ? cancelled() : end.trouble;
        if (m_list.fileTrouble.isEmpty())
            finish();
    }

    void take(qint64 line, std::span<const std::string_view> cells)
    {
        if (const int rule = m_cells->ruleFor(cells); rule >= 0) {
            PassedOver& passed = m_result.passedOver[static_cast<std::size_t>(rule)];
            passed.firstLine = passed.rows == 0 ? line : passed.firstLine;
            ++passed.rows;
            ++m_result.rowsPassedOver;
            return;
        }
        if (const auto complaint = m_cells->countTrouble(cells)) {
            refuse({line, 0, {}, complaint->wrong, QString::number(cells.size()), complaint->wanted});
            return;
        }
        m_cells->take(cells, m_list.currency);
        if (m_cells->anyTrouble()) {
            refuseCells(line, cells);
            return;
        }
        std::array<std::string_view, kColumnNames.size()> ours;
        std::copy(m_cells->texts().begin(), m_cells->texts().end(), ours.begin());
        if (m_floors)
            ours[static_cast<std::size_t>(Column::advertisedFloor)] =
                m_floors->floorOf(ours[static_cast<std::size_t>(Column::site)], ours[static_cast<std::size_t>(Column::tier)]);
        const std::size_t before = m_list.refused.size();
        m_rows->take(line, ours);
        if (m_list.refused.size() > before)
            tellTheirText(m_list.refused.back(), cells);
    }

    void refuse(RefusedRow row)
    {
        ++m_list.refusedCount;
        if (m_list.refused.size() < kRefusedRowsKept)
            m_list.refused.push_back(std::move(row));
    }

    // The first column in trouble is told in full, the others by name.
    void refuseCells(qint64 line, std::span<const std::string_view> cells)
    {
        RefusedRow row;
        row.line = line;
        QStringList others;
        for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
            const auto& trouble = m_cells->troubles()[i];
            const auto column = static_cast<Column>(i);
            if (!trouble)
                continue;
            if (!row.wrong.isEmpty()) {
                others << m_cells->shownName(column);
                continue;
            }
            row.column = m_cells->place(column) + 1;
            row.columnName = m_cells->shownName(column);
            row.wrong = trouble->wrong;
            row.wanted = trouble->wanted;
            row.found = shownText(m_cells->theirs(column, cells));
        }
        if (!others.isEmpty())
            row.wrong += Words::tr(" (wrong in this row too: %1)").arg(others.join(QStringLiteral(", ")));
        refuse(std::move(row));
    }

    // What UnitRows refuses it tells with our spelling of the cell; the user looks for their own.
    void tellTheirText(RefusedRow& row, std::span<const std::string_view> cells) const
    {
        if (row.columnName.isEmpty())
            return;
        if (row.column == 0) {
            row.wrong = Words::tr("%1: %2").arg(row.columnName, row.wrong);
            return;
        }
        row.found = shownText(trimmedText(cells[static_cast<std::size_t>(row.column - 1)]));
    }

    void finish()
    {
        const std::size_t before = m_list.refused.size();
        m_rows->finish();
        for (std::size_t i = before; i < m_list.refused.size(); ++i) {
            RefusedRow& row = m_list.refused[i];
            row.wanted = m_floors ? Words::tr("a row for it in %1, or a mapping that takes tiers without a floor").arg(m_floorsFile.name)
                                  : Words::tr("the floor on at least one row of the tier, a file of floors, or a mapping that takes tiers "
                                              "without one");
        }
    }

    void tellNotes()
    {
        for (const PassedOver& passed : m_result.passedOver) {
            if (passed.rows == 0)
                continue;
            const QString header = shownText(passed.rule.column.header);
            const QString why = passed.rule.kind == SkipRule::Kind::isEmpty
                                    ? Words::tr("'%1' is empty").arg(header)
                                    : Words::tr("'%1' begins with '%2'").arg(header, shownText(passed.rule.text));
            m_result.notes
                << Words::tr("rows passed over because %1: %2, the first on line %3").arg(why).arg(passed.rows).arg(passed.firstLine);
        }
        if (m_result.tiersWithoutFloor > 0)
            m_result.notes << Words::tr("tiers taken without a floor: %1").arg(m_result.tiersWithoutFloor);
        constexpr int most = 5;
        if (const qint64 unused = m_floors ? m_floors->unusedCount() : 0; unused > 0)
            m_result.notes << Words::tr("rows in %1 whose tier is not in the list: %2, %3%4")
                                  .arg(m_floorsFile.name, QString::number(unused), m_floors->unused(most).join(QStringLiteral("; ")),
                                       unused > most ? QStringLiteral("; ...") : QString());
    }

    QIODevice& m_device;
    QString m_fileName;
    const ImportMapping& m_mapping;
    const FloorsFile& m_floorsFile;
    const UnitListOptions& m_options;
    const Progress& m_progress;
    CsvLayout m_layout;
    MappedListResult m_result;
    UnitListResult& m_list;
    std::optional<CellMapper> m_cells;
    std::optional<Currency> m_found;
    qint64 m_currencyLine = 0;
    std::optional<FloorTable> m_floors;
    std::optional<UnitRows> m_rows;
};

MappedListResult inTrouble(const QString& trouble)
{
    MappedListResult result;
    result.list.fileTrouble = trouble;
    return result;
}

} // namespace

MappedListResult readMappedList(const QByteArray& bytes, const QString& fileName, const ImportMapping& mapping, const QByteArray& floors,
                                const QString& floorsName, const UnitListOptions& options, const Progress& progress)
{
    QBuffer buffer;
    buffer.setData(bytes);
    buffer.open(QIODevice::ReadOnly);
    return MappedReading(buffer, fileName, mapping, {floors, floorsName}, options, progress).read();
}

MappedListResult loadMappedList(const QString& path, const ImportMapping& mapping, const QString& floors, const UnitListOptions& options,
                                const Progress& progress)
{
    FloorsFile floorsFile{{}, floors};
    if (!floors.isEmpty()) {
        Outcome<QByteArray> bytes = readWhole(floors, kLargestFloors);
        if (!bytes)
            return inTrouble(QString::fromStdString(bytes.trouble()));
        floorsFile.bytes = std::move(bytes).value();
    }
    QFile file(path);
    if (QFileInfo(path).isDir())
        return inTrouble(Words::tr("%1: is a folder, not a file").arg(path));
    if (!file.open(QIODevice::ReadOnly))
        return inTrouble(Words::tr("%1: cannot be opened: %2").arg(path, file.errorString()));
    if (!file.isSequential())
        return MappedReading(file, path, mapping, floorsFile, options, progress).read();
    const Outcome<QByteArray> bytes = readRest(file, kLargestPipe);
    if (!bytes)
        return inTrouble(QString::fromStdString(bytes.trouble()));
    return readMappedList(bytes.value(), path, mapping, floorsFile.bytes, floors, options, progress);
}

bool isOwnFormat(const QByteArray& beginning)
{
    QBuffer buffer;
    buffer.setData(beginning);
    buffer.open(QIODevice::ReadOnly);
    bool own = false;
    readCsv(buffer, {}, [&](qint64, std::span<const std::string_view> cells) {
        if (isEmptyRecord(cells))
            return true;
        own = readUnitListHeader(cells).ok();
        return false;
    });
    return own;
}

} // namespace rungwright
