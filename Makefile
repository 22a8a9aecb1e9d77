# Build, test, check.  `make help` lists the targets; `make V=1` shows the commands.  All that is made lands in build/.
CC     ?= cc
CFLAGS ?= -O3 -g
HARDEN ?= -U_FORTIFY_SOURCE -D_FORTIFY_SOURCE=3 -fstack-protector-strong
BUILD  ?= build
PKGS := gsl yaml-0.1 json-c
DRAW := cairo pangocairo # of what draws alone, which the program loads when it draws
WARN  := -Wall -Wextra -Wpedantic -Wconversion -Wshadow -Wstrict-prototypes -Wmissing-prototypes \
         -Wcast-qual -Wwrite-strings -Wvla -Wformat=2 -Wundef
SAN   := -O1 -g -fsanitize=address,undefined -fno-sanitize-recover=all
STD   := -std=c11 -D_POSIX_C_SOURCE=200809L -Iinclude $(patsubst -I%,-isystem %,$(shell pkg-config --cflags $(PKGS) $(DRAW) 2>/dev/null))
FAST  := -fopenmp-simd -fno-math-errno  # never -ffast-math: NaN and infinity are part of what is checked
ALL_C  = $(STD) -fPIC -fvisibility=hidden $(WARN) $(WERROR) $(HARDEN) $(CPPFLAGS) $(FAST) $(CFLAGS)
LINK   = $(quiet) $(CC) $(CFLAGS) -Wl,-z,relro,-z,now,--as-needed $(LDFLAGS) -o $@
LIBS  := $(shell pkg-config --libs $(PKGS) 2>/dev/null) -lm -pthread
SCREEN_LIBS := $(shell pkg-config --libs ncursesw 2>/dev/null) -ldl
DRAW_LIBS := $(shell pkg-config --libs $(DRAW) 2>/dev/null)
FRONT_LIBS := $(SCREEN_LIBS) $(DRAW_LIBS)
TEST_LIBS  := $(shell pkg-config --libs check vterm 2>/dev/null)

MAIN     := $(wildcard src/command/main.c src/command/drawing.c) # of the program alone, not of the tests
FRONT    := $(sort $(filter-out $(MAIN),$(shell find src/command src/screen src/report -name '*.c' 2>/dev/null)))
ENGINE   := $(sort $(filter-out $(FRONT) $(MAIN),$(shell find src -name '*.c')))
HEADERS  := $(sort $(shell find include -name '*.h'))
TESTS    := $(sort $(shell find tests -name 'test_*.c'))
BENCH    := $(sort $(shell find tests -name 'bench_*.c'))
FUZZ     := $(sort $(shell find tests -name 'fuzz_*.c'))
COMMANDS := $(sort $(shell find tests -name '*.cmd'))
FOLDERS  := $(shell find src -type d)
OURS     := $(ENGINE) $(FRONT) $(MAIN)
LAID_OUT := $(OURS) $(HEADERS) $(shell find tests -name '*.[ch]')
obj   = $(patsubst %.c,$(BUILD)/%.o,$(1))
bin   = $(patsubst %.c,$(BUILD)/%,$(1))
run   = $(patsubst %,$(BUILD)/%.run,$(basename $(1)))
quiet = $(if $(V),,@echo '  $@' &&)
MAKEFLAGS += --no-print-directory
JOBS = $(if $(filter -j%,$(MAKEFLAGS)),,-j$(shell getconf _NPROCESSORS_ONLN 2>/dev/null || echo 1)) # unless -j is given
.DELETE_ON_ERROR:

