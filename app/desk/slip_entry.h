// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/thing_values.h"
#include "studies/board.h"

#include <QStringList>
#include <memory>

/// What a slip's one line means, without a widget.
namespace headroom::desk {

/// A typed line, understood as far as it goes.
struct SlipReading {
    int value = -1;        ///< which of the thing's values; −1: a name that is not known
    QString shown;         ///< as evaluated, with unit: "10.0 m"
    QString fault;         ///< why it cannot be taken, in one sentence; empty if it can
    bool changes = false;  ///< differs from what is there now
    plant::Tree next;      ///< the project with it; valid if it changes and has no fault
    QString label;         ///< of the undo step
};

/// What is said about one value below the line.
struct SlipFacts {
    QString what;          ///< "Surge shaft, diameter"
    QString help;
    QString origin;        ///< "As built 8.0 m (drawing DV-31)"
    bool differs = false;  ///< from the base
    QString usual;         ///< "usual 2 to 40 m"
    QString effect;        ///< "moves surge period, Thoma ratio"
    QStringList stays;     ///< with the base in the hand: options that keep their own value
};

class SlipEntry {
public:
    /// @param option  in the hand, −1: the base
    /// @param start   thing or value at which the slip opens
    SlipEntry(std::shared_ptr<const studies::Snapshot> snapshot, int option,
              const plant::Path& start);

    const std::vector<EditableValue>& values() const { return values_; }
    int current() const { return current_; }
    void setCurrent(int index); ///< wraps around
    void choose(int row, int column); ///< the table cell of the value it opened at
    /// Grammar: [name] [= += -= *= /=] arithmetic with unit words; a name alone only chooses.
    SlipReading read(const QString& typed) const;
    SlipFacts facts(int index) const;
    QString valueText(int index) const; ///< as it is now, with unit
    /// The number alone in the file's unit, to begin an entry with; the word for words.
    QString startText(int index) const;
    /// Whether the value is the option's own and not the base's.
    bool differs(int index) const;
    /// The project with this value taken back to the base.
    plant::Tree takenBack(int index) const;

private:
    struct Named {
        int value;
        QString rest;
    };
    Named nameIn(const QString& typed) const;
    void readNumber(SlipReading& reading, const EditableValue& value, const QString& rest) const;
    void readWord(SlipReading& reading, const EditableValue& value, const QString& rest) const;
    void checkProject(SlipReading& reading, const EditableValue& value,
                      const plant::Tree& entered) const;
    const plant::Tree* now(const plant::Path& path) const;
    std::optional<EditableValue> inBase(const EditableValue& value) const;
    QString sourceWords(const plant::Path& path) const;

    std::shared_ptr<const studies::Snapshot> snapshot_;
    int option_;
    std::vector<EditableValue> values_;
    int current_ = 0;
};

} // namespace headroom::desk
