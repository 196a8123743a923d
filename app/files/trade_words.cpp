// SPDX-License-Identifier: GPL-3.0-or-later
#include "trade_words.h"

#include "ladder/currency.h"

#include <QHash>
#include <QSet>

#include <algorithm>
#include <array>
#include <vector>

namespace rungwright
{

namespace
{

// Words as plainWords has them, separated by bars. By column of ours: English, German, French, Spanish, Italian, Dutch, Portuguese.
constexpr std::array<const char*, kColumnNames.size()> kHeaderWords{
    // site
    "site|location|facility|property|store|branch|building|centre|center|marina|house|site name|"
    "standort|objekt|filiale|gebaude|haus|liegenschaft|niederlassung|agence|etablissement|lieu|residence|immeuble|"
    "sede|centro|ubicacion|sitio|instalacion|edificio|sito|struttura|edificio|vestiging|locatie|filiaal|gebouw|pand|"
    "local|localizacao|loja|filial|predio",
    // tier
    "tier|size|size class|class|category|type|group|unit type|room type|kind|band|"
    "kategorie|grosse|groesse|grossenklasse|groessenklasse|klasse|typ|gruppe|art|categorie|taille|gamme|classe|"
    "tipo de unidad|categoria|tamano|tipo|clase|grupo|dimensione|taglia|tipologia|classe|maat|grootte|soort|klasse|"
    "tamanho|classe",
    // unit
    "unit|unit number|unit no|unit id|unit name|unit code|number|no|nr|id|code|room|room no|space|berth|locker|box|pitch|place|slot|"
    "einheit|nummer|zimmer|abteil|raum|stellplatz|liegeplatz|platz|einheitennummer|unite|numero|n|lot|chambre|poste|cellule|"
    "unidad|trastero|plaza|habitacion|amarre|unita|camera|posto|eenheid|ruimte|kamer|ligplaats|unidade|quarto|lugar",
    // asking_price
    "price|rent|rate|asking|asking price|asking rent|list price|monthly rent|monthly price|rent per month|tariff|fee|"
    "preis|miete|monatsmiete|mietpreis|mietzins|tarif|listenpreis|angebotspreis|sollmiete|prix|loyer|loyer mensuel|prix affiche|"
    "precio|renta|tarifa|alquiler|cuota|precio mensual|prezzo|canone|affitto|tariffa|prijs|huur|huurprijs|tarief|maandhuur|"
    "preco|renda|aluguel|aluguer|mensalidade",
    // status
    "status|state|availability|occupancy|available|occupied|vacant|let|rented|"
    "zustand|belegung|verfugbarkeit|belegt|vermietet|frei|verfugbar|statut|etat|disponibilite|occupation|occupe|loue|libre|disponible|"
    "estado|disponibilidad|situacion|ocupacion|ocupado|stato|disponibilita|occupazione|occupato|libero|"
    "staat|beschikbaarheid|bezetting|bezet|verhuurd|vrij|beschikbaar|situacao|disponibilidade|ocupacao|livre",
    // advertised_floor
    "advertised floor|floor price|price floor|from price|price from|rent from|advertised from|advertised price|from|minimum price|"
    "min price|lowest price|starting price|lead in price|"
    "ab preis|abpreis|preis ab|miete ab|mindestpreis|werbepreis|einstiegspreis|ab|"
    "a partir de|prix a partir de|loyer a partir de|prix minimum|prix d appel|prix plancher|"
    "desde|precio desde|precio minimo|precio anunciado|prezzo da|a partire da|prezzo minimo|prezzo base|vanaf|vanafprijs|prijs vanaf|"
    "minimumprijs|preco desde|preco a partir de|preco minimo",
    // currency
    "currency|currency code|ccy|wahrung|waehrung|devise|monnaie|moneda|divisa|valuta|munt|munteenheid|moeda",
    // grade
    "grade|rank|desirability|quality|stars|attractiveness|rang|qualitat|gute|lage|lagegute|qualite|grado|calidad|qualita|livello|"
    "kwaliteit|rangorde|grau|qualidade",
    // area
    "area|m2|sqm|sq m|square metres|square meters|net area|flache|flaeche|qm|quadratmeter|surface|superficie|surface m2|mq|metros|"
    "oppervlakte|oppervlak|vierkante meter|metragem",
    // vacancy_chance
    "vacancy chance|chance vacant|chance of vacancy|vacancy probability|leerstandswahrscheinlichkeit|leerstandsquote|leerstand|"
    "probabilite de vacance|taux de vacance|vacance|probabilidad de vacante|tasa de vacancia|vacancia|probabilita di sfitto|"
    "leegstandskans|leegstand|probabilidade de vacancia",
    // locked
    "locked|price locked|fixed|price fixed|frozen|fest|fixiert|festpreis|preis fest|preis fixiert|bloque|prix bloque|fige|prix fige|"
    "verrouille|bloqueado|precio bloqueado|fijo|precio fijo|bloccato|prezzo bloccato|fisso|vergrendeld|vast|vaste prijs|prijs vast|fixo|"
    "preco fixo"};

// A price that is not what a newcomer is asked.
constexpr const char* kOtherPrices =
    "old|previous|last|contract|deposit|insurance|paid|in place|discount|alt|alte|bisher|bisherige|vertrag|vertragsmiete|kaution|istmiete|"
    "ancien|ancienne|contrat|caution|depot|assurance|anterior|contrato|deposito|fianza|seguro|precedente|contratto|cauzione|assicurazione|"
    "oude|vorige|borg|verzekering|antigo|caucao|m2|sqm|qm|square|total|gesamt";

constexpr const char* kOtherAreas = "sqft|sq ft|square feet|square foot|ft2|sf|pies|pieds|pie cuadrado|pied carre";

constexpr std::array<const char*, 4> kStatusWords{
    // vacant
    "vacant|available|free|empty|open|for rent|to let|unoccupied|unlet|unrented|ready|on offer|"
    "frei|verfugbar|leer|leerstehend|leerstand|vermietbar|unbelegt|unvermietet|libre|disponible|inoccupe|vide|a louer|"
    "vacante|vacio|en alquiler|libero|disponibile|sfitto|vuoto|da affittare|vrij|beschikbaar|leeg|te huur|onverhuurd|"
    "livre|disponivel|vago|desocupado|vazio",
    // occupied
    "occupied|rented|let|taken|leased|in use|full|belegt|vermietet|besetzt|bewohnt|vergeben|occupe|loue|pris|"
    "ocupado|alquilado|arrendado|rentado|occupato|affittato|locato|bezet|verhuurd|in gebruik|alugado",
    // reserved
    "reserved|booked|on hold|hold|held|pending|under offer|reserviert|vorgemerkt|gebucht|option|reserve|en option|retenu|"
    "reservado|apartado|riservato|prenotato|opzionato|gereserveerd|optie|in optie|onder optie",
    // closed
    "closed|out of service|out of order|maintenance|in maintenance|blocked|damaged|unavailable|unrentable|not rentable|off market|inactive|"
    "gesperrt|geschlossen|defekt|ausser betrieb|wartung|in wartung|renovierung|in renovierung|nicht vermietbar|stillgelegt|"
    "ferme|hors service|indisponible|travaux|en travaux|bloque|hors d usage|cerrado|fuera de servicio|mantenimiento|en mantenimiento|"
    "bloqueado|en obras|averiado|chiuso|fuori servizio|manutenzione|in manutenzione|bloccato|gesloten|buiten gebruik|onderhoud|"
    "in onderhoud|geblokkeerd|defect|fechado|fora de servico|manutencao|em manutencao|em obras"};

constexpr const char* kYes = "yes|y|true|1|x|on|ja|j|wahr|oui|o|vrai|si|s|verdadero|vero|waar|sim";
constexpr const char* kNo = "no|n|false|0|off|nein|falsch|non|faux|falso|nee|onwaar|nao";
constexpr const char* kTotals =
    "grand total|subtotal|sub total|totals|total|sum|end of report|end of list|gesamtsumme|zwischensumme|summe|gesamt|"
    "sous total|somme|suma|totale|somma|totaal|eindtotaal|som|soma|fin de liste|fine elenco|fim da lista|ende der liste";

struct Sign {
    const char16_t* sign;
    const char* code;
};

constexpr std::array<Sign, 14> kSigns{{{u"€", "EUR"},
                                       {u"£", "GBP"},
                                       {u"US$", "USD"},
                                       {u"R$", "BRL"},
                                       {u"₹", "INR"},
                                       {u"₩", "KRW"},
                                       {u"₺", "TRY"},
                                       {u"₪", "ILS"},
                                       {u"₴", "UAH"},
                                       {u"₫", "VND"},
                                       {u"₱", "PHP"},
                                       {u"zł", "PLN"},
                                       {u"Kč", "CZK"},
                                       {u"円", "JPY"}}};

QStringList listOf(const char* words) { return QString::fromLatin1(words).split(QLatin1Char('|')); }

QSet<QString> setOf(const char* words)
{
    const QStringList list = listOf(words);
    return {list.begin(), list.end()};
}

// A word of ours, ready to be looked for.
struct Phrase {
    explicit Phrase(const QString& text) : plain(text), padded(QLatin1Char(' ') + text + QLatin1Char(' ')) {}
    QString plain;
    QString padded; ///< With a space at both ends, to be found as whole words.
    int words = static_cast<int>(plain.count(QLatin1Char(' '))) + 1;
};

using Phrases = std::vector<Phrase>;

Phrases phrasesOf(const char* words)
{
    Phrases phrases;
    for (const QString& word : listOf(words))
        phrases.emplace_back(word);
    return phrases;
}

bool holdsAny(const QString& header, const Phrases& phrases)
{
    const QString padded = QLatin1Char(' ') + header + QLatin1Char(' ');
    return std::any_of(phrases.begin(), phrases.end(), [&padded](const Phrase& phrase) { return padded.contains(phrase.padded); });
}

// German and Dutch put words together: what ends or begins with the word.
bool isCompoundOf(const QStringList& parts, const Phrase& phrase)
{
    constexpr qsizetype shortest = 4;
    if (phrase.plain.size() < shortest || phrase.words > 1)
        return false;
    return std::any_of(parts.begin(), parts.end(),
                       [&phrase](const QString& part) { return part.endsWith(phrase.plain) || part.startsWith(phrase.plain); });
}

int bestFit(const QString& header, const Phrases& phrases)
{
    const QString padded = QLatin1Char(' ') + header + QLatin1Char(' ');
    const QStringList parts = header.split(QLatin1Char(' '));
    int best = 0;
    for (const Phrase& phrase : phrases) {
        int fit = 0;
        if (header == phrase.plain)
            fit = 100 + 10 * phrase.words;
        else if (phrase.plain.size() > 1 && padded.contains(phrase.padded)) // One letter says little among other words.
            fit = 60 + 10 * phrase.words;
        else if (isCompoundOf(parts, phrase))
            fit = 50;
        best = std::max(best, fit);
    }
    return best;
}

// ocupado, ocupada; occupé, occupée: the forms that the languages give an adjective.
QStringList formsOf(const QString& word)
{
    QStringList forms{word, word + QLatin1Char('e'), word + QLatin1Char('s')};
    if (word.endsWith(QLatin1Char('o')))
        forms << word.chopped(1) + QLatin1Char('a') << word + QLatin1Char('s');
    return forms;
}

} // namespace

QString plainWords(const QString& text)
{
    QString out;
    bool gap = false;
    // Qt folds letter by letter and leaves the sharp s alone.
    const QString folded = text.toCaseFolded().replace(QChar(0xDF), QLatin1String("ss"));
    for (const QChar c : folded.normalized(QString::NormalizationForm_KD)) {
        if (c.isMark())
            continue;
        if (!c.isLetterOrNumber()) {
            gap = true;
            continue;
        }
        if (gap && !out.isEmpty())
            out += QLatin1Char(' ');
        gap = false;
        out += c;
    }
    return out;
}

bool saysOtherArea(const QString& header)
{
    static const Phrases others = phrasesOf(kOtherAreas);
    return holdsAny(plainWords(header), others);
}

int headerFit(Column column, const QString& header)
{
    const QString plain = plainWords(header);
    if (plain.isEmpty())
        return 0;
    const auto index = static_cast<std::size_t>(column);
    // Our own names first, exactly.
    if (plain == plainWords(QString::fromUtf8(kColumnNames[index].data(), qsizetype(kColumnNames[index].size()))))
        return 150;
    if (column == Column::area && saysOtherArea(header))
        return 0;
    static const auto phrases = [] {
        std::array<Phrases, kColumnNames.size()> all;
        std::transform(kHeaderWords.begin(), kHeaderWords.end(), all.begin(), phrasesOf);
        return all;
    }();
    static const Phrases otherPrices = phrasesOf(kOtherPrices);
    int best = bestFit(plain, phrases[index]);
    const bool isPrice = column == Column::askingPrice || column == Column::advertisedFloor;
    if (isPrice && holdsAny(plain, otherPrices))
        best -= 60;
    return std::max(best, 0);
}

std::optional<Status> statusOfTradeWord(const QString& word)
{
    static const auto known = [] {
        QHash<QString, Status> forms;
        for (std::size_t i = 0; i < kStatusWords.size(); ++i) {
            for (const QString& one : listOf(kStatusWords[i])) {
                for (const QString& form : formsOf(one)) {
                    if (!forms.contains(form))
                        forms.insert(form, static_cast<Status>(i));
                }
            }
        }
        return forms;
    }();
    const auto found = known.constFind(plainWords(word));
    return found == known.constEnd() ? std::nullopt : std::optional(*found);
}

std::optional<Status> statusOfYes(const QString& header)
{
    const std::optional<Status> status = statusOfTradeWord(header);
    return status == Status::vacant || status == Status::occupied ? status : std::nullopt;
}

std::optional<bool> yesNoOfTradeWord(const QString& word)
{
    static const QSet<QString> yes = setOf(kYes);
    static const QSet<QString> no = setOf(kNo);
    const QString plain = plainWords(word);
    if (yes.contains(plain))
        return true;
    return no.contains(plain) ? std::optional(false) : std::nullopt;
}

QString totalWordAtBeginning(const QString& text)
{
    const QString plain = plainWords(text);
    static const QStringList totals = listOf(kTotals);
    for (const QString& word : totals) {
        if (plain != word && !plain.startsWith(word + QLatin1Char(' ')))
            continue;
        // As it is spelled there: as many letters as the word has when it is plain already, else the first word of the text.
        const QString trimmed = text.simplified();
        const QString asSpelled = trimmed.left(word.size());
        return plainWords(asSpelled) == word ? asSpelled : trimmed.section(QLatin1Char(' '), 0, 0);
    }
    return {};
}

QString currencyOfSign(const QString& sign)
{
    const QString trimmed = sign.trimmed();
    for (const Sign& one : kSigns) {
        if (trimmed.compare(QString::fromUtf16(one.sign), Qt::CaseInsensitive) == 0)
            return QString::fromLatin1(one.code);
    }
    const QString code = trimmed.toUpper();
    return code.size() == 3 && findCurrency(code.toStdString()) ? code : QString();
}

} // namespace rungwright
