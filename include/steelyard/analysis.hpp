// Room "analysis": joins everything that a reader may see into one value.
#pragma once

#include <cstddef>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "steelyard/audit.hpp"
#include "steelyard/base.hpp"
#include "steelyard/pool.hpp"
#include "steelyard/read.hpp"
#include "steelyard/rebuild.hpp"
#include "steelyard/replicate.hpp"
#include "steelyard/stress.hpp"
#include "steelyard/weigh.hpp"

namespace steelyard {

/// The input of an analysis: what it takes to get the same answer again.
struct Input {
  std::string file;
  std::string sha256;  ///< of the bytes as read, 64 hexadecimal digits
  Table table;
};

/// What the caller asked for.
struct AnalysisOptions {
  Priors priors;
  bool explicit_priors = false;  ///< both priors were stated by the user
  PoolOptions pool;
  RebuildOptions rebuild;
  std::vector<std::string> without;  ///< labels (or "row N") of studies to leave out
};

/// A finished analysis of `pool` (and of `draw`, `report`, which show the same).
struct Analysis {
  Input input;
  AnalysisOptions options;
  std::vector<Study> studies;
  std::vector<Finding> findings;
  std::vector<std::string> left_out;  ///< labels named by `without`
  PoolResult result;
  std::vector<Diagnostic> cautions;  ///< of reading, rebuilding and pooling together
  std::optional<RegionResult> region;  ///< when it was asked for
};

/// Reads, rebuilds, audits and pools the text of a file.
[[nodiscard]] Outcome<Analysis> analyse_pool(std::string_view text, const std::string& file,
                                             const AnalysisOptions& options = {});

/// The same for rows that are read already (a result that is repeated, a table made in memory).
/// `cautions`: what reading had to say.
[[nodiscard]] Outcome<Analysis> analyse_table(Input input, const AnalysisOptions& options = {},
                                              std::vector<Diagnostic> cautions = {});

/// A run of `pool` as its JSON result records it: enough to repeat it.
struct RecordedRun {
  Input input;  ///< file name and checksum are those of the original file
  AnalysisOptions options;
};

/// Reads the JSON that `pool` wrote. Error when it is something else, or of a newer kind.
[[nodiscard]] Outcome<RecordedRun> read_result(std::string_view text, const std::string& file);

/// Rows that were read, rebuilt and audited: where every command that works on studies begins.
struct Gathered {
  Input input;
  AnalysisOptions options;
  std::vector<Study> studies;
  std::vector<Finding> findings;
  std::vector<std::string> left_out;  ///< labels named by `without`
  std::vector<Diagnostic> cautions;   ///< of reading and rebuilding
};

/// Error when a row that stays can't be rebuilt, or priors must be stated.
[[nodiscard]] Outcome<Gathered> gather(Input input, const AnalysisOptions& options,
                                       std::vector<Diagnostic> cautions = {});

/// A finished analysis of `weigh`.
struct WeighAnalysis {
  Gathered rows;
  WeighOptions options;
  WeighResult result;
};
[[nodiscard]] Outcome<WeighAnalysis> analyse_weigh(Gathered rows, const WeighOptions& options);

/// A finished analysis of `stress`; with `by`, differences among the groups of that column.
struct StressAnalysis {
  Gathered rows;
  StressOptions options;
  std::string by;
  StressResult result;
  std::optional<GroupResult> groups;  ///< absent without `by` or with fewer than two groups
};
/// `by`: the label column that makes groups, or "". Error when there is no such column or a cell is empty.
[[nodiscard]] Outcome<StressAnalysis> analyse_stress(Gathered rows, StressOptions options,
                                                     const std::string& by);

/// A finished analysis of `replicate`.
struct ReplicateAnalysis {
  Gathered rows;
  ReplicateOptions options;
  ReplicateResult result;
};
[[nodiscard]] Outcome<ReplicateAnalysis> analyse_replicate(Gathered rows, const ReplicateOptions& options);

/// What `check` looks at.
struct CheckOptions {
  RebuildOptions rebuild;
  std::vector<std::string> without;  ///< labels (or "row N") of studies to leave out
};

/// A file as `check` saw it: what could be rebuilt, what could not, and what doesn't agree.
struct Check {
  Input input;
  CheckOptions options;
  std::vector<Study> studies;        ///< the rows that could be rebuilt
  std::vector<Diagnostic> problems;  ///< errors: why the other rows could not
  std::vector<Finding> findings;
  std::vector<std::string> left_out;  ///< labels named by `without`
  std::vector<Diagnostic> cautions;   ///< of reading and rebuilding
};

/// Reads, rebuilds and audits the text of a file. A row that can't be rebuilt doesn't stop the others;
/// the value is absent only when the file can't be read as rows at all.
[[nodiscard]] Outcome<Check> analyse_check(std::string_view text, const std::string& file,
                                           const CheckOptions& options = {});

/// The label of a row: its `study` cell, or "row N" (N counts from 1).
[[nodiscard]] std::string row_label(const Table& table, std::size_t row);

/// The rows that stay, as indices, when these labels (or "row N") are left out. Error when a name
/// matches no row or no row stays.
[[nodiscard]] Outcome<std::vector<std::size_t>> rows_without(const Table& table,
                                                             std::span<const std::string> without);

/// SHA-256 of bytes, in hexadecimal.
[[nodiscard]] std::string sha256(std::string_view bytes);

/// The two plain sentences that answer "is there an effect?" and "does it vary?", with the odds the
/// right way round and the prior odds they assume. Order: effect, heterogeneity.
struct Verdict {
  std::string effect;
  std::string heterogeneity;
};
[[nodiscard]] Verdict verdict(const PoolResult& result, const Priors& priors, std::span<const Study> studies);

// ---- evidence in words; all in UTF-8 with U+2212 as minus and superscript exponents -----------------

/// Weight of evidence (Good 1950): 10·log10 of a Bayes factor given as natural log.
[[nodiscard]] double decibans(double log_bf);
/// "+15.3", "−4.0", "0.0"; whole numbers from 1,000 on.
[[nodiscard]] std::string decibans_text(double log_bf);
/// exp(log_ratio) to three figures: "0.0123", "34.2", "12,300"; outside [0.001, 1e6) as a power of ten,
/// "3.10×10¹²". Any finite log.
[[nodiscard]] std::string ratio_text(double log_ratio);
/// The odds the right way round: "34.2 to 1" for, "1 to 34.2" against; whole numbers without decimals.
[[nodiscard]] std::string odds_text(double log_odds);
/// "an effect", or "a positive effect" / "a negative effect" when the prior allows one direction only.
[[nodiscard]] std::string effect_phrase(Direction direction);

}  // namespace steelyard
