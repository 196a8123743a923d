// SPDX-License-Identifier: GPL-3.0-or-later
#include "piece_readers.h"

#include <system_error>
namespace rungwright
{

PieceReaders::PieceReaders(const UnitListHeader& header, const Currency& currency, KeepUnits keep, unsigned threads, UnitColumns& out) :
    m_out(out), m_mostJobs(2 * std::size_t(threads) + 1)
{
    for (unsigned i = 0; i < threads; ++i)
        m_rows.emplace_back(header, currency, keep);
}

PieceReaders::~PieceReaders()
{
    {
        const std::lock_guard lock(m_mutex);
        m_stop = true;
        m_queue.clear();
    }
    m_waiting.notify_all();
    for (std::thread& thread : m_threads)
        thread.join();
}

void PieceReaders::startThread()
{
    try {
        m_threads.emplace_back([this, &rows = m_rows[m_threads.size() + 1]] { work(rows); });
    } catch (const std::system_error&) {
        // The machine gives no more: those there are do it.
    }
}

bool PieceReaders::add(std::vector<char>& buffer, std::size_t from, std::size_t to, PlainRows::Begins begins)
{
    if (from == to)
        return putTogether();
    if (m_free.empty())
        m_free.push_back(std::make_unique<Job>());
    m_jobs.push_back(std::move(m_free.back()));
    m_free.pop_back();
    Job& job = *m_jobs.back();
    job.text.swap(buffer);
    job.from = from;
    job.to = to;
    job.begins = begins;
    job.done = false;
    {
        const std::lock_guard lock(m_mutex);
        m_queue.push_back(&job);
    }
    m_waiting.notify_one();
    // A list of one piece needs no thread beside this one.
    if (m_threads.size() + 1 < m_rows.size() && m_threads.size() + 1 < m_jobs.size())
        startThread();
    while (m_jobs.size() >= m_mostJobs) {
        if (!helpOrWait() || !putTogether())
            return false;
    }
    return putTogether();
}

bool PieceReaders::finish()
{
    while (!m_jobs.empty()) {
        if (!helpOrWait() || !putTogether())
            return false;
    }
    return true;
}

void PieceReaders::work(PlainRows& rows)
{
    std::unique_lock lock(m_mutex);
    for (;;) {
        m_waiting.wait(lock, [this] { return m_stop || !m_queue.empty(); });
        if (m_stop)
            return;
        Job& job = *m_queue.front();
        m_queue.pop_front();
        lock.unlock();
        const bool fine = read(rows, job);
        lock.lock();
        job.fine = fine;
        job.done = true;
        m_finished.notify_one();
    }
}

/// Reads one piece that nobody has begun; when there is none, waits for the first one in file order.
bool PieceReaders::helpOrWait()
{
    std::unique_lock lock(m_mutex);
    if (m_queue.empty()) {
        m_finished.wait(lock, [this] { return m_jobs.front()->done; });
        return m_jobs.front()->fine;
    }
    Job& job = *m_queue.front();
    m_queue.pop_front();
    lock.unlock();
    const bool fine = read(m_rows.front(), job);
    lock.lock();
    job.fine = fine;
    job.done = true;
    return fine;
}

/// Puts the finished parts together as far as they follow each other from the first.
bool PieceReaders::putTogether()
{
    while (!m_jobs.empty()) {
        {
            const std::lock_guard lock(m_mutex);
            if (!m_jobs.front()->done)
                return true;
            if (!m_jobs.front()->fine)
                return false;
        }
        if (!m_out.append(std::move(m_jobs.front()->part)))
            return false;
        m_free.push_back(std::move(m_jobs.front()));
        m_jobs.pop_front();
        m_buffer.swap(m_free.back()->text);
    }
    return true;
}

} // namespace rungwright
