// SPDX-License-Identifier: Apache-2.0
// The guard before toml++ lets pass what TOML 1.0 allows and stops what toml++ must not see.
#include "specimen/problem_list.h"
#include "specimen/text_check.h"
#include "specimen/toml_guard.h"
#include "support/catch.h"

#include <fmt/format.h>

#include <string>

using whorl::specimen::guard_toml;

namespace {

std::string guarded(const std::string& text) {
  whorl::specimen::ProblemList problems;
  guard_toml(text, problems);
  try {
    problems.throw_if_any("t");
  } catch (const whorl::diagnostics::InvalidInput& error) {
    return fmt::format("{}:{}", error.problems()[0].where.line, error.problems()[0].where.column);
  }
  return "passes";
}

}  // namespace

TEST_CASE("Characters beyond ASCII pass inside quotes of all four kinds and in comments", "[specimen]") {
  for (const char* text : {"a = \"ö\"", "a = 'ö'", "a = \"\"\"ö\n\"ö\"\"\n\"\"\"", "a = '''ö\n'ö''\n'''", "# ö",
                           "a = 1 # ö \" ö", "\"ö\" = 1", "['ö']", "a = \"\\\"ö\"", "a = 'C:\\' # ö",
                           "a = \"\"\"\\\"\"\"ö\"\"\"", "a = \"\"\"ö\"\"\"\"\" # ö", "a = '''ö''''' # ö",
                           "a = \"\" # ö", "\xEF\xBB\xBF# ö", "a = [ 'ö', # ö\n \"ö\" ]", "a = { \"ö\" = 'ö' }"}) {
    CAPTURE(text);
    CHECK(guarded(text) == "passes");
  }
}

TEST_CASE("A character beyond ASCII outside quotes and comments is stopped at its place", "[specimen]") {
  CHECK(guarded("ö = 1") == "1:1");
  CHECK(guarded("a = ö") == "1:5");
  CHECK(guarded("'ö'ö = 1") == "1:4");
  CHECK(guarded("\n[ö]") == "2:2");
  CHECK(guarded("a = \"ö\" ö") == "1:9");
  CHECK(guarded("a = \"\"\"\nö\n\"\"\" ö") == "3:5");
  CHECK(guarded("a = 'C:\\' ö") == "1:11");
  CHECK(guarded("a = \"not closed\nö = 1") == "2:1");
}

TEST_CASE("Quotes begin where a key, a value or a part of them may begin", "[specimen]") {
  for (const char* text :
       {"a='b'", "'a'.\"b\" = 1", "a = ['b','c']", "a = {'b'='c'}", "a = \"\"\"b\"\"\"\"\" ", "['a'.'b']",
        "\xEF\xBB\xBF'a' = 1", "a = {'b'.'c'='d','e'=['f',{'g'='h'}],i='j'}", "a = [\n'b',\n'c'\n]\n'd'='e'"}) {
    CAPTURE(text);
    CHECK(guarded(text) == "passes");
  }
  CHECK(guarded("a = 1e999\"\xCC\xA0\"") == "1:10");
  CHECK(guarded("a = true'\xCC\xA0'") == "1:9");
  CHECK(guarded("a = 'b''c'") == "1:8");
  CHECK(guarded("a = [1]'c'") == "1:8");
  CHECK(guarded("a = [1.'c']") == "1:8");
  CHECK(guarded("a = [[1='c']]") == "1:9");
  CHECK(guarded("a = { b = 1.'c' }") == "1:13");
  CHECK(guarded("a = 1{'c'}") == "1:7");
}

TEST_CASE("No character beyond ASCII follows a backslash, across line ends either", "[specimen]") {
  CHECK(guarded("a = \"\"\"b \\\n  c\"\"\"") == "passes");
  CHECK(guarded("a = 'b\\ö'") == "passes");
  CHECK(guarded("a = \"\"\"b\\\n  ö\"\"\"") == "1:9");
  CHECK(guarded("a = \"b\\ö\"") == "1:7");
}

TEST_CASE("Names of tables must begin like names; lists over several lines are no tables", "[specimen]") {
  for (const char* text : {"[a]", "[[a]]", "[ a ]", "[ \"a\" ]", "['a']", "[_]", "[-]", "[0]", "[]", "[", "[[", "[\n",
                           "a = [\n[+1, 2],\n[.5, 1]\n]", "a = [ # [\n[&]\n]", "a = \"\"\"\n[&]\n\"\"\""}) {
    CAPTURE(text);
    CHECK(guarded(text) == "passes");
  }
  CHECK(guarded("[&") == "1:1");
  CHECK(guarded("[&]") == "1:1");
  CHECK(guarded("a = 1\n  [[ =") == "2:3");
  CHECK(guarded("a = []\n[+]") == "2:1");
  CHECK(guarded("[a]\n[.b]") == "2:1");
  CHECK(guarded("[a] # ]\n[{") == "2:1");
}

TEST_CASE("A character is named by its number as the Unicode Standard writes it", "[specimen]") {
  CHECK(whorl::specimen::code_point("A") == U'A');
  CHECK(whorl::specimen::code_point("\xC3\xB6") == U'\u00F6');
  CHECK(whorl::specimen::code_point("\xE2\x82\xAC") == U'\u20AC');
  CHECK(whorl::specimen::code_point("\xF0\x9F\x90\x9A") == U'\U0001F41A');
  CHECK(whorl::specimen::first_character("\xE2\x82\xAC"
                                         "2") == "\xE2\x82\xAC");
}
