// SPDX-License-Identifier: GPL-3.0-or-later
#include "mapping_header.h"
#include "mapping_numbers.h"
#include "mapping_profile.h"
#include "mapping_sample.h"
#include "words.h"

#include <QDir>
#include <QFile>

#include <algorithm>
#include <optional>

namespace rungwright
{

namespace
{

const QString kEnding = QStringLiteral(".mapping.json");

QStringList folded(const QStringList& texts)
{
    QStringList out;
    for (const QString& text : texts)
        out << foldedText(text);
    return out;
}

// 0: the same headers in the same order; 1: in another order; 2 and more: all there, and so many new ones; nothing: one is missing.
std::optional<qsizetype> distance(const QStringList& known, const QStringList& found)
{
    if (known.isEmpty())
        return {};
    QStringList mine = folded(known);
    QStringList theirs = folded(found);
    if (mine == theirs)
        return 0;
    mine.sort();
    theirs.sort();
    if (!std::includes(theirs.begin(), theirs.end(), mine.begin(), mine.end()))
        return {};
    return 1 + theirs.size() - mine.size();
}

struct Ranked {
    qsizetype distance;
    MappingShelf::Entry entry;
};

std::vector<MappingShelf::Entry> bestFirst(std::vector<Ranked> ranked)
{
    std::stable_sort(ranked.begin(), ranked.end(), [](const Ranked& a, const Ranked& b) { return a.distance < b.distance; });
    std::vector<MappingShelf::Entry> entries;
    entries.reserve(ranked.size());
    for (Ranked& one : ranked)
        entries.push_back(std::move(one.entry));
    return entries;
}

// A file name that any system takes; what the profile is called stands inside it.
QString fileNameFor(const QString& name)
{
    QString out;
    for (const QChar c : name.normalized(QString::NormalizationForm_KD).toLower()) {
        if ((c >= u'a' && c <= u'z') || (c >= u'0' && c <= u'9'))
            out += c;
        else if (!out.isEmpty() && !out.endsWith(u'-') && !c.isMark())
            out += u'-';
    }
    while (out.endsWith(u'-'))
        out.chop(1);
    return out.isEmpty() ? QStringLiteral("mapping") : out.left(60);
}

} // namespace

std::vector<MappingShelf::Entry> MappingShelf::list(QStringList* troubles) const
{
    std::vector<Entry> entries;
    const QDir folder(m_folder);
    for (const QString& file : folder.entryList({QLatin1Char('*') + kEnding}, QDir::Files, QDir::Name)) {
        const QString path = folder.filePath(file);
        Outcome<MappingProfile> profile = loadMapping(path);
        if (profile)
            entries.push_back({path, std::move(profile).value()});
        else if (troubles != nullptr)
            *troubles << QString::fromStdString(profile.trouble());
    }
    std::stable_sort(entries.begin(), entries.end(),
                     [](const Entry& a, const Entry& b) { return foldedText(a.profile.name) < foldedText(b.profile.name); });
    return entries;
}

std::vector<MappingShelf::Entry> MappingShelf::matching(const QStringList& headers) const
{
    std::vector<Ranked> ranked;
    for (Entry& entry : list()) {
        if (const auto far = distance(entry.profile.mapping.headers, headers))
            ranked.push_back({*far, std::move(entry)});
    }
    return bestFirst(std::move(ranked));
}

std::vector<MappingShelf::Entry> MappingShelf::matchingSample(const QByteArray& beginning, bool whole) const
{
    const ListSample sample{beginning, whole};
    std::vector<Ranked> ranked;
    for (Entry& entry : list()) {
        const ImportMapping& mapping = entry.profile.mapping;
        HeaderGate gate(mapping);
        eachSampleRecord(sample, {mapping.encoding, mapping.delimiter}, [&gate](qint64, std::span<const std::string_view> cells) {
            return gate.pass(cells) != HeaderGate::Place::headerEnds;
        });
        if (const auto far = distance(mapping.headers, gate.headers()))
            ranked.push_back({*far, std::move(entry)});
    }
    return bestFirst(std::move(ranked));
}

Outcome<QString> MappingShelf::save(const MappingProfile& profile) const
{
    const auto refused = [](const QString& message) { return Trouble{message.toStdString()}; };
    QDir folder(m_folder);
    if (!folder.mkpath(QStringLiteral(".")))
        return refused(Words::tr("%1: the folder for mappings cannot be made").arg(m_folder));
    QString path;
    for (const Entry& entry : list()) {
        if (foldedText(entry.profile.name) == foldedText(profile.name))
            path = entry.path;
    }
    const QString stem = fileNameFor(profile.name);
    for (int number = 1; path.isEmpty(); ++number) {
        const QString file = (number == 1 ? stem : QStringLiteral("%1-%2").arg(stem).arg(number)) + kEnding;
        if (!folder.exists(file))
            path = folder.filePath(file);
    }
    const Outcome<bool> saved = saveMapping(profile, path);
    return saved ? Outcome<QString>(path) : Outcome<QString>(Trouble{saved.trouble()});
}

Outcome<bool> MappingShelf::remove(const QString& path) const
{
    const std::vector<Entry> entries = list();
    const bool ours = std::any_of(entries.begin(), entries.end(), [&path](const Entry& entry) { return entry.path == path; });
    if (!ours)
        return Trouble{Words::tr("%1: is no mapping in %2").arg(path, m_folder).toStdString()};
    QFile file(path);
    if (!file.remove())
        return Trouble{Words::tr("%1: cannot be removed: %2").arg(path, file.errorString()).toStdString()};
    return true;
}

} // namespace rungwright
