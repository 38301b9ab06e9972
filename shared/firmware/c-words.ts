// Names that an array may not have, because a language, its library or a compiler has taken them.

import { pythonKeywords, rustKeywords } from './other-words.ts';

const wordsIn = (text: string) => text.trim().split(/\s+/);

/** ISO/IEC 9899:1999, :2011, :2018 §6.4.1, C23's additions, ISO/IEC 14882:2020 [lex.key], and GNU's `asm`, `typeof`. */
export const keywords: ReadonlySet<string> = new Set(
  wordsIn(`
    auto break case char const continue default do double else enum extern float for goto if inline int long
    register restrict return short signed sizeof static struct switch typedef union unsigned void volatile while
    alignas alignof bool constexpr false nullptr static_assert thread_local true typeof typeof_unqual
    and and_eq asm bitand bitor catch char8_t char16_t char32_t class co_await co_return co_yield compl concept
    const_cast consteval constinit decltype delete dynamic_cast explicit export friend mutable namespace new
    noexcept not not_eq operator or or_eq private protected public reinterpret_cast requires static_cast template
    this throw try typeid typename using virtual wchar_t xor xor_eq
  `),
);

/** Functions of <math.h> and <complex.h> with their float and long double kin (C17 §7.3, §7.12), and GNU's of old. */
const mathFunctions = new Set(
  wordsIn(`
    acos acosh asin asinh atan atan2 atanh cabs cacos cacosh carg casin casinh catan catanh cbrt ccos ccosh ceil cexp
    cimag clog clog10 conj copysign cos cosh cpow cproj creal csin csinh csqrt ctan ctanh drem erf erfc exp exp10 exp2
    expm1 fabs fdim finite floor fma fmax fmin fmod frexp gamma hypot ilogb isinf isnan j0 j1 jn ldexp lgamma llrint
    llround log log10 log1p log2 logb lrint lround modf nan nearbyint nextafter nexttoward pow pow10 remainder remquo
    rint round roundeven scalb scalbln scalbn significand sin sincos sinh sqrt tan tanh tgamma trunc y0 y1 yn
  `),
);
const mathSuffix = /(?:f|l|[fd](?:16|32|64|128)x?|_r|f_r|l_r)$/;

