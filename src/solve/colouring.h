/// Which columns of a Jacobian can be worked out in one pass.
#pragma once
#include <vector>

#include "solve/sparsity.h"

namespace gaskettle {

/// A colour 0, 1, ... for each column such that two columns of one colour share no
/// row: one derivative direction per colour then yields every entry. Greedy,
/// fullest column first, ties by index.
///
/// Source: A. R. Curtis, M. J. D. Powell, J. K. Reid, On the estimation of sparse
/// Jacobian matrices, IMA J. Appl. Math. 13 (1974) 117-119.
std::vector<int> colour_columns(const Sparsity& pattern);

/// One more than the largest colour, 0 for none.
int colour_count(const std::vector<int>& colours);

}  // namespace gaskettle
