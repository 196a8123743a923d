// SPDX-License-Identifier: GPL-3.0-or-later
#include "ladder/currency.h"

#include <algorithm>
#include <array>

namespace rungwright
{

namespace
{

using namespace std::string_view_literals;

// Active codes with a minor unit, and XXX. ISO 4217 list one as of 2026-02-01; where a code has other than two decimals it
// stands in one of the short lists below as well.
constexpr std::array kCodes{
    "AED"sv, "AFN"sv, "ALL"sv, "AMD"sv, "AOA"sv, "ARS"sv, "AUD"sv, "AWG"sv, "AZN"sv, "BAM"sv, "BBD"sv, "BDT"sv, "BHD"sv, "BIF"sv,
    "BMD"sv, "BND"sv, "BOB"sv, "BOV"sv, "BRL"sv, "BSD"sv, "BTN"sv, "BWP"sv, "BYN"sv, "BZD"sv, "CAD"sv, "CDF"sv, "CHE"sv, "CHF"sv,
    "CHW"sv, "CLF"sv, "CLP"sv, "CNY"sv, "COP"sv, "COU"sv, "CRC"sv, "CUP"sv, "CVE"sv, "CZK"sv, "DJF"sv, "DKK"sv, "DOP"sv, "DZD"sv,
    "EGP"sv, "ERN"sv, "ETB"sv, "EUR"sv, "FJD"sv, "FKP"sv, "GBP"sv, "GEL"sv, "GHS"sv, "GIP"sv, "GMD"sv, "GNF"sv, "GTQ"sv, "GYD"sv,
    "HKD"sv, "HNL"sv, "HTG"sv, "HUF"sv, "IDR"sv, "ILS"sv, "INR"sv, "IQD"sv, "IRR"sv, "ISK"sv, "JMD"sv, "JOD"sv, "JPY"sv, "KES"sv,
    "KGS"sv, "KHR"sv, "KMF"sv, "KPW"sv, "KRW"sv, "KWD"sv, "KYD"sv, "KZT"sv, "LAK"sv, "LBP"sv, "LKR"sv, "LRD"sv, "LSL"sv, "LYD"sv,
    "MAD"sv, "MDL"sv, "MGA"sv, "MKD"sv, "MMK"sv, "MNT"sv, "MOP"sv, "MRU"sv, "MUR"sv, "MVR"sv, "MWK"sv, "MXN"sv, "MXV"sv, "MYR"sv,
    "MZN"sv, "NAD"sv, "NGN"sv, "NIO"sv, "NOK"sv, "NPR"sv, "NZD"sv, "OMR"sv, "PAB"sv, "PEN"sv, "PGK"sv, "PHP"sv, "PKR"sv, "PLN"sv,
    "PYG"sv, "QAR"sv, "RON"sv, "RSD"sv, "RUB"sv, "RWF"sv, "SAR"sv, "SBD"sv, "SCR"sv, "SDG"sv, "SEK"sv, "SGD"sv, "SHP"sv, "SLE"sv,
    "SOS"sv, "SRD"sv, "SSP"sv, "STN"sv, "SVC"sv, "SYP"sv, "SZL"sv, "THB"sv, "TJS"sv, "TMT"sv, "TND"sv, "TOP"sv, "TRY"sv, "TTD"sv,
    "TWD"sv, "TZS"sv, "UAH"sv, "UGX"sv, "USD"sv, "USN"sv, "UYI"sv, "UYU"sv, "UYW"sv, "UZS"sv, "VED"sv, "VES"sv, "VND"sv, "VUV"sv,
    "WST"sv, "XAD"sv, "XAF"sv, "XCD"sv, "XCG"sv, "XOF"sv, "XPF"sv, "XXX"sv, "YER"sv, "ZAR"sv, "ZMW"sv, "ZWG"sv};
static_assert(std::ranges::is_sorted(kCodes));

constexpr std::array kWithoutDecimals{"BIF"sv, "CLP"sv, "DJF"sv, "GNF"sv, "ISK"sv, "JPY"sv, "KMF"sv, "KRW"sv, "PYG"sv,
                                      "RWF"sv, "UGX"sv, "UYI"sv, "VND"sv, "VUV"sv, "XAF"sv, "XOF"sv, "XPF"sv};
constexpr std::array kWithThree{"BHD"sv, "IQD"sv, "JOD"sv, "KWD"sv, "LYD"sv, "OMR"sv, "TND"sv};
constexpr std::array kWithFour{"CLF"sv, "UYW"sv};

constexpr int decimalsOf(std::string_view code)
{
    if (std::ranges::binary_search(kWithoutDecimals, code))
        return 0;
    if (std::ranges::binary_search(kWithThree, code))
        return 3;
    if (std::ranges::binary_search(kWithFour, code))
        return 4;
    return 2;
}

constexpr bool isDigit(char c) { return c >= '0' && c <= '9'; }

} // namespace

std::int64_t Currency::minorPerMajor() const
{
    std::int64_t power = 1;
    for (int i = 0; i < decimals; ++i)
        power *= 10;
    return power;
}

std::optional<Currency> findCurrency(std::string_view code)
{
    if (!std::ranges::binary_search(kCodes, code))
        return std::nullopt;
    return Currency{std::string(code), decimalsOf(code)};
}

std::span<const std::string_view> currencyCodes() { return kCodes; }

std::string plainText(Price price, const Currency& currency)
{
    const auto decimals = static_cast<std::size_t>(currency.decimals);
    // The magnitude is taken unsigned, so that even the least value of the type has one.
    const auto magnitude = price.minor < 0 ? 0 - static_cast<std::uint64_t>(price.minor) : static_cast<std::uint64_t>(price.minor);
    std::string text = std::to_string(magnitude);
    if (decimals > 0) {
        if (text.size() <= decimals)
            text.insert(0, decimals + 1 - text.size(), '0');
        text.insert(text.size() - decimals, 1, '.');
    }
    if (price.minor < 0)
        text.insert(0, 1, '-');
    return text;
}

std::optional<Price> parsePlain(std::string_view text, const Currency& currency)
{
    bool negative = false;
    if (!text.empty() && (text.front() == '+' || text.front() == '-')) {
        negative = text.front() == '-';
        text.remove_prefix(1);
    }
    const auto point = std::min(text.find('.'), text.size());
    const auto whole = text.substr(0, point);
    const bool hasPoint = point < text.size();
    const auto fraction = hasPoint ? text.substr(point + 1) : std::string_view{};
    if (whole.empty() || (hasPoint && fraction.empty()) || !std::ranges::all_of(whole, isDigit) || !std::ranges::all_of(fraction, isDigit))
        return std::nullopt;

    std::int64_t minor = 0;
    const auto take = [&minor](char digit) {
        minor = minor * 10 + (digit - '0');
        return minor <= kGreatestPrice.minor; // Stops long before the type overflows.
    };
    for (char digit : whole)
        if (!take(digit))
            return std::nullopt;
    const auto decimals = static_cast<std::size_t>(currency.decimals);
    for (std::size_t i = 0; i < decimals; ++i)
        if (!take(i < fraction.size() ? fraction[i] : '0'))
            return std::nullopt;
    if (fraction.size() > decimals && !std::ranges::all_of(fraction.substr(decimals), [](char c) { return c == '0'; }))
        return std::nullopt;
    return Price{negative ? -minor : minor};
}

} // namespace rungwright
