// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"

#include <span>

namespace headroom::hydraulics {

inline constexpr Message boreNotPositive{
    "hydraulics.bore-not-positive", Severity::error,
    "The cross-section has an area of {area} and a hydraulic radius of {radius}; both must be "
    "finite and above zero.",
    "Give the diameter, or the area and the wetted perimeter of the section."};
inline constexpr Message roughnessOutOfRange{
    "hydraulics.roughness-out-of-range", Severity::error,
    "The roughness height is {roughness} in a section with a hydraulic diameter of {diameter}; "
    "it must lie between zero and that diameter.",
    "Give the height of the wall's roughness in millimetres; steel has about 0.1 mm. Use a "
    "Strickler number for very rough rock."};
inline constexpr Message roughnessBeyondTests{
    "hydraulics.roughness-beyond-tests", Severity::warning,
    "The roughness height is {roughness}, more than a twentieth of the hydraulic diameter of "
    "{diameter}; the friction law was not measured for such walls.",
    "Use a Strickler number, or confirm the loss by a measurement."};
inline constexpr Message stricklerNotPositive{
    "hydraulics.strickler-not-positive", Severity::error,
    "The Strickler number is {number}; it must be finite and above zero.",
    "Give M = 1/n: about 30 to 40 in unlined rock, 70 to 90 in concrete, 80 to 100 in steel."};
inline constexpr Message factorBelowZero{
    "hydraulics.factor-below-zero", Severity::error,
    "The Darcy friction factor is {factor}; it must be finite and not below zero.",
    "Give the factor f of f L V²/(2 g D); 0.01 to 0.07 is usual."};
inline constexpr Message rateBelowZero{
    "hydraulics.rate-below-zero", Severity::error,
    "The rate of the linear friction law is {rate} per second; it must be finite and not below "
    "zero.",
    "Give R of dV/dt = −R V, or another friction law."};
inline constexpr Message temperatureOutOfRange{
    "hydraulics.temperature-out-of-range", Severity::error,
    "The water temperature is {temperature}; the table of water properties reaches from "
    "{lowest} to {highest}.",
    "Give the temperature of the water in the waterway in degrees Celsius."};
inline constexpr Message latitudeOutOfRange{
    "hydraulics.latitude-out-of-range", Severity::error,
    "The latitude is {latitude}; it must lie between −90° and 90°.",
    "Give the latitude of the site, or its gravity."};
inline constexpr Message altitudeOutOfRange{
    "hydraulics.altitude-out-of-range", Severity::error,
    "The altitude is {altitude}; gravity and air pressure are known from {lowest} to {highest}.",
    "Give the altitude above the sea, or the gravity and air pressure themselves."};
inline constexpr Message wallDimension{
    "hydraulics.wall-dimension", Severity::error,
    "The wall has a diameter of {diameter} and a thickness of {thickness}; both must be finite "
    "and above zero.",
    "Give the inner diameter and the thickness of the wall, or the wave speed itself."};
inline constexpr Message modulusNotPositive{
    "hydraulics.modulus-not-positive", Severity::error,
    "A modulus of elasticity is {modulus}; it must be finite and above zero.",
    "Give Young's modulus: about 206 GPa for steel, 5 to 50 GPa for rock."};
inline constexpr Message poissonOutOfRange{
    "hydraulics.poisson-out-of-range", Severity::error,
    "A Poisson's ratio is {ratio}; it must lie between 0 and 0.5.",
    "Give about 0.3 for steel and 0.2 for rock."};
inline constexpr Message gasOutOfRange{
    "hydraulics.gas-out-of-range", Severity::error,
    "The share of free gas is {share} at an absolute pressure of {pressure}; the share must be "
    "at least 0 and below 1, the pressure above zero.",
    "Give the share by volume, for example 0.0001, and the pressure at which it holds."};
inline constexpr Message chamberTooFewRows{
    "hydraulics.chamber-too-few-rows", Severity::error,
    "The table of area over level has {rows} rows; a chamber needs its floor and its rim.",
    "Give at least two rows, the lowest level first."};
inline constexpr Message chamberNotFinite{
    "hydraulics.chamber-not-finite", Severity::error,
    "Row {row} of the table of area over level holds a value that is not a finite number.",
    "Replace the value in that row by a number, or remove the row."};
inline constexpr Message chamberAreaNotPositive{
    "hydraulics.chamber-area-not-positive", Severity::error,
    "The chamber's area at {level} is {area}; it must be above zero at every level.",
    "Give the water surface at that level."};
inline constexpr Message chamberLevelsFall{
    "hydraulics.chamber-levels-fall", Severity::error,
    "The table of area over level falls from {below} to {level} in row {row}; levels must rise.",
    "Sort the rows by level, the floor first; two rows at one level make a step."};
inline constexpr Message chamberLevelRepeated{
    "hydraulics.chamber-level-repeated", Severity::error,
    "The level {level} stands in more than two rows of the table of area over level.",
    "Keep two rows at that level: the area just below it and the area just above it."};
inline constexpr Message chamberFloorAboveRim{
    "hydraulics.chamber-floor-above-rim", Severity::error,
    "The chamber's floor at {floor} is not below its rim at {rim}.",
    "Give both levels above the site's datum, the floor first."};

/// Every message of this floor.
std::span<const Message* const> messages();

} // namespace headroom::hydraulics
