// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/slip_entry.h"

#include "base/near_miss.h"
#include "desk/words.h"
#include "units/expression.h"
#include "units/text.h"

#include <QCoreApplication>
#include <QRegularExpression>
#include <algorithm>
#include <cmath>

namespace headroom::desk {

namespace {

using plant::FieldKind;
using plant::Path;
using plant::Tree;

QString tr(const char* words) { return QCoreApplication::translate("desk", words); }

QString withUnit(Quantity quantity, double si) { return text(print(quantity, si)); }

/// "2 to 40 m": both ends in the file's unit, the unit once.
QString rangeWords(Quantity quantity, const plant::Range& range) {
    const auto number = [&](double si) {
        return QString::number(fromSi(quantity, si), 'g', 6).replace(QLatin1Char('-'), QChar(0x2212));
    };
    const auto symbol = text(info(quantity).symbol);
    const auto words = tr("%1 to %2").arg(number(range.low), number(range.high));
    return symbol.isEmpty() ? words : words + QChar(0x2009) + symbol;
}

bool sameFault(const Finding& a, const Finding& b) {
    return a.message == b.message && a.subject == b.subject;
}

QString listOf(const std::vector<std::string_view>& words) {
    QStringList list;
    for (const auto word : words) {
        list << text(word);
    }
    return list.join(QStringLiteral(", "));
}

/// yes/no, one of the choices, or any text, as it stands in the file.
std::optional<Tree> wordTree(const plant::Field& field, const QString& word) {
    const auto lower = word.toLower();
    if (field.kind == FieldKind::truth) {
        const bool yes = lower == tr("yes") || lower == QLatin1String("true");
        const bool no = lower == tr("no") || lower == QLatin1String("false");
        return yes || no ? std::optional(Tree::boolean(yes)) : std::nullopt;
    }
    if (field.kind == FieldKind::choice) {
        for (const auto choice : field.choices) {
            if (text(choice).compare(word, Qt::CaseInsensitive) == 0) {
                return Tree::text(std::string(choice));
            }
        }
        return std::nullopt;
    }
    return Tree::text(word.toStdString());
}

} // namespace

SlipEntry::SlipEntry(std::shared_ptr<const studies::Snapshot> snapshot, int option,
                     const Path& start)
    : snapshot_(std::move(snapshot)), option_(option) {
    const auto& variant = snapshot_->variant(option_);
    values_ = valuesOf(snapshot_->project(), variant, thingPath(start));
    if (values_.empty()) {
        values_ = valuesOf(snapshot_->project(), variant, start);
    }
    // The value that was asked for; on a thing as a whole its first number, not a name or a word.
    const auto asked = std::find_if(values_.begin(), values_.end(),
                                    [&](const auto& value) { return value.path == start; });
    const auto number = std::find_if(values_.begin(), values_.end(),
                                     [](const auto& value) { return value.numeric(); });
    const auto found = asked != values_.end() ? asked : number;
    current_ = found != values_.end() ? static_cast<int>(found - values_.begin()) : 0;
}

void SlipEntry::setCurrent(int index) {
    const int count = static_cast<int>(values_.size());
    current_ = count == 0 ? 0 : (index % count + count) % count;
}

void SlipEntry::choose(int row, int column) {
    for (std::size_t i = 0; i < values_.size(); ++i) {
        const auto& value = values_[i];
        if (value.path == values_[static_cast<std::size_t>(current_)].path && value.row == row &&
            value.column == column) {
            current_ = static_cast<int>(i);
            return;
        }
    }
}

const Tree* SlipEntry::now(const Path& path) const {
    return valueAt(snapshot_->project(), snapshot_->variant(option_), path);
}

QString SlipEntry::valueText(int index) const {
    const auto& value = values_[static_cast<std::size_t>(index)];
    return printed(value, now(value.path));
}

QString SlipEntry::startText(int index) const {
    const auto& value = values_[static_cast<std::size_t>(index)];
    if (!value.numeric()) {
        return value.given ? printed(value, now(value.path)) : QString();
    }
    return value.si ? QString::number(fromSi(value.quantity, *value.si), 'g', 12) : QString();
}

/// The name that a line begins with, if it is one of the thing's.
SlipEntry::Named SlipEntry::nameIn(const QString& typed) const {
    static const QRegularExpression lead(QStringLiteral("^\\s*([A-Za-z_]+)\\s*(.*)$"));
    const auto match = lead.match(typed);
    if (!match.hasMatch()) {
        return {current_, typed.trimmed()};
    }
    const int named = valueNamed(values_, match.captured(1));
    const bool words = !values_[static_cast<std::size_t>(current_)].numeric();
    if (named < 0 && words) {
        return {current_, typed.trimmed()};
    }
    return {named, match.captured(2).trimmed()};
}

SlipReading SlipEntry::read(const QString& typed) const {
    SlipReading reading;
    if (values_.empty()) {
        reading.fault = tr("There is no value to enter here.");
        return reading;
    }
    const auto [index, rest] = nameIn(typed);
    reading.value = index;
    if (index < 0) {
        QStringList names;
        for (const auto& value : values_) {
            if (!names.contains(shortName(value)) && names.size() < 8) {
                names << shortName(value);
            }
        }
        reading.fault = tr("No value of this name here. There are: %1.").arg(names.join(QStringLiteral(", ")));
        return reading;
    }
    const auto& value = values_[static_cast<std::size_t>(index)];
    reading.shown = valueText(index);
    if (rest.isEmpty()) {
        return reading;
    }
    if (value.numeric()) {
        readNumber(reading, value, rest);
    } else {
        readWord(reading, value, rest);
    }
    return reading;
}

void SlipEntry::readNumber(SlipReading& reading, const EditableValue& value,
                           const QString& rest) const {
    const bool relative = rest.size() > 1 && rest[1] == QLatin1Char('=');
    if (relative && !value.si) {
        reading.fault = tr("There is no value yet that this could change.");
        return;
    }
    const auto entered =
        expression::entered(rest.toStdString(), value.quantity, value.si.value_or(0.0));
    if (!entered) {
        const auto& finding = entered.findings().front();
        reading.fault = text(whatText(finding)) + QLatin1Char(' ') + text(mendText(finding));
        reading.shown.clear();
        return;
    }
    reading.shown = withUnit(value.quantity, *entered);
    if (value.field->kind == FieldKind::whole && *entered != std::round(*entered)) {
        reading.fault = tr("A whole number is needed here.");
        return;
    }
    if (value.hard && !value.hard->holds(*entered)) {
        reading.fault = tr("%1 lies within %2.").arg(value.label, rangeWords(value.quantity, *value.hard));
        return;
    }
    checkProject(reading, value, treeWith(value, now(value.path), *entered));
}

void SlipEntry::readWord(SlipReading& reading, const EditableValue& value,
                         const QString& rest) const {
    const auto word = rest.startsWith(QLatin1Char('=')) ? rest.mid(1).trimmed() : rest;
    const auto tree = wordTree(*value.field, word);
    if (!tree) {
        reading.fault = value.field->kind == FieldKind::truth
                            ? tr("Type yes or no.")
                            : tr("Type one of: %1.").arg(listOf(value.field->choices));
        reading.shown.clear();
        return;
    }
    reading.shown = word;
    checkProject(reading, value, *tree);
}

/// Puts the value into the project and asks whether that is worse than before.
void SlipEntry::checkProject(SlipReading& reading, const EditableValue& value,
                             const Tree& entered) const {
    const auto& project = snapshot_->project();
    const Tree* before = now(value.path);
    reading.changes = before == nullptr || !sameContent(*before, entered);
    if (!reading.changes) {
        return;
    }
    reading.next = plant::edited(project.tree, option_, value.path, entered);
    reading.label = tr("%1 to %2").arg(pathWords(value.path), reading.shown);
    const auto bound = plant::bind(reading.next);
    for (const auto& finding : bound.findings) {
        const bool known = std::any_of(
            snapshot_->bound->findings.begin(), snapshot_->bound->findings.end(),
            [&](const Finding& old) { return sameFault(old, finding); });
        if (finding.severity() == Severity::error && !known) {
            reading.fault = text(whatText(finding));
            return;
        }
    }
}

std::optional<EditableValue> SlipEntry::inBase(const EditableValue& value) const {
    const auto same = valuesOf(snapshot_->project(), snapshot_->variant(-1), value.path);
    const auto at = std::find(same.begin(), same.end(), value);
    return at == same.end() ? std::nullopt : std::optional(*at);
}

bool SlipEntry::differs(int index) const {
    const auto& value = values_[static_cast<std::size_t>(index)];
    const Tree* base = valueAt(snapshot_->project(), snapshot_->variant(-1), value.path);
    const Tree* here = now(value.path);
    if (option_ < 0 || base == here) {
        return false;
    }
    const auto other = inBase(value);
    if (value.numeric() && other) {
        return value.si != other->si;
    }
    return base == nullptr || here == nullptr || !sameContent(*base, *here);
}

Tree SlipEntry::takenBack(int index) const {
    return plant::takenBack(snapshot_->project().tree, option_,
                            values_[static_cast<std::size_t>(index)].path);
}

/// Document and revision of the nearest source above a value.
QString SlipEntry::sourceWords(const Path& path) const {
    for (Path owner(path.begin(), path.end() - 1); owner.size() > 1; owner.pop_back()) {
        Path at = owner;
        at.emplace_back(plant::commonFields().back().key);
        const Tree* source = snapshot_->project().tree.at(at);
        QStringList words;
        for (const auto& [key, part] : source == nullptr ? std::vector<Tree::Member>{}
                                                         : source->members()) {
            if (part.isText() && words.size() < 2) {
                words << text(part.asText());
            }
        }
        if (!words.isEmpty()) {
            return words.join(QStringLiteral(", "));
        }
    }
    return {};
}

SlipFacts SlipEntry::facts(int index) const {
    const auto& value = values_[static_cast<std::size_t>(index)];
    SlipFacts facts;
    facts.what = pathWords(value.path);
    if (value.column >= 0) {
        facts.what = thingName(value.path) + QStringLiteral(", ") + value.label.toLower();
    }
    facts.help = text(value.field->help);
    facts.differs = differs(index);
    const auto base = inBase(value);
    const auto baseText =
        base ? printed(*base, valueAt(snapshot_->project(), snapshot_->variant(-1), value.path))
             : tr("has none");
    facts.origin = text(snapshot_->optionName(-1)) + QLatin1Char(' ') + baseText;
    const auto source = sourceWords(value.path);
    facts.origin += source.isEmpty() ? tr(" (no source given)") : QStringLiteral(" (%1)").arg(source);
    if (value.usual) {
        facts.usual = tr("usual %1").arg(rangeWords(value.quantity, *value.usual));
    }
    if (!value.field->effect.empty()) {
        facts.effect = tr("moves %1").arg(text(value.field->effect));
    }
    for (int option = 0; option_ < 0 && option < snapshot_->options(); ++option) {
        const SlipEntry other(snapshot_, option, value.path);
        const auto at = std::find(other.values_.begin(), other.values_.end(), value);
        const int place = static_cast<int>(at - other.values_.begin());
        if (at != other.values_.end() && other.differs(place)) {
            facts.stays << tr("stays %1 in %2").arg(other.valueText(place), text(snapshot_->optionName(option)));
        }
    }
    return facts;
}

} // namespace headroom::desk
