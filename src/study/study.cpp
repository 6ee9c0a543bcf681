#include "steelyard/study.hpp"

namespace steelyard {

namespace {

template <class... F>
struct Overloaded : F... {
  using F::operator()...;
};
template <class... F>
Overloaded(F...) -> Overloaded<F...>;

}  // namespace

std::optional<double> t_value(const Study& study) {
  if (const auto* exact = std::get_if<ExactT>(&study.evidence)) return exact->t;
  return std::nullopt;
}

std::optional<double> degrees_of_freedom(const Study& study) {
  return std::visit(Overloaded{[](const ExactT& e) { return std::optional<double>(e.df); },
                               [](const BandT& e) { return std::optional<double>(e.df); },
                               [](const NormalEstimate&) { return std::optional<double>(); }},
                    study.evidence);
}

std::optional<double> effective_n(const Study& study) {
  return std::visit(Overloaded{[](const ExactT& e) { return std::optional<double>(e.n_effective); },
                               [](const BandT& e) { return std::optional<double>(e.n_effective); },
                               [](const NormalEstimate&) { return std::optional<double>(); }},
                    study.evidence);
}

const char* likelihood_name(const Evidence& evidence) {
  return std::visit(Overloaded{[](const ExactT&) { return "exact_t"; }, [](const BandT&) { return "t_band"; },
                               [](const NormalEstimate&) { return "normal"; }},
                    evidence);
}

bool is_folded(const Evidence& evidence) {
  return std::visit(Overloaded{[](const ExactT& e) { return e.folded; },
                               [](const BandT& e) {
                                 bool positive = false;
                                 bool negative = false;
                                 for (const Interval& band : e.bands) {
                                   positive = positive || band.high > 0.0;
                                   negative = negative || band.low < 0.0;
                                 }
                                 return positive && negative;
                               },
                               [](const NormalEstimate& e) { return e.folded; }},
                    evidence);
}

}  // namespace steelyard
