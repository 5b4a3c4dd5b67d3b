#!/usr/bin/env python3
"""Each house check must find the fault that it is for, and leave good code alone."""
import pathlib
import unittest

import check_house as house

MESH = pathlib.Path("libsolver/src/mesh/strip.cpp")
LONG_BODY = "    x += 1;\n" * 70


class Arrows(unittest.TestCase):
    def findings(self, include, path=MESH):
        return list(house.check_arrows(path, f"#include {include}\n"))

    def test_leftward_and_own_headers_pass(self):
        for include in ("<annulet/model/model.hpp>", "<annulet/mesh/mesh.hpp>", '"mesh/strip.hpp"', "<Eigen/Core>",
                        "<vector>", "<CGAL/Mesh/x.h>"):
            self.assertEqual(self.findings(include), [], include)

    def test_rightward_headers_are_found(self):
        self.assertEqual(len(self.findings("<annulet/mom/operator.hpp>")), 1)
        self.assertEqual(len(self.findings('"mom/kernel.hpp"')), 1)

    def test_internal_headers_of_another_room_are_found(self):
        self.assertEqual(len(self.findings('"model/expression.hpp"')), 1)

    def test_public_headers_are_held_to_it_too(self):
        path = pathlib.Path("libsolver/include/annulet/core/units.hpp")
        self.assertEqual(len(self.findings("<annulet/model/model.hpp>", path)), 1)

    def test_unknown_rooms_are_found(self):
        self.assertEqual(len(self.findings("<annulet/attic/x.hpp>")), 1)

    def test_links(self):
        self.assertEqual(list(house.check_links("annulet_room(mesh annulet_model)\n")), [])
        self.assertEqual(len(list(house.check_links("annulet_room(mesh annulet_mom)\n"))), 1)
        self.assertEqual(len(list(house.check_links("target_link_libraries(annulet_core PRIVATE annulet_io)"))), 1)


class Functions(unittest.TestCase):
    def lengths(self, text):
        return [last - first + 1 for first, last, _ in house.functions(text)]

    def test_long_ones_are_found_whatever_their_form(self):
        heads = ["int f(int a)\n{", "void C::g() const noexcept {", "auto h(int) -> std::vector<int> {",
                 "C::C(int a) : a_(a), b_{a} {", "template <class T>\nT k(T t) {", "TEST(Room, Name) {",
                 "struct S f(int a) {", "bool operator()(int a) const {"]
        for head in heads:
            text = f"namespace n {{\n{head}\n{LONG_BODY}}}\n}}\n"
            self.assertEqual(len(list(house.check_functions(text))), 1, head)

    def test_member_functions_count_one_by_one(self):
        text = "class C {\npublic:\n    int a() const { return 1; }\n    void b() {\n" + LONG_BODY + "    }\n};\n"
        self.assertEqual(sorted(self.lengths(text)), [1, 72])

    def test_scopes_and_tables_are_no_functions(self):
        rows = "    {1, 2},\n" * 100
        text = "namespace n {\nstruct S {\n" + "    int x;\n" * 100 + "};\nconst int t[] = {\n" + rows + "};\n}\n"
        self.assertEqual(self.lengths(text), [])

    def test_braces_in_literals_and_comments_do_not_count(self):
        text = 'void f() {\n  g("{{{", \'{\', R"x(}}})x");  // {\n  /* } */ int n = 1\'000;\n}\nvoid h() {}\n'
        self.assertEqual(self.lengths(text), [4, 1])

    def test_blocks_and_lambdas_belong_to_their_function(self):
        text = "void f() {\n  for (;;) {\n    if (a) { b(); }\n  }\n  auto g = [&](int x) {\n    return x;\n  };\n}\n"
        self.assertEqual(self.lengths(text), [8])


class Rest(unittest.TestCase):
    def test_citations(self):
        text = "// as in [Key2005] and [Other1999, equation 3]; not x[Index] or [[maybe_unused]]\n"
        missing = [finding for _, finding in house.check_citations(text, {"Key2005"})]
        self.assertEqual(missing, ["[Other1999] is not in docs/references.bib"])

    def test_bibliography_keys_stand_once(self):
        self.assertEqual(len(list(house.check_bibliography("@book{A1,\n}\n@book{A1,\n}\n"))), 1)

    def test_forbidden_things(self):
        for line in ("#include <fstream>", "std::cout << 1;", "int* p = new int[3];", "delete p;", "// TODO later"):
            self.assertGreaterEqual(len(list(house.check_forbidden(MESH, line + "\n"))), 1, line)
        for line in ("C(const C&) = delete;", "// a new mesh (finer)", 'text = "std::cout";'):
            self.assertEqual(list(house.check_forbidden(MESH, line + "\n")), [], line)

    def test_io_may_touch_files(self):
        self.assertEqual(list(house.check_forbidden(pathlib.Path("libsolver/src/io/x.cpp"), "#include <fstream>\n")), [])


if __name__ == "__main__":
    unittest.main()
