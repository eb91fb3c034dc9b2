// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/rows.h"

#include <deque>

/// Rows of limits: the measure is the key of its group, so that a bound carries its unit.
namespace headroom::plant::rows {

namespace {

/// Keeps keys that are made of a word and a quantity's suffix.
std::string_view kept(std::string key) {
    static std::deque<std::string> keys;
    for (const auto& known : keys) {
        if (known == key) {
            return known;
        }
    }
    keys.push_back(std::move(key));
    return keys.back();
}

std::string_view keyFor(std::string_view word, Quantity quantity) {
    std::string key(word);
    if (const auto suffix = info(quantity).suffix; !suffix.empty()) {
        key += '_';
        key += suffix;
    }
    return kept(std::move(key));
}

struct LoadClassWords {
    std::string_view key, label, help;
};
constexpr std::array<LoadClassWords, loadClassCount> loadClasses{{
    {"normal", "Normal",
     "Value for what staff or automatics may do to a healthy plant in any order."},
    {"exceptional", "Exceptional",
     "Value for one independent failure on top, or the worst phase of normal events."},
    {"extreme", "Extreme", "Value for two failures, or one failure at its worst phase."},
    {"catastrophic", "Catastrophic", "Value for rupture or complete loss of control."},
}};

/// The widest range of a bound, as written in the file.
struct Span {
    double low, high;
};
Span spanOf(Quantity quantity) {
    switch (quantity) {
    case Quantity::elevation:
        return {lowestLevel_m, highestLevel_m};
    case Quantity::percent:
        return {-100, 200};
    case Quantity::speedRatio:
        return {-3, 4};
    case Quantity::frequency:
        return {0, 200};
    default:
        return {-1e6, 1e6};
    }
}

RowsOf<ClassValues> classRows(Quantity quantity) {
    RowsOf<ClassValues> rows{};
    for (std::size_t i = 0; i < loadClasses.size(); ++i) {
        const auto& words = loadClasses[i];
        const Access<ClassValues, double> through{
            [i](ClassValues& values, double value) { values[i] = value; },
            [i](const ClassValues& values) { return values[i]; }};
        const auto span = spanOf(quantity);
        rows = rows.with({number(through, quantity, {words.key, words.label, words.help})
                              .range(span.low, span.high)
                              .uncounted()});
    }
    return rows;
}

RowsOf<Allowance> allowanceRows() {
    return {
        number(
            &Allowance::shareOfHead, Quantity::percent,
            {"pctOfHead", "Of the static head",
             "Per cent of the static head added to the computed value, for example for pulsation."})
            .range(0, 100)
            .usual(0, 10)
            .uncounted(),
        number(&Allowance::shareOfRise, Quantity::percent,
               {"pctOfRise", "Of the change from rest",
                "Per cent of the computed change from rest added to the computed value."})
            .range(0, 100)
            .usual(0, 20)
            .uncounted(),
    };
}

Row<Limit> placeRow(std::vector<Collection> named, bool alongToo) {
    auto row = bound(FieldKind::location,
                     {"at", "Place",
                      "The thing that is limited, by its name, or a chainage along a conduit."},
                     access(&Limit::at))
                   .uncounted();
    row.field.collections = std::move(named);
    if (alongToo) {
        row.field.fields = alongConduitRows().fields;
    }
    row.field.required = true;
    return row;
}

Row<Limit> wholeConduitRow() {
    const Access<Limit, Reference> whole{[](Limit& limit, Reference conduit) {
                                             limit.at.thing = std::move(conduit);
                                             limit.wholeConduit = true;
                                         },
                                         [](const Limit& limit) {
                                             return limit.wholeConduit
                                                        ? std::optional(limit.at.thing)
                                                        : std::nullopt;
                                         }};
    auto row = bound(FieldKind::reference,
                     {"along", "Along", "A conduit that is limited at every chainage."}, whole)
                   .uncounted();
    row.field.collections = {Collection::conduits};
    return std::move(row).needed();
}

/// Where each measure can be limited.
RowsOf<Limit> placeRows(Measure measure) {
    switch (measure) {
    case Measure::level:
        return {placeRow({Collection::chambers, Collection::reservoirs}, false)};
    case Measure::head:
    case Measure::pressureRate:
        return {placeRow({Collection::points}, true)};
    case Measure::pressureHead:
        return {eitherOf<Limit>({{placeRow({Collection::points}, true)}, {wholeConduitRow()}},
                                "Where", "A place, or a whole conduit.")};
    case Measure::discharge:
        return {placeRow({Collection::conduits, Collection::units, Collection::chambers}, true)};
    case Measure::velocity:
        return {placeRow({Collection::conduits}, true)};
    case Measure::frequency:
    case Measure::frequencyRate:
        return {};
    default:
        return {placeRow({Collection::units}, false)};
    }
}

RowsOf<Limit> boundRows(Quantity quantity) {
    return {
        group(&Limit::least, classRows(quantity),
              {keyFor("min", quantity), "Not below", "Least value allowed, for each load class."})
            .uncounted(),
        group(
            &Limit::greatest, classRows(quantity),
            {keyFor("max", quantity), "Not above", "Greatest value allowed, for each load class."})
            .uncounted(),
        number(&Limit::reserve, quantity,
               {keyFor("reserve", quantity), "Reserve",
                "Distance to the bound that is wanted beyond the uncertainty; with less the limit "
                "is tight."})
            .range(0, spanOf(quantity).high)
            .uncounted(),
        number(&Limit::modelUncertainty, quantity,
               {keyFor("modelUncertainty", quantity), "Model uncertainty",
                "How far the computed value may be wrong for other reasons than the numerical "
                "step; declared by the user."})
            .range(0, spanOf(quantity).high)
            .uncounted(),
        group(&Limit::allowance, allowanceRows(),
              {"allowance", "Allowance",
               "What is added to the computed value before it is compared, because it is not "
               "computed."})
            .uncounted(),
    };
}

Row<Limit> measureRow(const MeasureInfo& measure) {
    return groupBy<Limit, Limit>(
               [kind = measure.measure](Limit& limit) {
                   limit.measure = kind;
                   return &limit;
               },
               [kind = measure.measure](const Limit& limit) {
                   return limit.measure == kind ? &limit : nullptr;
               },
               placeRows(measure.measure).with(boundRows(measure.quantity)),
               {measure.key, measure.label, measure.help})
        .needed();
}

Row<Limit> timeKind(TimeRule rule, RowsOf<Limit> inner, Words words) {
    return groupBy<Limit, Limit>(
        [rule](Limit& limit) {
            limit.timeRule = rule;
            return &limit;
        },
        [rule](const Limit& limit) { return limit.timeRule == rule ? &limit : nullptr; },
        std::move(inner), words);
}

Row<Limit> allowedRow(std::string_view help) {
    return number(&Limit::allowed_s, Quantity::time, {"allowed_s", "Allowed time", help})
        .needed()
        .range(0, 1e6)
        .uncounted();
}

} // namespace

std::vector<std::string_view> loadClassKeys() {
    std::vector<std::string_view> keys;
    for (const auto& words : loadClasses) {
        keys.push_back(words.key);
    }
    return keys;
}

RowsOf<Limit> limitRows() {
    std::vector<RowsOf<Limit>> forms;
    for (const auto& measure : measures()) {
        forms.push_back({measureRow(measure)});
    }
    return {
        eitherOf<Limit>(std::move(forms), "Measure",
                        "What is limited, where, and by which values."),
        oneOf<Limit>(
            {
                timeKind(TimeRule::momentary, {},
                         {"momentary", "Momentary", "No excursion is allowed."}),
                timeKind(TimeRule::continuous, {allowedRow("How long one excursion may last.")},
                         {"continuous", "Continuous", "One excursion may last for a time."}),
                timeKind(
                    TimeRule::cumulative,
                    {allowedRow("How long all excursions of one event may last together.")},
                    {"cumulative", "Cumulative", "All excursions together may last for a time."}),
            },
            {"time", "Time rule", "How long the value may stay outside; left out: not at all."})
            .uncounted(),
        text(&Limit::consequence,
             {"consequence", "Consequence", "What happens beyond the bound, in words."}),
        group(&Limit::source, sourceRows(),
              {"source", "Source",
               "Document and author of the values; without both the limit is unsigned."})
            .uncounted()
            .withoutCommons(),
    };
}

} // namespace headroom::plant::rows
