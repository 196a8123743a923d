// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_propose.h"

#include "mapping_guess.h"
#include "mapping_header.h"
#include "mapping_layout.h"
#include "mapping_numbers.h"
#include "trade_words.h"
#include "words.h"

#include <QRegularExpression>

#include <algorithm>
#include <optional>
#include <set>

namespace rungwright
{

namespace
{

constexpr std::size_t kRecords = 5'000;

QString nameOf(std::size_t column) { return QString::fromUtf8(kColumnNames[column].data(), qsizetype(kColumnNames[column].size())); }

class Proposer
{
public:
    Proposer(const ListSample& sample, const ImportMapping& layout) :
        m_records(sampleRecords(sample, layout.encoding, layout.delimiter, kRecords))
    {
        if (!sample.tail.isEmpty())
            m_tail = sampleRecords({sample.tail, true}, layout.encoding, layout.delimiter, kRecords);
        ImportMapping& mapping = m_proposal.mapping;
        mapping.encoding = layout.encoding;
        mapping.delimiter = layout.delimiter;
        mapping.headerRow = layout.headerRow;
        mapping.headerLines = layout.headerLines;
    }

    MappingProposal run()
    {
        splitRecords();
        guess();
        findLinesThatAreNoUnits();
        if (!m_proposal.mapping.skip.empty())
            guess();
        setSources();
        setNumbers();
        setStatuses();
        setYesNo();
        noteWhatIsMissing();
        return std::move(m_proposal);
    }

private:
    ImportMapping& mapping() { return m_proposal.mapping; }
    int place(Column column) const { return m_guesses[static_cast<std::size_t>(column)].place; }
    const ColumnLook& look(Column column) const { return m_looks[static_cast<std::size_t>(place(column))]; }
    void note(const QString& text) { m_proposal.notes << text; }

    void splitRecords()
    {
        const auto first = static_cast<std::size_t>(std::max(mapping().headerRow, 1) - 1);
        const auto lines = static_cast<std::size_t>(mapping().headerLines == 2 ? 2 : 1);
        if (first + lines > m_records.size())
            return;
        m_proposal.headers = lines == 2 ? joinedHeaders(m_records[first], m_records[first + 1]) : joinedHeaders(m_records[first]);
        mapping().headers = m_proposal.headers;
        for (std::size_t i = first + lines; i < m_records.size(); ++i) {
            const QStringList& row = m_records[i];
            if (std::any_of(row.begin(), row.end(), [](const QString& cell) { return !cell.trimmed().isEmpty(); }))
                m_rows.push_back(row);
        }
    }

    void guess()
    {
        m_looks.clear();
        for (qsizetype i = 0; i < m_proposal.headers.size(); ++i)
            m_looks.push_back(lookAt(m_rows, i));
        m_guesses = guessColumns(m_proposal.headers, m_looks);
    }

    TheirColumn columnAt(qsizetype index) const
    {
        TheirColumn column{m_proposal.headers[index], 0};
        for (qsizetype i = 0; i <= index; ++i)
            column.occurrence += foldedText(m_proposal.headers[i]) == foldedText(column.header) ? 1 : 0;
        return column;
    }

    struct FoundRule {
        SkipRule rule;
        qsizetype at = 0;  ///< Index of the rule's column.
        bool lone = false; ///< The row holds one cell, and its first word is no word for a total.

        bool matches(const QStringList& row) const
        {
            const QString text = row.value(at);
            return rule.kind == SkipRule::Kind::isEmpty ? text.trimmed().isEmpty()
                                                        : beginsWithWords(foldedText(text), foldedText(rule.text));
        }
    };

