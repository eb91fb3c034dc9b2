// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "desk/application.h"

/// The one application of this test program, on the platform without a screen.
headroom::desk::Application& application();
