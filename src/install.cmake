# SPDX-License-Identifier: Apache-2.0
# cmake --install and the package for find_package(wellwright [COMPONENTS rooms...]).
include(CMakePackageConfigHelpers)
set(package_folder ${CMAKE_INSTALL_LIBDIR}/cmake/wellwright)

install(TARGETS wellwright RUNTIME DESTINATION ${CMAKE_INSTALL_BINDIR})
install(TARGETS wellwright_library EXPORT wellwright)
install(DIRECTORY ${PROJECT_SOURCE_DIR}/include/ DESTINATION ${CMAKE_INSTALL_INCLUDEDIR})
install(FILES ${PROJECT_SOURCE_DIR}/LICENSE DESTINATION ${CMAKE_INSTALL_DOCDIR})
install(EXPORT wellwright NAMESPACE wellwright:: FILE wellwright-targets.cmake DESTINATION ${package_folder})

# Which libraries each room brings along, so that a program that links one room finds no more than it needs.
get_property(rooms GLOBAL PROPERTY WELLWRIGHT_ROOMS)
set(WELLWRIGHT_NEEDS "")
foreach(room IN LISTS rooms)
  get_property(found GLOBAL PROPERTY WELLWRIGHT_NEEDS_${room})
  string(REPLACE ";" " " found "${found}")
  string(APPEND WELLWRIGHT_NEEDS "set(_wellwright_needs_${room} ${found})\n")
endforeach()
string(REPLACE ";" " " WELLWRIGHT_ROOMS "${rooms}")
configure_package_config_file(${CMAKE_CURRENT_SOURCE_DIR}/wellwright-config.cmake.in
  ${CMAKE_CURRENT_BINARY_DIR}/wellwright-config.cmake INSTALL_DESTINATION ${package_folder})
write_basic_package_version_file(${CMAKE_CURRENT_BINARY_DIR}/wellwright-config-version.cmake
  COMPATIBILITY SameMinorVersion)
install(FILES ${CMAKE_CURRENT_BINARY_DIR}/wellwright-config.cmake
              ${CMAKE_CURRENT_BINARY_DIR}/wellwright-config-version.cmake DESTINATION ${package_folder})
