// A program of somebody else's that uses the library: compiles a two-qubit job and checks that a
// circuit came out.
#include <farrier/farrier.hpp>
#include <iostream>

int main() {
  farrier::Job job = farrier::read_job_text("1.0 X0 X1\n0.5 Z0\n0.5 Z1\n",
                                            farrier::InputKind::pauli, "two-qubits", ".");
  job.times = {0.5};
  job.budget.tolerance = 1e-3;
  const farrier::Result result = farrier::compile(job);
  const bool complete = result.points.size() == 1 &&
                        result.points[0].text.rfind("OPENQASM 3.0;", 0) == 0 &&
                        result.points[0].plan.certificate.bound <= 1e-3;
  std::cout << (complete ? "a circuit came out\n" : "no circuit came out\n");
  return complete ? 0 : 1;
}
