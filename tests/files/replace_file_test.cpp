// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/project_file.h"
#include "files/replace_file.h"
#include "support/catch.h"
#include "units/text.h"

#include <sys/resource.h>
#include <sys/stat.h>
#include <unistd.h>

#include <atomic>
#include <csignal>
#include <thread>

#include "folder.h"

using namespace headroom;
using namespace headroom::files;
namespace fs = std::filesystem;
using support::Folder;

namespace {

std::string codeOf(const Findings& findings) {
    return findings.empty() ? "" : std::string(findings.front().message->code);
}

} // namespace

TEST_CASE("replaceFile: the old file or the new one, never a part", "[files][invariant]") {
    const Folder folder;
    const auto path = folder.path() / "a.headroom.json";
    const std::string first(400'000, 'a'), second(300'000, 'b');
    REQUIRE(replaceFile(path, first).empty());
    std::atomic<bool> done{false};
    std::atomic<int> wrong{0}, reads{0};
    std::thread reader([&] {
        while (!done) {
            const auto text = readFile(path);
            ++reads;
            if (!text || (*text != first && *text != second)) {
                ++wrong;
            }
        }
    });
    for (int i = 0; i < 20; ++i) {
        const auto findings = replaceFile(path, i % 2 == 0 ? second : first);
        if (!findings.empty()) {
            ++wrong;
        }
    }
    done = true;
    reader.join();
    CHECK(wrong == 0);
    CHECK(reads > 0);
    CHECK(fs::exists(path));
    CHECK_FALSE(fs::exists(path.string() + ".part"));
}

TEST_CASE("replaceFile: keeps the file's permissions and its link", "[files][invariant]") {
    const Folder folder;
    const auto real = folder.path() / "real.json";
    REQUIRE(replaceFile(real, "one").empty());
    fs::permissions(real, fs::perms::owner_read | fs::perms::owner_write);
    const auto link = folder.path() / "link.json";
    fs::create_symlink(real, link);
    REQUIRE(replaceFile(link, "two").empty());
    CHECK(fs::is_symlink(link));
    CHECK(*readFile(real) == "two");
    CHECK((fs::status(real).permissions() & fs::perms::group_read) == fs::perms::none);
}

TEST_CASE("replaceFile: what the system refuses is told, and nothing is lost",
          "[files][messages]") {
    const Folder folder;
    CHECK(codeOf(replaceFile(folder.path() / "no such folder" / "a.json", "x"))
          == "files.not-written");
    const auto blocked = folder.path() / "blocked";
    fs::create_directory(blocked);
    fs::create_directory(blocked / "inside");
    const auto findings = replaceFile(blocked, "x"); // a folder that is not empty has the name
    CHECK(codeOf(findings) == "files.not-replaced");
    CHECK_THAT(text(findings.front()), ContainsSubstring("unchanged"));
    CHECK_FALSE(fs::exists(blocked.string() + ".part"));
}

TEST_CASE("replaceFile: a full disk leaves the old file", "[files][messages]") {
    const Folder folder;
    const auto path = folder.path() / "a.json";
    REQUIRE(replaceFile(path, "old").empty());
    rlimit before{};
    REQUIRE(getrlimit(RLIMIT_FSIZE, &before) == 0);
    rlimit small = before;
    small.rlim_cur = 1000;
    const auto oldHandler = std::signal(SIGXFSZ, SIG_IGN);
    REQUIRE(setrlimit(RLIMIT_FSIZE, &small) == 0);
    const auto findings = replaceFile(path, std::string(5000, 'x'));
    setrlimit(RLIMIT_FSIZE, &before);
    std::signal(SIGXFSZ, oldHandler);
    CHECK(codeOf(findings) == "files.not-written");
    CHECK(*readFile(path) == "old");
    CHECK_FALSE(fs::exists(path.string() + ".part"));
}

TEST_CASE("replaceFile: a folder that cannot be written to is told", "[files][messages]") {
    const Folder folder;
    const auto path = folder.path() / "a.json";
    REQUIRE(replaceFile(path, "old").empty());
    const uid_t self = ::geteuid();
    fs::permissions(folder.path(), fs::perms::owner_read | fs::perms::owner_exec
                                       | fs::perms::others_read | fs::perms::others_exec);
    if (self == 0) { // the superuser may write everywhere: be nobody for a moment
        constexpr uid_t nobody = 65534;
        REQUIRE(::seteuid(nobody) == 0);
    }
    const auto old = replaceFile(path, "new");
    const auto fresh = replaceFile(folder.path() / "b.json", "new");
    if (self == 0) {
        REQUIRE(::seteuid(0) == 0);
    }
    CHECK(codeOf(old) == "files.not-written");
    CHECK(codeOf(fresh) == "files.not-written");
    fs::permissions(folder.path(), fs::perms::owner_all);
    CHECK(*readFile(path) == "old");
    CHECK_FALSE(fs::exists(folder.path() / "b.json"));
}

TEST_CASE("openProject, saveProject: there and back", "[files][files]") {
    const Folder folder;
    const auto demo = openProject(HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json");
    const auto path = folder.path() / "copy.headroom.json";
    const auto saved = saveProject(demo.tree, path);
    REQUIRE(saved);
    CHECK(*readFile(path) == demo.text);
    const auto opened = openProject(path);
    CHECK(opened.usable());
    CHECK(opened.tree == *saved);
    CHECK_FALSE(saveProject(demo.tree, folder.path() / "nowhere" / "x.json"));
    CHECK(codeOf(openProject(folder.path() / "missing.json").findings()) == "files.not-found");
    CHECK(codeOf(openProject(folder.path()).findings()) == "files.not-readable");
    CHECK_FALSE(openProject(folder.path()).usable());
}
