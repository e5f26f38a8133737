// SPDX-License-Identifier: Apache-2.0
// Text for people: wrapped paragraphs, numbers to the digits that are known, counted nouns.
#pragma once

#include <string>
#include <string_view>

namespace wellwright::cli {

/// `text` broken at spaces to `width` columns; the first line indented by `first`, the others by `rest`. Ends
/// with a line feed. Widths are displayed columns, not bytes.
std::string wrapped(std::string_view text, int width, int first = 0, int rest = 0);

/// Decimals that show `value`s whose uncertainty is `error`: the last digit is no finer than the error.
int decimals_for(double error, int most = 9);

/// `value` with the decimals that `error` allows.
std::string to_error(double value, double error);

/// `value` with `digits` significant digits, plain between 1e-4 and 1e7.
std::string significant(double value, int digits);

/// Significant digits of `value` when its uncertainty is `error`, between 2 and 8.
int known_digits(double value, double error);

/// "1 level", "6 levels"
std::string counted(long long count, std::string_view noun);

/// Columns of standard output: of the terminal, or 100 when it is none.
int output_width();

/// Both streams end in the same place (one terminal, one file).
bool output_and_errors_together();

bool errors_on_terminal();

}  // namespace wellwright::cli