/** Everything else with external linkage in the library (C17 annex B), and what GCC treats as if it were. */
const libraryNames = new Set(
  wordsIn(`
    abort abs aligned_alloc asctime assert at_quick_exit atexit atof atoi atol atoll bsearch btowc c16rtomb c32rtomb
    call_once calloc clearerr clock cnd_broadcast cnd_destroy cnd_init cnd_signal cnd_timedwait cnd_wait ctime
    difftime div errno exit fclose feclearexcept fegetenv fegetexceptflag fegetround feholdexcept feof feraiseexcept
    ferror fesetenv fesetexceptflag fesetround fetestexcept feupdateenv fflush fgetc fgetpos fgets fgetwc fgetws
    fopen fpclassify fprintf fputc fputs fputwc fputws fread free freopen fscanf fseek fsetpos ftell fwide fwprintf
    fwrite fwscanf getc getchar getenv gets getwc getwchar gmtime imaxabs imaxdiv isalnum isalpha isblank iscntrl
    isdigit isfinite isgraph isgreater isgreaterequal isless islessequal islessgreater islower isnormal isprint
    ispunct isspace isunordered isupper iswalnum iswalpha iswblank iswcntrl iswctype iswdigit iswgraph iswlower
    iswprint iswpunct iswspace iswupper iswxdigit isxdigit kill_dependency labs ldiv llabs lldiv localeconv localtime
    longjmp main malloc mblen mbrlen mbrtoc16 mbrtoc32 mbrtowc mbsinit mbsrtowcs mbstowcs mbtowc memchr memcmp memcpy
    memmove memset mktime mtx_destroy mtx_init mtx_lock mtx_timedlock mtx_trylock mtx_unlock offsetof perror printf
    putc putchar puts putwc putwchar qsort quick_exit raise rand realloc remove rename rewind scanf setbuf setjmp
    setlocale setvbuf signal signbit snprintf sprintf srand sscanf stderr stdin stdout strcat strchr strcmp strcoll
    strcpy strcspn strerror strftime strlen strncat strncmp strncpy strpbrk strrchr strspn strstr strtod strtof
    strtoimax strtok strtol strtold strtoll strtoul strtoull strtoumax strxfrm swprintf swscanf system thrd_create
    thrd_current thrd_detach thrd_equal thrd_exit thrd_join thrd_sleep thrd_yield time timespec_get tmpfile tmpnam
    tolower toupper towctrans towlower towupper tss_create tss_delete tss_get tss_set ungetc ungetwc va_arg va_copy
    va_end va_start vfprintf vfscanf vfwprintf vfwscanf vprintf vscanf vsnprintf vsprintf vsscanf vswprintf vswscanf
    vwprintf vwscanf wcrtomb wcscat wcschr wcscmp wcscoll wcscpy wcscspn wcsftime wcslen wcsncat wcsncmp wcsncpy
    wcspbrk wcsrchr wcsrtombs wcsspn wcsstr wcstod wcstof wcstoimax wcstok wcstol wcstold wcstoll wcstombs wcstoul
    wcstoull wcstoumax wcsxfrm wctob wctomb wctrans wctype wmemchr wmemcmp wmemcpy wmemmove wmemset wprintf wscanf
    alloca bcmp bcopy bzero dcgettext dgettext execl execle execlp execv execve execvp ffs ffsl ffsll fork
    fprintf_unlocked fputc_unlocked fputs_unlocked fwrite_unlocked gettext index isascii mempcpy posix_memalign
    printf_unlocked putc_unlocked putchar_unlocked puts_unlocked rindex stpcpy stpncpy strcasecmp strdup strfmon
    strncasecmp strndup strnlen toascii
    ptrdiff_t size_t max_align_t nullptr_t
    NULL EOF BUFSIZ RAND_MAX SIZE_MAX AVR linux unix i386
  `),
);

/** Types and limits of <stdint.h>, those to come included (C17 §7.20, §7.31.10). */
const stdintName =
  /^(?:u?int\w*_t|U?INT\w*_(?:MAX|MIN|C|WIDTH)|(?:PTRDIFF|SIG_ATOMIC|SIZE|WCHAR|WINT)_(?:MAX|MIN|WIDTH))$/;

/** Types, functions and macros of avr-libc's <avr/pgmspace.h> and <avr/sfr_defs.h>. */
const avrLibcName =
  /^(?:pgm_read_(?:byte|word|dword|float|ptr)(?:_near|_far)?|pgm_get_far_address|prog_(?:void|u?char|u?int\d+_t)|\w+_P|(?:loop_until_)?bit_is_(?:set|clear))$/;

/** Reserved names of devices on Windows file systems: `aux.h` cannot be stored there. */
const deviceName = /^(?:aux|con|nul|prn|com\d|lpt\d)$/i;

/** Why a well-formed identifier is not free in some target's language, said as what would be allowed; or nothing. */
export function takenBy(name: string): string | undefined {
  if (keywords.has(name)) return 'a name that is no keyword of C or C++';
  if (rustKeywords.has(name)) return 'a name that is no keyword of Rust';
  if (pythonKeywords.has(name)) return 'a name that is no keyword of Python';
  if (stdintName.test(name)) return 'a name that <stdint.h> does not use';
  const isMath = mathFunctions.has(name) || mathFunctions.has(name.replace(mathSuffix, ''));
  if (libraryNames.has(name) || isMath || avrLibcName.test(name)) {
    return 'a name that the C library and compilers do not use';
  }
  if (deviceName.test(name)) return 'a name that every file system can store';
  return undefined;
}
