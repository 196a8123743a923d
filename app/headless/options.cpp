// SPDX-License-Identifier: GPL-3.0-or-later
#include "options.h"

#include "ladder/currency.h"

#include <QCommandLineParser>

#include <algorithm>
#include <array>
#include <cmath>

namespace rungwright
{

namespace
{

struct OptionText {
    const char* name;
    const char* value; ///< What its value is called; empty for a flag.
    const char* text;
};

constexpr std::array kOptions{
    OptionText{"site", "S", "Only the tiers of site S."},
    OptionText{"tier", "T", "Only the tiers named T."},
    OptionText{"candidate", "C", "The candidate named C; 'current' is the ladder of today."},
    OptionText{"model", "M",
               "What an enquirer finds: perceived, fitted, remainder, unit, turnover or on-hand. "
               "Without it each tier's own choice in the scenario, or perceived."},
    OptionText{"left", "N",
               "Units left on offer (perceived, fitted, remainder); without it the tier's own setting, or the number on offer."},
    OptionText{"load", "A", "Offered load (turnover); without it the tier's own setting, or the load that the units taken imply."},
    OptionText{"currency", "CUR", "ISO 4217 code of a unit list that does not name its own."},
    OptionText{"json", "", "Print one JSON object instead of a table."},
    OptionText{"out", "FILE", "Where to write; scan without it writes to standard output."},
    OptionText{"threads", "N", "How many threads work at a time; without it as many as there are processors. The result is the same."},
    OptionText{"without-bad-rows", "", "Take a unit list without its refused rows."},
    OptionText{"rules", "RULES", "Price rules (*.rules.json) in place of the scenario's own. A scenario made from a unit list keeps them."},
    OptionText{"gap", "X", "Target: a disappointment gap of at most the amount X."},
    OptionText{"gap-share", "P", "Target: a gap of at most P percent of the advertised floor."},
    OptionText{"floor-met", "Q", "Target: the floor met by at least Q percent of enquirers."},
    OptionText{"hold-total", "", "Keep the asking total of the units on offer. This is so unless another total is asked for."},
    OptionText{"total-change", "P", "Change the asking total of the units on offer by P percent."},
    OptionText{"free-total", "", "Let the asking total become what it likes within the rules."},
    OptionText{"order", "ORDER", "Keep the 'present' order of prices, or 'grade' order; without it what the rules say."},
    OptionText{"taken-stay", "", "Units that are not on offer keep their prices."},
    OptionText{"sheet", "SHEET", "Write a price sheet (CSV) in place of a scenario."},
    OptionText{"mapping", "PROFILE", "Read FILE, a list of another system, as the saved import mapping PROFILE (*.mapping.json) says."},
    OptionText{"floors", "FLOORS", "The floors of a mapped list, where its mapping takes them from a file (site, tier, advertised_floor)."},
};

void addOptions(QCommandLineParser& parser, const Command& command)
{
    parser.setApplicationDescription(QString::fromLatin1(command.summary));
    parser.addPositionalArgument(QString::fromLatin1(command.word), QString::fromLatin1(command.summary));
    parser.addPositionalArgument(QStringLiteral("FILE"), QStringLiteral("A scenario (*.rungs.json) or a unit list (CSV)."));
    for (const OptionText& option : kOptions) {
        const bool known = std::any_of(command.takes.begin(), command.takes.end(),
                                       [&](const char* name) { return QLatin1String(name) == QLatin1String(option.name); });
        if (known)
            parser.addOption({QString::fromLatin1(option.name), QString::fromLatin1(option.text), QString::fromLatin1(option.value)});
    }
    parser.addOption({{QStringLiteral("h"), QStringLiteral("help")}, QStringLiteral("Say this, and do nothing.")});
}

Trouble trouble(const Command& command, const QString& text)
{
    const QString word = QString::fromLatin1(command.word);
    return {QStringLiteral("rungwright %1: %2\n'rungwright %1 --help' lists the options.").arg(word, text).toStdString()};
}

/// The option's value, given once at most.
class Values
{
public:
    Values(const QCommandLineParser& parser, const Command& command) : m_parser(parser), m_command(command) {}

    std::optional<QString> text(const char* name) const
    {
        const QString key = QString::fromLatin1(name);
        if (!takes(name) || !m_parser.isSet(key))
            return std::nullopt;
        return m_parser.value(key);
    }
    bool flag(const char* name) const { return takes(name) && m_parser.isSet(QString::fromLatin1(name)); }

    /// The first option that was given more than once: which of its values is meant cannot be known.
    QString repeated() const
    {
        for (const char* name : m_command.takes) {
            if (m_parser.values(QString::fromLatin1(name)).size() > 1)
                return QString::fromLatin1(name);
        }
        return {};
    }
    QString missing() const
    {
        for (const char* name : m_command.needs) {
            if (text(name).value_or(QString()).isEmpty())
                return QString::fromLatin1(name);
        }
        return {};
    }

private:
    bool takes(const char* name) const
    {
        return std::any_of(m_command.takes.begin(), m_command.takes.end(),
                           [&](const char* known) { return QLatin1String(known) == QLatin1String(name); });
    }

