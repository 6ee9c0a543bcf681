#include <steelyard/analysis.hpp>
#include <steelyard/json.hpp>
#include <steelyard/rebuild.hpp>
#include <steelyard/render.hpp>

std::size_t routes_in_second_unit() { return steelyard::routes().size(); }
