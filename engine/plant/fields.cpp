// SPDX-License-Identifier: GPL-3.0-or-later
#include "plant/fields.h"

#include "base/ensure.h"
#include "plant/rows.h"

namespace headroom::plant {

namespace {

using namespace rows;

RowsOf<Option> optionRows() {
    auto changes = bound(
        FieldKind::patch,
        {"changes", "Changes",
         "What the option changes in site, plant and limits, as a merge patch: null removes."},
        access(&Option::changes));
    return {
        text(&Option::about, {"about", "About", "What the option is, in words."}),
        number(&Option::cost_M, Quantity::money,
               {"cost_M", "Cost", "Cost in millions of the user's currency."})
            .range(-1e6, 1e6)
            .uncounted(),
        group(&Option::source, sourceRows(), {"source", "Source", "Where the option comes from."})
            .uncounted()
            .withoutCommons(),
        std::move(changes).uncounted(),
    };
}

RowsOf<Numerics> numericsRows() {
    return {number(&Numerics::longestStep_s, Quantity::time,
                   {"longestStep_s", "Longest step",
                    "Cap of the plant's time step; the step is chosen from the waterway below it."})
                .range(1e-5, 1)
                .usual(0.001, 0.05)};
}

/// The base's name stands in a group of its own but belongs to the project.
RowsOf<Project> baseRows() {
    return {text(&Project::baseName, {"name", "Name of the base",
                                      "Name of the plant without any option, the first column."})};
}

Row<Project> formatRow() {
    auto row =
        bare<Project>(FieldKind::whole, {"headroom", "Format", "Number of this file format."});
    row.field.hard = Range{1, 1e6};
    return std::move(row).needed().uncounted();
}

Row<Project> identity(RowsOf<Project> inner, Words words) {
    return groupBy<Project, Project>([](Project& project) { return &project; },
                                     [](const Project& project) { return &project; },
                                     std::move(inner), words);
}

RowsOf<Project> describedRows() {
    return {
        formatRow(),
        text(&Project::title, {"title", "Title", "What the project is called."}),
        group(&Project::site, siteRows(),
              {"site", "Site", "What holds for the whole plant: datum, water, air."})
            .varies(),
        identity(baseRows(), {"base", "Base", "The plant without any option."}).uncounted(),
        group(&Project::plant, plantRows(), {"plant", "Plant", "The plant as it is."})
            .needed()
            .varies(),
        keyed(&Project::limits, Collection::limits, limitRows(),
              {"limits", "Limits", "Bounds that the plant's owner, makers and authorities set."})
            .uncounted()
            .varies(),
        keyed(&Project::options, Collection::options, optionRows(),
              {"options", "Options", "Named changes of the plant that are compared with the base."})
            .uncounted(),
        keyed(&Project::studies, Collection::studies, studyRows(),
              {"studies", "Studies", "Starts and events that every option is run through."}),
    };
}

RowsOf<Project> besideRows() {
    return {
        reserved<Project>({"searches", "Searches", "Reserved for searches."}),
        reserved<Project>({"products", "Products", "Reserved for reserve products."}),
        reserved<Project>({"ranges", "Ranges", "Reserved for ranges of uncertain inputs."}),
        reserved<Project>({"recordings", "Recordings", "Reserved for recordings of the plant."}),
        reserved<Project>(
            {"dispositions", "Dispositions", "Reserved for what was decided about a verdict."}),
        reserved<Project>({"prices", "Prices", "Reserved for prices."}),
        group(&Project::numerics, numericsRows(),
              {"numerics", "Numerics", "Settings of the computation."}),
        table(
            &Project::ground,
            {risingColumn("chainage_m", "Chainage", Quantity::chainage, -longestChainage_m,
                          longestChainage_m),
             column("elevation_m", "Elevation", Quantity::elevation, lowestLevel_m,
                    highestLevel_m)},
            {"ground", "Ground line", "Surface of the ground above the waterway, for the drawing."})
            .uncounted(),
        reserved<Project>({"underlay", "Underlay", "Reserved for a drawing behind the section."}),
        reserved<Project>({"notes", "Notes", "Reserved for notes on the whole project."}),
    };
}

/// Rows without a struct of their own: they are kept in the tree.
struct Unowned {
    std::string text;
};

Fields makeCommonFields() {
    auto note = bare<Unowned>(FieldKind::text, {"note", "Note", "A remark, in words."});
    auto source = bare<Unowned>(FieldKind::group,
                                {"source", "Source", "Document and author of these numbers."});
    source.field.fields = sourceRows().fields;
    for (auto& field : source.field.fields) {
        field.binding = {};
    }
    return RowsOf<Unowned>{std::move(note).uncounted(),
                           std::move(source).uncounted().withoutCommons()}
        .fields;
}

} // namespace

const Fields& projectFields() {
    static const Fields fields = describedRows().with(besideRows()).fields;
    return fields;
}

const Field& projectRow() {
    static const Field whole = [] {
        Field field;
        field.kind = FieldKind::group;
        field.fields = projectFields();
        return field;
    }();
    return whole;
}

const Field& varyingRow() {
    static const Field part = [] {
        Field field = projectRow();
        std::erase_if(field.fields, [](const Field& row) { return !row.varies; });
        return field;
    }();
    return part;
}

const Fields& commonFields() {
    static const Fields fields = makeCommonFields();
    return fields;
}

const Field* rowOf(const Fields& fields, std::string_view key) {
    for (const auto& field : fields) {
        if (field.kind != FieldKind::eitherOf) {
            if (field.key == key) {
                return &field;
            }
            continue;
        }
        for (const auto& form : field.forms) {
            if (const Field* found = rowOf(form, key)) {
                return found;
            }
        }
    }
    return nullptr;
}

const Field* rowInside(const Field& group, std::string_view key) {
    const Field* own = rowOf(group.fields, key);
    return own == nullptr && group.commons ? rowOf(commonFields(), key) : own;
}

std::vector<std::string> keysOf(const Fields& fields) {
    std::vector<std::string> keys;
    for (const auto& field : fields) {
        if (field.kind != FieldKind::eitherOf) {
            keys.emplace_back(field.key);
            continue;
        }
        for (const auto& form : field.forms) {
            const auto more = keysOf(form);
            keys.insert(keys.end(), more.begin(), more.end());
        }
    }
    return keys;
}

std::vector<std::string_view> rivalsOf(const Field& owner, std::string_view key) {
    std::vector<std::string_view> rivals;
    if (owner.kind == FieldKind::oneOf) {
        for (const auto& other : owner.fields) {
            if (other.key != key) {
                rivals.push_back(other.key);
            }
        }
        return rivals;
    }
    for (const auto& field : owner.fields) {
        const bool contains = field.kind == FieldKind::eitherOf && rowOf({field}, key) != nullptr;
        for (const auto& form : contains ? field.forms : std::vector<Fields>{}) {
            if (rowOf(form, key) == nullptr) {
                for (const auto& other : form) {
                    rivals.push_back(other.key);
                }
            }
        }
    }
    return rivals;
}

const Field* fieldAt(const Path& path) {
    const Field* here = &projectRow();
    bool nameNext = false;
    for (const auto& key : path) {
        const Field& owner = *here;
        if (nameNext) {
            nameNext = false; // a user's name: the collection's row answers for it
        } else if (owner.kind == FieldKind::patch) {
            here = rowOf(projectRow().fields, key);
            if (here == nullptr || !here->varies) {
                return nullptr;
            }
        } else {
            here = rowInside(owner, key);
        }
        if (here == nullptr || (nameNext && here->kind == FieldKind::numbers)) {
            return nullptr;
        }
        nameNext =
            here != &owner && (here->kind == FieldKind::keyed || here->kind == FieldKind::numbers);
    }
    return here == &projectRow() ? nullptr : here;
}

Path pathOf(Collection collection) {
    for (const auto& field : projectFields()) {
        if (field.declares == collection) {
            return {std::string(field.key)};
        }
        for (const auto& inner : field.fields) {
            if (field.kind == FieldKind::group && inner.declares == collection) {
                return {std::string(field.key), std::string(inner.key)};
            }
        }
    }
    throw Bug("a collection at the top of a project has a path");
}

std::string_view changesKey() {
    static const std::string_view key = [] {
        for (const auto& row : optionRows().fields) {
            if (row.kind == FieldKind::patch) {
                return row.key;
            }
        }
        throw Bug("an option has changes");
    }();
    return key;
}

} // namespace headroom::plant