    const QCommandLineParser& m_parser;
    const Command& m_command;
};

QString modelWords()
{
    QStringList words;
    for (const ModelKind kind : kModels)
        words += QString::fromUtf8(modelWord(kind).data(), qsizetype(modelWord(kind).size()));
    return words.join(QStringLiteral(", "));
}

/// Fills in the values that are not plain text; what is wrong with one, or an empty text.
QString readValues(const Values& values, Request& request)
{
    if (const auto word = values.text("model")) {
        request.model = modelFromWord(word->toStdString());
        if (!request.model)
            return QStringLiteral("--model knows no '%1'; wanted one of %2").arg(*word, modelWords());
    }
    if (const auto text = values.text("left")) {
        bool number = false;
        request.left = text->toInt(&number);
        if (!number || *request.left < 1)
            return QStringLiteral("--left wants a whole number of at least 1, found '%1'").arg(*text);
    }
    if (const auto text = values.text("load")) {
        bool number = false;
        request.load = text->toDouble(&number);
        if (!number || !std::isfinite(*request.load) || *request.load <= 0)
            return QStringLiteral("--load wants a number above 0 with a decimal point, found '%1'").arg(*text);
    }
    if (const auto text = values.text("threads")) {
        constexpr int most = 1024;
        bool number = false;
        request.threads = text->toInt(&number);
        if (!number || *request.threads < 1 || *request.threads > most)
            return QStringLiteral("--threads wants a whole number from 1 to %1, found '%2'").arg(most).arg(*text);
    }
    if (const auto code = values.text("currency")) {
        request.currency = *code;
        if (!findCurrency(code->toStdString()))
            return QStringLiteral("--currency knows no '%1'; wanted an ISO 4217 code such as EUR, JPY or KWD").arg(*code);
    }
    return {};
}

} // namespace

Outcome<Request> readRequest(const Command& command, const QStringList& arguments)
{
    QCommandLineParser parser;
    addOptions(parser, command);
    if (!parser.parse(arguments))
        return trouble(command, parser.errorText());

    Request request;
    request.help = parser.isSet(QStringLiteral("help"));
    if (request.help)
        return request;

    const Values values(parser, command);
    if (const QString name = values.repeated(); !name.isEmpty())
        return trouble(command, QStringLiteral("--%1 is given more than once").arg(name));
    if (const QString name = values.missing(); !name.isEmpty())
        return trouble(command, QStringLiteral("--%1 is missing").arg(name));

    // The command's own word comes first.
    const QStringList files = parser.positionalArguments().mid(1);
    if (files.size() != 1 || files.first().isEmpty())
        return trouble(command, files.isEmpty() ? QStringLiteral("FILE is missing: a scenario or a unit list")
                                                : QStringLiteral("wanted one FILE, found %1").arg(files.size()));
    request.file = files.first();
    request.site = values.text("site");
    request.tier = values.text("tier");
    request.candidate = values.text("candidate");
    request.out = values.text("out").value_or(QString());
    request.mapping = values.text("mapping").value_or(QString());
    request.floors = values.text("floors").value_or(QString());
    request.json = values.flag("json");
    request.withoutBadRows = values.flag("without-bad-rows");
    if (values.text("out") && request.out.isEmpty())
        return trouble(command, QStringLiteral("--out names no file"));
    for (const char* name : {"mapping", "floors"}) {
        if (values.text(name) == QString())
            return trouble(command, QStringLiteral("--%1 names no file").arg(QLatin1String(name)));
    }
    if (values.text("floors") && !values.text("mapping"))
        return trouble(command, QStringLiteral("--floors is for a mapped list: --mapping is missing"));
    if (const QString wrong = readValues(values, request); !wrong.isEmpty())
        return trouble(command, wrong);
    if (command.run == reshape) {
        const QString wrong = readReshapeWish([&](const char* name) { return values.text(name); },
                                              [&](const char* name) { return values.flag(name); }, request.reshape);
        if (!wrong.isEmpty())
            return trouble(command, wrong);
    }
    return request;
}

QString helpText(const Command& command)
{
    QCommandLineParser parser;
    addOptions(parser, command);
    return parser.helpText();
}

QString helpText()
{
    QString text = QStringLiteral("Usage: rungwright [FILE]                   open the desk, with a scenario or a unit list\n"
                                  "       rungwright COMMAND FILE [options]   do one thing without a window\n"
                                  "       rungwright --help | --version\n"
                                  "\n"
                                  "Commands ('rungwright COMMAND --help' lists the options of one):\n");
    for (const Command& command : commands())
        text += QStringLiteral("  %1  %2\n").arg(QLatin1String(command.word), -8).arg(QLatin1String(command.summary));
    text += QStringLiteral("\n"
                           "Exit status: 0 done; 2 wrong usage; 3 input refused; 4 cannot write; 5 some tiers have no ladder as wished\n"
                           "(reshape). Messages go to standard error.\n");
    return text;
}

} // namespace rungwright
