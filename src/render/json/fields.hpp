// Private to the room: the description of a document's fields. From one `Part<T>` come the bytes
// (Part::write), the JSON Schema and the table of the documentation (both from Part::shape).
#pragma once

#include <functional>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <type_traits>
#include <utility>
#include <vector>

#include "render/json/writer.hpp"

namespace steelyard::json {

struct Member;

/// What may stand at a place of a document.
struct Shape {
  enum class Kind { text, number, integer, boolean, object, array, map };
  Kind kind = Kind::text;
  bool nullable = false;
  std::vector<std::string> choices;      ///< of a text: the only values
  std::string name;                      ///< of an object: its name among the schema's definitions
  std::vector<Member> members;           ///< of an object
  std::shared_ptr<const Shape> element;  ///< of an array or a map
};

struct Member {
  std::string_view name;
  std::string_view meaning;
  Shape shape;
};

/// A place's shape, and how a T fills it.
template <class T>
struct Part {
  Shape shape;
  std::function<void(Writer&, const T&)> write;
};

/// One named place of an object that is made from a T.
template <class T>
struct Field {
  std::string_view name;
  std::string_view meaning;
  Part<T> part;
};

template <class X>
struct IsOptional : std::false_type {};
template <class X>
struct IsOptional<std::optional<X>> : std::true_type {};

/// A leaf: `get` gives a value or an optional value, `put` writes it.
template <class T, class Get, class Put>
Part<T> leaf(Shape::Kind kind, Get get, Put put) {
  using Result = std::remove_cvref_t<std::invoke_result_t<Get, const T&>>;
  Part<T> part;
  part.shape.kind = kind;
  part.shape.nullable = IsOptional<Result>::value;
  part.write = [get, put](Writer& writer, const T& from) {
    const auto& value = std::invoke(get, from);
    if constexpr (IsOptional<Result>::value) {
      if (!value) return writer.null();
      put(writer, *value);
    } else {
      put(writer, value);
    }
  };
  return part;
}

template <class T, class Get>
Part<T> number(Get get) {
  return leaf<T>(Shape::Kind::number, get, [](Writer& w, double value) { w.number(value); });
}
template <class T, class Get>
Part<T> integer(Get get) {
  return leaf<T>(Shape::Kind::integer, get, [](Writer& w, unsigned long long value) { w.integer(value); });
}
template <class T, class Get>
Part<T> boolean(Get get) {
  return leaf<T>(Shape::Kind::boolean, get, [](Writer& w, bool value) { w.boolean(value); });
}
template <class T, class Get>
Part<T> text(Get get) {
  return leaf<T>(Shape::Kind::text, get, [](Writer& w, std::string_view value) { w.text(value); });
}
/// A text with a closed list of values.
template <class T, class Get>
Part<T> word(std::vector<std::string> choices, Get get) {
  Part<T> part = text<T>(get);
  part.shape.choices = std::move(choices);
  return part;
}
/// A text that is null when it is empty.
template <class T, class Get>
Part<T> text_or_null(Get get) {
  return text<T>([get](const T& from) {
    const std::string_view value = std::invoke(get, from);
    return value.empty() ? std::optional<std::string_view>() : std::optional<std::string_view>(value);
  });
}

/// An object with these fields.
template <class T>
Part<T> object(std::string name, std::vector<Field<T>> fields) {
  Part<T> part;
  part.shape.kind = Shape::Kind::object;
  part.shape.name = std::move(name);
  for (const Field<T>& field : fields) {
    part.shape.members.push_back({field.name, field.meaning, field.part.shape});
  }
  part.write = [fields = std::move(fields)](Writer& writer, const T& from) {
    writer.begin_object();
    for (const Field<T>& field : fields) {
      writer.key(field.name);
      field.part.write(writer, from);
    }
    writer.end_object();
  };
  return part;
}

/// What `part` makes of something inside a T; null when `get` gives an empty optional.
template <class T, class U, class Get>
Part<T> inside(Part<U> part, Get get) {
  using Result = std::remove_cvref_t<std::invoke_result_t<Get, const T&>>;
  Part<T> outer;
  outer.shape = std::move(part.shape);
  if (IsOptional<Result>::value) outer.shape.nullable = true;
  outer.write = [write = std::move(part.write), get](Writer& writer, const T& from) {
    const auto& value = std::invoke(get, from);
    if constexpr (IsOptional<Result>::value) {
      if (!value) return writer.null();
      write(writer, *value);
    } else {
      write(writer, value);
    }
  };
  return outer;
}

/// An array of what `part` makes of each element of a range inside a T.
template <class T, class U, class Get>
Part<T> array(Part<U> part, Get get) {
  Part<T> outer;
  outer.shape.kind = Shape::Kind::array;
  outer.shape.element = std::make_shared<const Shape>(std::move(part.shape));
  outer.write = [write = std::move(part.write), get](Writer& writer, const T& from) {
    writer.begin_array();
    for (const U& element : std::invoke(get, from)) write(writer, element);
    writer.end_array();
  };
  return outer;
}

/// An object whose keys are the user's own (columns); `each(from, put)` calls put(key, text).
template <class T, class Each>
Part<T> text_map(Each each) {
  Part<T> part;
  part.shape.kind = Shape::Kind::map;
  part.shape.element = std::make_shared<const Shape>();
  part.write = [each](Writer& writer, const T& from) {
    writer.begin_object();
    each(from, [&writer](std::string_view key, std::string_view value) {
      writer.key(key);
      writer.text(value);
    });
    writer.end_object();
  };
  return part;
}

/// JSON Schema (draft 2020-12) of a document.
[[nodiscard]] std::string schema(const Shape& shape, std::string_view title, std::string_view id);
/// A Markdown table with one row a field, nested names joined by dots.
[[nodiscard]] std::string fields_table(const Shape& shape);

}  // namespace steelyard::json