COMPLETE := $(addprefix $(BUILD)/completions/,bash zsh fish)
all: $(addprefix $(BUILD)/,beamhours beamhours-draw.so libbeamhours.a libbeamhours.so.0) $(COMPLETE) ## build the program and the library
everything: all $(call bin,$(TESTS) $(BENCH))            ## and the tests, without running them
$(BUILD)/beamhours: $(call obj,$(MAIN)) $(BUILD)/front.a $(BUILD)/libbeamhours.a ; $(LINK) -pie $^ $(SCREEN_LIBS) $(LIBS)
$(BUILD)/beamhours-draw.so: $(call obj,$(wildcard src/report/figures/drawing_module.c)) $(BUILD)/front.a $(BUILD)/libbeamhours.a
	$(LINK) -shared $(if $(HARDEN),-Xlinker --no-undefined) $^ $(DRAW_LIBS) $(LIBS)
$(BUILD)/libbeamhours.a $(BUILD)/libbeamhours.so.0: $(call obj,$(ENGINE)) $(FOLDERS)
$(BUILD)/front.a: $(call obj,$(FRONT)) $(FOLDERS)
$(BUILD)/%.a: ; $(quiet) rm -f $@ && ar rcs $@ $(filter %.o,$^)
$(BUILD)/%.so.0: ; $(LINK) -shared -Wl,-soname,$(@F) $(if $(HARDEN),-Xlinker --no-undefined) $(filter %.o,$^) $(LIBS)
TTY := $(filter $(BUILD)/tests/terminal/%,$(call bin,$(TESTS) $(BENCH)))
$(TTY): $(addprefix $(BUILD)/tests/terminal/,tty.o tty_files.o tty_keys.o)
$(BUILD)/tests/terminal/test_disk: | $(BUILD)/tests/terminal/failing.so
$(BUILD)/tests/terminal/failing.so: tests/terminal/failing.c ; $(quiet) mkdir -p $(@D) && $(CC) $(STD) $(WARN) -O1 -fPIC -shared -o $@ $<
$(call bin,$(TESTS) $(BENCH)): %: %.o $(BUILD)/front.a $(BUILD)/libbeamhours.a ; $(LINK) -pie $(filter %.o,$^) $(filter %.a,$^) $(TEST_LIBS) $(FRONT_LIBS) $(LIBS)
$(call bin,$(filter %_faults.c,$(TESTS))): LDFLAGS += $(patsubst %,-Xlinker --wrap=%,malloc calloc realloc write fsync fchmod close rename)
$(call bin,$(filter %_slow.c,$(TESTS))): LDFLAGS += -Xlinker --wrap=bh_structure_eval
$(call bin,$(FUZZ)): %: %.o $(BUILD)/libbeamhours.a ; $(LINK) -fsanitize=fuzzer $^ $(LIBS)
$(BUILD)/%.o: %.c $(BUILD)/flags ; $(quiet) mkdir -p $(@D) && $(CC) $(ALL_C) -MMD -MP -c -o $@ $<
$(COMPLETE): $(BUILD)/completions/%: include/beamhours/command/options.h src/complete.awk
	$(quiet) mkdir -p $(@D) && printf '#include "beamhours/command/options.h"\n#define ROW(...) @@ __VA_ARGS__\nBH_COMMANDS(ROW)\nBH_OPTIONS(ROW)\n' | \
	 $(CC) -E -P -Iinclude - | awk -v shell=$* -f src/complete.awk >$@
FLAGS := $(CC) $(ALL_C) $(LDFLAGS) $(LIBS) $(FRONT_LIBS) $(TEST_LIBS)
$(BUILD)/flags: $(if $(subst x$(FLAGS),,x$(file <$(BUILD)/flags)),changed) # other flags than last time: compile all again
	@mkdir -p $(@D) && printf '%s\n' '$(subst ','\'',$(FLAGS))' >$@

demo: ; @sh src/setup.sh build && $(MAKE) $(JOBS) all && $(BUILD)/beamhours table plans/hydrogen-separation.yaml ## install what is missing, build, print the run table of a demonstration
check: ; @sh src/setup.sh check && $(MAKE) $(JOBS) check-run       ## install what is missing, build, run every test
check-run: all
	@{ $(MAKE) -k -Otarget $(call run,$(TESTS) $(COMMANDS) rules); echo "status $$?"; } 2>&1 | tee $(BUILD)/check.log | grep -v '^status'; \
	 awk -f tests/rules/summary.awk $(BUILD)/check.log
