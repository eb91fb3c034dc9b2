// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"

#include <array>
#include <bit>
#include <cstddef>
#include <cstdint>
#include <memory>
#include <string>
#include <vector>

namespace headroom::hydraulics {

/// Cross-section as friction sees it: inertia takes the area, friction the hydraulic radius A/P.
struct Bore {
    double area_m2 = 0.0;
    double hydraulicRadius_m = 0.0;
};

/// The turbulent part of a Colebrook–White loss as cubic pieces over the binary digits of
/// x = Re/2000: looked up with integer steps, no logarithm, the same bits everywhere. Zero in the
/// laminar range, exact in the blend, relative error of f below 2e-8 beyond. From Re 3.4e10 on
/// (50 km/s in a pipe of 1 m) the last value stands.
class ExcessFactor {
public:
    /// Samples darcyFactor − 64/Re at k/D ≥ 0.
    explicit ExcessFactor(double relativeRoughness);

    /// f − 64/Re at x = Re/2000 ≥ 0; zero for x ≤ 1 and for NaN.
    double value(double x) const {
        double t = 0.0;
        const Piece& p = pieces_[locate(x, t)];
        return p[0] + t * (p[1] + t * (p[2] + t * p[3]));
    }
    /// Its derivative by x.
    double slope(double x) const;

private:
    using Piece = std::array<double, 4>; // powers of t, 0 ≤ t < 1 along the piece
    static constexpr int digits = 5;     // 2⁵ pieces in each doubling of Re
    static constexpr int doublings = 24;

    static std::size_t locate(double x, double& t) {
        constexpr double largest = static_cast<double>(1 << doublings);
        const double inside = x > 1.0 ? (x < largest ? x : largest) : 1.0;
        const auto bits = std::bit_cast<std::uint64_t>(inside);
        constexpr std::uint64_t fraction = (std::uint64_t{1} << (52 - digits)) - 1;
        constexpr std::uint64_t first = std::uint64_t{1023} << digits;
        constexpr double perPiece = static_cast<double>(std::uint64_t{1} << digits);
        const auto rest = std::bit_cast<double>((bits & fraction) | (std::uint64_t{1023} << 52));
        t = (rest - 1.0) * perPiece;
        return static_cast<std::size_t>((bits >> (52 - digits)) - first);
    }

    std::vector<Piece> pieces_;
};

/// Steady friction of a uniform reach: loss per metre = linear·Q + quadratic(|Q|)·Q|Q|, in metres
/// of water per metre, odd and increasing in Q [m³/s]. The linear part is constant (laminar, or
/// the whole of a linear law); the quadratic one is constant except for Colebrook–White.
/// Cheap to copy; values are shared and immutable.
class FrictionLaw {
public:
    /// No loss at all.
    FrictionLaw() = default;

    /// Darcy–Weisbach with Colebrook–White; roughness height k ≥ 0 [m].
    struct ColebrookWhite {
        double roughness_m = 0.0;
        double viscosity_m2s = 0.0; ///< kinematic, > 0
        double gravity_mps2 = 0.0;  ///< > 0
    };
    static Result<FrictionLaw> make(const Bore& bore, const ColebrookWhite& law,
                                    const std::string& subject = {});
    /// Strickler (Manning) number M = 1/n [m^(1/3)/s], > 0: V = M R^(2/3) S^(1/2).
    struct Strickler {
        double number = 0.0;
    };
    static Result<FrictionLaw> make(const Bore& bore, const Strickler& law,
                                    const std::string& subject = {});
    /// Constant Darcy factor f ≥ 0.
    struct DarcyFactor {
        double factor = 0.0;
        double gravity_mps2 = 0.0; ///< > 0
    };
    static Result<FrictionLaw> make(const Bore& bore, const DarcyFactor& law,
                                    const std::string& subject = {});
    /// Linear law dV/dt = −R V with R ≥ 0 [1/s].
    struct Linear {
        double rate_1s = 0.0;
        double gravity_mps2 = 0.0; ///< > 0
    };
    static Result<FrictionLaw> make(const Bore& bore, const Linear& law,
                                    const std::string& subject = {});

    /// Coefficient of Q [s/m³].
    double linear_sm3() const { return linear_; }
    /// Coefficient of Q|Q| at this flow [s²/m⁶].
    double quadratic_s2m6(double flow_m3s) const {
        if (excess_ == nullptr) {
            return quadratic_;
        }
        const double size = flow_m3s < 0.0 ? -flow_m3s : flow_m3s;
        return quadratic_ * excess_->value(size * relative_);
    }
    /// Head loss per metre [1], sign of the flow.
    double lossPerMetre(double flow_m3s) const {
        const double size = flow_m3s < 0.0 ? -flow_m3s : flow_m3s;
        return (linear_ + quadratic_s2m6(flow_m3s) * size) * flow_m3s;
    }
    /// d(lossPerMetre)/dQ [s/m³], never negative.
    double slope_sm3(double flow_m3s) const;

    /// Does the quadratic coefficient depend on the flow?
    bool variable() const { return excess_ != nullptr; }
    /// For tight loops: quadratic_s2m6 = scale·excess->value(|Q|·perFlow). Null when constant.
    const ExcessFactor* excess() const { return excess_.get(); }
    double scale_s2m6() const { return quadratic_; }
    double perFlow_sm3() const { return relative_; }

private:
    double linear_ = 0.0;
    double quadratic_ = 0.0; // the coefficient, or what the excess factor is multiplied by
    double relative_ = 0.0;  // Re/2000 for 1 m³/s
    std::shared_ptr<const ExcessFactor> excess_;
};

/// Velocity [m/s] over Reynolds number 4 R V/ν of a bore.
double reynoldsNumber(const Bore& bore, double flow_m3s, double viscosity_m2s);

} // namespace headroom::hydraulics
