#include "core/bases/trigger.h"

#include <math.h>
#include <string.h>

#include <glib.h>

typedef enum { OP_FLAG, OP_WORD, OP_RANGE, OP_NOT, OP_AND, OP_OR } Op;

/* A node of the parsed condition. Ranges carry which ends belong to them. */
struct EnlTrigger {
  Op op;
  size_t fact;
  double low, high;
  bool open_low, open_high; /* the end itself does not belong to the range */
  char **word;              /* NULL-terminated */
  EnlTrigger *left, *right; /* operands; OP_NOT has left only */
};

/* Nesting that no sensible rule needs; keeps a damaged table from exhausting the stack. */
#define MAX_DEPTH 32

typedef struct {
  const char *text;
  size_t size, at;
  size_t token, token_size; /* present token; size 0 at the end */
  unsigned depth;
  EnlError *err;
} Parser;

static EnlTrigger *parse_trigger (Parser *p);

/* ---- tokens ---- */

static bool
is_word_byte (char c)
{
  return g_ascii_isalnum (c) || c == '_' || c == '/' || c == '-' || c == '.';
}

static bool
starts_range (const Parser *p, size_t at)
{
  return at + 1 < p->size && p->text[at] == '.' && p->text[at + 1] == '.';
}

static void
next_token (Parser *p)
{
  while (p->at < p->size && g_ascii_isspace (p->text[p->at]))
    p->at++;
  p->token = p->at;
  if (p->at < p->size) {
    char c = p->text[p->at];
    if (starts_range (p, p->at))
      p->at += 2;
    else if (is_word_byte (c))
      while (p->at < p->size && is_word_byte (p->text[p->at]) && !starts_range (p, p->at))
        p->at++;
    else
      p->at += (c == '<' || c == '>') && p->at + 1 < p->size && p->text[p->at + 1] == '=' ? 2 : 1;
  }
  p->token_size = p->at - p->token;
}

static bool
token_is (const Parser *p, const char *word)
{
  return p->token_size == strlen (word) && strncmp (p->text + p->token, word, p->token_size) == 0;
}

static bool
accept (Parser *p, const char *word)
{
  if (!token_is (p, word))
    return false;
  next_token (p);
  return true;
}

static EnlTrigger *
fault (Parser *p, const char *expected)
{
  g_autofree char *found =
      p->token_size ? g_strdup_printf ("'%.*s'", (int)MIN (p->token_size, 60), p->text + p->token)
                    : g_strdup ("the end");

  enl_error_set (p->err, ENL_ERROR_SYNTAX, "correct the trigger of this rule",
                 "expected %s, found %s", expected, found);
  enl_error_locate (p->err, p->text, p->size, p->token, MAX (p->token_size, 1));
  return NULL;
}

/* ---- grammar ---- */

static EnlTrigger *
join (Op op, EnlTrigger *left, EnlTrigger *right)
{
  EnlTrigger *node = g_new0 (EnlTrigger, 1);

  node->op = op;
  node->left = left;
  node->right = right;
  return node;
}

static bool
take_number (Parser *p, double *out)
{
  g_autofree char *text = g_strndup (p->text + p->token, p->token_size);
  char *end;

  *out = g_ascii_strtod (text, &end);
  if (end == text || *end || !isfinite (*out)) {
    fault (p, "a number");
    return false;
  }
  next_token (p);
  return true;
}

static EnlTrigger *
parse_words (Parser *p, EnlTrigger *node)
{
  g_autoptr (GStrvBuilder) words = g_strv_builder_new ();

  do {
    if (p->token_size == 0 || !is_word_byte (p->text[p->token])) {
      enl_trigger_free (node);
      return fault (p, "a word");
    }
    g_autofree char *word = g_strndup (p->text + p->token, p->token_size);
    g_strv_builder_add (words, word);
    next_token (p);
  } while (accept (p, ","));
  node->op = OP_WORD;
  node->word = g_strv_builder_end (words);
  return node;
}

