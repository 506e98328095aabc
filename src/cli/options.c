#include "cli/options.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "core/molecule/molecule.h"

typedef struct {
  char letter;
  const char *name, *value; /* value NULL: a switch */
  const char *help;
} Option;

static const Option option[] = {
    {'f', "--format", "text|tsv|json", "how to print (default text; json: one object a line)"},
    {'s', "--solvent", "dmso|water|thf", "solvent of the pKa values (default dmso)"},
    {'a', "--atom", "N", "position of the acidic atom in the input (default: most acidic C-H)"},
    {'e', "--equiv", "E", "equivalents of base (default 1.05)"},
    {'c', "--conc", "C", "substrate, mol/L (default 0.1)"},
    {'t', "--temperature", "T", "degrees Celsius; pK values hold at 25 and are not carried over"},
    {'h', "--water", "E", "equivalents of water per substrate (default 0)"},
    {'v', "--view", "NAME", "substrates, forms, bases or curve"},
    {'o', "--out", "FILE", "file to write: .png, .svg or .pdf; a report .pdf or .html"},
    {'w', "--width-mm", "W", "width of the picture in mm (default: natural size)"},
    {'d', "--dpi", "D", "resolution of a .png (default 150)"},
    {'m', "--theme", "NAME", "light, dark, print or projector (default print)"},
    {'l', "--lab", "FILE.tsv", "own measured values that join the table (may be given repeatedly)"},
    {'g', "--fold", "compound|cluster", "what is left out together (default compound)"},
    {'k', "--ranking", NULL, "how many pairs of acids stand in the right order"},
    {'F', "--families", NULL, "the same for every family of compounds"},
    {'P', "--pairs", NULL, "pairs that stand in the wrong order"},
    {'R', "--rows", NULL, "every row of the table, largest standardised residual first"},
    {'x', "--explain", NULL, "why each value is what it is: contributions that add up, precedents"},
    {'b', "--base", "B", "base by id, name or usual spelling (may be given repeatedly)"},
    {'M', "--mmol", "M", "amount of substrate, mmol"},
    {'G', "--grams", "G", "mass of substrate, g (instead of --mmol)"},
    {'T', "--titre", "X", "strength of the solution at hand, mol/L"},
    {'D', "--dispersion", "P", "base in the dispersion or solid at hand, % by mass"},
    {'p', "--plot", "FILE", "write the reliability picture: ends in .png, .svg or .pdf"},
};

static int wrong_use (const EnlVerb *verb, const char *format, ...) G_GNUC_PRINTF (2, 3);

static int
wrong_use (const EnlVerb *verb, const char *format, ...)
{
  va_list args;

  va_start (args, format);
  g_autofree char *text = g_strdup_vprintf (format, args);
  va_end (args);
  fprintf (stderr, "enolith-cli %s: %s; see 'enolith-cli %s --help'\n", verb->name, text,
           verb->name);
  return 2;
}

static void
print_help (const EnlVerb *verb)
{
  printf ("enolith-cli %s [options]%s\n%s\n\n", verb->name, verb->needs_input ? " INPUT..." : "",
          verb->summary);
  for (size_t i = 0; i < ENL_COUNT (option); i++)
    if (strchr (verb->options, option[i].letter)) {
      g_autofree char *left =
          g_strjoin (option[i].value ? " " : NULL, option[i].name, option[i].value, NULL);
      printf ("  %-26s %s\n", left, option[i].help);
    }
  printf ("  %-26s %s\n", "--help", "this text");
  if (verb->needs_input)
    printf (
        "\nINPUT is a SMILES, an InChI, a name, a line of groups, a file (.smi .smiles .mol .sdf "
        ".enolith)\nor - for standard input: one structure a line, optional name behind it.\n");
}

static bool
take_double (const char *text, double *out)
{
  char *end;

  *out = g_ascii_strtod (text, &end);
  return end != text && !*end && isfinite (*out);
}

static bool
take_format (const char *text, EnlFormat *out)
{
  static const char *const word[] = {"text", "tsv", "json"};

  for (int i = 0; i < 3; i++)
    if (strcmp (text, word[i]) == 0) {
      *out = (EnlFormat)i;
      return true;
    }
  return false;
}

static bool
take_atom (const char *text, uint32_t *out)
{
  guint64 value;

  if (!g_ascii_string_to_unsigned (text, 10, 1, ENL_MAX_ATOMS, &value, NULL))
    return false;
  *out = (uint32_t)value;
  return true;
}

static bool
add_word (const char *word, char ***list)
{
  guint n = *list ? g_strv_length (*list) : 0;

  *list = g_renew (char *, *list, n + 2);
  (*list)[n] = g_strdup (word);
  (*list)[n + 1] = NULL;
  return word[0] != '\0';
}

/* The scale of weigh. False for a letter that is none of it or a text that is no number. */
static bool
take_scale (char letter, const char *text, EnlWeighScale *out)
{
  const struct {
    char letter;
    double *place;
  } number[] = {
      {'M', &out->mmol}, {'G', &out->grams}, {'T', &out->titre}, {'D', &out->mass_percent}};

  for (size_t i = 0; i < ENL_COUNT (number); i++)
    if (number[i].letter == letter)
      return take_double (text, number[i].place);
  return false;
}

