// SPDX-License-Identifier: GPL-3.0-or-later
// What a computation on user input gives back: a value, or the words to show the user.
#pragma once

#include <cassert>
#include <string>
#include <utility>
#include <variant>

namespace rungwright
{

/// Why something could not be done, in words fit for the person at the desk.
struct Trouble {
    std::string message;
};

/// Either a T or a Trouble. C++20 has no std::expected; this is the small part of it we use.
/// Asking for the side that is not there is a programming error and asserts.
template <class T>
class [[nodiscard]] Outcome
{
public:
    Outcome(T value) : m_held(std::move(value)) {}
    Outcome(Trouble trouble) : m_held(std::move(trouble)) {}

    bool ok() const { return std::holds_alternative<T>(m_held); }
    explicit operator bool() const { return ok(); }

    const T& value() const&
    {
        assert(ok());
        return *std::get_if<T>(&m_held);
    }
    T&& value() &&
    {
        assert(ok());
        return std::move(*std::get_if<T>(&m_held));
    }
    const std::string& trouble() const
    {
        assert(!ok());
        return std::get_if<Trouble>(&m_held)->message;
    }

private:
    std::variant<T, Trouble> m_held;
};

} // namespace rungwright
