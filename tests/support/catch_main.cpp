// SPDX-License-Identifier: GPL-3.0-or-later
#ifdef HEADROOM_CATCH_3
#include <catch2/catch_session.hpp>
int main(int count, char* words[]) { return Catch::Session().run(count, words); }
#else
#define CATCH_CONFIG_MAIN
#include <catch2/catch.hpp>
#endif
