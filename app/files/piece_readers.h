// SPDX-License-Identifier: GPL-3.0-or-later
// Pieces of a unit list, read by several threads and put together in file order.
#pragma once

#include "plain_rows.h"

#include <condition_variable>
#include <deque>
#include <memory>
#include <mutex>
#include <thread>
#include <vector>

namespace rungwright
{

/// The calling thread hands in pieces and puts the parts together; it reads pieces itself when the others have enough to do. With one
/// thread there are no others. Few pieces are in memory at a time, however long the file is. Destroying it early ends the threads.
class PieceReaders
{
public:
    PieceReaders(const UnitListHeader& header, const Currency& currency, KeepUnits keep, unsigned threads, UnitColumns& out);
    ~PieceReaders();
    PieceReaders(const PieceReaders&) = delete;
    PieceReaders& operator=(const PieceReaders&) = delete;

    /// A buffer for the next piece; good until the next add().
    std::vector<char>& buffer() { return m_buffer; }
    /// Takes `buffer` away, of which the bytes [from, to) are whole records with kPadding zeros behind them. False as soon as it is known
    /// that some piece is not plainly fine.
    bool add(std::vector<char>& buffer, std::size_t from, std::size_t to, PlainRows::Begins begins);
    /// After the last piece.
    bool finish();

private:
    struct Job {
        std::vector<char> text;
        std::size_t from = 0, to = 0;
        PlainRows::Begins begins = PlainRows::Begins::withRow;
        UnitPart part;
        bool done = false, fine = false;
    };

    void startThread();
    void work(PlainRows& rows);
    bool helpOrWait();
    bool putTogether();
    static bool read(PlainRows& rows, Job& job)
    {
        return rows.read(job.text.data() + job.from, job.text.data() + job.to, job.begins, job.part);
    }

    UnitColumns& m_out;
    std::vector<char> m_buffer;
    std::size_t m_mostJobs;
    std::deque<PlainRows> m_rows; ///< One for each thread, the calling one's first.
    std::vector<std::unique_ptr<Job>> m_free;
    std::deque<std::unique_ptr<Job>> m_jobs; ///< In file order, from the first that was not put together yet.

    std::mutex m_mutex; ///< Guards what follows, and `done` and `fine` of the jobs.
    std::condition_variable m_waiting, m_finished;
    std::deque<Job*> m_queue;
    bool m_stop = false;
    std::vector<std::thread> m_threads;
};

} // namespace rungwright
