// SPDX-License-Identifier: GPL-3.0-or-later
// A scenario's tiers, shared between its copies until one of them changes.
#pragma once

#include <QSharedData>
#include <QSharedDataPointer>

#include <cassert>
#include <cstddef>
#include <initializer_list>
#include <iterator>
#include <stdexcept>
#include <type_traits>
#include <utility>
#include <vector>

namespace rungwright
{

/// A vector whose copies share their elements. A copy of 20,000 tiers with a million units costs 20,000 pointers; an element is copied
/// when it is reached for writing while another list still holds it. One thread may read a copy while another changes its own.
/// A reference got for writing is good until the list is copied, changed in size or destroyed.
template <class T>
class SharedList
{
    struct Held : QSharedData {
        Held() = default;
        explicit Held(T given) : value(std::move(given)) {}
        T value;
    };

    template <bool forWriting>
    class Iterator
    {
        using List = std::conditional_t<forWriting, SharedList, const SharedList>;

    public:
        using iterator_category = std::random_access_iterator_tag;
        using value_type = T;
        using difference_type = std::ptrdiff_t;
        using reference = std::conditional_t<forWriting, T&, const T&>;
        using pointer = std::conditional_t<forWriting, T*, const T*>;

        Iterator() = default;
        Iterator(List* list, std::size_t at) : m_list(list), m_at(at) {}

        reference operator*() const { return (*m_list)[m_at]; }
        pointer operator->() const { return &(*m_list)[m_at]; }
        reference operator[](difference_type by) const { return *(*this + by); }
        Iterator& operator+=(difference_type by)
        {
            m_at = static_cast<std::size_t>(static_cast<difference_type>(m_at) + by);
            return *this;
        }
        Iterator& operator-=(difference_type by) { return *this += -by; }
        Iterator& operator++() { return *this += 1; }
        Iterator& operator--() { return *this -= 1; }
        Iterator operator++(int)
        {
            const Iterator before = *this;
            ++*this;
            return before;
        }
        Iterator operator--(int)
        {
            const Iterator before = *this;
            --*this;
            return before;
        }
        friend Iterator operator+(Iterator a, difference_type by) { return a += by; }
        friend Iterator operator+(difference_type by, Iterator a) { return a += by; }
        friend Iterator operator-(Iterator a, difference_type by) { return a -= by; }
        friend difference_type operator-(const Iterator& a, const Iterator& b)
        {
            return static_cast<difference_type>(a.m_at) - static_cast<difference_type>(b.m_at);
        }
        friend bool operator==(const Iterator& a, const Iterator& b) { return a.m_at == b.m_at; }
        friend auto operator<=>(const Iterator& a, const Iterator& b) { return a.m_at <=> b.m_at; }

    private:
        List* m_list = nullptr;
        std::size_t m_at = 0;
    };

public:
    using value_type = T;
    using iterator = Iterator<true>;
    using const_iterator = Iterator<false>;

    SharedList() = default;
    SharedList(std::vector<T> values)
    {
        reserve(values.size());
        for (T& value : values)
            push_back(std::move(value));
    }
    SharedList(std::initializer_list<T> values)
    {
        reserve(values.size());
        for (const T& value : values)
            push_back(value);
    }

    std::size_t size() const { return m_held.size(); }
    bool empty() const { return m_held.empty(); }
    void reserve(std::size_t count) { m_held.reserve(count); }
    void clear() { m_held.clear(); }
    void push_back(T value) { m_held.push_back(QSharedDataPointer<Held>(new Held(std::move(value)))); }
    /// Takes an element of another list without a copy.
    void pushShared(const SharedList& other, std::size_t at)
    {
        assert(at < other.m_held.size());
        m_held.push_back(other.m_held[at]);
    }
    void pop_back() { m_held.pop_back(); }

    const T& operator[](std::size_t at) const
    {
        assert(at < m_held.size());
        return m_held[at].constData()->value;
    }
    /// Copies the element first when another list holds it too.
    T& operator[](std::size_t at)
    {
        assert(at < m_held.size());
        return m_held[at]->value;
    }
    const T& at(std::size_t at) const
    {
        if (at >= m_held.size())
            throw std::out_of_range("SharedList::at");
        return (*this)[at];
    }
    T& front() { return (*this)[0]; }
    const T& front() const { return (*this)[0]; }
    T& back() { return (*this)[size() - 1]; }
    const T& back() const { return (*this)[size() - 1]; }

    iterator begin() { return {this, 0}; }
    iterator end() { return {this, size()}; }
    const_iterator begin() const { return {this, 0}; }
    const_iterator end() const { return {this, size()}; }

    /// Whether the two lists hold one and the same element there, not only equal ones.
    bool shares(std::size_t at, const SharedList& other, std::size_t otherAt) const
    {
        return m_held[at].constData() == other.m_held[otherAt].constData();
    }

    friend bool operator==(const SharedList& a, const SharedList& b)
    {
        if (a.size() != b.size())
            return false;
        for (std::size_t i = 0; i < a.size(); ++i) {
            if (!a.shares(i, b, i) && !(a[i] == b[i]))
                return false;
        }
        return true;
    }

private:
    std::vector<QSharedDataPointer<Held>> m_held;
};

} // namespace rungwright
