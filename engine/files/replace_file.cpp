// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/replace_file.h"

#include "files/messages.h"

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <string>

namespace headroom::files {

namespace {

/// A file handle that is closed in any case.
class Handle {
public:
    explicit Handle(int number) : number_(number) {}
    ~Handle() {
        if (number_ >= 0) {
            ::close(number_);
        }
    }
    Handle(const Handle&) = delete;
    Handle& operator=(const Handle&) = delete;
    int number() const { return number_; }
    bool close() {
        const int result = ::close(number_);
        number_ = -1;
        return result == 0;
    }

private:
    int number_;
};

Findings fault(const Message& message, const std::filesystem::path& path, int reason) {
    Finding finding;
    finding.message = &message;
    finding.arguments = {{"file", path.filename().string()},
                         {"reason", std::string(std::strerror(reason))}};
    return {finding};
}

bool writeAll(int file, std::string_view text) {
    while (!text.empty()) {
        const ssize_t written = ::write(file, text.data(), text.size());
        if (written < 0) {
            if (errno == EINTR) {
                continue;
            }
            return false;
        }
        text.remove_prefix(static_cast<std::size_t>(written));
    }
    return true;
}

/// Writes and flushes; the number of the error, or 0.
int writeFlushed(const std::filesystem::path& path, std::string_view text, mode_t mode) {
    Handle file(::open(path.c_str(), O_WRONLY | O_CREAT | O_TRUNC | O_CLOEXEC, mode));
    if (file.number() < 0) {
        return errno;
    }
    if (!writeAll(file.number(), text) || ::fsync(file.number()) != 0 || !file.close()) {
        return errno != 0 ? errno : EIO;
    }
    return 0;
}

/// Makes the rename itself last through a power cut; no fault if the system cannot.
void flushFolder(const std::filesystem::path& folder) {
    const Handle handle(::open(folder.c_str(), O_RDONLY | O_DIRECTORY | O_CLOEXEC));
    if (handle.number() >= 0) {
        ::fsync(handle.number());
    }
}

} // namespace

Findings replaceFile(const std::filesystem::path& named, std::string_view text) {
    std::error_code ignored;
    // A link stays a link: what it points to is replaced.
    const auto target = std::filesystem::weakly_canonical(named, ignored);
    const auto path = ignored ? named : target;
    mode_t mode = 0644;
    struct stat old {};
    if (::stat(path.c_str(), &old) == 0) {
        mode = old.st_mode & 07777U;
        if (::access(path.c_str(), W_OK) != 0) {
            return fault(say::notWritten, named, errno);
        }
    }
    auto part = path;
    part += ".part";
    if (const int reason = writeFlushed(part, text, mode)) {
        std::filesystem::remove(part, ignored);
        return fault(say::notWritten, named, reason);
    }
    if (std::rename(part.c_str(), path.c_str()) != 0) {
        const int reason = errno;
        std::filesystem::remove(part, ignored);
        return fault(say::notReplaced, named, reason);
    }
    flushFolder(path.has_parent_path() ? path.parent_path() : ".");
    return {};
}

Findings overwriteFile(const std::filesystem::path& path, std::string_view text) {
    if (const int reason = writeFlushed(path, text, 0644)) {
        return fault(say::notWritten, path, reason);
    }
    return {};
}

} // namespace headroom::files
