// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_cells.h"

#include "words.h"

#include <algorithm>

namespace rungwright
{

namespace
{

constexpr std::size_t kSpellingsKept = 4'096;

std::size_t indexOf(Column column) { return static_cast<std::size_t>(column); }

QString quoted(const QStringList& words)
{
    constexpr qsizetype most = 12;
    QStringList shown;
    for (const QString& word : words.mid(0, most))
        shown << (word.isEmpty() ? Words::tr("(empty)") : QStringLiteral("'%1'").arg(shownText(word)));
    return shown.join(QStringLiteral(", ")) + (words.size() > most ? QStringLiteral(", ...") : QString());
}

} // namespace

HeaderPlaces::HeaderPlaces(const QStringList& headers)
{
    for (const QString& header : headers)
        m_folded.push_back(foldedText(header));
}

int HeaderPlaces::placeOf(const TheirColumn& column) const
{
    const QString wanted = foldedText(column.header);
    int seen = 0;
    for (std::size_t i = 0; i < m_folded.size(); ++i) {
        if (m_folded[i] == wanted && ++seen == column.occurrence)
            return static_cast<int>(i);
    }
    return -1;
}

std::optional<int> WordTable::find(std::string_view text) const
{
    if (const auto seen = m_seen.find(text); seen != m_seen.end())
        return seen->second;
    const auto known = m_folded.find(foldedText(text));
    if (known == m_folded.end())
        return {};
    if (m_seen.size() < kSpellingsKept)
        m_seen.emplace(text, known->second);
    return known->second;
}

CellMapper::CellMapper(const ImportMapping& mapping, const QStringList& headers) :
    m_mapping(mapping), m_numbers(mapping.numbers), m_columns(headers.size())
{
    const HeaderPlaces places(headers);
    const auto find = [&](const TheirColumn& column) {
        const int place = places.placeOf(column);
        if (place < 0)
            m_missing << (column.occurrence > 1
                              ? Words::tr("'%1' (the %2. of that name)").arg(shownText(column.header)).arg(column.occurrence)
                              : QStringLiteral("'%1'").arg(shownText(column.header)));
        return place;
    };
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        const ColumnSource& source = mapping.sources[i];
        m_places[i] = source.kind == ColumnSource::Kind::column ? find(source.column) : -1;
        m_names[i] = source.kind == ColumnSource::Kind::column
                         ? source.column.header.simplified()
                         : QString::fromUtf8(kColumnNames[i].data(), qsizetype(kColumnNames[i].size()));
        if (source.kind == ColumnSource::Kind::constant)
            m_constants[i] = trimmedText(source.constant.toStdString());
    }
    for (SkipRule& rule : m_mapping.skip) {
        m_rulePlaces.push_back(find(rule.column));
        rule.text = foldedText(rule.text);
    }
    m_missing.removeDuplicates();
    for (const StatusWord& word : mapping.statuses)
        m_statuses.add(word.word, static_cast<int>(word.status));
    for (const QString& word : mapping.yesWords)
        m_yesNo.add(word, 1);
    for (const QString& word : mapping.noWords)
        m_yesNo.add(word, 0);
    m_mayTellCurrency = mapping.from(Column::currency).kind != ColumnSource::Kind::absent ||
                        std::any_of(mapping.numbers.marks.begin(), mapping.numbers.marks.end(),
                                    [](const NumberMark& mark) { return !mark.currency.isEmpty(); });
}

std::string_view CellMapper::theirs(Column column, std::span<const std::string_view> cells) const
{
    const int place = m_places[indexOf(column)];
    return place < 0 || static_cast<std::size_t>(place) >= cells.size() ? std::string_view()
                                                                        : trimmedText(cells[static_cast<std::size_t>(place)]);
}

