#!/usr/bin/env python3
"""Checks the rules of the house over a source tree: arrows between rooms, file and function size, cited keys.

Usage: check_house.py ROOT. Prints every finding as path:line: text; status 1 if one of them is an error.
"""
import pathlib
import re
import sys

ROOMS = ["core", "numerics", "geometry", "model", "mesh", "mom", "sweep", "analysis", "study", "io", "apps"]
SOURCE_FOLDERS = ["libsolver", "apps", "tests", "benchmarks", "scripts"]
CODE = {".cpp", ".hpp"}
SIZED = CODE | {".py", ".sh", ".txt", ".cmake"}
WARN_LINES, MOST_LINES, MOST_FUNCTION_LINES = 400, 500, 60

# Nothing before io touches files or the terminal.
FORBIDDEN_BEFORE_IO = re.compile(r"#include\s*<(fstream|iostream|cstdio|filesystem)>|\bstd::(cout|cerr|clog)\b|\bprintf\s*\(")
FORBIDDEN_ANYWHERE = re.compile(r"\bTODO\b|\bFIXME\b|\bXXX\b|\bnew\s+[A-Za-z_:]+\s*[\[({]|\bdelete\s*(\[\])?\s*[a-z_]|\busing namespace std\b")
CITATION = re.compile(r"\[([A-Z][A-Za-z]+(?:19|20)?\d{2,4}[a-z]?)(?:[,;][^\]\[]*)?\]")
BIB_ENTRY = re.compile(r"^@\w+\{\s*([^,\s]+)\s*,", re.MULTILINE)


def blank_literals(text):
    """The text with comments and literals replaced by spaces; lengths and line breaks stay."""
    pattern = re.compile(
        r'//[^\n]*|/\*.*?\*/|R"(?P<tag>[^()\s\\]{0,16})\(.*?\)(?P=tag)"|"(?:\\.|[^"\\\n])*"'
        r"|(?<![0-9A-Fa-f])'(?:\\.|[^'\\\n])+'", re.DOTALL)
    return pattern.sub(lambda m: re.sub(r"[^\n]", " ", m.group()), text)


def blank_preprocessor(text):
    return re.sub(r"^[ \t]*#(?:[^\n]*\\\n)*[^\n]*", lambda m: re.sub(r"[^\n]", " ", m.group()), text, flags=re.MULTILINE)


SCOPE = re.compile(r"^(?:template\s*<[^{}]*>\s*)?(?:typedef\s+)?(?:inline\s+)?(?:namespace|class|struct|union|enum)\b[^()]*$")
PARAMETERS = re.compile(r"\)(?:\s*(?:const|noexcept|override|final|mutable|try|&|->\s*[\w:<>,\s*&]+|:\s.*))*\s*$", re.DOTALL)
ACCESS = re.compile(r"\s*(?:(?:public|private|protected)\s*:\s*)*")


def functions(text):
    """(first line, last line, head) of each outermost function body; blocks and lambdas inside count with it."""
    code = blank_preprocessor(blank_literals(text))
    stack, head_from, found = [], 0, []
    for at, char in enumerate(code):
        if char == "{":
            start = ACCESS.match(code, head_from, at).end()
            kind = kind_of_brace(code, start, at, any(kind == "function" for kind, _ in stack))
            stack.append((kind, start))
            head_from = head_from if kind == "initialiser" else at + 1
        elif char == "}" and stack:
            kind, start = stack.pop()
            if kind == "function":
                head = " ".join(code[start:code.index("{", start)].split())
                found.append((code.count("\n", 0, start) + 1, code.count("\n", 0, at) + 1, head))
            head_from = head_from if kind == "initialiser" else at + 1
        elif char == ";" and code.count("(", head_from, at) == code.count(")", head_from, at):
            head_from = at + 1
    return found


def kind_of_brace(code, start, at, inside_function):
    """"function", "block" or "initialiser" (such as b_{a} in a constructor's list) for the '{' at `at`."""
    head = code[start:at].strip()
    if not inside_function and re.match(r"[\w>]", code[at - 1] if at else " "):
        return "initialiser"
    is_scope = SCOPE.search(head) is not None
    return "function" if not inside_function and not is_scope and PARAMETERS.search(head) else "block"


def room_of(path):
    parts = path.parts
    if parts[0] == "apps":
        return "apps"
    if parts[0] == "libsolver" and len(parts) > 3:
        return parts[3] if parts[1] == "include" else parts[2] if parts[1] == "src" else None
    if parts[0] == "libsolver" and len(parts) == 4 and parts[1] == "src":
        return parts[2]
    return None


def line_of(text, at):
    return text.count("\n", 0, at) + 1


