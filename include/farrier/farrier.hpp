// Everything that farrier's library offers.
#pragma once

#include <farrier/circuit.hpp>
#include <farrier/compile.hpp>
#include <farrier/diagnostic.hpp>
#include <farrier/formula.hpp>
#include <farrier/hamiltonian.hpp>
#include <farrier/job.hpp>
#include <farrier/pauli.hpp>
#include <farrier/plan.hpp>
#include <farrier/read.hpp>
#include <farrier/version.hpp>
