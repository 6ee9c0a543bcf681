// The grammar of priors: what is read, what is refused with which words, and the way back to text.
#include <catch2/catch.hpp>
#include <cmath>
#include <locale>
#include <string>
#include <variant>

#include "steelyard/model.hpp"

using namespace steelyard;

namespace {

double cauchy_scale(const std::string& argument) {
  const auto prior = parse_effect_prior("cauchy(0, " + argument + ")");
  INFO(argument << ": " << (prior.ok() ? "" : prior.diagnostics.front().what));
  REQUIRE(prior.ok());
  return std::get<CauchyPrior>(prior.value->family).scale;
}

std::string complaint(const std::string& text) {
  const auto prior = parse_effect_prior(text);
  REQUIRE_FALSE(prior.ok());
  REQUIRE(prior.diagnostics.size() == 1);
  return prior.diagnostics[0].what + " " + prior.diagnostics[0].remedy;
}

std::string spread_complaint(const std::string& text) {
  const auto prior = parse_spread_prior(text);
  REQUIRE_FALSE(prior.ok());
  REQUIRE(prior.diagnostics.size() == 1);
  return prior.diagnostics[0].what + " " + prior.diagnostics[0].remedy;
}

}  // namespace

TEST_CASE("the default scale is the double nearest to one over the root of two") {
  // 1/√2 = 0.70710678118654752440084436210484903928...; 1.0/sqrt(2.0) in double misses it by one bit.
  constexpr double nearest = 0.70710678118654752440084436210484903928;
  CHECK(cauchy_scale("1/sqrt(2)") == nearest);
  CHECK(cauchy_scale("sqrt(2)/2") == nearest);
  CHECK(cauchy_scale("sqrt(1/2)") == nearest);
  CHECK(std::get<CauchyPrior>(EffectPrior{}.family).scale == nearest);
  CHECK(std::get<CauchyPrior>(parse_effect_prior("default").value->family).scale == nearest);
  CHECK(1.0 / std::sqrt(2.0) != nearest);
}

TEST_CASE("arguments are small arithmetic") {
  CHECK(cauchy_scale("0.7") == 0.7);
  CHECK(cauchy_scale(" .5 ") == 0.5);
  CHECK(cauchy_scale("2e-1") == 0.2);
  CHECK(cauchy_scale("1 + 2*3 - 4/8") == 6.5);
  CHECK(cauchy_scale("-(2 - 3)") == 1.0);
  CHECK(cauchy_scale("2--1") == 3.0);
  CHECK(cauchy_scale("8/2/2") == 2.0);
  CHECK(cauchy_scale("exp(0)*log(exp(2))") == 2.0);
  CHECK(cauchy_scale("pi/pi") == 1.0);
  CHECK(cauchy_scale("pi") == 3.14159265358979323846);
  CHECK(cauchy_scale("((((1))))") == 1.0);
  CHECK(std::get<NormalPrior>(parse_effect_prior("normal(−0.5, 1)").value->family).mean == -0.5);
}

TEST_CASE("families are read in either case and with spaces") {
  CHECK(std::holds_alternative<NormalPrior>(parse_effect_prior(" Normal ( 0 , 1 ) ").value->family));
  CHECK(std::holds_alternative<StudentTPrior>(parse_effect_prior("t(0, 1, 3)").value->family));
  CHECK(std::holds_alternative<StudentTPrior>(parse_effect_prior("STUDENT_T(0, 1, 3)").value->family));
  CHECK(std::holds_alternative<HalfStudentTPrior>(parse_spread_prior("half-t(0.5, 4)").value->family));
  CHECK(std::holds_alternative<LogNormalPrior>(parse_spread_prior("lognormal(-1, 1)").value->family));
  CHECK(std::holds_alternative<UniformSpreadPrior>(parse_spread_prior("uniform(0, 1)").value->family));
}

