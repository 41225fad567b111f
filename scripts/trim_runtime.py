"""Makes the standard library and numpy smaller and quicker to import. Runs inside Pyodide.

Left out is what nothing in a browser's worker can use (mail, servers, development tools) and the
parts of numpy that the package does not import; the rest is compiled to byte code, which spares
every start the compiling. Tests ask every topic in the browser: what is missed there belongs back
in.
"""

import importlib.util
import marshal
import zipfile

# Python's own, by the first part of the name.
STDLIB_LEFT_OUT = set("""
    __hello__ __phello__ _aix_support _bootsubprocess _markupbase _pydecimal _pyio aifc antigravity
    bdb cProfile cgi cgitb chunk cmd code codeop compileall configparser crypt curses dbm distutils
    doctest ensurepip filecmp fileinput ftplib getopt getpass html http idlelib imaplib imghdr
    lib2to3 mailbox mailcap mimetypes modulefinder msilib multiprocessing netrc nntplib nturl2path
    optparse pdb pickletools pipes plistlib poplib profile pstats pty py_compile pyclbr pydoc
    pydoc_data rlcompleter runpy sched shelve smtplib sndhdr socketserver sqlite3 sunau symtable
    tabnanny telnetlib test this timeit tkinter tomllib trace tracemalloc tty turtle turtledemo
    unittest uu venv wave webbrowser wsgiref xdrlib xml xmlrpc zipapp zoneinfo
""".split())  # noqa: SIM905
ENCODINGS_KEPT = {"__init__", "aliases", "ascii", "cp437", "idna", "latin_1", "punycode",
                  "raw_unicode_escape", "unicode_escape", "utf_16", "utf_16_le", "utf_32", "utf_8",
                  "utf_8_sig"}

# numpy's, by path. What it loads lazily and the package never asks for, tests, and type stubs.
NUMPY_LEFT_OUT = (
    "numpy/_pyinstaller/", "numpy/doc/", "numpy/f2py/", "numpy/fft/", "numpy/ma/",
    "numpy/polynomial/", "numpy/random/", "numpy/testing/", "numpy/tests/",
    "numpy/linalg/lapack_lite", "numpy/_core/_rational_tests", "numpy/_core/_simd",
    "numpy/_core/_struct_ufunc_tests", "numpy/_core/_umath_tests",
    "numpy/_core/_operand_flag_tests",
)


# numpy copies the docstrings of this one's functions to others, and fails without them.
WITH_DOCSTRINGS = {"numpy/_core/multiarray.py"}


def kept_of_stdlib(name: str) -> bool:
    first, _, rest = name.partition("/")
    if first == "encodings":
        return rest.removesuffix(".py") in ENCODINGS_KEPT
    return first.removesuffix(".py") not in STDLIB_LEFT_OUT


def kept_of_numpy(name: str) -> bool:
    return not name.startswith(NUMPY_LEFT_OUT) and "/tests/" not in name \
        and not name.endswith((".pyi", ".pxd", ".h", ".c", ".a", ".ini"))


def compiled(source: bytes, name: str, root: str) -> bytes:
    """Byte code, marked as never to be compared with a source; without docstrings and asserts."""
    code = compile(source, f"{root}/{name}", "exec", dont_inherit=True,
                   optimize=0 if name in WITH_DOCSTRINGS else 2)
    return importlib.util.MAGIC_NUMBER + (1).to_bytes(4, "little") + bytes(8) + marshal.dumps(code)


def trim(source: str, target: str, kept, root: str) -> None:
    with zipfile.ZipFile(source) as old, zipfile.ZipFile(target, "w") as new:
        for name in sorted(old.namelist()):
            if name.endswith("/") or not kept(name):
                continue
            content = old.read(name)
            if name.endswith(".py"):
                content, name = compiled(content, name, root), name + "c"
            # A fixed date: the same input gives the same bytes.
            entry = zipfile.ZipInfo(name, (2020, 1, 1, 0, 0, 0))
            entry.compress_type = zipfile.ZIP_DEFLATED
            new.writestr(entry, content, compresslevel=9)
