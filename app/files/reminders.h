// SPDX-License-Identifier: GPL-3.0-or-later
// Rules that bind advertised prices, as reminders for the person who signs: never a verdict, and never complete.
#pragma once

#include <QString>

#include <span>
#include <vector>

namespace rungwright
{

/// A place whose rules the user wants to be reminded of.
struct Jurisdiction {
    const char* key;  ///< Stable, for settings: "us", "us-ca", "eu", "uk", "au", "ca".
    const char* name; ///< Untranslated source text.
};
std::span<const Jurisdiction> jurisdictions();
QString jurisdictionName(const Jurisdiction& jurisdiction);

/// What of a reminder was not looked up in a source but remembered; the text shown says so.
enum class Remembered : unsigned char { nothing, wording, all };

struct Reminder {
    QString rule; ///< Where it stands: "16 CFR 238.1-238.2, bait advertising guides".
    QString text; ///< What it asks, in a sentence, with "(from memory)" where that is so.
    Remembered remembered = Remembered::nothing;
};

/// The reminders of a jurisdiction; of an unknown key none. Key "" = what holds wherever competition law does.
std::vector<Reminder> remindersOf(const QString& key);

/// That these are reminders and not a verdict, in one sentence.
QString remindersCaution();

} // namespace rungwright
