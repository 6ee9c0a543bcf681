#include "audit/range.hpp"

namespace steelyard::auditing {

Range honest(const Printed& printed) {
  if (printed.relation != Relation::rounded) return {printed.low, printed.high};
  const double half = (printed.high - printed.low) / 2.0;
  // Cut-off digits leave a number nearer to zero than it was.
  if (printed.value > 0.0) return {printed.low, printed.value + 2.0 * half};
  if (printed.value < 0.0) return {printed.value - 2.0 * half, printed.high};
  return {-2.0 * half, 2.0 * half};
}

}  // namespace steelyard::auditing
