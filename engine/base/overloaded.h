// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

namespace headroom {

/// Joins lambdas into one visitor of a std::variant.
template <class... Parts>
struct overloaded : Parts... {
    using Parts::operator()...;
};
template <class... Parts>
overloaded(Parts...) -> overloaded<Parts...>;

} // namespace headroom
