// SPDX-License-Identifier: GPL-3.0-or-later
#include "reminders.h"

#include "words.h"

#include <array>
#include <string_view>

namespace rungwright
{

namespace
{

constexpr std::array kPlaces{Jurisdiction{"us", QT_TRANSLATE_NOOP("rungwright::Words", "United States")},
                             Jurisdiction{"us-ca", QT_TRANSLATE_NOOP("rungwright::Words", "California")},
                             Jurisdiction{"eu", QT_TRANSLATE_NOOP("rungwright::Words", "European Union")},
                             Jurisdiction{"uk", QT_TRANSLATE_NOOP("rungwright::Words", "United Kingdom")},
                             Jurisdiction{"au", QT_TRANSLATE_NOOP("rungwright::Words", "Australia")},
                             Jurisdiction{"ca", QT_TRANSLATE_NOOP("rungwright::Words", "Canada")}};

struct Row {
    std::string_view place;
    const char* rule;
    const char* text;
    Remembered remembered;
};

// What was found in a retrieved source was found by December 2026; laws change.
constexpr std::array kRows{
    Row{"us", QT_TRANSLATE_NOOP("rungwright::Words", "16 CFR 238.1-238.2, bait advertising guides"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "An offer is to be a genuine effort to let what is advertised; telling the truth later does not cure a "
                          "first contact that was won by a misleading price."),
        Remembered::nothing},
    Row{"us", QT_TRANSLATE_NOOP("rungwright::Words", "16 CFR 238.3"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "Too few units at the advertised terms, or discouraging people from them, counts as evidence of bait."),
        Remembered::all},
    Row{"us-ca", QT_TRANSLATE_NOOP("rungwright::Words", "California Penal Code 396"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "After a declared emergency, no more than 10 % over the earlier price for 30 days, which can be extended; its "
                          "text names storage services and housing."),
        Remembered::nothing},
    Row{"us-ca", QT_TRANSLATE_NOOP("rungwright::Words", "California Civil Code 1770(a)(29)"),
        QT_TRANSLATE_NOOP("rungwright::Words", "An advertised price to consumers includes the fees that cannot be avoided."),
        Remembered::nothing},
    Row{"eu", QT_TRANSLATE_NOOP("rungwright::Words", "Directive 2005/29/EC, Annex I (5) and (6)"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "Inviting at a price without saying that there is reason to doubt a reasonable supply, or refusing what is "
                          "advertised in order to promote something else, is always unfair."),
        Remembered::nothing},
    Row{"eu", QT_TRANSLATE_NOOP("rungwright::Words", "Directive 98/6/EC, Article 6a"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "An announced reduction shows the lowest price of at least the 30 days before it; for goods, and in some "
                          "member states for services."),
        Remembered::nothing},
    Row{"uk", QT_TRANSLATE_NOOP("rungwright::Words", "CAP Code 3.22 and trade guidance"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "A \"from\" price is not to exaggerate what is available: a significant proportion is to be at it (an older rule "
                          "of thumb said about a tenth)."),
        Remembered::wording},
    Row{"uk", QT_TRANSLATE_NOOP("rungwright::Words", "Digital Markets, Competition and Consumers Act 2024, Part 4"),
        QT_TRANSLATE_NOOP("rungwright::Words", "No misleading price indications, and no mandatory charges left out."), Remembered::nothing},
    Row{"au", QT_TRANSLATE_NOOP("rungwright::Words", "Australian Consumer Law, s 35 and s 48"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "No advertised price that one has reason to doubt can be honoured for a reasonable time and number; prices are "
                          "shown as one total."),
        Remembered::nothing},
    Row{"ca", QT_TRANSLATE_NOOP("rungwright::Words", "Competition Act, s 74.04"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "A bargain price is to be backed by reasonable quantities; there are defences that a lawyer knows."),
        Remembered::nothing},
    Row{"", QT_TRANSLATE_NOOP("rungwright::Words", "Competition law generally (common practice, no source)"),
        QT_TRANSLATE_NOOP("rungwright::Words",
                          "Setting prices from rivals' non-public data, or through a shared algorithm that is fed with it, can be unlawful "
                          "coordination."),
        Remembered::nothing},
};

} // namespace

std::span<const Jurisdiction> jurisdictions() { return kPlaces; }

QString jurisdictionName(const Jurisdiction& jurisdiction) { return Words::tr(jurisdiction.name); }

std::vector<Reminder> remindersOf(const QString& key)
{
    std::vector<Reminder> found;
    for (const Row& row : kRows) {
        if (key != QLatin1String(row.place.data(), static_cast<qsizetype>(row.place.size())))
            continue;
        QString text = Words::tr(row.text);
        if (row.remembered == Remembered::all)
            text = Words::tr("%1 (From memory.)").arg(text);
        else if (row.remembered == Remembered::wording)
            text = Words::tr("%1 (Wording from memory.)").arg(text);
        found.push_back({Words::tr(row.rule), text, row.remembered});
    }
    return found;
}

QString remindersCaution() { return Words::tr("Reminders, not a verdict and not complete; look the rule up, laws change."); }

} // namespace rungwright
