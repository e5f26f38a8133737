# SPDX-License-Identifier: Apache-2.0
# Install, move, build outside programs, run them and the installed command.
cmake_minimum_required(VERSION 3.22)

function(step NAME)
  execute_process(COMMAND ${ARGN} RESULT_VARIABLE result OUTPUT_VARIABLE output ERROR_VARIABLE output)
  if(NOT result EQUAL 0)
    message(FATAL_ERROR "${NAME} failed (${result}):\n${output}")
  endif()
  message(STATUS "${NAME}: fine")
  set(output "${output}" PARENT_SCOPE)
endfunction()

file(REMOVE_RECURSE ${WORK}/prefix ${WORK}/moved ${WORK}/outside ${WORK}/levels_only)
step("install" ${CMAKE_COMMAND} --install ${BUILD} --prefix ${WORK}/prefix)
file(RENAME ${WORK}/prefix ${WORK}/moved)  # an installed package does not know where it was installed

# No path of the build or of the checkout may have got into the package.
file(GLOB_RECURSE package ${WORK}/moved/*.cmake)
get_filename_component(checkout ${HERE}/../.. ABSOLUTE)
foreach(file IN LISTS package)
  file(STRINGS ${file} lines)
  foreach(line IN LISTS lines)
    string(FIND "${line}" "${BUILD}" at_build)
    string(FIND "${line}" "${checkout}" at_checkout)
    if(NOT at_build EQUAL -1 OR NOT at_checkout EQUAL -1)
      message(FATAL_ERROR "${file} holds a path of the build:\n${line}")
    endif()
  endforeach()
endforeach()

set(flags "")
if(SANITIZE)  # the archives need the run-time library of the sanitizers
  set(flags -DCMAKE_CXX_FLAGS=-fsanitize=address,undefined)
endif()
foreach(program outside levels_only)
  step("configure ${program}" ${CMAKE_COMMAND} -G ${GENERATOR} -S ${HERE}/${program} -B ${WORK}/${program}
       -DCMAKE_PREFIX_PATH=${WORK}/moved -DCMAKE_BUILD_TYPE=Release ${flags})
  step("build ${program}" ${CMAKE_COMMAND} --build ${WORK}/${program})
  step("run ${program}" ${WORK}/${program}/program)
  message(STATUS "${output}")
endforeach()

# What the levels need is found, and nothing beyond.
file(STRINGS ${WORK}/levels_only/CMakeCache.txt beyond REGEX "^(HDF5|TBB|nlohmann)")
if(beyond)
  message(FATAL_ERROR "find_package(wellwright COMPONENTS levels) looked for more than the levels need:\n${beyond}")
endif()

# The command needs no file beside it: it runs from the moved folder with an empty environment.
step("installed command" env -i ${WORK}/moved/bin/wellwright --version)
if(NOT output STREQUAL "wellwright ${VERSION}\n")
  message(FATAL_ERROR "wellwright --version says: ${output}")
endif()
step("installed table" env -i ${WORK}/moved/bin/wellwright materials GaAs)
