// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "support/catch.h"

#include <sys/wait.h>
#include <unistd.h>

#include <atomic>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <sstream>
#include <string>

/// Runs the batch program as a user would: as a process, with its exit status and its two outputs.
namespace program {

namespace fs = std::filesystem;

inline std::string readAll(const fs::path& path) {
    std::ifstream file(path, std::ios::binary);
    std::ostringstream text;
    text << file.rdbuf();
    return text.str();
}

/// A folder of its own, removed at the end.
class Folder {
public:
    Folder() {
        static std::atomic<int> number{0};
        path_ = fs::temp_directory_path() /
                ("headroom-batch-test-" + std::to_string(getpid()) + "-" + std::to_string(++number));
        fs::create_directories(path_);
    }
    ~Folder() {
        std::error_code ignored;
        fs::remove_all(path_, ignored);
    }
    Folder(const Folder&) = delete;
    Folder& operator=(const Folder&) = delete;
    const fs::path& path() const { return path_; }

private:
    fs::path path_;
};

struct Answer {
    int exit = -1;
    std::string out, err;
};

inline std::string inQuotes(const std::string& word) {
    std::string out = "'";
    for (const char letter : word) {
        out += letter == '\'' ? std::string("'\\''") : std::string(1, letter);
    }
    return out + "'";
}

inline Answer call(const std::vector<std::string>& words) {
    const Folder folder;
    std::string line = inQuotes(HEADROOM_BATCH);
    for (const auto& word : words) {
        line += " ";
        line += inQuotes(word);
    }
    line += " >" + inQuotes((folder.path() / "out").string());
    line += " 2>" + inQuotes((folder.path() / "err").string());
    const int status = std::system(line.c_str());
    Answer answer;
    answer.exit = WIFEXITED(status) ? WEXITSTATUS(status) : -1;
    answer.out = readAll(folder.path() / "out");
    answer.err = readAll(folder.path() / "err");
    return answer;
}

inline const std::string demo = HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json";
inline const fs::path faulty = HEADROOM_SOURCE_DIR "/tests/files/faulty";

} // namespace program
