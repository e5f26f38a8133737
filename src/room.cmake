# SPDX-License-Identifier: Apache-2.0
# room(NAME USES rooms... LIBS libraries...): a static library of src/NAME/*.cpp with the public header
# include/wellwright/NAME.hpp, a compile check of that header alone, and a test of its includes.

# library(NAME items... [PACKAGE words...]): a name that a room asks for under LIBS. Header-only libraries are needed to
# build the rooms only; a library that is linked names the words that find it again from an installed package.
function(library NAME)
  cmake_parse_arguments(L "" "" "ITEMS;PACKAGE" ${ARGN})
  add_library(lib_${NAME} INTERFACE)
  foreach(item IN LISTS L_ITEMS)
    if(IS_DIRECTORY "${item}")
      target_include_directories(lib_${NAME} SYSTEM INTERFACE ${item})
    else()
      target_link_libraries(lib_${NAME} INTERFACE ${item})
    endif()
  endforeach()
  string(REPLACE ";" " " find "${L_PACKAGE}")
  set_property(GLOBAL PROPERTY WELLWRIGHT_FIND_${NAME} "${find}")
endfunction()

library(udunits  ITEMS ${UDUNITS2_INCLUDE} ${UDUNITS2_LIBRARY} PACKAGE udunits)
library(yaml     ITEMS yaml-cpp PACKAGE yaml-cpp)
library(fmt      ITEMS fmt::fmt PACKAGE fmt)
library(json     ITEMS nlohmann_json::nlohmann_json)
library(cli11    ITEMS CLI11::CLI11)
library(spectra  ITEMS ${SPECTRA_INCLUDE})
library(hdf5     ITEMS ${hdf5_items} PACKAGE hdf5)
library(tbb      ITEMS TBB::tbb PACKAGE TBB)

# Flags for our own code only.
add_library(wellwright_flags INTERFACE)
target_compile_options(wellwright_flags INTERFACE -Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wno-sign-conversion)
if(CMAKE_CXX_COMPILER_ID STREQUAL "GNU" AND CMAKE_CXX_COMPILER_VERSION VERSION_LESS 13)
  target_compile_options(wellwright_flags INTERFACE -Wno-restrict)  # false alarms on std::string, GCC bug 105651
endif()
if(WELLWRIGHT_STRICT)
  target_compile_options(wellwright_flags INTERFACE -Werror)
endif()
if(WELLWRIGHT_SANITIZE)
  target_compile_options(wellwright_flags INTERFACE -fsanitize=address,undefined -fno-sanitize-recover=all
                                                    -fno-omit-frame-pointer)
  target_link_options(wellwright_flags INTERFACE -fsanitize=address,undefined)
endif()
if(WELLWRIGHT_FUZZ)  # every room counts its branches for the fuzzer; only its own program links the engine
  target_compile_options(wellwright_flags INTERFACE -fsanitize=fuzzer-no-link,address,undefined
                                                    -fno-sanitize-recover=all)
  target_link_options(wellwright_flags INTERFACE -fsanitize=address,undefined)
endif()

set_property(GLOBAL PROPERTY WELLWRIGHT_ROOMS "")

function(room NAME)
  cmake_parse_arguments(ROOM "" "" "USES;LIBS" ${ARGN})
  get_property(above GLOBAL PROPERTY WELLWRIGHT_ROOMS)
  set(allowed ${NAME})
  foreach(used IN LISTS ROOM_USES)
    if(NOT used IN_LIST above)
      message(FATAL_ERROR "room ${NAME} uses ${used}, which is not declared above it in src/CMakeLists.txt")
    endif()
    get_property(below GLOBAL PROPERTY WELLWRIGHT_BELOW_${used})
    list(APPEND allowed ${below})
  endforeach()
  list(REMOVE_DUPLICATES allowed)
  set_property(GLOBAL PROPERTY WELLWRIGHT_BELOW_${NAME} ${allowed})
  set_property(GLOBAL APPEND PROPERTY WELLWRIGHT_ROOMS ${NAME})

  file(GLOB sources CONFIGURE_DEPENDS ${CMAKE_CURRENT_SOURCE_DIR}/${NAME}/*.cpp)
  list(FILTER sources EXCLUDE REGEX "/main\\.cpp$")
  add_library(wellwright_${NAME} STATIC ${sources} ${WELLWRIGHT_GENERATED_${NAME}})
  add_library(wellwright::${NAME} ALIAS wellwright_${NAME})
  set_target_properties(wellwright_${NAME} PROPERTIES EXPORT_NAME ${NAME} LINKER_LANGUAGE CXX)
  target_compile_features(wellwright_${NAME} PUBLIC cxx_std_20)
  target_include_directories(wellwright_${NAME}
    PUBLIC $<BUILD_INTERFACE:${PROJECT_SOURCE_DIR}/include> $<INSTALL_INTERFACE:${CMAKE_INSTALL_INCLUDEDIR}>
    PRIVATE ${CMAKE_CURRENT_SOURCE_DIR})
  target_link_libraries(wellwright_${NAME} PUBLIC Eigen3::Eigen PRIVATE $<BUILD_INTERFACE:wellwright_flags>)
  foreach(used IN LISTS ROOM_USES)
    target_link_libraries(wellwright_${NAME} PUBLIC wellwright_${used})
  endforeach()
  set(found "")  # what a program that links this room has to find again
  foreach(used IN LISTS ROOM_USES)
    get_property(below GLOBAL PROPERTY WELLWRIGHT_NEEDS_${used})
    list(APPEND found ${below})
  endforeach()
  foreach(library IN LISTS ROOM_LIBS)
    target_link_libraries(wellwright_${NAME} PRIVATE $<BUILD_INTERFACE:lib_${library}>)
    get_property(find GLOBAL PROPERTY WELLWRIGHT_FIND_${library})
    if(find)
      target_link_libraries(wellwright_${NAME} PRIVATE $<INSTALL_INTERFACE:wellwright::lib_${library}>)
      list(APPEND found ${library})
    endif()
  endforeach()
  list(REMOVE_DUPLICATES found)
  set_property(GLOBAL PROPERTY WELLWRIGHT_NEEDS_${NAME} "${found}")
  install(TARGETS wellwright_${NAME} EXPORT wellwright)

  # The public header compiles alone, and twice.
  if(WELLWRIGHT_TESTS)
    set(alone ${CMAKE_CURRENT_BINARY_DIR}/alone/${NAME}.cpp)
    file(CONFIGURE OUTPUT ${alone} CONTENT
      "#include \"wellwright/${NAME}.hpp\"\n#include \"wellwright/${NAME}.hpp\"\n")
    add_library(alone_${NAME} OBJECT ${alone})
    target_include_directories(alone_${NAME} PRIVATE ${PROJECT_SOURCE_DIR}/include)
    target_link_libraries(alone_${NAME} PRIVATE Eigen3::Eigen wellwright_flags)
    target_compile_features(alone_${NAME} PRIVATE cxx_std_20)

    string(REPLACE ";" "," list "${allowed}")
    add_test(NAME rooms.${NAME}
      COMMAND ${CMAKE_COMMAND} -DROOM=${NAME} -DALLOWED=${list} -DROOT=${PROJECT_SOURCE_DIR}
              -P ${PROJECT_SOURCE_DIR}/tests/rooms/includes.cmake)
  endif()
endfunction()
