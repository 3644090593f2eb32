#include "drawing_words.hpp"

namespace lightledger::report {

const char* name_of(analysis::View view) {
  switch (view) {
  case analysis::View::x:
    return "x";
  case analysis::View::y:
    return "y";
  case analysis::View::z:
    break;
  }
  return "z";
}

std::string_view describe_view(analysis::View view) {
  switch (view) {
  case analysis::View::x:
    return "seen along x: z to the right, y up";
  case analysis::View::y:
    return "seen along y: z to the right, x up";
  case analysis::View::z:
    break;
  }
  return "seen along z: x to the right, y up";
}

const char* name_of(analysis::RayEnd end) {
  switch (end) {
  case analysis::RayEnd::arrived:
    return "arrived";
  case analysis::RayEnd::clipped:
    return "clipped";
  case analysis::RayEnd::missed:
    return "missed";
  case analysis::RayEnd::turned_back:
    break;
  }
  return "turned_back";
}

} // namespace lightledger::report