    // Totals and footers. They are taken out of the rows, so that they do not spoil the second look at the columns.
    void findLinesThatAreNoUnits()
    {
        constexpr std::size_t mostTried = 20;
        constexpr std::size_t mostRules = 5;
        std::vector<FoundRule> tried;
        const auto tryRow = [&](const QStringList& row) {
            const std::optional<FoundRule> found = ruleFor(row);
            if (found && tried.size() < mostTried &&
                std::none_of(tried.begin(), tried.end(), [&](const FoundRule& one) { return one.rule == found->rule; }))
                tried.push_back(*found);
        };
        std::for_each(m_rows.begin(), m_rows.end(), tryRow);
        const SampleRecords last = lastRows();
        std::for_each(last.begin(), last.end(), tryRow);
        std::erase_if(tried, [this](const FoundRule& found) {
            if (found.lone && standsInUnitRows(found.rule.text, found.at))
                return true;
            const auto takesUnit = [&](const QStringList& row) { return isUnit(row) && found.matches(row); };
            return std::any_of(m_rows.begin(), m_rows.end(), takesUnit) || std::any_of(m_tail.begin(), m_tail.end(), takesUnit);
        });
        tried.resize(std::min(tried.size(), mostRules));
        const auto passed = std::stable_partition(m_rows.begin(), m_rows.end(), [&tried](const QStringList& row) {
            return std::none_of(tried.begin(), tried.end(), [&row](const FoundRule& found) { return found.matches(row); });
        });
        const auto atEnd = std::count_if(last.begin(), last.end(), [&tried](const QStringList& row) {
            return std::any_of(tried.begin(), tried.end(), [&row](const FoundRule& found) { return found.matches(row); });
        });
        for (FoundRule& found : tried)
            mapping().skip.push_back(std::move(found.rule));
        if (passed != m_rows.end() || atEnd > 0)
            note(Words::tr("lines that seem to be no units (totals, footers) will be passed over: %1 in the sample. Look at the rules")
                     .arg(m_rows.end() - passed + atEnd));
        m_rows.erase(passed, m_rows.end());
    }

    // The file's last few lines, when the sample does not reach them. None where most of the tail makes no sense as rows of units: it may
    // begin inside of quotes.
    SampleRecords lastRows() const
    {
        constexpr std::ptrdiff_t few = 5;
        const auto units = std::count_if(m_tail.begin(), m_tail.end(), [this](const QStringList& row) { return isUnit(row); });
        const auto rows = std::ssize(m_tail);
        if (rows < 2 || 2 * units < rows)
            return {};
        return {m_tail.end() - std::min(few, rows - 1), m_tail.end()};
    }

    bool isUnit(const QStringList& row) const
    {
        return place(Column::unit) >= 0 && !row.value(place(Column::unit)).trimmed().isEmpty() && hasKnownStatus(row);
    }

    bool hasKnownStatus(const QStringList& row) const
    {
        const int at = place(Column::status);
        if (at < 0)
            return false;
        const QString text = row.value(at);
        return statusOfTradeWord(text) || (statusOfYes(m_proposal.headers[at]) && yesNoOfTradeWord(text));
    }

    // Does the word stand in the column in a row that holds more than this one cell?
    bool standsInUnitRows(const QString& word, qsizetype at) const
    {
        const QString wanted = foldedText(word);
        return std::any_of(m_rows.begin(), m_rows.end(), [&](const QStringList& row) {
            const QString text = foldedText(row.value(at));
            return (text.split(QLatin1Char(' ')).contains(wanted) || beginsWithWords(text, wanted)) && filledCells(row) > 1;
        });
    }

    static qsizetype filledCells(const QStringList& row)
    {
        return std::count_if(row.begin(), row.end(), [](const QString& cell) { return !cell.trimmed().isEmpty(); });
    }

    std::optional<FoundRule> ruleFor(const QStringList& row) const
    {
        const auto text = [&row](int at) { return at < 0 ? QString() : row.value(at).trimmed(); };
        const int unit = place(Column::unit);
        const qsizetype width = std::min(row.size(), m_proposal.headers.size());
        qsizetype totalAt = -1;
        for (qsizetype i = 0; i < width && totalAt < 0; ++i)
            totalAt = totalWordAtBeginning(row[i]).isEmpty() ? -1 : i;
        // A site may be called so: a line of a total has no status.
        if (hasKnownStatus(row))
            totalAt = -1;
        const bool noUnit = unit >= 0 && text(unit).isEmpty();
        if (noUnit && (totalAt >= 0 || text(place(Column::status)).isEmpty()))
            return FoundRule{{SkipRule::Kind::isEmpty, columnAt(unit), {}}, unit, false};
        if (totalAt >= 0)
            return FoundRule{{SkipRule::Kind::beginsWith, columnAt(totalAt), totalWordAtBeginning(row[totalAt])}, totalAt, false};
        if (m_proposal.headers.size() < 3 || filledCells(row) != 1)
            return {};
        const auto only = std::find_if(row.begin(), row.end(), [](const QString& cell) { return !cell.trimmed().isEmpty(); }) - row.begin();
        return only < width ? std::optional(FoundRule{
                                  {SkipRule::Kind::beginsWith, columnAt(only), row[only].simplified().section(u' ', 0, 0)}, only, true})
                            : std::nullopt;
    }