int CellMapper::ruleFor(std::span<const std::string_view> cells) const
{
    for (std::size_t i = 0; i < m_rulePlaces.size(); ++i) {
        const auto place = static_cast<std::size_t>(m_rulePlaces[i]);
        if (m_rulePlaces[i] < 0)
            continue;
        const std::string_view text = place < cells.size() ? trimmedText(cells[place]) : std::string_view();
        const SkipRule& rule = m_mapping.skip[i];
        if (rule.kind == SkipRule::Kind::isEmpty ? text.empty() : beginsWithWords(foldedText(text), rule.text))
            return static_cast<int>(i);
    }
    return -1;
}

std::optional<Complaint> CellMapper::countTrouble(std::span<const std::string_view> cells) const
{
    const auto columns = static_cast<std::size_t>(m_columns);
    if (cells.size() < columns)
        return Complaint{Words::tr("too few cells"), Words::tr("%1, as in the header row").arg(m_columns)};
    const auto beyond = cells.subspan(columns);
    if (std::all_of(beyond.begin(), beyond.end(), [](std::string_view cell) { return trimmedText(cell).empty(); }))
        return {};
    const QString sign = m_mapping.delimiter == '\t' ? Words::tr("a tab") : QStringLiteral("'%1'").arg(QLatin1Char(m_mapping.delimiter));
    return Complaint{
        Words::tr("too many cells"),
        Words::tr("%1, as in the header row (%2 inside a cell needs quotation marks around the cell)").arg(m_columns).arg(sign)};
}

std::string_view CellMapper::currencyOf(std::span<const std::string_view> cells) const
{
    if (const std::string& constant = m_constants[indexOf(Column::currency)]; !constant.empty())
        return constant;
    if (const std::string_view text = theirs(Column::currency, cells); !text.empty())
        return m_numbers.currencyOfMark(text).value_or(text);
    ReadNumber number;
    for (const Column column : {Column::askingPrice, Column::advertisedFloor}) {
        const std::string_view text = theirs(column, cells);
        if (!text.empty() && m_numbers.read(text, number) && !number.currency.empty())
            return number.currency;
    }
    return {};
}

void CellMapper::take(std::span<const std::string_view> cells, const Currency& currency)
{
    m_anyTrouble = false;
    m_priceCurrency = {};
    m_twoCurrencies = false;
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        m_texts[i].clear();
        m_troubles[i].reset();
        if (m_places[i] < 0) {
            m_texts[i] = m_constants[i];
            continue;
        }
        const auto column = static_cast<Column>(i);
        m_troubles[i] = translate(column, theirs(column, cells), currency, m_texts[i]);
        if (m_troubles[i])
            m_texts[i].clear();
    }
    auto& priceTrouble = m_troubles[indexOf(Column::askingPrice)];
    if (!priceTrouble)
        priceTrouble = currencyTrouble();
    if (textOf(Column::currency).empty() && !m_troubles[indexOf(Column::currency)])
        textOf(Column::currency) = m_priceCurrency;
    m_anyTrouble = std::any_of(m_troubles.begin(), m_troubles.end(), [](const auto& trouble) { return trouble.has_value(); });
}

CellMapper::Answer CellMapper::currencyTrouble() const
{
    if (m_twoCurrencies)
        return Complaint{Words::tr("one currency beside the price and another beside the floor"),
                         Words::tr("a unit list has one currency")};
    const std::string& said = m_texts[indexOf(Column::currency)];
    if (said.empty() || m_priceCurrency.empty() || foldedText(said) == foldedText(m_priceCurrency))
        return {};
    return Complaint{Words::tr("the sign beside the price stands for %1 and the row's currency is %2")
                         .arg(QString::fromStdString(std::string(m_priceCurrency)), shownText(said)),
                     Words::tr("one currency: change what the sign stands for in the mapping, or the row")};
}