check-all:                                               ## check, all that follows up to fuzz, a trial installation
	@$(MAKE) -k check lint globals sanitize valgrind valgrind-screen enduring coverage fuzz mutate installed papers montecarlo
montecarlo: $(BUILD)/tests/montecarlo/test_montecarlo     ## the demonstrations counted event by event, 10 million a plan and seed
	@MONTE_CARLO_EVENTS=1e7 $<
$(call run,$(TESTS)): %.run: % ; @$(UNDER) $<
$(call run,$(COMMANDS)): $(BUILD)/%.run: %.cmd all ; @UNDER='$(UNDER)' sh tests/commands/run.sh $(BUILD) $<
$(call run,rules): ; @CC='$(CC)' sh tests/rules/selftest.sh
installed: all ; @CC='$(CC)' sh tests/rules/installed.sh   ## a trial installation, used by another program
papers: all                                              ## reports in TeX, a browser and page by page; skipped where absent
	@if command -v python3 >/dev/null; then python3 tests/papers/papers.py $(BUILD); \
	 else echo "skipped: no python3, reports are not looked at"; fi
lint: floors docs-lint                                   ## layout, warnings of gcc and clang, clang-tidy, cppcheck
	@clang-format --dry-run --Werror $(LAID_OUT)
	@$(MAKE) objects CC=gcc WERROR=-Werror BUILD=$(BUILD)/gcc
	@printf '%s\n' $(OURS) $(TESTS) $(BENCH) | xargs -n 8 -P 2 clang -fsyntax-only -Werror $(STD) $(WARN) \
	 $(shell pkg-config --cflags-only-I check vterm 2>/dev/null)
	@printf '%s\n' $(OURS) | xargs -n 2 -P 2 sh -c 'clang-tidy --quiet "$$@" -- $(STD) $(WARN)' -
	@cppcheck --quiet --std=c11 --enable=warning,style,performance,portability --inline-suppr \
	 --suppress=missingIncludeSystem --error-exitcode=1 -Iinclude src
objects: $(call obj,$(OURS) $(TESTS) $(BENCH))
floors: ; @awk -f tests/rules/floors.awk $(OURS) $(HEADERS) ## a room includes only lower rooms
docs-lint: ; @awk -f tests/rules/headers.awk $(HEADERS)  ## every number in a header has its unit
GUARDED := $(ENGINE) $(filter src/report/%,$(FRONT))
globals:                                                 ## no writable data in the library and in reports
	@$(MAKE) -s CFLAGS=-O0 HARDEN= BUILD=$(BUILD)/globals $(patsubst %.c,$(BUILD)/globals/%.o,$(GUARDED))
	@objdump -wht $(patsubst %.c,$(BUILD)/globals/%.o,$(GUARDED)) | awk -v objects=$(words $(GUARDED)) -f tests/rules/globals.awk
sanitize:                                                ## the tests under ASan and UBSan
	@LSAN_OPTIONS=suppressions=$(CURDIR)/tests/rules/leaks.lsan:print_suppressions=0 CK_FORK=no \
	 $(MAKE) check-run HARDEN= BUILD=$(BUILD)/san CFLAGS='$(SAN)'
GRIND := valgrind -q --leak-check=full --error-exitcode=99 --suppressions=$(CURDIR)/tests/rules/leaks.valgrind
valgrind:                                                ## the tests under valgrind
	@CK_FORK=no MONTE_CARLO_EVENTS=20000 $(MAKE) check-run HARDEN= BUILD=$(BUILD)/valgrind UNDER='$(GRIND)'
