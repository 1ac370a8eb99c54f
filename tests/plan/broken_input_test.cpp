// Plans from a stranger or from a damaged disk: refused with one message, never a crash.

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <random>

#include "plan/plan_document.h"
#include "plan/plan_folder.h"
#include "plan/plan_text.h"

namespace sunfall::testing {
namespace {

// Reads text as a plan: true for a plan, false for an error of the user's. Anything else escapes.
bool is_plan(const PlanFolder& folder, const std::string& text) {
  try {
    folder.read(text);
    return true;
  } catch (const Error& error) {
    EXPECT_TRUE(error.kind() == ErrorKind::plan || error.kind() == ErrorKind::data) << error.what();
    EXPECT_NE(error.parts().what, "");
    EXPECT_THAT(error.parts().where, ::testing::HasSubstr("farm.toml"));
    EXPECT_EQ(std::string(error.what()).find('\n'), std::string::npos) << error.what();
    return false;
  }
}

std::string whole_plan() { return example_plans(plan_page()).at(0); }

TEST(BrokenPlans, CutAnywhere) {
  const PlanFolder folder;
  const std::string plan = whole_plan();
  ASSERT_TRUE(is_plan(folder, plan));
  // Nothing is a plan before the list of months, which every plan's light hangs on, has closed.
  const std::size_t light = plan.find("1.8]") + 4;
  ASSERT_LT(light, plan.size());
  for (std::size_t size = 0; size < light; ++size)
    EXPECT_FALSE(is_plan(folder, plan.substr(0, size))) << size;
  EXPECT_TRUE(is_plan(folder, plan.substr(0, light)));
  for (std::size_t size = light; size < plan.size(); ++size) is_plan(folder, plan.substr(0, size));
}

TEST(BrokenPlans, WithChangedBytes) {
  const PlanFolder folder;
  const std::string plan = whole_plan();
  std::mt19937 random(20250415);
  std::uniform_int_distribution<std::size_t> place(0, plan.size() - 1);
  std::uniform_int_distribution<int> byte(0, 255);
  const std::string marks = "[]{}=\"'.,#\\\n\r\t -_0eE+:u";
  std::uniform_int_distribution<std::size_t> mark(0, marks.size() - 1);
  int refused = 0;
  for (int i = 0; i < 2000; ++i) {
    std::string broken = plan;
    for (int k = 0; k <= i % 3; ++k) {
      broken[place(random)] = i % 2 == 0 ? static_cast<char>(byte(random)) : marks[mark(random)];
    }
    refused += is_plan(folder, broken) ? 0 : 1;
  }
  // Some changes must matter; some fall on comments, spaces and names, and must not.
  EXPECT_GT(refused, 0);
  EXPECT_LT(refused, 2000);
}

TEST(BrokenPlans, OfNothingButNoise) {
  const PlanFolder folder;
  std::mt19937 random(7);
  std::uniform_int_distribution<int> byte(0, 255);
  std::uniform_int_distribution<int> printable(32, 126);
  std::uniform_int_distribution<std::size_t> size(1, 400);
  for (int i = 0; i < 1000; ++i) {
    std::string noise(size(random), ' ');
    for (char& letter : noise) letter = static_cast<char>(i % 2 == 0 ? byte(random) : printable(random));
    EXPECT_FALSE(is_plan(folder, noise)) << i;  // a plan needs a ground that exists
  }
}

std::string repeated(const std::string& text, int times) {
  std::string all;
  for (int i = 0; i < times; ++i) all += text;
  return all;
}

// Each of these nests so deeply that freeing the tables would use up the stack.
TEST(BrokenPlans, NestedBeyondReason) {
  const PlanFolder folder;
  const std::string what = "the plan is nested too deeply";
  for (const std::string& plan : {repeated("a.", 400000) + "a = 1\n", "[" + repeated("a.", 400000) + "a]\n",
                                  "a = " + repeated("[", 400000), "a = " + repeated("{a=", 300000),
                                  "a = " + repeated("[\n{" + repeated("a.", 150) + "a=", 200),
                                  "s = 'x' #'''\n" + repeated("'a' . ", 100000) + "a = 1\n",
                                  "s = \"\\\"\" # \"\n" + repeated("a.", 400000) + "a = 1\n",
                                  "s = { b = '''a'''', " + repeated("a.", 400000) + "a = 1 }\n"}) {
    const PlanFolder::Fault fault = folder.fault(plan);
    EXPECT_EQ(fault.what, what) << plan.substr(0, 60);
    EXPECT_EQ(fault.kind, ErrorKind::plan);
  }
}

TEST(BrokenPlans, NestingIsCountedOutsideTextsAndCommentsOnly) {
  const PlanFile file{"farm.toml"};
  const std::string dots(1000, '.');
  const std::string brackets(1000, '[');
  for (const std::string& text :
       {"# " + dots + brackets, "a = '" + dots + brackets + "'", "a = \"\\\"" + dots + brackets + "\"",
        "a = '''\n'" + dots + "\n''" + brackets + "'''", "a = \"\"\"\n\\\"\"\"" + dots + brackets + "\"\"\"",
        repeated("a.b = [[1.5]]\n", 1000)}) {
    EXPECT_NO_THROW(refuse_deep_nesting(text, file)) << text.substr(0, 40);
  }
}

TEST(BrokenPlans, WithLongNames) {
  const PlanFolder folder;
  const std::string name(400000, 'k');
  EXPECT_FALSE(is_plan(folder, name + " = 1\n"));
  EXPECT_FALSE(is_plan(folder, "[" + name + "]\n"));
  EXPECT_FALSE(is_plan(folder, plan_with("[dome]\n" + name + " = 1\n")));
  EXPECT_FALSE(is_plan(folder, plan_with("[dome]\nsky = '" + name + "'\n")));
  EXPECT_FALSE(is_plan(folder, plan_with_site("ground = '" + name + "'\nclock = 'UTC'")));
  EXPECT_FALSE(is_plan(folder, plan_with_site("ground = 'ground.tif'\nclock = '" + name + "'")));
  EXPECT_LT(folder.fault(plan_with("[dome]\n" + name + " = 1\n")).message.size(), 400U);
}

}  // namespace
}  // namespace sunfall::testing