    void setSources()
    {
        for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
            const ColumnGuess& guess = m_guesses[i];
            if (guess.place < 0)
                continue;
            const TheirColumn column = columnAt(guess.place);
            mapping().sources[i] = {ColumnSource::Kind::column, column, {}};
            ColumnNote& told = m_proposal.columns[i];
            told.confidence = guess.score >= 90 ? Confidence::sure : guess.score >= 55 ? Confidence::likely : Confidence::guess;
            told.note = guess.byWord ? Words::tr("the header '%1' says so").arg(shownText(column.header))
                                     : Words::tr("the values under '%1' look like it").arg(shownText(column.header));
        }
        if (place(Column::grade) >= 0)
            m_proposal.columns[static_cast<std::size_t>(Column::grade)].note += Words::tr("; check that higher is more desirable");
    }

    void setNumbers()
    {
        std::vector<QString> prices;
        std::vector<QString> others;
        const auto add = [this](Column column, std::vector<QString>& texts) {
            if (place(column) >= 0)
                texts.insert(texts.end(), look(column).values.begin(), look(column).values.end());
        };
        add(Column::askingPrice, prices);
        add(Column::advertisedFloor, prices);
        add(Column::area, others);
        add(Column::grade, others);
        add(Column::vacancyChance, others);
        NumbersGuess guess = guessNumbers(prices, others, mapping().delimiter);
        mapping().numbers = guess.style;
        mapping().numbers.chanceInPercent = chancesArePercent();
        m_proposal.numbersAmbiguous = guess.ambiguous;
        if (guess.ambiguous) {
            const bool groups = guess.style.grouping == Grouping::point || guess.style.grouping == Grouping::comma;
            note(Words::tr("numbers such as %1 can be read in two ways; taken here as %2. Say which it is")
                     .arg(shownText(guess.example), groups ? Words::tr("grouped thousands") : Words::tr("decimals")));
        }
        for (const QString& sign : guess.tellNothing)
            note(Words::tr("the sign '%1' stands for more than one currency. Say which it is").arg(sign));
        noteMarks(guess);
        currencyOfHeader();
    }

    void noteMarks(const NumbersGuess& guess)
    {
        const auto quoted = [](const QStringList& texts) {
            QStringList shown;
            for (const QString& text : texts)
                shown << QStringLiteral("'%1'").arg(shownText(text));
            return shown.join(QStringLiteral(", "));
        };
        if (!guess.unknownMarks.isEmpty())
            note(Words::tr("beside numbers stands what is not known here, and it will be taken off: %1. Take out of the signs what changes "
                           "an amount")
                     .arg(quoted(guess.unknownMarks)));
        if (!guess.otherPeriods.isEmpty())
            note(Words::tr("prices are for different periods: '%1', and %2 too. Only '%1' will be taken off, and rows with another period "
                           "will be refused: a list has prices for one period")
                     .arg(shownText(guess.period), quoted(guess.otherPeriods)));
    }

    bool chancesArePercent() const
    {
        if (place(Column::vacancyChance) < 0)
            return false;
        const std::vector<QString>& values = look(Column::vacancyChance).values;
        return std::any_of(values.begin(), values.end(), [](const QString& text) {
            const NumberText number = takeApart(text);
            return !number.percent && number.figures.section(QRegularExpression(QStringLiteral("[.,]")), 0, 0).toInt() > 1;
        });
    }