def check_arrows(path, text):
    room = room_of(path)
    if room is None:
        return
    if room not in ROOMS:
        yield 1, f"'{room}' is not a room of the house"
        return
    for match in re.finditer(r'#include\s*[<"](?:annulet/)?(\w+)/[^>"]+[>"]', text):
        other = match.group(1)
        ours = f"annulet/{other}/" in match.group() or match.group().count('"') == 2
        if not ours:
            continue
        if other not in ROOMS:
            yield line_of(text, match.start()), f"includes from '{other}', which is not a room"
        elif ROOMS.index(other) > ROOMS.index(room):
            yield line_of(text, match.start()), f"room '{room}' must not know room '{other}'"
        elif other != room and match.group().count('"') == 2:
            yield line_of(text, match.start()), f"includes an internal header of room '{other}'"


def check_links(text):
    """Link lists of the rooms: annulet_room(ROOM link...) and target_link_libraries(annulet_ROOM ... annulet_OTHER)."""
    for match in re.finditer(r"\b(?:annulet_room\(\s*|target_link_libraries\(\s*annulet_)(\w+)([^)]*)\)", text):
        room, links = match.group(1), re.findall(r"\bannulet(?:_|::)(\w+)", match.group(2))
        for other in links:
            if room in ROOMS and other in ROOMS and ROOMS.index(other) >= ROOMS.index(room):
                yield line_of(text, match.start()), f"target of room '{room}' links room '{other}'"


def check_forbidden(path, text):
    code = blank_literals(text)
    for match in FORBIDDEN_ANYWHERE.finditer(code):
        yield line_of(code, match.start()), f"'{match.group().strip()}' does not belong here"
    for match in re.finditer(r"\b(TODO|FIXME)\b", text):
        yield line_of(text, match.start()), f"'{match.group()}' does not belong here"
    room = room_of(path)
    if room in ROOMS and ROOMS.index(room) < ROOMS.index("io"):
        for match in FORBIDDEN_BEFORE_IO.finditer(code):
            yield line_of(code, match.start()), f"room '{room}' touches files or the terminal: '{match.group().strip()}'"


def check_functions(text):
    for first, last, head in functions(text):
        length = last - first + 1
        if length > MOST_FUNCTION_LINES:
            yield first, f"function of {length} lines (at most {MOST_FUNCTION_LINES}): {head[:80]}"


def check_citations(text, keys):
    for match in CITATION.finditer(text):
        if match.group(1) not in keys:
            yield line_of(text, match.start()), f"[{match.group(1)}] is not in docs/references.bib"


def sources(root):
    for folder in SOURCE_FOLDERS:
        for path in sorted((root / folder).rglob("*")):
            if path.is_file() and path.suffix in SIZED and "__pycache__" not in path.parts:
                yield path.relative_to(root)


def check_bibliography(text):
    seen = set()
    for match in BIB_ENTRY.finditer(text):
        if match.group(1) in seen:
            yield line_of(text, match.start()), f"{match.group(1)} stands twice"
        seen.add(match.group(1))


def check_tree(root):
    """Yields (path, line, text, is_error)."""
    bibliography = root / "docs" / "references.bib"
    bib_text = bibliography.read_text(encoding="utf-8") if bibliography.exists() else ""
    keys = set(BIB_ENTRY.findall(bib_text))
    for line, finding in check_bibliography(bib_text):
        yield bibliography.relative_to(root), line, finding, True
    for path in sources(root):
        text = (root / path).read_text(encoding="utf-8")
        lines = text.count("\n")
        if lines > WARN_LINES:
            yield path, lines, f"{lines} lines (aim: {WARN_LINES}, at most {MOST_LINES})", lines > MOST_LINES
        findings = []
        if path.suffix in CODE:
            findings += list(check_arrows(path, text)) + list(check_forbidden(path, text))
            findings += list(check_functions(text)) + list(check_citations(text, keys))
        if path.name == "CMakeLists.txt":
            findings += list(check_links(text))
        for line, finding in findings:
            yield path, line, finding, True


def main():
    root = pathlib.Path(sys.argv[1]).resolve()
    files = list(sources(root))
    if len([path for path in files if path.suffix in CODE]) < 10:
        print(f"only {len(files)} source files under {root}: is this the right folder?")
        return 1
    findings = list(check_tree(root))
    for path, line, finding, is_error in findings:
        print(f"{path}:{line}: {'error' if is_error else 'warning'}: {finding}")
    errors = sum(is_error for *_, is_error in findings)
    print(f"{len(files)} files checked, {errors} errors, {len(findings) - errors} warnings")
    return 1 if errors else 0


if __name__ == "__main__":
    sys.exit(main())
