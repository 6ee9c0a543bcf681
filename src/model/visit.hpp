// Several lambdas as one visitor for std::visit.
#pragma once

namespace steelyard::model {

template <class... F>
struct Overloaded : F... {
  using F::operator()...;
};
template <class... F>
Overloaded(F...) -> Overloaded<F...>;

}  // namespace steelyard::model
