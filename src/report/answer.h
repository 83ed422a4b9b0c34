/// The answer of a run: for a person, and for a program.
#pragma once
#include <string>
#include <vector>

#include "plant/plant.h"
#include "run/case.h"

namespace gaskettle {

/// What ran, beside its result.
struct AnswerContext {
  std::string title, model_file;
  std::vector<std::string> advice;
  int exit_status = 0;
};

/// Text of at most about 100 columns: caution; verdict; targets; limits; relief; gas
/// models and warnings; events; energy and entropy; last the bookkeeping and solver counts.
std::string answer_text(const Plant& plant, const CaseResult& result, const AnswerContext& context);
/// The same as one JSON object, SI units inside.
std::string answer_json(const Plant& plant, const CaseResult& result, const AnswerContext& context);
/// One sentence, broken limits first.
std::string verdict(const Plant& plant, const CaseResult& result);
/// Which gas model each space uses.
std::string gas_model_line(const Plant& plant);

}  // namespace gaskettle