    // "Miete (EUR)", "Rent £": a currency that only the header names is a constant.
    void currencyOfHeader()
    {
        const std::vector<NumberMark>& marks = mapping().numbers.marks;
        const bool told = std::any_of(marks.begin(), marks.end(), [](const NumberMark& mark) { return !mark.currency.isEmpty(); });
        if (told || place(Column::currency) >= 0 || place(Column::askingPrice) < 0)
            return;
        const QString& header = m_proposal.headers[place(Column::askingPrice)];
        static const QRegularExpression between(QStringLiteral("[\\s()\\[\\]/,.:;-]+"));
        for (const QString& word : header.split(between, Qt::SkipEmptyParts)) {
            const QString code = currencyOfSign(word);
            // "ALL" or "TOP" in a title of capitals is no currency.
            if (code.isEmpty() || (word == code && header == header.toUpper() && !header.contains(QLatin1Char('('))) ||
                (word.size() == 3 && word.at(0).isLetter() && word != code))
                continue;
            mapping().from(Column::currency) = ColumnSource::always(code);
            m_proposal.columns[static_cast<std::size_t>(Column::currency)] = {Confidence::likely,
                                                                              Words::tr("the header '%1' says so").arg(shownText(header))};
            return;
        }
    }

    void setStatuses()
    {
        if (place(Column::status) < 0)
            return;
        const ColumnLook& statuses = look(Column::status);
        const std::optional<Status> yes = statusOfYes(m_proposal.headers[place(Column::status)]);
        QStringList unknown;
        std::set<QString> seen;
        for (const QString& word : statuses.values) {
            if (!seen.insert(foldedText(word)).second)
                continue;
            std::optional<Status> status = statusOfTradeWord(word);
            const std::optional<bool> answer = yesNoOfTradeWord(word);
            if (!status && yes && answer)
                status = *answer ? *yes : *yes == Status::vacant ? Status::occupied : Status::vacant;
            if (status)
                mapping().statuses.push_back({word.simplified(), *status});
            else
                unknown << QStringLiteral("'%1'").arg(shownText(word));
        }
        if (!unknown.isEmpty())
            note(Words::tr("status words that are not known here: %1. Say what they mean").arg(unknown.join(QStringLiteral(", "))));
    }

    void setYesNo()
    {
        if (place(Column::locked) < 0)
            return;
        for (const QString& value : look(Column::locked).values) {
            const QString word = value.simplified();
            const std::optional<bool> yes = yesNoOfTradeWord(word);
            QStringList& words = yes.value_or(false) ? mapping().yesWords : mapping().noWords;
            if (yes && !words.contains(word, Qt::CaseInsensitive))
                words << word;
        }
    }

    void noteWhatIsMissing()
    {
        if (m_proposal.headers.isEmpty()) {
            note(Words::tr("no header row was found"));
            return;
        }
        for (std::size_t i = 0; i < kColumnsNeeded; ++i) {
            if (mapping().sources[i].kind != ColumnSource::Kind::absent)
                continue;
            const bool floor = i == static_cast<std::size_t>(Column::advertisedFloor);
            m_proposal.columns[i].note =
                floor
                    ? Words::tr("no column seems to hold it. Choose one, or a constant, or a file of floors, or take tiers without a floor")
                    : Words::tr("no column seems to hold it. Choose one, or a constant");
            note(QStringLiteral("%1: %2").arg(nameOf(i), m_proposal.columns[i].note));
        }
    }

    MappingProposal m_proposal;
    SampleRecords m_records;
    SampleRecords m_tail; ///< Of the file's end, the first one torn; empty when the sample is whole.
    SampleRecords m_rows; ///< Below the header, those of units.
    std::vector<ColumnLook> m_looks;
    std::array<ColumnGuess, kColumnNames.size()> m_guesses;
};

} // namespace

MappingProposal proposeColumns(const ListSample& sample, const ImportMapping& layout) { return Proposer(sample, layout).run(); }

MappingProposal proposeMapping(const ListSample& sample)
{
    ImportMapping layout;
    const EncodingGuess encoding = guessEncoding(sample.bytes, sample.whole);
    layout.encoding = encoding.encoding;
    layout.delimiter = guessDelimiter(sample, layout.encoding);
    constexpr std::size_t enough = 200;
    const HeaderGuess header = guessHeader(sampleRecords(sample, layout.encoding, layout.delimiter, enough));
    layout.headerRow = header.row;
    layout.headerLines = header.lines;
    MappingProposal proposal = proposeColumns(sample, layout);
    if (!encoding.sure) {
        const std::string_view word = encodingWord(encoding.encoding);
        proposal.notes.prepend(Words::tr("the encoding is a guess, %1: %2. Look at the letters with accents and at currency signs")
                                   .arg(QString::fromUtf8(word.data(), qsizetype(word.size())), encoding.why));
    }
    return proposal;
}

} // namespace rungwright