TEST_CASE("misread priors point at the character") {
  CHECK(complaint("cauchy(0; 1)") ==
        "The effect prior \"cauchy(0; 1)\" can't be read from character 9 on, where `,` or `)` was expected. "
        "Write it as cauchy(location, scale); arguments may use + - * / ( ), sqrt, exp, log and pi, for "
        "instance "
        "1/sqrt(2).");
  CHECK(
      complaint("cauchy(0, 1/sqrt(2)") ==
      "The effect prior \"cauchy(0, 1/sqrt(2)\" ends at character 20 where `,` or `)` was expected. Write it "
      "as cauchy(location, scale); arguments may use + - * / ( ), sqrt, exp, log and pi, for instance "
      "1/sqrt(2).");
  CHECK(complaint("cauchi(0, 1)") ==
        "The effect prior \"cauchi(0, 1)\" names \"cauchi\" at character 1, which is not a known prior. Did "
        "you "
        "mean \"cauchy\"?");
  CHECK(complaint("cauchy(0, 0,7)") ==
        "The effect prior \"cauchy(0, 0,7)\" has 3 arguments where 2 were expected. Write it as "
        "cauchy(location, scale), with points for decimals and commas between arguments.");
  CHECK(complaint("cauchy(0, sqrt(-1))").find("character 16 on, where a number that is not negative") !=
        std::string::npos);
  CHECK(complaint("cauchy(0, 1/0)").find("character 13 on, where a divisor that is not 0") !=
        std::string::npos);
  CHECK(complaint("cauchy(0, 1e400)").find("a number that a computer can hold") != std::string::npos);
  CHECK(complaint("cauchy(0, nan)").find("character 11 on, where a number, `pi`") != std::string::npos);
  CHECK(complaint("cauchy(0, 1) more").find("where the end of the text was expected") != std::string::npos);
  CHECK(complaint("ééé").find("does not begin with the name of a prior") != std::string::npos);
  CHECK(complaint("").find("cauchy(location, scale), normal(mean, sd)") != std::string::npos);
  CHECK(complaint("flat").find("not a known prior") != std::string::npos);
  CHECK(complaint("gronau-2020(1)").find("takes no arguments; it stands for student-t(0.35, 0.102, 3)") !=
        std::string::npos);
  CHECK(complaint(std::string(2000, '(')).find("2000 bytes long") != std::string::npos);
  CHECK(complaint("cauchy(0, " + std::string(500, '(') + "1").find("at most 64 levels deep") !=
        std::string::npos);
  CHECK(spread_complaint("cauchy(0, 1)").find("\"cauchy\"") != std::string::npos);
  CHECK(spread_complaint("half-couchy(1)").find("Did you mean \"half-cauchy\"?") != std::string::npos);
  const auto prior = parse_effect_prior("cauchy(−1; 1)");
  REQUIRE(prior.diagnostics.size() == 1);
  CHECK(prior.diagnostics[0].where.column == 10);  // characters, not bytes
}

TEST_CASE("parameters out of their domain are refused") {
  CHECK(complaint("cauchy(0, 0)") == "The scale of a Cauchy prior is 0. It must be a positive number.");
  CHECK(complaint("normal(0, -1)").find("is -1. It must be a positive number.") != std::string::npos);
  CHECK(complaint("normal(0, 1e200)").find("not larger than 1e100") != std::string::npos);
  CHECK(complaint("normal(1e200, 1)").find("between -1e100 and 1e100") != std::string::npos);
  CHECK(complaint("student-t(0, 1, 0)").find("degrees of freedom") != std::string::npos);
  CHECK(complaint("student-t(0, 1, 1e12)").find("use a Normal prior instead") != std::string::npos);
  CHECK(complaint("uniform(1, 1)").find("has no width") != std::string::npos);
  CHECK(spread_complaint("uniform(-1, 1)").find("A spread can't be negative") != std::string::npos);
  CHECK(spread_complaint("log-normal(0, 0)").find("logarithm") != std::string::npos);
  CHECK(spread_complaint("log-normal(300, 1)").find("between -200 and 200") != std::string::npos);
  CHECK(spread_complaint("inverse-gamma(0, 1)").find("shape") != std::string::npos);
  CHECK(spread_complaint("exponential(-2)") ==
        "The mean of an exponential prior is -2. It must be a positive number.");
}

