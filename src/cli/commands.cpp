#include "commands.hpp"

#include <array>

namespace steelyard::cli {

namespace {

constexpr std::array pool_examples = {
    Example{"steelyard pool studies.csv", "verdict, forest and estimates in the terminal"},
    Example{"steelyard pool studies.csv --svg forest.svg --json result.json",
            "the same, with a figure and all numbers"},
    Example{"steelyard pool studies.csv --direction greater --effect-prior \"normal(0, 0.5)\"",
            "another prior of the mean effect, and only effects above zero"},
    Example{"steelyard pool studies.csv --without \"Miller 1998\"",
            "leave one study out, and say so in every output"},
    Example{"steelyard pool --from result.json", "repeat a run from its own result"},
};

constexpr std::array check_examples = {
    Example{"steelyard check studies.csv", "how each row is read, and what does not agree"},
    Example{"steelyard check studies.csv --fail-on impossible", "exit status 4 when numbers can't be true"},
    Example{"steelyard check studies.csv --json -", "the same for another program"},
};

constexpr std::array weigh_examples = {
    Example{"steelyard weigh studies.csv", "each study on its own, and how the evidence is distributed"},
    Example{"steelyard weigh --t 2.1 --n1 30 --n2 32", "one result straight from a paper"},
    Example{"steelyard weigh --t 2.2 --n 40 --design one_sample --region -0.1:0.1",
            "how probable a practically negligible effect is"},
};

constexpr std::array stress_examples = {
    Example{"steelyard stress studies.csv", "what would change the answer"},
    Example{"steelyard stress studies.csv --by setting", "the same by group, and whether the groups differ"},
    Example{"steelyard stress studies.csv --verdict-at 10 --json stress.json",
            "ask for ten to one, and keep every answer"},
};

constexpr std::array replicate_examples = {
    Example{"steelyard replicate studies.csv", "rows marked original and replication in the column role"},
    Example{"steelyard replicate studies.csv --direction greater", "with only positive effects allowed"},
};

constexpr std::string_view figure_kinds = "forest|surface|belief|funnel|ladder|sway|priors";

constexpr std::array draw_examples = {
    Example{"steelyard draw forest studies.csv --svg forest.svg", "the forest, as with steelyard pool --svg"},
    Example{"steelyard draw ladder studies.csv --svg ladder.svg", "the weight of evidence as studies arrive"},
    Example{"steelyard draw funnel studies.csv --size one-column --svg funnel.svg", "for a narrow column"},
};

constexpr std::array report_examples = {
    Example{"steelyard report studies.csv --html report.html", "one file to open, send or print"},
    Example{"steelyard report studies.csv --markdown report.md", "for a supplement or a pull request"},
};

constexpr std::array commands = {
    CommandInfo{
        Command::pool, "pool", "weigh the printed evidence of several studies together",
        "Reads a table of published results, rebuilds each study's test statistic from what is printed, and "
        "answers two questions: is there an effect, and does it vary from study to study? Shows how strong "
        "the "
        "evidence is, how large the effect is, and what does not agree in the printed numbers.",
        pool_examples, "", run_pool},
    CommandInfo{Command::check, "check", "see how each row is read and whether its numbers agree",
                "Rebuilds every row of a table of published results and compares the printed numbers with "
                "each other. "
                "A disagreement is listed only when rounding can't explain it. Nothing is pooled.",
                check_examples, "", run_check},
    CommandInfo{
        Command::weigh, "weigh", "weigh each study on its own",
        "Takes each row by itself: its Bayes factor for an effect against none, the effect, the range that "
        "rounding allows, what a sceptic and an enthusiast would say, and the prior width at which the "
        "evidence "
        "turns. Any column of docs/formats.md is also an option, so that one result can be weighed without a "
        "file.",
        weigh_examples, "", run_weigh},
    CommandInfo{Command::stress, "stress", "see how firm the pooled answer is",
                "Pools again without each study, as studies arrive, under other priors, directions and "
                "models, and by "
                "group, and says which smallest change turns the verdict.",
                stress_examples, "", run_stress},
    CommandInfo{Command::replicate, "replicate", "set replications against their originals",
                "Rows say in the column role whether they are an original or a replication. Says what the "
                "replications "
                "add, by two published definitions, whether they lie where the originals predict, and what "
                "remains when "
                "originals are read as selected for significance.",
                replicate_examples, "", run_replicate},
    CommandInfo{Command::draw, "draw", "draw a figure of the pooled answer",
                "Pools the studies and draws one figure as SVG: forest (the studies), surface (mean effect "
                "and spread), "
                "belief (before and after the data), funnel (effect against standard error), ladder "
                "(evidence as studies "
                "arrive), sway (each study left out) or priors (evidence over prior widths). Without --svg "
                "the figure "
                "goes to standard output.",
                draw_examples, figure_kinds, run_draw},
    CommandInfo{
        Command::report, "report", "write the whole analysis as one file",
        "Pools the studies, tries how firm the answer is, and writes everything a reader needs into one file "
        "that "
        "opens without a network: verdict, forest, evidence, estimates, firmness, the table of studies, "
        "every "
        "assumption, and a methods paragraph with references. Without --html or --markdown the HTML goes to "
        "standard output.",
        report_examples, "", run_report},
};

}  // namespace

std::span<const CommandInfo> command_table() { return commands; }

const CommandInfo* find_command(std::string_view name) {
  for (const CommandInfo& command : commands) {
    if (command.name == name) return &command;
  }
  return nullptr;
}

}  // namespace steelyard::cli
