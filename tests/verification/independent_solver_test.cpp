// SPDX-License-Identifier: GPL-3.0-or-later
#include "support/catch.h"

#include <cvode/cvode.h>
#include <nvector/nvector_serial.h>
#include <sundials/sundials_context.h>
#include <sunlinsol/sunlinsol_dense.h>
#include <sunmatrix/sunmatrix_dense.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <string>
#include <vector>

#include "cases.h"
#include "independent_plant.h"

using namespace headroom;
using namespace headroom::verification;

namespace {

int rightHandSide(double, N_Vector state, N_Vector rate, void* plant) {
    StateVector in, out;
    std::copy_n(N_VGetArrayPointer(state), stateCount, in.begin());
    static_cast<const IndependentPlant*>(plant)->derivative(in, out);
    std::copy_n(out.begin(), stateCount, N_VGetArrayPointer(rate));
    return 0;
}

/// CVODE, BDF with dense Newton, at tolerances far below what is asked of the product.
std::vector<StateVector> integrate(IndependentPlant& plant, const StateVector& start,
                                   const std::vector<double>& instants_s) {
    SUNContext context = nullptr;
    SUNContext_Create(nullptr, &context);
    N_Vector state = N_VNew_Serial(stateCount, context);
    std::copy_n(start.begin(), stateCount, N_VGetArrayPointer(state));
    SUNMatrix matrix = SUNDenseMatrix(stateCount, stateCount, context);
    SUNLinearSolver solver = SUNLinSol_Dense(state, matrix, context);
    void* memory = CVodeCreate(CV_BDF, context);
    CVodeInit(memory, rightHandSide, 0.0, state);
    CVodeSStolerances(memory, 1e-11, 1e-12);
    CVodeSetLinearSolver(memory, solver, matrix);
    CVodeSetUserData(memory, &plant);
    CVodeSetMaxNumSteps(memory, 1000000);
    std::vector<StateVector> out;
    for (const double instant : instants_s) {
        double reached = 0.0;
        REQUIRE(CVode(memory, instant, state, &reached, CV_NORMAL) == CV_SUCCESS);
        StateVector now;
        std::copy_n(N_VGetArrayPointer(state), stateCount, now.begin());
        out.push_back(now);
    }
    CVodeFree(&memory);
    SUNLinSolFree(solver);
    SUNMatDestroy(matrix);
    N_VDestroy(state);
    SUNContext_Free(&context);
    return out;
}

struct Compared {
    const char* name;
    int index; ///< in the independent state
    Measure measure;
    results::Place place;
    double offset; ///< product's value = independent one plus this
};

const std::array<Compared, 6> compared{
    Compared{"tunnel flow", 0, Measure::discharge, {results::Thing::conduit, 0, 0.0}, 0.0},
    Compared{"shaft level", 1, Measure::level, {results::Thing::chamber, 0, 0.0}, 0.0},
    Compared{"unit flow", 2, Measure::discharge, {results::Thing::unit, 0, 0.0}, 0.0},
    Compared{"speed", 4, Measure::speed, {results::Thing::unit, 0, 0.0}, 0.0},
    Compared{"frequency", 5, Measure::frequency, {results::Thing::grid, -1, 0.0}, 50.0},
    Compared{"opening", 8, Measure::opening, {results::Thing::unit, 0, 0.0}, 0.0}};

/// The product's values at the instants, in double, from one run.
std::vector<std::array<double, 6>> productAt(const Numbers& numbers, double restLevel_m,
                                             const std::vector<double>& times_s, double step_s) {
    Case made;
    made.site = productSite(numbers);
    made.plant = productPlant(numbers);
    made.study = productStudy(numbers, restLevel_m, times_s.back());
    made.settings.longestStep_s = step_s;
    const auto run = course(made, static_cast<int>(std::lround(times_s.front() / step_s)));
    std::vector<std::array<double, 6>> out;
    for (const double time_s : times_s) {
        std::array<double, 6> values{};
        for (std::size_t i = 0; i < compared.size(); ++i) {
            values[i] = run.at(run.find(compared[i].measure, compared[i].place), time_s);
        }
        out.push_back(values);
    }
    return out;
}

} // namespace

TEST_CASE("Whole plant: an independent integrator agrees", "[verification][reference]") {
    // Source: the equations of independent_plant.cpp integrated by SUNDIALS CVODE (Hindmarsh et
    // al. 2005, ACM Trans. Math. Softw. 31), relative tolerance 1e-11. The product's step of
    // 0.5 ms leaves an error of order step², below 1e-6 of the excursion of each state.
    const Numbers numbers;
    IndependentPlant plant(numbers);
    auto start = plant.rest();
    const double restLevel_m = start[1];
    start[1] += numbers.shaftOffset_m;

    constexpr int instants = 200;
    std::vector<double> times_s;
    for (int i = 1; i <= instants; ++i) {
        times_s.push_back(0.25 * i);
    }
    const auto reference = integrate(plant, start, times_s);

    const auto product = productAt(numbers, restLevel_m, times_s, 0.0005);
    std::array<double, 6> excursion{}, worst{};
    for (std::size_t k = 0; k < times_s.size(); ++k) {
        for (std::size_t i = 0; i < compared.size(); ++i) {
            const auto at = static_cast<std::size_t>(compared[i].index);
            const double expected = reference[k][at] + compared[i].offset;
            excursion[i] = std::max(excursion[i], std::abs(reference[k][at] - start[at]));
            worst[i] = std::max(worst[i], std::abs(product[k][i] - expected));
        }
    }
    for (std::size_t i = 0; i < compared.size(); ++i) {
        CAPTURE(compared[i].name, excursion[i], worst[i]);
        CHECK(excursion[i] > 0.0);
        hold(std::string("independent integrator, ") + compared[i].name, worst[i] / excursion[i],
             0.0, 1e-6);
    }
}
