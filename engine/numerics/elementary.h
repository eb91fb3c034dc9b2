// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <cmath>

/// The one place through which the engine reaches transcendental functions, so that a machine
/// type gives the same bits everywhere. Arguments and results are plain numbers, angles in rad.
/// Never called inside a loop that a compiler may vectorise with another library.
namespace headroom::numerics {

inline double exp(double x) {
    return std::exp(x);
}
inline double log(double x) {
    return std::log(x);
}
inline double log10(double x) {
    return std::log10(x);
}
inline double pow(double base, double exponent) {
    return std::pow(base, exponent);
}
inline double tanh(double x) {
    return std::tanh(x);
}
inline double artanh(double x) {
    return std::atanh(x);
}
inline double sin(double x) {
    return std::sin(x);
}
inline double cos(double x) {
    return std::cos(x);
}
inline double tan(double x) {
    return std::tan(x);
}
inline double asin(double x) {
    return std::asin(x);
}
inline double acos(double x) {
    return std::acos(x);
}
inline double atan2(double y, double x) {
    return std::atan2(y, x);
}
/// Correctly rounded by the floating-point standard; here so that callers need one name.
inline double sqrt(double x) {
    return std::sqrt(x);
}
/// exp(x) − 1 without cancellation at small x.
inline double expm1(double x) {
    return std::expm1(x);
}
inline double square(double x) {
    return x * x;
}
/// x|x|, the form of every quadratic loss; odd and increasing.
inline double signedSquare(double x) {
    return x * std::fabs(x);
}
/// √|x| with the sign of x, the inverse of `signedSquare`.
inline double signedRoot(double x) {
    return std::copysign(std::sqrt(std::fabs(x)), x);
}

} // namespace headroom::numerics
