#include "support/walk.hpp"

#include <lightledger/trace/instruction_set.hpp>
#include <lightledger/trace/interact.hpp>

#include <gtest/gtest.h>

namespace lightledger::trace {
namespace {

/// Puts the set back that was in use.
class InstructionSets : public testing::Test {
protected:
  ~InstructionSets() override { use(m_before); }

private:
  InstructionSet m_before = instruction_set_in_use();
};

InstructionSet run() {
  PlanLeg leg{};
  leg.index = 1.0;
  PlanOp op{};
  op.amplitude = AmplitudeKind::fresnel;
  op.n1 = 1.0;
  op.n2 = 1.5;
  RayBlock block{};
  block.count = 1;
  block.alive = 1;
  block.d[2][0] = block.u[0][0] = block.J[0][0] = block.J[6][0] = block.w[0] = 1.0;
  StepOut out;
  out.pass = &block;
  return interact(leg, op, {0.5, 0.5, {}}, block, out);
}

TEST_F(InstructionSets, RunWhenTheyAreChosen) {
  for (const InstructionSet set : instruction_sets) {
    if (!available(set))
      continue;
    use(set);
    EXPECT_EQ(run(), set) << name(set);
  }
}

TEST_F(InstructionSets, AreLeftAloneByOneThatIsNotAvailable) {
  const InstructionSet before = instruction_set_in_use();
  for (const InstructionSet set : instruction_sets)
    if (!available(set))
      use(set);
  EXPECT_EQ(instruction_set_in_use(), before);
}

TEST_F(InstructionSets, IncludeThePortableOneOrNeon) {
  EXPECT_TRUE(available(InstructionSet::portable) || available(InstructionSet::neon));
}

} // namespace
} // namespace lightledger::trace
