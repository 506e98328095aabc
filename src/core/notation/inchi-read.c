/* InChI to structure, through a child process (inchi-worker.c). */
#include "core/notation/inchi.h"

#include <errno.h>
#include <poll.h>
#include <signal.h>
#include <string.h>
#include <sys/mman.h>
#include <sys/wait.h>
#include <unistd.h>

#include "core/notation/inchi-answer.h"

#define LONGEST_INCHI  (32 * 1024)
#define LARGEST_ANSWER (1024 * 1024)
#define WAIT_SECONDS   8           /* more than the child's own 5 s of processor time */
#define CHILD_MARK     "ENL_INCHI" /* set in the child, so that no child starts children */

/* ---- the text, before any library sees it ---- */

static EnlStatus
text_fault (const char *text, size_t size, size_t at, size_t length, EnlError *err, EnlStatus code,
            const char *fault, const char *advice)
{
  enl_error_set (err, code, advice, "%s", fault);
  enl_error_locate (err, text, size, at, length);
  return code;
}

static EnlStatus
check_prefix (const char *text, size_t size, EnlError *err)
{
  static const char *const prefix[] = {"InChI=1S/", "InChI=1/"};
  size_t same = 0;

  for (size_t i = 0; i < ENL_COUNT (prefix); i++)
    if (size >= strlen (prefix[i]) && strncmp (text, prefix[i], strlen (prefix[i])) == 0)
      return ENL_OK;
  while (same < MIN (size, strlen (prefix[0])) && text[same] == prefix[0][same])
    same++;
  return text_fault (text, size, same, 1, err, ENL_ERROR_SYNTAX,
                     "an InChI starts with 'InChI=1S/' or 'InChI=1/'",
                     "copy the whole InChI, capitals included");
}

static EnlStatus
check_text (const char *text, size_t size, EnlError *err)
{
  EnlStatus status = check_prefix (text, size, err);

  if (status != ENL_OK)
    return status;
  if (size > LONGEST_INCHI)
    return text_fault (text, size, LONGEST_INCHI, 1, err, ENL_ERROR_LIMIT,
                       "an InChI of more than 32768 characters is not read",
                       "give the structure as SMILES or molfile");
  for (size_t i = 0; i < size; i++)
    if (!g_ascii_isalnum (text[i]) && !strchr ("/()-+,.;=?*!_", text[i] ? text[i] : ' '))
      return text_fault (text, size, i, 1, err, ENL_ERROR_SYNTAX,
                         "this character has no place in an InChI",
                         "delete it; an InChI has no spaces");
  if (text[size - 1] == '/')
    return text_fault (text, size, size - 1, 1, err, ENL_ERROR_SYNTAX,
                       "the InChI ends where a layer should follow", "copy the whole InChI");
  return ENL_OK;
}

/* ---- the child ---- */

typedef struct {
  GPid pid;
  int out; /* read end of its standard output */
} Child;

/* The text goes in as a file in memory: no pipe that could block or break. */
static int
file_of_text (const char *text, size_t size)
{
  int file = memfd_create ("inchi", MFD_CLOEXEC);

  if (file < 0)
    return -1;
  for (size_t done = 0; done < size;) {
    ssize_t n = write (file, text + done, size - done);
    if (n < 0 && errno == EINTR)
      continue;
    if (n <= 0) {
      close (file);
      return -1;
    }
    done += (size_t)n;
  }
  lseek (file, 0, SEEK_SET);
  return file;
}

static EnlStatus
start_child (int input, Child *child, EnlError *err)
{
  char *argv[] = {(char *)"/proc/self/exe", (char *)ENL_INCHI_WORKER, NULL};
  g_autoptr (GError) error = NULL;
  g_auto (GStrv) environment = g_get_environ ();

  if (g_environ_getenv (environment, CHILD_MARK))
    return enl_error_set (err, ENL_ERROR_IO, "use the program itself",
                          "this program cannot read InChI");
  environment = g_environ_setenv (environment, CHILD_MARK, "1", TRUE);
  if (!g_spawn_async_with_pipes_and_fds (
          NULL, (const char *const *)argv, (const char *const *)environment,
          G_SPAWN_DO_NOT_REAP_CHILD | G_SPAWN_STDERR_TO_DEV_NULL, NULL, NULL, input, -1, -1, NULL,
          NULL, 0, &child->pid, NULL, &child->out, NULL, &error))
    return enl_error_set (err, ENL_ERROR_IO, "try again, or give the structure as SMILES",
                          "the reader of InChI did not start (%.100s)", error->message);
  return ENL_OK;
}

/* Waits for output until the deadline; false when there is none in time. */
static bool
wait_for_output (int file, gint64 deadline)
{
  for (;;) {
    gint64 left = (deadline - g_get_monotonic_time ()) / 1000;
    struct pollfd want = {.fd = file, .events = POLLIN};
    if (left <= 0)
      return false;
    int ready = poll (&want, 1, (int)left);
    if (ready > 0)
      return true;
    if (ready == 0 || errno != EINTR)
      return false;
  }
}

static bool
collect (Child *child, GString *answer)
{
  gint64 deadline = g_get_monotonic_time () + WAIT_SECONDS * G_USEC_PER_SEC;
  char buffer[4096];

  while (wait_for_output (child->out, deadline)) {
    ssize_t n = read (child->out, buffer, sizeof buffer);
    if (n < 0 && errno == EINTR)
      continue;
    if (n <= 0)
      return n == 0;
    if (answer->len > LARGEST_ANSWER)
      return false;
    g_string_append_len (answer, buffer, n);
  }
  return false;
}

/* True when the child closed its output and ended well. It is ended and reaped in any case. */
static bool
finish_child (Child *child, bool complete)
{
  int how = 0;

  if (!complete)
    kill (child->pid, SIGKILL);
  close (child->out);
  while (waitpid (child->pid, &how, 0) < 0)
    if (errno != EINTR)
      return false;
  g_spawn_close_pid (child->pid);
  return complete && WIFEXITED (how) && WEXITSTATUS (how) == 0;
}

static EnlStatus
ask_child (const char *text, size_t size, GString *answer, EnlError *err)
{
  Child child = {0};
  int input = file_of_text (text, size);

  if (input < 0)
    return enl_error_set (err, ENL_ERROR_IO, "free some memory and try again",
                          "the reader of InChI could not be given the text");
  EnlStatus status = start_child (input, &child, err);
  close (input);
  if (status != ENL_OK)
    return status;
  bool complete = collect (&child, answer);
  if (!finish_child (&child, complete))
    return enl_error_set (err, ENL_ERROR_SYNTAX, "copy the whole InChI again, or give a SMILES",
                          "not a readable InChI (its reader broke off)");
  return ENL_OK;
}

EnlStatus
enl_inchi_parse (const char *text, size_t size, EnlMolecule **out, EnlError *err)
{
  g_autoptr (GString) answer = g_string_new (NULL);

  *out = NULL;
  if (size == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "give an InChI", "nothing to read");
  EnlStatus status = check_text (text, size, err);
  if (status != ENL_OK)
    return status;
  status = ask_child (text, size, answer, err);
  if (status == ENL_OK)
    status = enl_inchi_answer_parse (answer->str, answer->len, out, err);
  if (status != ENL_OK)
    enl_error_locate (err, text, size, 0, size);
  return status;
}
