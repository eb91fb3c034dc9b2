// SPDX-License-Identifier: GPL-3.0-or-later
#include "files/safe_name.h"

namespace headroom::files {

namespace {

bool isKept(unsigned char letter) {
    return (letter >= '0' && letter <= '9') || (letter >= 'a' && letter <= 'z')
           || (letter >= 'A' && letter <= 'Z') || letter >= 0x80;
}

std::string small(std::string text) {
    for (char& letter : text) {
        if (letter >= 'A' && letter <= 'Z') {
            letter = static_cast<char>(letter - 'A' + 'a');
        }
    }
    return text;
}

} // namespace

std::string safeName(std::string_view name) {
    std::string out;
    for (const char letter : name) {
        if (isKept(static_cast<unsigned char>(letter))) {
            out += letter;
        } else if (!out.empty() && out.back() != '-') {
            out += '-';
        }
    }
    while (!out.empty() && out.back() == '-') {
        out.pop_back();
    }
    return out.empty() ? "unnamed" : out;
}

std::string SafeNames::of(std::string_view name) {
    const std::string plain = safeName(name);
    std::string tried = plain;
    for (int i = 2; !used_.insert(small(tried)).second; ++i) {
        tried = plain + "-" + std::to_string(i);
    }
    return tried;
}

} // namespace headroom::files
