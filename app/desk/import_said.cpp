// SPDX-License-Identifier: GPL-3.0-or-later
#include "import_said.h"

#include "mapping_numbers.h"

#include <algorithm>

namespace rungwright
{

MappingProposal keepWhatWasSaid(const ImportMapping& said, MappingProposal proposal)
{
    using Kind = ColumnSource::Kind;
    ImportMapping& now = proposal.mapping;
    const auto stands = [&proposal](const TheirColumn& column) { return proposal.headers.count(column.header) >= column.occurrence; };
    bool anyStands = false;
    for (std::size_t i = 0; i < said.sources.size(); ++i) {
        const ColumnSource& source = said.sources[i];
        const bool kept = source.kind == Kind::column && stands(source.column);
        anyStands = anyStands || kept;
        if ((kept || source.kind == Kind::constant) && source != now.sources[i]) {
            now.sources[i] = source;
            proposal.columns[i] = {};
        }
    }
    const ColumnSource& price = said.from(Column::askingPrice);
    if (price.kind == Kind::column && stands(price.column)) {
        now.numbers = said.numbers;
        proposal.numbersAmbiguous = false;
    }
    if (!anyStands)
        return proposal;
    std::vector<StatusWord> words = said.statuses;
    for (const StatusWord& word : now.statuses) {
        const auto same = [&word](const StatusWord& one) { return foldedText(one.word) == foldedText(word.word); };
        if (std::none_of(words.begin(), words.end(), same))
            words.push_back(word);
    }
    now.statuses = std::move(words);
    now.yesWords = said.yesWords;
    now.noWords = said.noWords;
    for (const SkipRule& rule : said.skip) {
        if (stands(rule.column) && std::find(now.skip.begin(), now.skip.end(), rule) == now.skip.end())
            now.skip.push_back(rule);
    }
    now.floorsFromFile = said.floorsFromFile;
    now.floorsMayBeMissing = said.floorsMayBeMissing;
    return proposal;
}

} // namespace rungwright