valgrind-demo: all                                       ## the main job under valgrind: the demonstrations' tables, one explained row
	@for c in $(patsubst %,'table --bins %',$(wildcard plans/*.yaml)) 'explain plans/hydrogen-separation.yaml low-1'; do \
	 $(GRIND) $(BUILD)/beamhours $$c >$(BUILD)/valgrind.out 2>&1 || { cat $(BUILD)/valgrind.out; exit 1; }; done
# A program below the pseudo-terminal says into a file what it finds, and ends with status 99.  Its threads
# take turns: else one that computes lets the one that minds the keys wait for minutes on a busy machine.
GRIND_LOGS := $(abspath $(BUILD))/grind
SCREENS := $(filter %/test_terminal %/test_safety %/test_sessions %/test_suspend %/test_disk %/test_rights,$(call bin,$(TESTS)))
valgrind-screen: $(BUILD)/beamhours $(BUILD)/tests/terminal/test_terminal ## a session on the terminal screen under valgrind
	@rm -rf $(GRIND_LOGS) && mkdir -p $(GRIND_LOGS) && bad=0; \
	 PATIENCE=300 TTY_UNDER='$(GRIND) --fair-sched=yes --log-file=$(GRIND_LOGS)/%p.log' $(BUILD)/tests/terminal/test_terminal || bad=1; \
	 find $(GRIND_LOGS) -type f -size +0 -exec cat {} +; exit $$bad
enduring: all $(SCREENS)                                 ## the tests of the terminal screen ENDURE times (50) in a row, every processor busy
	@sh tests/terminal/endure.sh '$(or $(ENDURE),50)' $(SCREENS)
coverage:                                                ## lines of src/ that the tests reach
	@rm -rf $(BUILD)/cov && $(MAKE) check-run CC=gcc HARDEN= BUILD=$(BUILD)/cov CFLAGS='-O0 -g --coverage'
	gcovr -r . --object-directory $(BUILD)/cov -f src/ --txt | awk -f tests/rules/coverage.awk
mutate: everything                                       ## one sign, power, mass or factor wrong at a time: a test must notice
	@CC='$(CC)' COMPILE='$(ALL_C) $(LDFLAGS)' LINKS='$(TEST_LIBS) $(FRONT_LIBS) $(LIBS)' sh tests/mutation/mutate.sh $(BUILD)
fuzz:                                                    ## each harness for FUZZ_SECONDS (10)
	@$(MAKE) -k fuzz-run CC=clang HARDEN= BUILD=$(BUILD)/fuzz CFLAGS='$(SAN) -fsanitize=fuzzer-no-link'
fuzz-run: $(call run,$(FUZZ))
$(call run,$(FUZZ)): $(BUILD)/%.run: $(BUILD)/%
	@mkdir -p $<.found && $< -max_total_time=$(or $(FUZZ_SECONDS),10) -artifact_prefix=$<. $<.found $(wildcard $*.seeds) $(addprefix -dict=,$(wildcard $*.dict))
bench: all $(call bin,$(BENCH))                          ## times as ratios, a goal a line; BENCH_STRICT=1: a miss fails
	@bad=0; for b in $(call bin,$(BENCH)); do echo "$${b##*/}:"; $$b || bad=1; done; exit $$bad
screens: $(BUILD)/tests/screen/test_shown ; @ACCEPT=yes $< && git diff --stat docs/screens ## write docs/screens anew
format: ; @clang-format -i $(LAID_OUT)                    ## rewrite the layout
install: all ; @BUILD=$(BUILD) PKGS='$(PKGS)' sh src/install.sh ## into PREFIX (/usr/local), LIBDIR, DESTDIR
uninstall: ; @sh src/install.sh remove                   ## with the same PREFIX, LIBDIR, DESTDIR
clean: ; rm -rf $(BUILD)                                 ## remove all that is made
help: ; @sed -nE 's/^([a-z-]+):.*## /\1\t/p' Makefile | expand -t 12 ## list the targets
.PHONY: $(shell sed -nE 's/^([a-z-]+):.*/\1/p' Makefile) changed $(call run,$(TESTS) $(COMMANDS) $(FUZZ) rules)
-include $(patsubst %.c,$(BUILD)/%.d,$(OURS) $(TESTS) $(BENCH) $(FUZZ))
