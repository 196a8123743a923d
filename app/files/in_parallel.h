// SPDX-License-Identifier: GPL-3.0-or-later
// The same work on many things, by several threads.
#pragma once

#include <algorithm>
#include <atomic>
#include <cstddef>
#include <system_error>
#include <thread>
#include <vector>

namespace rungwright
{

/// As many threads as the machine gives this process, unless told; at least one.
inline unsigned threadsFor(unsigned asked)
{
    constexpr unsigned most = 64; // Each has buffers of its own.
    return std::clamp(asked > 0 ? asked : std::thread::hardware_concurrency(), 1U, most);
}

/// Calls `work(i, thread)` once for every i below `count`, in no order, and returns when all are done; `thread` is below `threads`. The
/// calling thread is thread 0 and takes its share. Work that returns false ends everything early, and false is returned.
template <class Work>
bool inParallel(std::size_t count, unsigned threads, Work work)
{
    constexpr std::size_t slice = 64;
    std::atomic<std::size_t> next = 0;
    std::atomic<bool> goOn = true;
    const auto run = [&](unsigned thread) {
        for (std::size_t from = next.fetch_add(slice); from < count && goOn; from = next.fetch_add(slice)) {
            for (std::size_t i = from; i < std::min(count, from + slice) && goOn; ++i) {
                if (!work(i, thread))
                    goOn = false;
            }
        }
    };
    std::vector<std::jthread> others;
    const std::size_t useful = std::min<std::size_t>(threads, (count + slice - 1) / slice);
    try {
        for (unsigned thread = 1; thread < useful; ++thread)
            others.emplace_back(run, thread);
    } catch (const std::system_error&) {
        // The machine gives no more: those there are do it.
    }
    run(0);
    others.clear();
    return goOn;
}

} // namespace rungwright
