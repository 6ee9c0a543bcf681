#include "read/problems.hpp"

#include <algorithm>
#include <tuple>

#include <fmt/format.h>

#include "read/text.hpp"

namespace steelyard::read {

void Problems::add(Diagnostic diagnostic) {
  const bool is_error = diagnostic.severity == Severity::error;
  ++(is_error ? errors_ : cautions_);
  auto& kept = is_error ? kept_errors_ : kept_cautions_;
  if (kept.size() < most) kept.push_back(std::move(diagnostic));
}

std::vector<Diagnostic> Problems::take() {
  const std::size_t all = errors_ + cautions_;
  std::vector<Diagnostic> list = std::move(kept_errors_);
  list.insert(list.end(), std::make_move_iterator(kept_cautions_.begin()),
              std::make_move_iterator(kept_cautions_.end()));
  const bool cut = all > most;
  if (cut && list.size() >= most) list.resize(most - 1);
  std::stable_sort(list.begin(), list.end(), [](const Diagnostic& a, const Diagnostic& b) {
    return std::tie(a.where.line, a.where.column) < std::tie(b.where.line, b.where.column);
  });
  if (!cut) return list;
  const std::size_t more = all - list.size();
  Diagnostic last;
  last.severity = errors_ > 0 ? Severity::error : Severity::caution;
  last.code = "more-problems";
  last.where.file = list.front().where.file;
  last.what = fmt::format("There {} {} more problem{} like these in this file.", more == 1 ? "is" : "are",
                          with_commas(more), more == 1 ? "" : "s");
  last.remedy = "Mend the ones above first.";
  list.push_back(std::move(last));
  return list;
}

}  // namespace steelyard::read
