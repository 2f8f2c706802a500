// `farrier list`: the tables that the other verbs draw on.
#pragma once

#include <string>
#include <string_view>
#include <vector>

namespace farrier::driver {

/// A row of the table of tables.
struct ListInfo {
  std::string_view name;
  std::string (*text)();
};

const std::vector<ListInfo>& list_table();

/// The table of that name, as aligned text. Throws UserError(ExitCode::usage) where there is none.
std::string list_text(const std::string& name);

}  // namespace farrier::driver