static EnlTrigger *
parse_range (Parser *p, EnlTrigger *node)
{
  bool ok = true;

  node->op = OP_RANGE;
  node->low = -INFINITY;
  node->high = INFINITY;
  if (accept (p, "in")) {
    ok = take_number (p, &node->low);
    if (ok && !accept (p, "..")) {
      fault (p, "'..'");
      ok = false;
    }
    ok = ok && take_number (p, &node->high);
  } else if (token_is (p, "<") || token_is (p, "<=")) {
    node->open_high = p->token_size == 1;
    next_token (p);
    ok = take_number (p, &node->high);
  } else if (token_is (p, ">") || token_is (p, ">=")) {
    node->open_low = p->token_size == 1;
    next_token (p);
    ok = take_number (p, &node->low);
  } else {
    fault (p, "'<', '<=', '>', '>=' or 'in' after a number");
    ok = false;
  }
  if (ok)
    return node;
  enl_trigger_free (node);
  return NULL;
}

static EnlTrigger *
parse_test (Parser *p)
{
  int fact = enl_fact_find (p->text + p->token, p->token_size);

  if (fact < 0)
    return fault (p, "the name of a fact");
  EnlTrigger *node = g_new0 (EnlTrigger, 1);
  node->op = OP_FLAG;
  node->fact = (size_t)fact;
  next_token (p);
  switch (enl_fact_kind (node->fact)) {
  case ENL_FACT_NUMBER:
    return parse_range (p, node);
  case ENL_FACT_WORD:
    if (accept (p, "is"))
      return parse_words (p, node);
    enl_trigger_free (node);
    return fault (p, "'is' after a word fact");
  default:
    return node;
  }
}

static EnlTrigger *
parse_inside (Parser *p)
{
  EnlTrigger *inside = parse_trigger (p);

  if (!inside || accept (p, ")"))
    return inside;
  enl_trigger_free (inside);
  return fault (p, "')'");
}

static EnlTrigger *
parse_term (Parser *p)
{
  EnlTrigger *node;

  if (++p->depth > MAX_DEPTH) {
    p->depth--;
    return fault (p, "fewer brackets and 'not'");
  }
  if (accept (p, "not")) {
    node = parse_term (p);
    node = node ? join (OP_NOT, node, NULL) : NULL;
  } else {
    node = accept (p, "(") ? parse_inside (p) : parse_test (p);
  }
  p->depth--;
  return node;
}

static EnlTrigger *
parse_chain (Parser *p, const char *word, Op op, EnlTrigger *(*part) (Parser *))
{
  EnlTrigger *left = part (p);

  while (left && accept (p, word)) {
    EnlTrigger *right = part (p);
    if (!right) {
      enl_trigger_free (left);
      return NULL;
    }
    left = join (op, left, right);
  }
  return left;
}

static EnlTrigger *
parse_clause (Parser *p)
{
  return parse_chain (p, "and", OP_AND, parse_term);
}

static EnlTrigger *
parse_trigger (Parser *p)
{
  return parse_chain (p, "or", OP_OR, parse_clause);
}

EnlStatus
enl_trigger_parse (const char *text, size_t size, EnlTrigger **out, EnlError *err)
{
  EnlError unused;
  Parser p = {.text = text, .size = size, .err = err ? err : &unused};

  next_token (&p);
  *out = parse_trigger (&p);
  if (*out && p.token_size) {
    g_clear_pointer (out, enl_trigger_free);
    fault (&p, "'and', 'or' or the end");
  }
  return *out ? ENL_OK : ENL_ERROR_SYNTAX;
}

void
enl_trigger_free (EnlTrigger *trigger)
{
  if (!trigger)
    return;
  enl_trigger_free (trigger->left);
  enl_trigger_free (trigger->right);
  g_strfreev (trigger->word);
  g_free (trigger);
}

/* ---- asking ---- */

static bool
in_range (const EnlTrigger *t, double x)
{
  if (isnan (x))
    return false;
  return (t->open_low ? x > t->low : x >= t->low) && (t->open_high ? x < t->high : x <= t->high);
}

bool
enl_trigger_holds (const EnlTrigger *t, const EnlFactValue *value)
{
  const EnlFactValue *v = &value[t->fact];

  switch (t->op) {
  case OP_FLAG:
    return enl_fact_kind (t->fact) == ENL_FACT_PHRASE ? v->phrase[0] != '\0' : v->flag;
  case OP_WORD:
    return v->word && g_strv_contains ((const char *const *)t->word, v->word);
  case OP_RANGE:
    return in_range (t, v->number);
  case OP_NOT:
    return !enl_trigger_holds (t->left, value);
  case OP_AND:
    return enl_trigger_holds (t->left, value) && enl_trigger_holds (t->right, value);
  case OP_OR:
    return enl_trigger_holds (t->left, value) || enl_trigger_holds (t->right, value);
  }
  return false;
}
