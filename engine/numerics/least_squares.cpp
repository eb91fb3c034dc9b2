// SPDX-License-Identifier: GPL-3.0-or-later
#include "numerics/least_squares.h"

#include "base/ensure.h"

#include <Eigen/Dense>

#include <algorithm>
#include <cmath>

namespace headroom::numerics {

namespace {

using Vector = Eigen::VectorXd;
using Matrix = Eigen::MatrixXd;

class Fit {
public:
    Fit(const LeastSquaresProblem& problem, const LeastSquaresOptions& options)
        : problem_(problem), options_(options), lower_(map(problem.lower)),
          upper_(map(problem.upper)), x_(map(problem.start).cwiseMax(lower_).cwiseMin(upper_)) {}

    LeastSquaresFit run() {
        LeastSquaresFit fit;
        if (!evaluate(x_, residual_)) {
            fit.unknowns.assign(x_.begin(), x_.end());
            return fit;
        }
        while (fit.iterations < options_.mostIterations && !fit.converged) {
            ++fit.iterations;
            fit.converged = !improve();
        }
        fit.unknowns.assign(x_.begin(), x_.end());
        fit.residuals.assign(residual_.begin(), residual_.end());
        fit.sumOfSquares = residual_.squaredNorm();
        return fit;
    }

private:
    static Vector map(const std::vector<double>& values) {
        return Eigen::Map<const Vector>(values.data(), static_cast<Eigen::Index>(values.size()));
    }

    bool evaluate(const Vector& x, Vector& into) const {
        into.resize(problem_.residualCount);
        const bool formed =
            problem_.residuals({x.data(), static_cast<std::size_t>(x.size())},
                               {into.data(), static_cast<std::size_t>(into.size())});
        return formed && into.allFinite();
    }

    /// Central differences inside the box, one-sided at its walls or where nothing can be formed.
    Matrix jacobian() const {
        constexpr double share = 1e-6; // of the range: balances rounding and curvature
        Matrix result = Matrix::Zero(problem_.residualCount, x_.size());
        for (Eigen::Index j = 0; j < x_.size(); ++j) {
            const double delta = share * (upper_[j] - lower_[j]);
            Vector up = x_, down = x_, atUp, atDown;
            up[j] = std::min(x_[j] + delta, upper_[j]);
            down[j] = std::max(x_[j] - delta, lower_[j]);
            if (!evaluate(up, atUp)) {
                up = x_;
                atUp = residual_;
            }
            if (!evaluate(down, atDown)) {
                down = x_;
                atDown = residual_;
            }
            if (up[j] > down[j]) {
                result.col(j) = (atUp - atDown) / (up[j] - down[j]);
            }
        }
        return result;
    }

    /// One accepted step; false when none improves.
    bool improve() {
        constexpr double mostDamping = 1e12;
        const Matrix j = jacobian();
        const Vector gradient = j.transpose() * residual_;
        const Matrix normal = freeNormal(j, gradient);
        const Vector freeGradient = masked(gradient);
        for (; damping_ < mostDamping; damping_ *= 4.0) {
            Matrix damped = normal;
            damped.diagonal() += damping_ * normal.diagonal();
            const Vector step = damped.ldlt().solve(-freeGradient);
            const Vector trial = (x_ + step).cwiseMax(lower_).cwiseMin(upper_);
            Vector atTrial;
            if (!evaluate(trial, atTrial)) {
                continue;
            }
            const double before = residual_.squaredNorm();
            const double after = atTrial.squaredNorm();
            if (after < before) {
                return accept(trial, atTrial, before, after);
            }
        }
        return false;
    }

    bool accept(const Vector& trial, const Vector& atTrial, double before, double after) {
        const double move = ((trial - x_).cwiseAbs().cwiseQuotient(upper_ - lower_)).maxCoeff();
        x_ = trial;
        residual_ = atTrial;
        damping_ = std::max(damping_ * 0.2, 1e-12);
        return move > options_.smallestStep && before - after > options_.relativeDecrease * before;
    }

    /// Marks unknowns pressed against a wall and removes them from the normal equations.
    Matrix freeNormal(const Matrix& j, const Vector& gradient) {
        Matrix normal = j.transpose() * j;
        held_.assign(static_cast<std::size_t>(x_.size()), false);
        for (Eigen::Index i = 0; i < x_.size(); ++i) {
            const bool atWall = (x_[i] <= lower_[i] && gradient[i] > 0.0)
                                || (x_[i] >= upper_[i] && gradient[i] < 0.0);
            if (atWall || !(normal(i, i) > 0.0)) {
                held_[static_cast<std::size_t>(i)] = true;
                normal.row(i).setZero();
                normal.col(i).setZero();
                normal(i, i) = 1.0;
            }
        }
        return normal;
    }

    Vector masked(Vector gradient) const {
        for (Eigen::Index i = 0; i < gradient.size(); ++i) {
            if (held_[static_cast<std::size_t>(i)]) {
                gradient[i] = 0.0;
            }
        }
        return gradient;
    }

    const LeastSquaresProblem& problem_;
    const LeastSquaresOptions& options_;
    Vector lower_, upper_, x_, residual_;
    std::vector<bool> held_;
    double damping_ = 1e-3;
};

} // namespace

LeastSquaresFit fitBounded(const LeastSquaresProblem& problem, const LeastSquaresOptions& options) {
    ensure(problem.start.size() == problem.lower.size()
               && problem.start.size() == problem.upper.size() && problem.residualCount > 0,
           "a least-squares problem has bounds for each unknown");
    return Fit(problem, options).run();
}

} // namespace headroom::numerics