CellMapper::Answer CellMapper::translate(Column column, std::string_view text, const Currency& currency, std::string& out)
{
    switch (column) {
    case Column::site:
    case Column::tier:
    case Column::unit:
        out = text;
        return text.empty() ? Answer(Complaint{Words::tr("nothing in it"), Words::tr("a name")}) : std::nullopt;
    case Column::askingPrice:
        return text.empty() ? Answer(Complaint{Words::tr("no price"), Words::tr("an amount above 0 such as %1").arg(m_numbers.example())})
                            : price(column, text, currency, out);
    case Column::advertisedFloor:
        return text.empty() ? std::nullopt : price(column, text, currency, out);
    case Column::status:
        return status(text, out);
    case Column::currency: {
        out = m_numbers.currencyOfMark(text).value_or(text);
        Currency read;
        return out.empty() ? std::nullopt : readCurrency(out, read);
    }
    case Column::grade:
    case Column::area:
    case Column::vacancyChance:
        return text.empty() ? std::nullopt : plain(column, text, out);
    case Column::locked:
        return yesNo(text, out);
    }
    return {};
}

CellMapper::Answer CellMapper::number(Column column, std::string_view text, ReadNumber& out) const
{
    const bool fine = m_numbers.read(text, out);
    if (fine && (!out.percent || column == Column::vacancyChance))
        return {};
    return Complaint{Words::tr("not a number as the mapping has them"),
                     Words::tr("one such as %1%2, or another way of writing numbers in the mapping")
                         .arg(m_numbers.example(), m_mapping.numbers.marks.empty() ? Words::tr(" without a sign beside it") : QString())};
}

CellMapper::Answer CellMapper::price(Column column, std::string_view text, const Currency& currency, std::string& out)
{
    ReadNumber read;
    if (auto complaint = number(column, text, read))
        return complaint;
    if (!read.currency.empty()) {
        m_twoCurrencies = m_twoCurrencies || (!m_priceCurrency.empty() && m_priceCurrency != read.currency);
        m_priceCurrency = read.currency;
    }
    if (m_mapping.numbers.grouping == Grouping::none) {
        if (auto complaint = twoWaysTrouble(read.plain, currency))
            return complaint;
    }
    Price price;
    auto complaint = readPrice(read.plain, currency, price);
    if (complaint)
        complaint->wanted = Words::tr("an amount above 0 such as %1, with at most %2 decimals (%3)")
                                .arg(m_numbers.example(), QString::number(currency.decimals), QString::fromStdString(currency.code));
    out = std::move(read.plain);
    return complaint;
}

CellMapper::Answer CellMapper::status(std::string_view text, std::string& out) const
{
    if (const auto status = m_statuses.find(text)) {
        out = statusWord(static_cast<Status>(*status));
        return {};
    }
    QStringList words;
    for (const StatusWord& word : m_mapping.statuses)
        words << word.word;
    return Complaint{text.empty() ? Words::tr("no status") : Words::tr("a status word that the mapping does not know"),
                     Words::tr("one of %1; or say in the mapping which status it stands for").arg(quoted(words))};
}

CellMapper::Answer CellMapper::yesNo(std::string_view text, std::string& out) const
{
    const auto yes = text.empty() ? std::optional(0) : m_yesNo.find(text);
    if (yes) {
        out = *yes == 1 ? "yes" : "no";
        return {};
    }
    return Complaint{Words::tr("neither a word for yes nor one for no"),
                     Words::tr("yes as %1, no as %2; or say in the mapping which of the two it is")
                         .arg(quoted(m_mapping.yesWords), quoted(m_mapping.noWords))};
}

CellMapper::Answer CellMapper::plain(Column column, std::string_view text, std::string& out) const
{
    ReadNumber read;
    if (auto complaint = number(column, text, read))
        return complaint;
    out = std::move(read.plain);
    double value = 0;
    int grade = 0;
    if (column == Column::area)
        return readArea(out, value);
    if (column == Column::grade) {
        // A spreadsheet may have given whole numbers decimals: 3,0 is the grade 3.
        if (const auto point = out.find('.'); point != std::string::npos && out.find_first_not_of('0', point + 1) == std::string::npos)
            out.resize(point);
        return readGrade(out, grade);
    }
    if (read.percent || m_mapping.numbers.chanceInPercent)
        out = hundredthOf(out);
    return readChance(out, value);
}

} // namespace rungwright
