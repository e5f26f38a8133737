// SPDX-License-Identifier: Apache-2.0
// Fermi functions; private to the room.
#pragma once

namespace wellwright {

/// ln(1 + exp(x)) without overflow.
double log_one_plus_exp(double x);

}  // namespace wellwright
