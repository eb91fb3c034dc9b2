// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/fields.h"
#include "plant/names.h"
#include "plant/report.h"

namespace headroom::plant {

/// Adds a key to a path for as long as it lives.
class Deeper {
public:
    Deeper(Path& path, std::string_view key) : path_(path) { path_.emplace_back(key); }
    ~Deeper() { path_.pop_back(); }
    Deeper(const Deeper&) = delete;
    Deeper& operator=(const Deeper&) = delete;

private:
    Path& path_;
};

/// Reads a value tree into structs by walking the rows; every fault becomes a finding and the
/// reading goes on, so that all faults come at once.
class Reader {
public:
    Reader(Report& report, Names names) : report_(report), names_(std::move(names)) {}

    /// Reads the members of `tree` by the rows of `owner` into the struct `object` they belong to.
    void readGroup(const Field& owner, const Tree& tree, void* object);

private:
    void readMember(const Field& row, const Tree& value, void* object);
    void readNumber(const Field& row, const Tree& value, void* object);
    void readWhole(const Field& row, const Tree& value, void* object);
    void readChoice(const Field& row, const Tree& value, void* object);
    void readReferences(const Field& row, const Tree& value, void* object);
    void readLocation(const Field& row, const Tree& value, void* object);
    void readTable(const Field& row, const Tree& value, void* object);
    void readInterval(const Field& row, const Tree& value, void* object);
    void readKeyed(const Field& row, const Tree& value, void* object);
    void readNumbers(const Field& row, const Tree& value, void* object);
    void readInner(const Field& row, const Tree& value, void* object);

    void checkPresence(const Field& owner, const Fields& rows, const Tree& tree);
    void checkForms(const Field& owner, const Field& either, const Tree& tree);
    void checkKinds(const Field& oneOf, const Tree& tree);
    void checkSearch(const Tree& value);
    void tellRivals(std::string_view first, std::string_view second, std::string_view label);
    void tellUnknown(const Field& owner, const std::string& key);
    void tellMistyped(const Field& row, const Tree& value);

    std::optional<double> numberOf(const Field& row, const Tree& value);
    Reference resolve(const Field& row, const std::string& name);
    void tellUndeclared(const Field& row, const std::string& name);
    TableRows inlineRows(const Field& row, const Tree& value);
    TableRows outerRows(const Field& row, const Tree& value);
    bool checkRow(const Field& row, std::size_t index, const std::vector<double>& file,
                  const std::vector<double>* before);

    Report& report_;
    Names names_;
    Path path_;
    bool mayLack_ = false; ///< limits and studies may name what only another option has
};

} // namespace headroom::plant
