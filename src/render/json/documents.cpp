// The list of documents, and what follows from their descriptions.
#include "render/json/documents.hpp"

#include <array>
#include <string>

#include <fmt/format.h>

namespace steelyard {

namespace {

struct Described {
  JsonDocument document;
  const json::Shape& (*shape)();  ///< null: the input, which the table of columns describes
};

constexpr std::array described = {
    Described{{"studies", "A file of studies, as input"}, nullptr},
    Described{{"pool", "Result of steelyard pool"}, json::pool_shape},
    Described{{"check", "Result of steelyard check"}, json::check_shape},
    Described{{"weigh", "Result of steelyard weigh"}, json::weigh_shape},
    Described{{"stress", "Result of steelyard stress"}, json::stress_shape},
    Described{{"replicate", "Result of steelyard replicate"}, json::replicate_shape},
};

const Described* find(std::string_view name) {
  for (const Described& one : described) {
    if (one.document.name == name) return &one;
  }
  return nullptr;
}

constexpr auto documents = [] {
  std::array<JsonDocument, described.size()> list{};
  for (std::size_t i = 0; i < list.size(); ++i) list[i] = described[i].document;
  return list;
}();

}  // namespace

std::span<const JsonDocument> json_documents() { return documents; }

std::string json_schema(std::string_view document) {
  const Described* one = find(document);
  if (one == nullptr) return "";
  const std::string id = fmt::format("urn:steelyard:schema:{}:{}", document, json_schema_version);
  return one->shape == nullptr ? json::studies_schema(one->document.title, id)
                               : json::schema(one->shape(), one->document.title, id);
}

std::string json_fields(std::string_view document) {
  const Described* one = find(document);
  if (one == nullptr) return "";
  return one->shape == nullptr ? json::studies_fields() : json::fields_table(one->shape());
}

}  // namespace steelyard
