// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping.h"

#include "cell_values.h"
#include "mapping_numbers.h"
#include "words.h"

#include <algorithm>
#include <map>

namespace rungwright
{

namespace
{

QString nameOf(std::size_t column) { return QString::fromUtf8(kColumnNames[column].data(), qsizetype(kColumnNames[column].size())); }

// Prices are looked at with the most decimals a currency has; how many this list's has is known when it is read.
const Currency kFinest{"XXX", 4};

std::optional<Complaint> constantTrouble(Column column, const QString& value)
{
    const std::string utf8 = value.toStdString();
    const std::string_view text = trimmedText(utf8);
    Price price;
    Status status{};
    int grade = 0;
    double number = 0;
    bool yes = false;
    Currency currency;
    switch (column) {
    case Column::site:
    case Column::tier:
        break;
    case Column::unit:
        return Complaint{Words::tr("the units would all have one name"), Words::tr("a column of the list")};
    case Column::askingPrice:
    case Column::advertisedFloor:
        return readPrice(text, kFinest, price);
    case Column::status:
        return readStatus(text, status);
    case Column::currency:
        return readCurrency(text, currency);
    case Column::grade:
        return readGrade(text, grade);
    case Column::area:
        return readArea(text, number);
    case Column::vacancyChance:
        return readChance(text, number);
    case Column::locked:
        return readYesNo(text, yes);
    }
    return text.empty() ? std::optional(Complaint{Words::tr("nothing in it"), Words::tr("a name")}) : std::nullopt;
}

bool isNeeded(const ImportMapping& mapping, std::size_t column)
{
    const bool floorElsewhere = mapping.floorsFromFile || mapping.floorsMayBeMissing;
    return column < kColumnsNeeded && !(column == static_cast<std::size_t>(Column::advertisedFloor) && floorElsewhere);
}

QString sourcesTrouble(const ImportMapping& mapping)
{
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        const ColumnSource& source = mapping.sources[i];
        if (source.kind == ColumnSource::Kind::absent && isNeeded(mapping, i))
            return i == static_cast<std::size_t>(Column::advertisedFloor)
                       ? Words::tr(
                             "'advertised_floor' has no source. Choose a column, a constant or a file of floors, or take tiers without one")
                       : Words::tr("'%1' has no source. Choose a column of the list or a constant").arg(nameOf(i));
        if (source.kind == ColumnSource::Kind::column && (source.column.occurrence < 1 || source.column.occurrence > 1'000))
            return Words::tr("'%1': a column is counted from 1, found %2").arg(nameOf(i), QString::number(source.column.occurrence));
        if (source.kind != ColumnSource::Kind::constant)
            continue;
        if (const auto complaint = constantTrouble(static_cast<Column>(i), source.constant))
            return Words::tr("the constant for '%1': %2; found '%3'; wanted: %4")
                .arg(nameOf(i), complaint->wrong, shownText(source.constant), complaint->wanted);
    }
    if (mapping.floorsFromFile && mapping.from(Column::advertisedFloor).kind != ColumnSource::Kind::absent)
        return Words::tr("the floors come from a file and from '%1' too. Choose one of the two")
            .arg(nameOf(static_cast<std::size_t>(Column::advertisedFloor)));
    return {};
}

QString layoutTrouble(const ImportMapping& mapping)
{
    if (std::find(kDelimiters.begin(), kDelimiters.end(), mapping.delimiter) == kDelimiters.end())
        return Words::tr("cells are separated by a comma, a semicolon, a tab or a bar |; found '%1'").arg(QLatin1Char(mapping.delimiter));
    if (mapping.headerRow < 1 || mapping.headerRow > 1'000'000)
        return Words::tr("the header row is counted from 1, found %1").arg(mapping.headerRow);
    if (mapping.headerLines != 1 && mapping.headerLines != 2)
        return Words::tr("a header has one line or two, found %1").arg(mapping.headerLines);
    return {};
}

QString numbersTrouble(const NumberStyle& style)
{
    if ((style.decimal == DecimalMark::comma && style.grouping == Grouping::comma) ||
        (style.decimal == DecimalMark::point && style.grouping == Grouping::point))
        return Words::tr("one sign cannot stand for decimals and for groups of thousands. Choose another for one of the two");
    for (const NumberMark& mark : style.marks) {
        const QString text = mark.text.trimmed();
        if (text.isEmpty() || std::any_of(text.begin(), text.end(), [](QChar c) { return c.isDigit() || c == u'-' || c == u'+'; }))
            return Words::tr("a sign to be taken off numbers holds neither figures nor plus or minus; found '%1'")
                .arg(shownText(mark.text));
        if (!mark.currency.isEmpty() && !findCurrency(mark.currency.toStdString()))
            return Words::tr("the sign '%1': not a currency; found '%2'; wanted: a code of ISO 4217 such as EUR, in capitals, or nothing")
                .arg(shownText(text), shownText(mark.currency));
    }
    return {};
}

QString wordsTrouble(const ImportMapping& mapping)
{
    std::map<QString, Status> known;
    for (const StatusWord& word : mapping.statuses) {
        const auto [same, fresh] = known.emplace(foldedText(word.word), word.status);
        if (!fresh && same->second != word.status)
            return Words::tr("the status word '%1' stands for two statuses. Choose one").arg(shownText(word.word));
    }
    if (mapping.from(Column::status).kind == ColumnSource::Kind::column && mapping.statuses.empty())
        return Words::tr("no word is a status yet. Say what the words in '%1' mean")
            .arg(shownText(mapping.from(Column::status).column.header));
    for (const QString& yes : mapping.yesWords) {
        for (const QString& no : mapping.noWords) {
            if (foldedText(yes) == foldedText(no))
                return Words::tr("the word '%1' stands for yes and for no. Choose one").arg(shownText(yes));
        }
    }
    for (const SkipRule& rule : mapping.skip) {
        if (rule.kind == SkipRule::Kind::beginsWith && foldedText(rule.text).isEmpty())
            return Words::tr("rows to be passed over: say with which words they begin in '%1'").arg(shownText(rule.column.header));
        if (rule.column.occurrence < 1 || rule.column.occurrence > 1'000)
            return Words::tr("rows to be passed over: a column is counted from 1, found %1").arg(rule.column.occurrence);
    }
    return {};
}

} // namespace

ImportMapping ownFormatMapping()
{
    ImportMapping mapping;
    for (std::size_t i = 0; i < kColumnNames.size(); ++i) {
        mapping.sources[i] = ColumnSource::of(nameOf(i));
        mapping.headers << nameOf(i);
    }
    for (const Status status : {Status::vacant, Status::occupied, Status::reserved, Status::closed}) {
        const std::string_view word = statusWord(status);
        mapping.statuses.push_back({QString::fromUtf8(word.data(), qsizetype(word.size())), status});
    }
    mapping.yesWords = QStringList{QStringLiteral("yes")};
    mapping.noWords = QStringList{QStringLiteral("no")};
    return mapping;
}

QString mappingTrouble(const ImportMapping& mapping)
{
    for (const auto& look : {layoutTrouble(mapping), sourcesTrouble(mapping), numbersTrouble(mapping.numbers), wordsTrouble(mapping)}) {
        if (!look.isEmpty())
            return look;
    }
    return {};
}

QStringList joinedHeaders(const QStringList& upper, const QStringList& lower)
{
    QStringList joined;
    QString above;
    for (qsizetype i = 0; i < std::max(upper.size(), lower.size()); ++i) {
        const QString own = upper.value(i).simplified();
        const QString below = lower.value(i).simplified();
        if (!own.isEmpty())
            above = own;
        // An upper text reaches to the right over lower ones only; a column without either stays nameless.
        const QString head = own.isEmpty() && (lower.isEmpty() || below.isEmpty()) ? QString() : above;
        joined << (head.isEmpty() ? below : below.isEmpty() ? head : head + QLatin1Char(' ') + below);
    }
    return joined;
}

} // namespace rungwright
