// The reader of job files (.xml).
#pragma once

#include <farrier/job.hpp>
#include <string>

#include "compiler/base/source.hpp"

namespace farrier::front {

/// The job of a text; its name stays empty where the text gives none. Paths in it are relative to
/// `directory`.
Job read_job_file(const base::SourceText& source, const std::string& directory);

}  // namespace farrier::front
