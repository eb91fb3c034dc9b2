// SPDX-License-Identifier: GPL-3.0-or-later
#include "limits/definitions.h"

#include "units/quantity.h"

#include <fmt/format.h>

namespace headroom::limits {

namespace {

std::string datumText(const plant::Site& site) {
    return site.datum.empty()
               ? "Levels are metres above one datum, which the project does not name."
               : fmt::format("Levels are metres above the datum \"{}\".", site.datum);
}

std::string allowanceText(const plant::Allowance& allowance) {
    std::string parts;
    if (allowance.shareOfHead > 0.0) {
        parts = fmt::format("{} of the static head", print(Quantity::percent, allowance.shareOfHead));
    }
    if (allowance.shareOfRise > 0.0) {
        parts += parts.empty() ? "" : " and ";
        parts += fmt::format("{} of the change from rest",
                             print(Quantity::percent, allowance.shareOfRise));
    }
    return fmt::format("Added to the computed value on the side of the bound before it is "
                       "compared: {}.",
                       parts);
}

} // namespace

std::vector<Definition> definitions(const plant::Variant& variant) {
    std::vector<Definition> sheet{
        {"Datum", datumText(variant.site)},
        {"Net head",
         "Energy head (piezometric head and velocity head) at the spiral inlet less that at the "
         "draft-tube outlet, with the areas given; where no area is given there is no velocity "
         "head."},
        {"Static head",
         "At a unit: upper reservoir less tailwater, both at rest at the start of the study. At "
         "another place: upper reservoir at rest less the elevation of the axis there."},
        {"Percent rise", "Changes of head in percent refer to the static head at the unit."},
        {"Momentary overspeed",
         "The highest speed of the shaft at any instant of the run, in shares of rated speed; it "
         "is neither averaged nor filtered."},
        {"Power",
         "Shaft power is hydraulic torque times speed; generator power is taken at the terminals; "
         "grid power, which set-points name, is what the grid receives."},
        {"Gate",
         "Stroke of the servo, 0 closed to 100 % open. The opening of the guide vanes belonging "
         "to a stroke is a property of the turbine and is not meant."},
        {"Uncertainty",
         "Root of the sum of squares of the numerical part (change when cells and step are "
         "halved, plus the largest change in one step near the extreme) and of the model part "
         "(declared, and never zero for a turbine chart made from rated data)."},
        {"Marks",
         "With margin M, uncertainty U and reserve R: broken M + U < 0; undecided M − U < 0 ≤ "
         "M + U; tight 0 ≤ M − U < R; held R ≤ M − U. The bound itself is allowed."},
        {"Share",
         "Margin over the distance from rest to the bound, at least 2 % of the span. For a limit "
         "that allows a time outside, the smaller of this and of the share of that time left; "
         "its margin is counted from the value that is exceeded for just the time allowed."},
    };
    for (const auto& [name, limit] : variant.limits) {
        if (limit.allowance.shareOfHead > 0.0 || limit.allowance.shareOfRise > 0.0) {
            sheet.push_back(
                {fmt::format("Allowance in \"{}\"", name), allowanceText(limit.allowance)});
        }
    }
    return sheet;
}

} // namespace headroom::limits
