#include <cmath>

#include <catch2/catch.hpp>

#include "steelyard/figure.hpp"

using namespace steelyard::figure;

TEST_CASE("ticks are round, inside the scale and few enough", "[scale]") {
  for (const double width : {1e-6, 0.0037, 0.9, 1.0, 7.3, 1234.5, 8e9}) {
    for (const double low : {-0.37 * width, 0.0, 1.7 * width}) {
      const Scale scale{low, low + width, false, ""};
      for (const std::size_t most : {2U, 3U, 5U, 9U}) {
        const auto out = ticks(scale, most);
        INFO("width " << width << " low " << low << " most " << most);
        REQUIRE(out.size() <= most);
        if (most >= 5) REQUIRE(out.size() >= 2);
        for (const Tick& tick : out) {
          CHECK(tick.value >= scale.low - 1e-9 * width);
          CHECK(tick.value <= scale.high + 1e-9 * width);
        }
        for (std::size_t i = 1; i < out.size(); ++i) {
          const double step = out[i].value - out[i - 1].value;
          const double mantissa = step / std::pow(10.0, std::floor(std::log10(step) + 1e-9));
          const bool round = std::fabs(mantissa - 1) < 1e-6 || std::fabs(mantissa - 2) < 1e-6 ||
                             std::fabs(mantissa - 5) < 1e-6;
          CHECK(round);
          CHECK(out[i].text != out[i - 1].text);
        }
      }
    }
  }
}

TEST_CASE("a symmetrical scale keeps its zero", "[scale]") {
  for (const double limit : {3.0, 30.0, 52.0, 999.0}) {
    const auto out = ticks({-limit, limit, false, ""}, 3);
    REQUIRE(out.size() == 3);
    CHECK(out[1].value == 0.0);
    CHECK(out[1].text == "0");
  }
}

TEST_CASE("logarithmic ticks thin out to decades", "[scale]") {
  const auto fine = ticks({0.1, 10, true, ""}, 9);
  CHECK(fine.size() == 7);
  CHECK(fine.front().text == "0.1");
  CHECK(fine.back().text == "10");
  const auto coarse = ticks({1e-4, 1e4, true, ""}, 5);
  CHECK(coarse.size() <= 5);
  CHECK(coarse.size() >= 2);
}

TEST_CASE("scales and their inverse agree", "[scale]") {
  for (const Scale& scale : {Scale{-2, 5, false, ""}, Scale{0.01, 40, true, ""}}) {
    for (const double fraction : {0.0, 0.2, 0.9, 1.0})
      CHECK(scale.at(scale.value_at(fraction)) == Approx(fraction).margin(1e-12));
  }
}

TEST_CASE("numbers print as people read them", "[scale]") {
  CHECK(number_text(-0.25, 2) == "−0.25");
  CHECK(number_text(-0.001, 2) == "0.00");
  CHECK(number_text(1234.56, 0) == "1235");
  CHECK(number_text(-3.2e9, 2) == "−3.20e9");
  CHECK(decimals_for(1.0) == 2);
  CHECK(decimals_for(2000) == 0);
  CHECK(decimals_for(0.002) == 5);
}