static bool
take_value (char letter, const char *text, EnlOptions *out)
{
  switch (letter) {
  case 'f':
    return take_format (text, &out->format);
  case 's':
    return enl_solvent_parse (text, &out->conditions.solvent);
  case 'a':
    return take_atom (text, &out->atom);
  case 'e':
    return take_double (text, &out->conditions.equivalents) &&
           take_double (text, &out->scale.equivalents);
  case 'c':
    return take_double (text, &out->conditions.concentration);
  case 't':
    return take_double (text, &out->conditions.temperature);
  case 'h':
    return take_double (text, &out->conditions.water);
  case 'w':
    return take_double (text, &out->width_mm) && out->width_mm > 0.0;
  case 'd':
    return take_double (text, &out->dpi) && out->dpi > 0.0;
  case 'p':
    out->plot = text;
    return true;
  case 'v':
    out->view = text;
    return true;
  case 'o':
    out->out = text;
    return true;
  case 'l':
    return add_word (text, &out->lab);
  case 'b':
    return add_word (text, &out->base);
  case 'M':
  case 'G':
  case 'T':
  case 'D':
    return take_scale (letter, text, &out->scale);
  case 'm':
    out->theme = text;
    return true;
  default:
    out->fold = text;
    return true;
  }
}

static void
take_switch (char letter, EnlOptions *out)
{
  static const char listing[] = {[ENL_LISTING_RANKING] = 'k',
                                 [ENL_LISTING_FAMILIES] = 'F',
                                 [ENL_LISTING_PAIRS] = 'P',
                                 [ENL_LISTING_ROWS] = 'R'};

  for (size_t i = 0; i < ENL_COUNT (listing); i++)
    if (listing[i] == letter)
      out->listing = (EnlListing)i;
}

static const Option *
find_option (const EnlVerb *verb, const char *name, size_t length)
{
  for (size_t i = 0; i < ENL_COUNT (option); i++)
    if (strlen (option[i].name) == length && strncmp (option[i].name, name, length) == 0)
      return strchr (verb->options, option[i].letter) ? &option[i] : NULL;
  return NULL;
}

/* One option with its value, "--name value" or "--name=value"; moves *index to its last word. */
static int
parse_option (const EnlVerb *verb, int argc, char **argv, int *index, EnlOptions *out)
{
  const char *word = argv[*index], *equals = strchr (word, '=');
  size_t length = equals ? (size_t)(equals - word) : strlen (word);
  const Option *found = find_option (verb, word, length);

  if (!found)
    return wrong_use (verb, "no option '%.*s'", (int)length, word);
  if (!found->value && equals)
    return wrong_use (verb, "%s takes no value", found->name);
  if (found->letter == 'x') {
    out->explain = true;
    return -1;
  }
  if (!found->value) {
    if (out->listing != ENL_LISTING_USUAL)
      return wrong_use (verb, "one list at a time: %s is one too many", found->name);
    take_switch (found->letter, out);
    return -1;
  }
  if (!equals && *index + 1 >= argc)
    return wrong_use (verb, "%s needs a value (%s)", found->name, found->value);
  const char *value = equals ? equals + 1 : argv[++*index];
  if (!take_value (found->letter, value, out))
    return wrong_use (verb,
                      strchr (found->value, '|') ? "%s '%s' is not one of %s"
                                                 : "%s '%s' is no usable value for %s",
                      found->name, value, found->value);
  return -1;
}

int
enl_options_parse (const EnlVerb *verb, int argc, char **argv, EnlOptions *out)
{
  g_autoptr (GPtrArray) input = g_ptr_array_new_with_free_func (g_free);
  bool only_inputs = false;
  EnlError err;

  *out = (EnlOptions){.conditions = enl_conditions_default (),
                      .scale = enl_weigh_scale_none (),
                      .dpi = 150.0,
                      .theme = "print",
                      .fold = "compound"};
  for (int i = 0; i < argc; i++) {
    if (!only_inputs && strcmp (argv[i], "--help") == 0) {
      print_help (verb);
      return 0;
    }
    if (!only_inputs && strcmp (argv[i], "--") == 0) {
      only_inputs = true;
    } else if (!only_inputs && g_str_has_prefix (argv[i], "--")) {
      int code = parse_option (verb, argc, argv, &i, out);
      if (code >= 0)
        return code;
    } else {
      g_ptr_array_add (input, g_strdup (argv[i]));
    }
  }
  if (verb->needs_input && input->len == 0)
    return wrong_use (verb, "no INPUT given");
  if (!verb->needs_input && input->len > 0)
    return wrong_use (verb, "takes no INPUT");
  if (enl_conditions_check (&out->conditions, &err) != ENL_OK)
    return wrong_use (verb, "%s: %s", err.text, err.advice);
  g_ptr_array_add (input, NULL);
  out->input = g_strdupv ((char **)input->pdata);
  return -1;
}

void
enl_options_clear (EnlOptions *options)
{
  g_strfreev (options->input);
  options->input = NULL;
  g_strfreev (options->lab);
  options->lab = NULL;
  g_strfreev (options->base);
  options->base = NULL;
}