TEST_CASE("a direction without prior mass is refused") {
  const auto problem = problem_with(EffectPrior{UniformPrior{-1.0, -0.5}, Direction::greater});
  REQUIRE(problem.has_value());
  CHECK(problem->what ==
        "The effect prior uniform(-1, -0.5) leaves no probability for effects greater than 0.");
  CHECK(problem->remedy ==
        "Ask for the direction `less`, allow either direction, or use a prior that reaches above 0.");
  CHECK(problem_with(EffectPrior{UniformPrior{0.0, 0.5}, Direction::less}).has_value());
  CHECK(problem_with(EffectPrior{NormalPrior{5.0, 0.001}, Direction::less}).has_value());
  CHECK_FALSE(problem_with(EffectPrior{NormalPrior{5.0, 0.01}, Direction::greater}).has_value());
  CHECK_FALSE(problem_with(EffectPrior{CauchyPrior{5.0, 0.01}, Direction::less}).has_value());
}

TEST_CASE("the text of a prior reads back as the same prior") {
  for (const char* text :
       {"cauchy(0, 1/sqrt(2))", "cauchy(0, sqrt(2))", "normal(-0.25, 1)", "student-t(0.35, 0.102, 3)",
        "uniform(-1/3, 2/3)", "normal(0.1234567890123, 0.3333333333333)", "cauchy(0, sqrt(3)/2)"}) {
    const auto prior = parse_effect_prior(text);
    REQUIRE(prior.ok());
    CHECK(to_text(*prior.value) == text);
  }
  for (const char* text :
       {"half-cauchy(1/sqrt(2))", "half-normal(0.5)", "half-student-t(0.5, 4)", "inverse-gamma(1, 0.15)",
        "log-normal(-1.28, 0.87)", "exponential(1/3)", "uniform(0, 1)"}) {
    const auto prior = parse_spread_prior(text);
    REQUIRE(prior.ok());
    CHECK(to_text(*prior.value) == text);
  }
  for (double scale = 1e-9; scale < 1e9; scale *= 3.3) {
    const EffectPrior prior{CauchyPrior{-scale, scale / 7.0}};
    const auto back = parse_effect_prior(to_text(prior));
    REQUIRE(back.ok());
    CHECK(std::get<CauchyPrior>(back.value->family).location == -scale);
    CHECK(std::get<CauchyPrior>(back.value->family).scale == scale / 7.0);
  }
  CHECK(to_text(Direction::greater) == "greater");
  CHECK(to_text(Direction::less) == "less");
  CHECK(to_text(Direction::either) == "either");
}

TEST_CASE("every published prior can be used by its name") {
  for (const PublishedPrior& published : published_effect_priors()) {
    const auto by_name = parse_effect_prior(published.name);
    const auto by_definition = parse_effect_prior(published.definition);
    REQUIRE(by_name.ok());
    CHECK(to_text(*by_name.value) == to_text(*by_definition.value));
    CHECK(published.source.find('(') != std::string_view::npos);
  }
  for (const PublishedPrior& published : published_spread_priors()) {
    const auto by_name = parse_spread_prior(published.name);
    REQUIRE(by_name.ok());
    CHECK(to_text(*by_name.value) == published.definition);
  }
  // The variance's log-normal(m, s) is the spread's log-normal(m/2, s/2).
  const auto turner = std::get<LogNormalPrior>(parse_spread_prior("turner-2012-log-odds").value->family);
  CHECK(turner.log_mean == Approx(-2.56 / 2.0).epsilon(1e-15));
  CHECK(turner.log_sd == Approx(1.74 / 2.0).epsilon(1e-15));
}
